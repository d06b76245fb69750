"""Power that flows into a real ground, from the spectrum of its surface field.

With l the radial wavenumber, alpha its direction and J(l, alpha) the transform of the currents with
e^{-u0 z}, the tangential field in the surface splits into a part along and a part across the
wavenumber, each a plane wave below it (Parseval; docs/theory.md):

    E_across = -j w mu0 J_across / (u0 + u1)
    E_along  = -[u0 J_along / (j w eps0) + w mu0 l J_z / k^2] u1 / (ec u0 + u1)
    P = (1/4 pi^2) integral of |E_across|^2 Re(u1/(j w mu0)) + |E_along|^2 Re(j w eps0 ec / u1)

An end on the ground carries a current into it.  Its static self-power (that of its point charge) is
replaced by the stated ground connection, a load, and left out here as in the matrix.
"""

import numpy as np
from scipy.special import j0

from fieldsolver.constants import EPSILON_0, FREE_SPACE_IMPEDANCE, MU_0
from fieldsolver.ground import LossyGround
from fieldsolver.kernels import gauss

DECAY = 14.0  # e^{-2 * 14} = 7e-13 of the power is left where panels end
CELLS = 1 << 20


def ground_loss(problem, ends: np.ndarray) -> float:
    """Power into the ground, without stated ground connections; 0 over none and over a perfect one. [W]"""
    if not isinstance(problem.ground, LossyGround):
        return 0.0
    permittivity = problem.ground.complex_permittivity(problem.angular_frequency)
    contacts = problem.ground_ends.points[:, :2], -(problem.ground_ends.slopes @ ends), problem.ground_ends
    flux = sum(
        _panel(problem, ends, permittivity, contacts, wavenumber, weight)
        for wavenumber, weight in _panels(problem, permittivity, contacts)
    )
    return flux + _replaced(problem, ends, permittivity)


def _panels(problem, permittivity, contacts):
    """(wavenumbers, weights dl) from 0 to where the evanescent field no longer reaches the ground."""
    k, mesh = problem.k, problem.mesh
    extent = float(np.linalg.norm(np.ptp(np.concatenate([mesh.start, mesh.end]), axis=0)))
    lowest = float(min(mesh.start[:, 2].min(), mesh.end[:, 2].min()))
    last = 40 / contacts[2].radius.min() if len(contacts[0]) else DECAY / lowest + 2 * k
    t, w = gauss(24 + int(k * extent))
    yield k * np.sin(np.pi / 2 * t), w * np.pi / 2 * k * np.cos(np.pi / 2 * t)
    inner = abs(np.sqrt(permittivity)) * k
    edges = [k * 1.02, k * 1.15, k * 1.6, *np.linspace(2 * k, max(2.5 * k, 1.5 * inner), 4)]
    low = k
    for high in edges:
        if low >= last:
            return
        t, w = gauss(16 + int((min(high, last) - low) * extent))
        top = np.arccosh(min(high, last) / k)
        bottom = np.arccosh(max(low / k, 1))
        yield (
            k * np.cosh(bottom + (top - bottom) * t),
            w * (top - bottom) * k * np.sinh(bottom + (top - bottom) * t),
        )
        low = high
    while low < last:
        high = min(1.6 * low, last)
        spread = _spread(mesh, low)
        t, w = gauss(16 + int((high - low) * spread))
        yield low + (high - low) * t, w * (high - low)
        low = high


def _spread(mesh, wavenumber: float) -> float:
    """Diameter in plan of what lies so low that its evanescent field still reaches the ground. [m]"""
    reach = _reaching(mesh, wavenumber)
    low, high = mesh.start[reach], mesh.end[reach]
    top = np.full(len(low), DECAY / wavenumber if wavenumber > 0 else np.inf)
    rise = high[:, 2] - low[:, 2]
    with np.errstate(divide="ignore", invalid="ignore"):
        first = np.where(low[:, 2] > top, (top - low[:, 2]) / rise, 0.0)[:, None]
        last = np.where(high[:, 2] > top, (top - low[:, 2]) / rise, 1.0)[:, None]
    along = (high - low)[:, :2]
    corners = np.concatenate([low[:, :2] + first * along, low[:, :2] + last * along])
    return float(np.linalg.norm(np.ptp(corners, axis=0))) if len(corners) else 0.0


def _reaching(mesh, wavenumber: float) -> np.ndarray:
    return wavenumber * np.minimum(mesh.start[:, 2], mesh.end[:, 2]) < DECAY


