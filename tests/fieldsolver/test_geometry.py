"""What the thin-wire model accepts, and how it says what it does not."""

import math

import pytest

import fieldsolver as fs
from fieldsolver.segments import mesh

WAVELENGTH_1_M = 299_792_458.0


def grid(*wires, ground=fs.FREE_SPACE, cuts=()):
    return mesh(wires, cuts, WAVELENGTH_1_M, ground)


@pytest.mark.parametrize(
    "start, end, radius, words",
    [
        ((0, 0, 0), (0, 0, 0), 0.001, "too short"),
        ((0, 0, 0), (0, 0, 0.0019), 0.001, "two radii"),
        ((0, 0, 0), (0, 0, 1), 0.0, "positive"),
        ((0, 0, 0), (0, 0, math.nan), 0.001, "finite numbers"),
        ((0, 0), (0, 0, 1), 0.001, "three"),
    ],
)
def test_a_wire_that_is_not_thin_or_not_a_wire_is_refused(start, end, radius, words):
    with pytest.raises(fs.GeometryError, match=words):
        fs.Wire(start, end, radius)


def test_an_insulated_wire_is_refused_by_name():
    with pytest.raises(fs.GeometryError, match="coatings are not modelled"):
        fs.Wire((0, 0, 0), (0, 0, 1), 1e-3, coating=object())


@pytest.mark.parametrize(
    "arguments, words",
    [
        ({"impedance": -1}, "not negative"),
        ({"impedance": 50, "resistance": 1.0}, "either"),
        ({"capacitance": 0.0}, "positive"),
        ({"resistance": 5.0, "connection": "star"}, "series"),
    ],
)
def test_a_load_that_is_not_passive_or_ambiguous_is_refused(arguments, words):
    with pytest.raises(fs.GeometryError, match=words):
        fs.Load(0, 0.5, **arguments)


def test_a_parallel_circuit_without_resistance_has_no_impedance_at_resonance():
    inductance, capacitance = 1e-6, 1e-12
    load = fs.Load(0, 0.5, inductance=inductance, capacitance=capacitance, connection="parallel")

    with pytest.raises(fs.GeometryError, match="no finite impedance"):
        load.at(1 / math.sqrt(inductance * capacitance))


def test_parts_of_a_load_join_in_series_and_in_parallel():
    """Circuit theory: Z = R + jwL + 1/jwC; 1/Z = 1/R + 1/jwL + jwC.  Exact to rounding."""
    omega = 2 * math.pi * 7e6
    parts = {"resistance": 10.0, "inductance": 2e-6, "capacitance": 50e-12}
    inductor, capacitor = 1j * omega * 2e-6, 1 / (1j * omega * 50e-12)

    assert fs.Load(0, 0.5, **parts).at(omega) == pytest.approx(10 + inductor + capacitor, rel=1e-12)
    parallel = fs.Load(0, 0.5, **parts, connection="parallel").at(omega)
    assert parallel == pytest.approx(1 / (1 / 10 + 1 / inductor + 1 / capacitor), rel=1e-12)


def test_ends_within_a_tenth_of_a_radius_are_one_joint():
    joined = grid(fs.Wire((0, 0, 0), (0, 0, 1), 0.01), fs.Wire((0, 0, 1.0009), (0, 1, 1), 0.01))

    assert joined.nodes[joined.wire == 0][-1, 1] == joined.nodes[joined.wire == 1][0, 0]


def test_an_end_on_the_axis_of_another_wire_puts_a_node_there():
    joined = grid(fs.Wire((0, 0, 0), (0, 0, 1), 0.01), fs.Wire((0.005, 0, 0.37), (1, 0, 0.37), 0.01))

    node = joined.nodes[joined.wire == 1][0, 0]
    assert (joined.nodes[joined.wire == 0] == node).sum() == 2
    assert 0.37 in joined.fractions[0].round(9)


