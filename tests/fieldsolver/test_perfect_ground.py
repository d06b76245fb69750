"""A perfect ground is its image."""

import numpy as np
import pytest

import fieldsolver as fs
from tests.fieldsolver.reactions import reaction_of_a_sine

FREQUENCY = 299_792_458.0  # wavelength 1 m
POINTS = np.array([[0.1, 0.2, 0.05], [0.3, 0.1, 0.4], [0.02, 0.05, 0.0], [3, -2, 1.0]])


def test_a_horizontal_dipole_over_perfect_ground_is_two_opposite_dipoles():
    """Image theory: the same equations twice, so rounding only (1e-10 relative)."""
    above = fs.Wire((-0.25, 0, 0.1), (0.25, 0, 0.1), 1e-3)
    below = fs.Wire((-0.25, 0, -0.1), (0.25, 0, -0.1), 1e-3)
    grounded = fs.solve([above], [fs.Feed(0)], FREQUENCY, fs.PERFECT_GROUND)
    pair = fs.solve([above, below], [fs.Feed(0), fs.Feed(1, voltage=-1)], FREQUENCY)

    assert grounded.feed_impedances[0] == pytest.approx(pair.feed_impedances[0], rel=1e-10)
    ours, images = fs.near_field(grounded, POINTS), fs.near_field(pair, POINTS)
    assert ours.electric == pytest.approx(images.electric, abs=1e-9)
    assert ours.magnetic == pytest.approx(images.magnetic, abs=1e-12)


def test_a_monopole_has_half_the_impedance_of_the_dipole_and_its_field():
    """Image theory; the monopole's joint with the ground is the dipole's centre."""
    monopole = fs.solve(
        [fs.Wire((0, 0, 0), (0, 0, 0.25), 1e-3)], [fs.Feed(0, 0)], FREQUENCY, fs.PERFECT_GROUND
    )
    dipole = fs.solve([fs.Wire((0, 0, -0.25), (0, 0, 0.25), 1e-3)], [fs.Feed(0, voltage=2)], FREQUENCY)

    assert 2 * monopole.feed_impedances[0] == pytest.approx(dipole.feed_impedances[0], rel=1e-9)
    assert fs.near_field(monopole, POINTS).electric == pytest.approx(
        fs.near_field(dipole, POINTS).electric, abs=1e-8
    )


def test_a_sloping_wire_on_the_ground_equals_the_bent_dipole():
    """Image theory where the joint turns, kernel rule 2 across the image."""
    slope = fs.solve(
        [fs.Wire((0, 0, 0), (0.2, 0, 0.15), 1e-3)], [fs.Feed(0, 0)], FREQUENCY, fs.PERFECT_GROUND
    )
    arms = [fs.Wire((0, 0, 0), (0.2, 0, 0.15), 1e-3), fs.Wire((0.2, 0, -0.15), (0, 0, 0), 1e-3)]
    bent = fs.solve(arms, [fs.Feed(1, 1, voltage=2)], FREQUENCY)

    assert 2 * slope.feed_impedances[0] == pytest.approx(bent.feed_impedances[0], rel=1e-9)


def test_a_short_monopole_makes_300_mV_per_m_at_1_km_for_1_kW():
    """ITU-R P.368-10 reference radiator (second-hand); sqrt(90 P)/r = 300.0 mV/m by closed form.

    0.2 %: a monopole of a thirtieth of a wavelength instead of an infinitesimal one (+0.02 %), on
    the ground at 1 km where 1/(k r) = 0.05 adds (1/2)(1/kr)^4 to nothing.
    """
    currents = fs.solve([fs.Wire((0, 0, 0), (0, 0, 10), 0.01)], [fs.Feed(0, 0)], 1e6, fs.PERFECT_GROUND)

    field = fs.near_field(currents.scaled_to(1000.0), [[1000.0, 0, 0]])

    assert field.electric_strength[0] == pytest.approx(0.300, rel=0.002)


@pytest.mark.parametrize(
    "height, impedance",
    [(0.05, 5.79 + 34.98j), (0.1, 21.72 + 61.67j), (0.25, 85.60 + 72.42j), (0.5, 69.07 + 24.79j)],
)
def test_induced_voltage_of_a_half_wave_dipole_over_perfect_ground(height, impedance):
    """P. S. Carter's closed form for a sinusoidal current (values: shared facts, formulas 2).

    The reaction of a sine with itself through our matrix.  0.05 ohm: half of the printed digits plus
    the chord of the sine at 200 segments a wavelength, 3e-5 of 100 ohm; X feels the wire's radius
    only in free space, so the image's part is compared for it.
    """
    wire = fs.Wire((-0.25, 0, height), (0.25, 0, height), 1e-5)

    over = reaction_of_a_sine(wire, fs.PERFECT_GROUND, FREQUENCY, segments_per_wavelength=200)

    alone = reaction_of_a_sine(wire, fs.FREE_SPACE, FREQUENCY, segments_per_wavelength=200)
    assert over.real == pytest.approx(impedance.real, abs=0.05)
    assert (over - alone).imag == pytest.approx(impedance.imag - 42.52, abs=0.05)


@pytest.mark.parametrize(
    "wire", [((-0.25, 0, 0.2), (0.25, 0, 0.2)), ((0, 0, 0), (0, 0, 0.25)), ((0, 0, 0), (0.2, 0, 0.3))]
)
def test_power_balance_closes_over_perfect_ground(wire):
    currents = fs.solve([fs.Wire(*wire, 1e-4)], [fs.Feed(0, 0.5)], FREQUENCY, fs.PERFECT_GROUND)

    assert currents.ground_loss == 0
    assert abs(fs.quality(currents).power_balance) < 2e-6


def test_points_below_ground_are_refused():
    currents = fs.solve(
        [fs.Wire((0, 0, 0), (0, 0, 0.25), 1e-3)], [fs.Feed(0, 0)], FREQUENCY, fs.PERFECT_GROUND
    )
    with pytest.raises(fs.PointError):
        fs.near_field(currents, [[1, 0, -0.1]])
