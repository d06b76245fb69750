"""Wires over real flat ground."""

import numpy as np
import pytest

import fieldsolver as fs
from tests.fieldsolver.reactions import reaction, reaction_of_a_sine

C = 299_792_458.0
AVERAGE = fs.LossyGround(13, 0.005)
DRY = fs.LossyGround(3, 0.0001)
MOIST = fs.LossyGround(30, 0.01)

# shared facts, formulas 2 [computed from the exact one-dimensional integrals]: resistance over its
# free-space value, horizontal and vertical short dipole, soil 13, 0.005 S/m
SHORT_DIPOLES = [
    # h/lambda   MHz   horizontal vertical
    (0.02, 3.6, 7.676, 16.344),
    (0.02, 14.2, 7.280, 14.931),
    (0.05, 3.6, 1.324, 3.826),
    (0.05, 50.0, 1.447, 3.252),
    (0.10, 14.2, 0.903, 2.190),
    (0.25, 3.6, 1.178, 1.228),
    (0.25, 50.0, 1.099, 1.183),
    (0.50, 14.2, 0.960, 0.955),
    (1.00, 14.2, 0.986, 0.989),
]


def short_dipole_ratio(direction, height, frequency):
    """Resistance of a triangular current on 0.003 wavelengths, over that in free space."""
    length = 0.003 * C / frequency
    middle = np.array([0, 0, height * C / frequency])
    half = np.array(direction) * length / 2
    wire = fs.Wire(middle - half, middle + half, 1e-4 * length)

    def current(points):
        return 1 - np.linalg.norm(points - middle, axis=1) / (length / 2)

    over, free = (reaction([wire], ground, frequency, current) for ground in (AVERAGE, fs.FREE_SPACE))
    return over.real / free.real


@pytest.mark.parametrize("height, frequency, horizontal, vertical", SHORT_DIPOLES)
def test_radiation_resistance_of_short_dipoles(height, frequency, horizontal, vertical):
    """Asked: 1 %.  The printed three decimals, plus the dipole's length: at h = 0.02 wavelengths the
    ratio of a vertical one changes by (l/2h)^2 = 0.6 % along it, of which a third is left; 0.3 %."""
    tolerance = 0.001 / min(horizontal, vertical) + 0.003

    assert short_dipole_ratio((1, 0, 0), height, frequency * 1e6) == pytest.approx(horizontal, rel=tolerance)
    assert short_dipole_ratio((0, 0, 1), height, frequency * 1e6) == pytest.approx(vertical, rel=tolerance)


# shared facts, formulas 2 [computed]: R + jX of a sinusoidal half-wave dipole, one decimal
HALF_WAVE = [
    # ground  MHz   h/lambda  Z
    (AVERAGE, 2.0, 0.03, 45.8 + 59.4j),
    (AVERAGE, 2.0, 0.10, 43.1 + 64.3j),
    (AVERAGE, 3.6, 0.05, 47.9 + 56.0j),
    (AVERAGE, 3.6, 0.20, 75.0 + 67.9j),
    (AVERAGE, 7.1, 0.03, 69.2 + 63.6j),
    (AVERAGE, 7.1, 0.15, 62.2 + 64.5j),
    (AVERAGE, 14.2, 0.05, 63.1 + 50.3j),
    (AVERAGE, 14.2, 0.25, 82.1 + 57.6j),
    (AVERAGE, 14.2, 0.50, 69.4 + 32.6j),
    (AVERAGE, 28.5, 0.03, 80.7 + 58.9j),
    (AVERAGE, 28.5, 0.30, 86.2 + 50.1j),
    (DRY, 14.2, 0.03, 86.6 + 66.6j),
    (DRY, 14.2, 0.10, 70.7 + 46.9j),
    (DRY, 14.2, 0.40, 77.4 + 39.3j),
    (MOIST, 14.2, 0.03, 64.0 + 49.3j),
    (MOIST, 14.2, 0.20, 70.9 + 67.1j),
]


