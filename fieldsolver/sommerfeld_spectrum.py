"""Spectra of what a flat real ground adds in air, without their quasi-static limits.

With l the radial wavenumber, u0 = sqrt(l^2 - k0^2), u1 = sqrt(l^2 - ec k0^2) (A. Sommerfeld, Ann. Phys.
28 (1909) 665 and 81 (1926) 1135; form C of K. A. Michalski and D. Zheng, IEEE Trans. AP-38 (1990) 335):

    R_TE = (u0 - u1)/(u0 + u1)             = (ec - 1) k0^2/(u0 + u1)^2
    R_TM = (ec u0 - u1)/(ec u0 + u1)
    D    = (R_TM + R_TE)/l^2               = 2 (ec - 1)/((u0 + u1)(ec u0 + u1))
    K_xx = R_TE
    K_phi = (-R_TM u0^2 + R_TE k0^2)/l^2   = -kappa + k0^2 D/(ec + 1)
    K_zz = (R_TM (l^2 + u0^2) + R_TE u0^2)/l^2 = 2 kappa + ec k0^2 D/(ec + 1) + q
    F    = u0 D                            = u0 (kappa + k0^2 D + q)/l^2
    G_TM = R_TM                            = kappa + ec k0^2 D/(ec + 1)

with kappa = (ec - 1)/(ec + 1) and q = u0^2 D - kappa = kappa k0^2 D ((ec + 2) u0 + u1)/(2 (u0 + u1)).
The right-hand sides are exact: the limits are taken off by algebra, so nothing cancels at large l.
"""

import numpy as np


def vertical_wavenumber(l, k):
    """u = sqrt(l^2 - k^2) with Re u >= 0, and +j sqrt(k^2 - l^2) for real l below a real k. [rad/m]"""
    squared = np.asarray(l, dtype=complex) ** 2 - k**2
    # -0.0 as imaginary part would put l < k on the growing branch
    return np.sqrt(np.where(squared.imag == 0, squared.real + 0j, squared))


def reflection_te(l, permittivity: complex, k0: float):
    """R_TE at radial wavenumber l (...); horizontal polarisation, l = k0 sin theta in the far field. [1]"""
    u0, u1 = _pair(l, permittivity, k0)
    return (permittivity - 1) * k0**2 / (u0 + u1) ** 2


def reflection_tm(l, permittivity: complex, k0: float):
    """R_TM at radial wavenumber l (...); of the magnetic field, +1 for a perfect conductor. [1]"""
    u0, u1 = _pair(l, permittivity, k0)
    return (permittivity * u0 - u1) / (permittivity * u0 + u1)


def kappa(permittivity: complex) -> complex:
    """Static reflection of a charge, (ec - 1)/(ec + 1). [1]"""
    return (permittivity - 1) / (permittivity + 1)


def spectra(l, u0, permittivity: complex, k0: float):
    """Spectral factors over (l/u0) e^{-u0 zeta} dl, quasi-static limits taken off.

    Parameters
    ----------
    l, u0 : (m,) float or complex
        Radial and vertical wavenumber in air. [rad/m]

    Returns
    -------
    (6, m), (3, m), (m,) complex
        With J0(l rho): K_xx, K_phi, K_zz, dK_phi/dzeta, dK_xx/dzeta, transverse Laplacian of F;
        with J1(l rho): dK_phi/drho, dK_xx/drho, dG_TM/drho; with J1(l rho)/(l rho): (dF/drho)/rho.
    """
    u1 = vertical_wavenumber(l, k0 * np.sqrt(permittivity))
    r_te = (permittivity - 1) * k0**2 / (u0 + u1) ** 2
    d = k0**2 * 2 * (permittivity - 1) / ((u0 + u1) * (permittivity * u0 + u1))
    q = kappa(permittivity) * d * ((permittivity + 2) * u0 + u1) / (2 * (u0 + u1))
    phi = d / (permittivity + 1)
    tm = permittivity * phi
    f = -u0 * (q + d)
    with_j0 = np.stack([r_te, phi, tm + q, -u0 * phi, -u0 * r_te, f])
    with_j1 = np.stack([-l * phi, -l * r_te, -l * tm])
    return with_j0, with_j1, f


def _pair(l, permittivity, k0):
    return vertical_wavenumber(l, k0), vertical_wavenumber(l, k0 * np.sqrt(permittivity))
