"""Closed forms of the literature that several tests compare with."""

import numpy as np

ETA = 376.730313668


def sinusoidal_dipole(points, half_length, k, current=1.0):
    """E_rho, E_z, H_phi of a z-directed dipole at the origin with current I sin k(h - |z|).

    C. A. Balanis, Antenna Theory, 4th ed., eqs 8-45 to 8-52 (edition and numbers from memory;
    the three spherical waves are checked here by Maxwell's equations in ``test_dipole``).
    """
    x, y, z = points.T
    rho = np.hypot(x, y)
    distances = np.hypot(rho, z - half_length), np.hypot(rho, z + half_length), np.hypot(rho, z)
    upper, lower, middle = (np.exp(-1j * k * r) for r in distances)
    c = 2 * np.cos(k * half_length)
    r1, r2, r = distances
    e_z = -1j * ETA * current / (4 * np.pi) * (upper / r1 + lower / r2 - c * middle / r)
    e_rho = (
        1j
        * ETA
        * current
        / (4 * np.pi * rho)
        * ((z - half_length) * upper / r1 + (z + half_length) * lower / r2 - c * z * middle / r)
    )
    h_phi = 1j * current / (4 * np.pi * rho) * (upper + lower - c * middle)
    return e_rho, e_z, h_phi


def short_dipole(points, moment, k):
    """E and H (n, 3) of a current element I dl (3,) [A m] at the origin (Balanis, ch. 4)."""
    moment = np.asarray(moment, dtype=complex)
    r = np.linalg.norm(points, axis=1)[:, None]
    n = points / r
    x = k * r
    wave = np.exp(-1j * x) / r
    radial = (n @ moment)[:, None] * n
    electric = (
        -1j
        * k
        * ETA
        / (4 * np.pi)
        * wave
        * ((1 - 1j / x - 1 / x**2) * moment - (1 - 3j / x - 3 / x**2) * radial)
    )
    magnetic = wave * (1j * k + 1 / r) / (4 * np.pi) * np.cross(moment, n)
    return electric, magnetic


def sphere(radius, count=32):
    """Points (n, 3) and area weights (n,) of a sphere: Gauss in cos(theta), uniform in phi."""
    u, w = np.polynomial.legendre.leggauss(count)
    phi = 2 * np.pi * np.arange(2 * count) / (2 * count)
    u, phi = (a.reshape(-1) for a in np.meshgrid(u, phi, indexing="ij"))
    s = np.sqrt(1 - u**2)
    weights = np.repeat(w, 2 * count) * np.pi / count * radius**2
    return radius * np.column_stack([s * np.cos(phi), s * np.sin(phi), u]), weights