def test_wires_that_cross_without_a_joint_are_refused_by_name_and_gap():
    with pytest.raises(fs.GeometryError, match=r"conductors 0 and 1 touch or cross.*0\.015 m"):
        grid(fs.Wire((-1, 0, 0), (1, 0, 0), 0.01), fs.Wire((0, -1, 0.015), (0, 1, 0.015), 0.01))


def test_a_gap_under_four_radii_is_a_warning():
    close = grid(fs.Wire((-1, 0, 0), (1, 0, 0), 0.01), fs.Wire((0, -1, 0.05), (0, 1, 0.05), 0.01))

    assert "conductors 0 and 1" in close.warnings[0] and "0.03 m" in close.warnings[0]


def test_a_wire_folded_back_on_another_is_refused():
    with pytest.raises(fs.GeometryError, match="lie on each other"):
        grid(fs.Wire((0, 0, 0), (1, 0, 0), 0.01), fs.Wire((1, 0, 0), (0.2, 0.001, 0), 0.01))


@pytest.mark.parametrize(
    "start, end, words",
    [
        ((0, 0, -0.5), (0, 0, 1), "below the ground"),
        ((0, 0, 0.005), (1, 0, 0.005), "surface of the ground"),
        ((0, 0, 0), (1, 0, 0), "surface of the ground"),
    ],
)
def test_a_wire_in_or_under_the_ground_is_refused(start, end, words):
    with pytest.raises(fs.GeometryError, match=words):
        grid(fs.Wire(start, end, 0.01), ground=fs.PERFECT_GROUND)


def test_a_tenth_of_a_radius_above_ground_counts_as_on_it():
    touching = grid(fs.Wire((0, 0, 0.0009), (0, 0, 1), 0.01), ground=fs.PERFECT_GROUND)

    assert touching.grounded.sum() == 1 and touching.start[0, 2] == 0


def test_the_default_mesh_has_forty_segments_a_wavelength_and_ten_a_wire():
    """docs/theory.md, mesh."""
    assert grid(fs.Wire((0, 0, 0), (0, 0, 2), 1e-4)).count == 80
    assert grid(fs.Wire((0, 0, 0), (0, 0, 0.05), 1e-4)).count == 10


@pytest.mark.parametrize("position", [0.0, 1.0])
def test_a_feed_at_a_free_end_is_refused(position):
    with pytest.raises(fs.GeometryError, match="free end"):
        fs.solve([fs.Wire((0, 0, 0), (0, 0, 0.5), 1e-3)], [fs.Feed(0, position)], WAVELENGTH_1_M)


def test_a_feed_inside_a_wire_where_another_is_joined_is_ambiguous():
    wires = [fs.Wire((0, 0, 0), (0, 0, 1), 1e-3), fs.Wire((0, 0, 0.5), (1, 0, 0.5), 1e-3)]
    with pytest.raises(fs.GeometryError, match="another conductor is joined"):
        fs.solve(wires, [fs.Feed(0, 0.5)], WAVELENGTH_1_M)


def test_a_feed_on_a_conductor_that_is_not_there_is_refused():
    with pytest.raises(fs.GeometryError, match="conductor 3"):
        fs.solve([fs.Wire((0, 0, 0), (0, 0, 1), 1e-3)], [fs.Feed(3)], WAVELENGTH_1_M)


def test_real_ground_asks_for_the_ground_connection_by_name():
    ground = fs.LossyGround(13, 0.005)
    with pytest.raises(fs.GeometryError, match="state its ground connection"):
        fs.solve([fs.Wire((0, 0, 0), (0, 0, 10), 1e-2)], [fs.Feed(0, 0.5)], 7e6, ground)


@pytest.mark.parametrize("permittivity, conductivity", [(0.5, 0.01), (10, -1), (math.nan, 0)])
def test_a_ground_that_is_not_passive_is_refused(permittivity, conductivity):
    with pytest.raises(fs.GeometryError):
        fs.LossyGround(permittivity, conductivity)
