"""Tables of the reflected potentials: laws, limits and the accuracy of the interpolation."""

import numpy as np
import pytest

from fieldsolver.constants import SPEED_OF_LIGHT
from fieldsolver.ground import LossyGround
from fieldsolver.sommerfeld import half_space, reflection_te, reflection_tm
from fieldsolver.sommerfeld_paths import _real_tail, _vertical_tail, remainders
from fieldsolver.sommerfeld_spectrum import kappa
from fieldsolver.sommerfeld_tables import IN_ORDER, cross_static

AVERAGE = (13, 0.005)


def ground(frequency, soil):
    """Complex permittivity and wavenumber in air."""
    omega = 2 * np.pi * frequency
    return LossyGround(*soil).complex_permittivity(omega), omega / SPEED_OF_LIGHT


def exact(permittivity, k0, rho, zeta):
    """Remainders (10, n), each point integrated by itself, in the order of the table."""
    points = [
        remainders(permittivity, k0, np.array([r]), np.array([z])) for r, z in zip(rho, zeta, strict=True)
    ]
    values = np.concatenate(points, axis=2)[:, 0][IN_ORDER]
    r1 = np.hypot(rho, zeta)
    wave = np.exp(-1j * k0 * r1)
    limit = -kappa(permittivity) * (np.exp(-1j * k0 * zeta) - zeta / r1 * wave) / rho**2
    values[3] += limit - cross_static(permittivity, k0, r1, zeta) * wave / r1
    return values


@pytest.mark.parametrize("soil", [(13, 0.005), (3, 1e-4), (30, 0.01), (80, 4)])
@pytest.mark.parametrize("frequency", [1.9e6, 14.2e6, 146e6])
def test_table_follows_the_integral_between_its_nodes(frequency, soil):
    """Potentials to 1e-6 of 1/R1, derivatives to 3e-6 of (k0 + 1/R1)/R1, from millimetres to 60 m.

    Tolerance: largest errors measured here are 4.4e-7 and 1.2e-6; the next setting, six nodes along a
    panel instead of eight, has up to 8e-5 and 2e-4 and misses it in eleven of these twelve.
    """
    permittivity, k0 = ground(frequency, soil)
    table = half_space(permittivity, k0, 60.0, 40.0)
    random = np.random.default_rng(7)
    rho, zeta = 10 ** random.uniform(-3, np.log10(60), 40), 10 ** random.uniform(-3, np.log10(40), 40)
    zeta[::5] = 0.0

    error = np.abs(table.ten.values(rho, zeta) - exact(permittivity, k0, rho, zeta)) * np.hypot(rho, zeta)

    size = k0 + 1 / np.hypot(rho, zeta)
    assert error[:3].max() < 1e-6
    assert (error[3:] / size).max() < 3e-6


@pytest.mark.parametrize("zeta", [0.1, 0.2, 0.5])
def test_tail_is_the_same_on_either_path(zeta):
    """Cauchy: real axis and the vertical pair enclose no singularity; both are summed to 1e-9."""
    permittivity, k0 = ground(14.2e6, AVERAGE)
    last = 1.5 * k0 * np.sqrt(permittivity).real
    rho, height = np.array([0.2]), np.array([zeta])

    along = _real_tail(permittivity, k0, last, rho, height)
    across = _vertical_tail(permittivity, k0, last, rho, height)

    assert np.abs(along - across).max() < 1e-9 * np.abs(along).max()


#   height    3.6 MHz          14.2 MHz         50 MHz         horizontal, vertical
RESISTANCES = [
    (0.02, (7.676, 16.344), (7.280, 14.931), (3.984, 7.871)),
    (0.05, (1.324, 3.826), (1.566, 3.756), (1.447, 3.252)),
    (0.10, (0.782, 2.276), (0.903, 2.190), (0.902, 2.093)),
    (0.25, (1.178, 1.228), (1.126, 1.189), (1.099, 1.183)),
    (0.50, (0.939, 0.945), (0.960, 0.955), (0.973, 0.956)),
    (1.00, (0.976, 0.986), (0.986, 0.989), (0.992, 0.989)),
]