def _panel(problem, ends, permittivity, contacts, wavenumber, weight) -> float:
    k, omega = problem.k, problem.angular_frequency
    low = float(wavenumber.min())
    segments = np.flatnonzero(_reaching(problem.mesh, low if low > 2 * k else 0.0))
    count = 2 * int(8 + 0.6 * wavenumber.max() * _spread(problem.mesh, low if low > 2 * k else 0.0)) + 1
    alpha = 2 * np.pi * np.arange(count) / count
    step = max(1, CELLS // (count * max(1, len(segments))))
    total = 0.0
    for i in range(0, len(wavenumber), step):
        l = wavenumber[i : i + step, None]
        u0 = np.sqrt(l.astype(complex) ** 2 - k**2)
        u1 = np.sqrt(l**2 - permittivity * k**2)
        along, across, upward = _transform(problem.mesh, ends, segments, l, u0, alpha)
        e_across = -1j * omega * MU_0 * across / (u0 + u1)
        share = u1 / (permittivity * u0 + u1)
        lift = omega * MU_0 * l / k**2 * share
        e_along = -(u0 * along / (1j * omega * EPSILON_0)) * share - lift * upward
        admittance_across = (u1 / (1j * omega * MU_0)).real
        admittance_along = (1j * omega * EPSILON_0 * permittivity / u1).real
        density = np.abs(e_across) ** 2 * admittance_across
        density += _density(e_along, lift / u1, l, alpha, contacts) * admittance_along
        total += float(weight[i : i + step] @ (density.mean(axis=1) * l[:, 0])) / (2 * np.pi)
    return total - _static_self(problem, permittivity, contacts) * float(weight.sum())


def _transform(mesh, ends, segments, l, u0, alpha):
    """Transform of the currents along, across the wavenumber and upwards, (l, alpha) each. [A m]"""
    cosine, sine = np.cos(alpha), np.sin(alpha)
    shape = (len(l), len(alpha))
    along, across, upward = (np.zeros(shape, complex) for _ in range(3))
    for s in segments:
        start, vector = mesh.start[s], mesh.end[s] - mesh.start[s]
        exponent = 1j * l * (vector[0] * cosine + vector[1] * sine) - u0 * vector[2]
        value = np.exp(1j * l * (start[0] * cosine + start[1] * sine) - u0 * start[2])
        first, second = _hat_transforms(exponent)
        value *= ends[2 * s] * first + ends[2 * s + 1] * second
        along += value * (vector[0] * cosine + vector[1] * sine)
        across += value * (vector[1] * cosine - vector[0] * sine)
        upward += value * vector[2]
    return along, across, upward


def _hat_transforms(p):
    """Integrals over 0..1 of (1 - s) e^{ps} and s e^{ps}."""
    small = np.abs(p) < 0.02
    safe = np.where(small, 1.0, p)
    power = np.exp(safe)
    first = np.where(small, 1 / 2 + p * (1 / 6 + p * (1 / 24 + p / 120)), (power - 1 - safe) / safe**2)
    second = np.where(small, 1 / 2 + p * (1 / 3 + p * (1 / 8 + p / 30)), (power * (safe - 1) + 1) / safe**2)
    return first, second


def _density(e_along, per_end, l, alpha, contacts):
    """|E_along|^2 with the charge of an end on the ground seen by the rest as a ring, J0(l a).

    per_end : surface field of that charge for one ampere, l/(w eps0 (ec u0 + u1)).
    """
    position, current, ends = contacts
    if not len(current):
        return np.abs(e_along) ** 2
    direction = np.stack([np.cos(alpha), np.sin(alpha)])
    own = [per_end * i * np.exp(1j * l * (xy @ direction)) for xy, i in zip(position, current, strict=True)]
    rings = [j0(l * radius) * end for radius, end in zip(ends.radius, own, strict=True)]
    density = np.abs(e_along - sum(own) + sum(rings)) ** 2
    return density + sum(np.abs(end) ** 2 - np.abs(ring) ** 2 for end, ring in zip(own, rings, strict=True))


def _replaced(problem, ends, permittivity) -> float:
    """Power that the stated connections change between ends on the ground and wires. [W]"""
    at = problem.ground_ends
    both = 2 * ((at.slopes @ ends).conj() @ (at.replaced @ ends)).real
    impedance = -1j * FREE_SPACE_IMPEDANCE / (4 * np.pi * problem.k) * 2 / (permittivity + 1)
    return float(impedance.real * both)


def _static_self(problem, permittivity, contacts) -> float:
    """Static self-power of the ends on the ground, per unit of l. [W m]"""
    omega, k = problem.angular_frequency, problem.k
    field = omega * MU_0 / (k**2 * (permittivity + 1))
    conductance = (1j * omega * EPSILON_0 * permittivity).real
    return float((np.abs(contacts[1] * field) ** 2).sum() * conductance) / (2 * np.pi)