@pytest.mark.parametrize("ground, frequency, height, impedance", HALF_WAVE)
def test_impedance_of_a_half_wave_dipole_against_height(ground, frequency, height, impedance):
    """Change from free space, added to the sinusoidal dipole's 73.08 + j42.52 ohm.

    Asked: 1 % of R; found: the printed decimal, 0.06 ohm with the chord of the sine (docs/accuracy.md).
    """
    wavelength = C / (frequency * 1e6)
    ends = [(side * wavelength / 4, 0, height * wavelength) for side in (-1, 1)]
    wire = fs.Wire(*ends, 1e-5 * wavelength)

    over, free = (
        reaction_of_a_sine(wire, g, frequency * 1e6, segments_per_wavelength=100)
        for g in (ground, fs.FREE_SPACE)
    )

    found = over - free + 73.08 + 42.52j
    assert abs(found.real - impedance.real) < 0.07
    assert abs(found.imag - impedance.imag) < 0.07


CASES = {
    "low horizontal": (7.1e6, [fs.Wire((-10, 0, 1.5), (10, 0, 1.5), 1e-3)], []),
    "sloping": (14.2e6, [fs.Wire((0, 0, 1), (4, 1, 5), 1e-3)], []),
    "vertical": (146e6, [fs.Wire((0, 0, 2), (0, 0, 3), 2e-3)], []),
    "bent": (14.2e6, [fs.Wire((0, 0, 6), (4, 0, 3), 1e-3), fs.Wire((4, 0, 3), (4, 3, 3), 1e-3)], []),
    "on the ground": (14.2e6, [fs.Wire((0, 0, 0), (0, 0, 5), 5e-3)], [fs.Load(0, 0, 20)]),
    "sloping from the ground": (14.2e6, [fs.Wire((0, 0, 0), (3, 0, 4), 5e-3)], [fs.Load(0, 0, 50)]),
    "short on the ground": (1.8e6, [fs.Wire((0, 0, 0), (0, 0, 12), 1e-2)], [fs.Load(0, 0, 10)]),
}


@pytest.mark.parametrize("name", CASES)
@pytest.mark.parametrize("ground", [AVERAGE, DRY], ids=["average", "dry"])
def test_power_balance_closes_over_real_ground(name, ground):
    """Sky plus ground plus loads is what the feed accepts; none of the parts uses the matrix.

    Without contact 3e-5, (k a)^2/2 of the thickest wire.  With an end on the ground the connection is
    a static model (docs/theory.md 6): 0.2 %, a fifth of what an assessment allows.
    """
    frequency, wires, loads = CASES[name]
    currents = fs.solve(wires, [fs.Feed(0, 0.5)], frequency, ground, loads)

    balance = fs.quality(currents).power_balance

    assert abs(balance) < (0.002 if loads else 3e-5)
    assert currents.ground_loss > 0.05 * currents.accepted_power


@pytest.mark.parametrize("name", CASES)
def test_fields_over_real_ground_obey_maxwell(name):
    """curl E = -j w mu0 H and curl H = j w eps0 E by central differences of 1 mm; 3e-4 of the larger."""
    frequency, wires, loads = CASES[name]
    currents = fs.solve(wires, [fs.Feed(0, 0.5)], frequency, AVERAGE, loads)
    step, omega = 2e-3, 2 * np.pi * frequency
    at = np.array([1.3, -1.1, 0.4])
    points = np.concatenate([[at], *[[at + step * e, at - step * e] for e in np.eye(3)]])

    field = fs.near_field(currents, points)

    for source, other, factor in (
        (field.electric, field.magnetic, -1j * omega * 4e-7 * np.pi),
        (field.magnetic, field.electric, 1j * omega * 8.8541878e-12),
    ):
        d = (source[1::2] - source[2::2]) / (2 * step)
        curl = np.array([d[1, 2] - d[2, 1], d[2, 0] - d[0, 2], d[0, 1] - d[1, 0]])
        assert np.abs(curl - factor * other[0]).max() < 3e-4 * max(
            np.abs(factor * other[0]).max(), np.abs(d).max()
        )