@pytest.mark.parametrize(
    ("height", "frequency", "expected"),
    [
        (row[0], f, value)
        for row in RESISTANCES
        for f, value in zip((3.6e6, 14.2e6, 50e6), row[1:], strict=True)
    ],
)
def test_radiation_resistance_of_short_dipoles_over_average_ground(height, frequency, expected):
    """Ratio to free space, from the reflected E at the dipole itself; height in wavelengths.

    Expected: one integral over R_TE and R_TM each, no potentials (computed apart from this code,
    printed to 1e-3).  Here 1 + (3/2k) Re j[K_xx + d2K_phi/dx2 / k^2] and
    1 + (3/2k) Re j[K_zz - d2K_phi/dzeta2 / k^2].
    Tolerance: rounding of the expected values 5e-4, and 1e-3 of the value for difference quotients.
    """
    permittivity, k0 = ground(frequency, AVERAGE)
    zeta = 4 * np.pi / k0 * height
    table = half_space(permittivity, k0, zeta, 1.1 * zeta)
    step = 0.01 * zeta

    f = table.fields(np.array([step, 0, 0]), np.array([zeta, zeta + step, zeta - step]))
    bend_x = f.k_phi_rho[0] / step
    bend_z = (f.k_phi_zeta[1] - f.k_phi_zeta[2]) / (2 * step)
    k_zz = f.k_zz[1:].mean()
    ratios = 1 + 1.5 / k0 * (1j * np.array([f.k_xx[0] + bend_x / k0**2, k_zz - bend_z / k0**2])).real

    np.testing.assert_allclose(ratios, expected, rtol=1e-3, atol=5e-4)


def test_vertical_current_has_the_same_magnetic_field_from_both_of_its_potentials():
    """G_TM = K_zz + dF/dzeta (curl of a z current's A), here d/drho of it, from tables filled apart.

    d2F/(drho dzeta) and dK_zz/drho by difference quotients of 0.02 m; their error is (0.02/5)^2.
    """
    permittivity, k0 = ground(14.2e6, AVERAGE)
    table = half_space(permittivity, k0, 20.0, 20.0)
    rho, zeta, h = 5.0, 3.0, 0.02

    f = table.fields(
        np.array([rho, rho + h, rho - h, rho, rho]), np.array([zeta, zeta, zeta, zeta + h, zeta - h])
    )

    k_zz_rho = (f.k_zz[1] - f.k_zz[2]) / (2 * h)
    f_rho_zeta = (f.f_rho[3] - f.f_rho[4]) / (2 * h)
    assert f.g_tm_rho[0] == pytest.approx(k_zz_rho + f_rho_zeta, rel=5e-5)


def test_highly_conducting_ground_is_a_mirror():
    """R_TE = -1, R_TM = 1: K_xx = K_phi = -g, K_zz = g, no cross term.

    Tolerance: R_TM = 1 - 2/(n cos theta); |n| = 1127 and cos theta >= 0.24 give 7.4e-3.
    """
    k0 = 0.3
    table = half_space(1 - 1.27e6j, k0, 20.0, 10.0)
    rho, zeta = np.array([3.0, 8.0]), np.array([5.0, 2.0])
    g = np.exp(-1j * k0 * np.hypot(rho, zeta)) / np.hypot(rho, zeta)

    k = table.potentials(rho, zeta)

    np.testing.assert_allclose(
        np.array([k.k_xx, k.k_phi, k.k_zz]) / g, [[-1, -1]] * 2 + [[1, 1]], atol=7.4e-3
    )
    assert np.abs(k.f_rho * np.hypot(rho, zeta)).max() < 7.4e-3


def test_ground_like_air_adds_nothing():
    table = half_space(1.0, 0.3, 5.0, 5.0)

    fields = table.fields(np.array([0.0, 3.0]), np.array([1.0, 0.0]))

    assert all(np.all(part == 0) for part in fields)


def test_ground_reflects_plane_waves_as_fresnel_says():
    """Normal incidence: (1 - n)/(1 + n) and its opposite; no TM at the Brewster angle (Stratton, 9.4)."""
    normal = reflection_te(0.0, 4.0, 1.0), reflection_tm(0.0, 4.0, 1.0)

    assert normal == pytest.approx((-1 / 3, 1 / 3), abs=1e-15)
    assert abs(reflection_tm(np.sin(np.arctan(2.0)), 4.0, 1.0)) < 1e-15


def test_point_outside_the_table_is_refused():
    table = half_space(13 - 6j, 0.3, 5.0, 5.0, 1.0)

    with pytest.raises(ValueError, match=r"rho to 6 m.*this table covers rho to 5 m"):
        table.potentials(np.array([6.0]), np.array([2.0]))
    with pytest.raises(ValueError, match="zeta 0.5"):
        table.potentials(np.array([1.0]), np.array([0.5]))
