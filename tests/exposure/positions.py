"""Closed-form fields for the tests of searches over position, with a count of points asked for."""

import numpy as np

from exposure.assessment.strengths import FieldStrengths

ETA = 376.730313668


class Counted:
    """A function of position that counts the points it was asked for."""

    def __init__(self, function):
        self.function, self.points, self.calls = function, 0, 0

    def __call__(self, points):
        self.points += len(points)
        self.calls += 1
        return self.function(points)


def strengths(function, conductors, wavelength=21.0):
    return FieldStrengths(Counted(function), tuple(np.asarray(c, float) for c in conductors), wavelength)


def first_over(limit):
    """The ratio function of the first squared strength."""
    return lambda values: values[:, 0] / limit


def sphere(centre, strength=1.0):
    """E^2 = strength / r^2 and E^2 / eta^2 beside it: a far field everywhere."""

    def values(points):
        squared = ((points - centre) ** 2).sum(axis=1)
        electric = np.divide(strength, squared, out=np.full(len(points), np.inf), where=squared > 1e-8)
        return np.column_stack([electric, electric / ETA**2])

    return values


def half_wave_dipole(points, centre, axis, length, wavelength, current):
    """Phasors E, H (n, 3) of a straight dipole with sinusoidal current.

    E_z = -j 30 I [e^{-jkR1}/R1 + e^{-jkR2}/R2 - 2 cos(kh) e^{-jkr}/r],
    E_rho = j 30 I [(z-h) e^{-jkR1}/R1 + (z+h) e^{-jkR2}/R2 - 2 z cos(kh) e^{-jkr}/r] / rho,
    H_phi = j I/(4 pi rho) [e^{-jkR1} + e^{-jkR2} - 2 cos(kh) e^{-jkr}], h the half length
    (C. A. Balanis, Antenna Theory, 4th ed., Wiley 2016, sec. 8.5.2; number from memory).
    """
    k, h = 2 * np.pi / wavelength, 0.5 * length
    axis = np.asarray(axis, float)
    offset = points - centre
    z = offset @ axis
    across = offset - z[:, None] * axis
    rho = np.maximum(np.linalg.norm(across, axis=1), 1e-9)
    unit = across / rho[:, None]
    waves = []
    for place, weight in ((h, 1.0), (-h, 1.0), (0.0, -2 * np.cos(k * h))):
        r = np.hypot(rho, z - place)
        waves.append((weight * np.exp(-1j * k * r), np.maximum(r, 1e-9), z - place))
    e_z = -1j * ETA / (4 * np.pi) * current * sum(w / r for w, r, _ in waves)
    e_rho = 1j * ETA / (4 * np.pi) * current * sum(w * dz / r for w, r, dz in waves) / rho
    h_phi = 1j * current / (4 * np.pi * rho) * sum(w for w, _, _ in waves)
    electric = e_z[:, None] * axis + e_rho[:, None] * unit
    return electric, h_phi[:, None] * np.cross(axis, unit)


GARDEN = {
    "centre": np.array([0.0, 0.0, 9.0]),
    "axis": np.array([1.0, 0.0, 0.0]),
    "length": 10.0,
    "wavelength": 21.0,
}
GARDEN_WIRE = np.array([[-5.0, 0.0, 9.0], [5.0, 0.0, 9.0]])


def garden(reflection=-0.6, current=1.0):
    """E^2, H^2 of a dipole 10 m long, 9 m high, and its image times `reflection` (-1: perfect ground)."""

    def values(points):
        points = np.asarray(points, float)
        electric, magnetic = half_wave_dipole(points, current=current, **GARDEN)
        image = {**GARDEN, "centre": np.array([0.0, 0.0, -9.0])}
        e, h = half_wave_dipole(points, current=current * reflection, **image)
        result = np.column_stack([(abs(electric + e) ** 2).sum(axis=1), (abs(magnetic + h) ** 2).sum(axis=1)])
        inside = np.hypot(points[:, 1], points[:, 2] - 9.0) < 0.003
        result[inside & (abs(points[:, 0]) < 5.003)] = np.inf
        return result

    return values


def heating(electric, magnetic):
    """max((E/E_L)^2, (H/H_L)^2)."""
    return lambda values: np.maximum(values[:, 0] / electric**2, values[:, 1] / magnetic**2)