def test_a_ground_of_high_conductivity_becomes_a_perfect_one():
    """At 14 MHz and 100 S/m the surface impedance is 1/sqrt|ec| = 0.3 % of that of space; 1 % asserted."""
    wire, points = fs.Wire((-5, 0, 4), (5, 0, 4), 1e-3), np.array([[3.0, 2, 1], [8, 1, 0.5], [0, 0, 1]])
    metal, perfect = (
        fs.near_field(fs.solve([wire], [fs.Feed(0)], 14.2e6, ground), points)
        for ground in (fs.LossyGround(1, 100.0), fs.PERFECT_GROUND)
    )

    assert np.abs(metal.electric - perfect.electric).max() < 1e-2 * np.abs(perfect.electric).max()
    assert np.abs(metal.magnetic - perfect.magnetic).max() < 1e-2 * np.abs(perfect.magnetic).max()


def test_a_ground_of_air_is_no_ground():
    wire, points = fs.Wire((-5, 0, 4), (3, 0, 6), 1e-3), np.array([[3.0, 2, 1], [8, 1, 0.5], [0, 0, 0]])
    air, none = (
        fs.near_field(fs.solve([wire], [fs.Feed(0)], 14.2e6, ground), points)
        for ground in (fs.LossyGround(1.0, 0.0), fs.FREE_SPACE)
    )

    assert air.electric == pytest.approx(none.electric, abs=1e-7 * np.abs(none.electric).max())


def test_reciprocity_over_real_ground():
    """Lorentz: the current at antenna b for a volt at a equals that at a for a volt at b."""
    wires = [fs.Wire((0, 0, 2), (3, 0, 6), 1e-3), fs.Wire((6, 2, 1), (6, 5, 2), 1e-3)]

    def transfer(driven, read):
        feeds = [fs.Feed(driven, 0.4), fs.Feed(read, 0.6, voltage=0.0)]
        return fs.solve(wires, feeds, 14.2e6, AVERAGE).feed_currents[1]

    back = [fs.Feed(1, 0.6), fs.Feed(0, 0.4, voltage=0.0)]
    assert transfer(0, 1) == pytest.approx(fs.solve(wires, back, 14.2e6, AVERAGE).feed_currents[1], rel=1e-9)


def test_the_impedance_of_a_grounded_vertical_does_not_hang_on_the_mesh():
    """The charge that leaves through a stated connection must not drive the wire by its bare end."""
    found = [
        fs.solve(
            [fs.Wire((0, 0, 0), (0, 0, 15), 1e-2)], [fs.Feed(0, 0.1)], 3.6e6, AVERAGE, [fs.Load(0, 0, 20)], n
        )
        for n in (40, 80)
    ]

    first, second = (currents.feed_impedances[0] for currents in found)
    assert abs(first - second) < 0.01 * abs(second)


def test_the_field_beside_a_ground_connection_is_that_of_its_current_in_the_soil():
    """E = I/(2 pi |sigma + j w eps0 (er + 1)| R^2) close to a point electrode (shared facts, formulas 4).

    At R = 6 cm over a base of radius 1 cm; the vertical's own charges add a few per cent.
    """
    frequency = 1.8e6
    currents = fs.solve(
        [fs.Wire((0, 0, 0), (0, 0, 30), 1e-2)], [fs.Feed(0, 0.05)], frequency, DRY, [fs.Load(0, 0, 10)]
    )
    injected = abs(currents.ends[0])
    admittivity = abs(1e-4 + 2j * np.pi * frequency * 8.8541878e-12 * 4)

    field = fs.near_field(currents, [[0.06, 0, 0]])

    radial = abs(field.electric[0, 0])
    assert radial == pytest.approx(injected / (2 * np.pi * admittivity * 0.06**2), rel=0.1)
