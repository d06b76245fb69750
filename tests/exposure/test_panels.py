"""Adaptive Chebyshev panels against functions that are known everywhere."""

import numpy as np
import pytest

from exposure.assessment.panels import blind, cut, halved, nodes, refined, sampled, strengths_of
from exposure.assessment.strengths import FieldStrengths, remembered
from tests.exposure.positions import GARDEN_WIRE, Counted, garden


def everything(lower, upper):
    return np.ones(len(lower), bool)


@pytest.mark.parametrize("order", [3, 5, 8])
def test_a_polynomial_exponential_is_its_own_interpolant(order):
    """exp of a polynomial of degree order - 1 has no interpolation error: rounding only (1e-12)."""
    powers = np.arange(order)

    def function(p):
        return np.exp((p[:, :1] ** powers).sum(axis=1) * p[:, 1])[:, None]

    panel = sampled(function, np.array([[0.0, 0.5]]), np.array([[1.0, 1.5]]), (order, order))

    places = np.random.default_rng(1).uniform([0, 0.5], [1, 1.5], (50, 2))
    found = strengths_of(panel.at(np.zeros(50, int), places))
    assert found == pytest.approx(function(places), rel=1e-11)


@pytest.mark.parametrize("side", [1.0, 2.0, 4.0])
@pytest.mark.parametrize("order", [5, 7])
def test_tails_are_no_smaller_than_the_error_of_a_dipole_field(order, side):
    """The error that the last coefficients promise is met at 500 random places of 60 panels.

    The sizes are those of the searches: up to a fifth of a wavelength, two metres from the wire.
    """
    random = np.random.default_rng(3)
    lower = np.column_stack([random.uniform(-8, 8, 60), random.uniform(2, 9, 60)])
    plane = np.full(2, side)

    def function(p):
        return garden()(np.column_stack([p, np.full(len(p), 8.0)]))

    panels = sampled(function, lower, lower + plane, (order, order))
    which = np.repeat(np.arange(60), 500)
    places = lower[which] + random.uniform(0, side, (len(which), 2))
    error = np.abs(panels.at(which, places) - np.log(function(places)))

    assert np.all(error <= panels.errors[which] + 1e-9)


def test_a_refined_region_is_covered_once():
    """The areas of the leaves add up to the area of the region."""
    lower, upper = cut([0, 0], [3.0, 2.0], 1.1)

    def direction(panels):
        return np.where((panels.lower[:, 0] == 0) & (panels.sides[:, 0] > 0.2), 0, -1)

    leaves = refined(lambda p: 1 + p**2, lower, upper, (3, 3), direction, everything)

    assert leaves.sides.prod(axis=1).sum() == pytest.approx(6.0, rel=1e-12)
    assert leaves.sides[:, 0].min() < 0.2


def test_a_level_of_refinement_is_one_call():
    """Four levels of halving ask the function four times."""
    function = Counted(lambda p: 1 + p**2)
    lower, upper = np.zeros((1, 2)), np.ones((1, 2))

    refined(function, lower, upper, (4, 4), lambda p: np.where(p.sides[:, 0] > 0.2, 0, -1), everything)

    assert function.calls == 4


def test_no_point_is_evaluated_twice():
    """Both halves of a panel of five by five nodes need 45 points, 15 of them known: 3 rows of 5."""
    function = Counted(lambda p: 1 + p**2)
    known = remembered(function)
    lower, upper = np.zeros((1, 2)), np.ones((1, 2))

    sampled(known, lower, upper, (5, 5))
    sampled(known, *halved(lower, upper, np.array([0])), (5, 5))

    assert function.points == 25 + 45 - 15


@pytest.mark.parametrize("order", [3, 5, 7])
def test_a_conductor_that_crosses_a_panel_is_noticed_wherever_it_lies(order):
    """Straight wires through 400 random places of a panel, in random directions."""
    random = np.random.default_rng(5)
    panel = sampled(lambda p: 1 + p**2, np.zeros((1, 3)), np.array([[1.0, 2.0, 0.5]]), (order,) * 3)
    for place, along in zip(
        random.uniform(0, [1, 2, 0.5], (400, 3)), random.normal(size=(400, 3)), strict=True
    ):
        wire = np.array([place - 5 * along, place + 5 * along])
        strengths = FieldStrengths(None, (wire,), 1.0)
        assert blind(panel, strengths.distance).all()


def test_distance_from_the_conductors():
    """Beside, beyond the end of, and on a level wire from x = -5 to 5, 9 m high (by hand)."""
    strengths = FieldStrengths(None, (GARDEN_WIRE,), 21.0)
    points = np.array([[0.0, 3.0, 5.0], [8.0, 0.0, 5.0], [1.0, 0.0, 9.0]])

    assert strengths.distance(points) == pytest.approx([5.0, 5.0, 0.0])
    assert strengths.plan_distance(points) == pytest.approx([3.0, 3.0, 0.0])


def test_nodes_hold_both_ends():
    """Extremal nodes: corners and edges of a region are sampled as they stand."""
    assert nodes(5)[[0, 2, 4]] == pytest.approx([-1, 0, 1], abs=1e-15)
