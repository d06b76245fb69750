"""The field at infinity, and the power that passes there."""

from dataclasses import dataclass

import numpy as np

from fieldsolver.constants import FREE_SPACE_IMPEDANCE
from fieldsolver.fresnel import reflection
from fieldsolver.ground import FreeSpace
from fieldsolver.kernels import gauss, phasor
from fieldsolver.nodes import current_nodes

BLOCK = 1 << 17


@dataclass(frozen=True)
class FarField:
    """Far field in some directions.

    electric_theta, electric_phi : complex, e^{-jkr}/r removed, phase at the origin [V rms];
    gain : over accepted power and an isotropic radiator [1]
    """

    electric_theta: np.ndarray
    electric_phi: np.ndarray
    gain: np.ndarray


def far_field(currents, theta, phi) -> FarField:
    """The far field of currents.

    Parameters
    ----------
    theta, phi : floats, broadcast against each other
        From up; from east towards north. [rad]

    Over ground the field below the horizon is zero.
    """
    theta, phi = np.broadcast_arrays(np.asarray(theta, float), np.asarray(phi, float))
    e_theta, e_phi = _electric(currents.problem, currents.ends, theta.reshape(-1), phi.reshape(-1))
    intensity = (np.abs(e_theta) ** 2 + np.abs(e_phi) ** 2) / FREE_SPACE_IMPEDANCE
    gain = 4 * np.pi * intensity / currents.accepted_power
    return FarField(*(values.reshape(theta.shape) for values in (e_theta, e_phi, gain)))


def radiated_power(problem, ends: np.ndarray) -> float:
    """Power through the sphere, over ground the upper hemisphere, at infinity. [W]

    Gauss points in the square root of cos(theta), condensed at the horizon where the reflection of
    a real ground turns fast, and uniform in phi; as many as the size over the wavelength asks for.
    """
    mesh = problem.mesh
    corners = np.concatenate([mesh.start, mesh.end])
    turns = problem.k * np.linalg.norm(np.ptp(corners, axis=0)) / 2 + problem.k * np.abs(corners[:, 2]).max()
    u, weight = gauss(int(20 + 1.3 * turns))
    cosine, weight = u**2, 2 * u * weight
    if isinstance(problem.ground, FreeSpace):
        cosine, weight = np.concatenate([cosine, -cosine]), np.concatenate([weight, weight])
    count = int(16 + 2.2 * turns)
    phi = 2 * np.pi * np.arange(count) / count
    theta, phi = (a.reshape(-1) for a in np.meshgrid(np.arccos(cosine), phi, indexing="ij"))
    e_theta, e_phi = _electric(problem, ends, theta, phi)
    density = (np.abs(e_theta) ** 2 + np.abs(e_phi) ** 2) / FREE_SPACE_IMPEDANCE
    return float(weight @ density.reshape(-1, count).mean(axis=1)) * 2 * np.pi


def _electric(problem, ends, theta, phi):
    """(-j k eta/4 pi) times the transverse radiation vector, direct and reflected, (n,) each. [V]"""
    points, moments, _ = (
        values.reshape(-1, *values.shape[2:]) for values in current_nodes(problem.mesh, ends, 2)
    )
    step = max(1, BLOCK // len(points))
    parts = [
        _transverse(problem, points, moments, theta[i : i + step], phi[i : i + step])
        for i in range(0, len(theta), step)
    ]
    factor = -1j * problem.k * FREE_SPACE_IMPEDANCE / (4 * np.pi)
    return tuple(factor * np.concatenate(values) for values in zip(*parts, strict=True))


def _transverse(problem, points, moments, theta, phi):
    st, ct, sp, cp = np.sin(theta), np.cos(theta), np.sin(phi), np.cos(phi)
    horizontal = np.outer(st * cp, points[:, 0]) + np.outer(st * sp, points[:, 1])
    vertical = np.outer(ct, points[:, 2])
    direct = phasor(-problem.k * (horizontal + vertical)) @ moments
    e_theta = ct * (cp * direct[:, 0] + sp * direct[:, 1]) - st * direct[:, 2]
    e_phi = cp * direct[:, 1] - sp * direct[:, 0]
    if isinstance(problem.ground, FreeSpace):
        return e_theta, e_phi
    mirror = phasor(-problem.k * (horizontal - vertical)) @ moments
    tm, te = reflection(problem.ground, problem.angular_frequency, np.maximum(ct, 0.0))
    e_theta = e_theta + tm * (-ct * (cp * mirror[:, 0] + sp * mirror[:, 1]) - st * mirror[:, 2])
    e_phi = e_phi + te * (cp * mirror[:, 1] - sp * mirror[:, 0])
    above = ct >= 0
    return np.where(above, e_theta, 0), np.where(above, e_phi, 0)
