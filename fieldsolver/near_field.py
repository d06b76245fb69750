"""Electric and magnetic field anywhere in air, up to three radii from the conductors.

A segment farther from a group of points than four of its lengths is two Gauss points, a nearer one
four; within one length of a point it is integrated on its own, with points condensed by a sinh
towards the foot of the perpendicular.  All within 3e-5 of the field (docs/accuracy.md).
"""

from dataclasses import dataclass

import numpy as np

from fieldsolver.clearances import axis_distances
from fieldsolver.constants import FREE_SPACE_IMPEDANCE
from fieldsolver.emitters import Emitter
from fieldsolver.errors import PointError
from fieldsolver.ground import FreeSpace
from fieldsolver.kernels import gauss, phasor
from fieldsolver.radiation import CELLS, fields_of_elements

RADII = 3.0
GROUP = 64
FAR, NEAR = 4.0, 1.0


@dataclass(frozen=True)
class Field:
    """Total field at points: electric (n, 3) [V/m rms], magnetic (n, 3) [A/m rms], complex."""

    electric: np.ndarray
    magnetic: np.ndarray

    @property
    def electric_strength(self) -> np.ndarray:
        """(n,) square root of the summed squares of the components. [V/m rms]"""
        return np.sqrt((np.abs(self.electric) ** 2).sum(axis=1))

    @property
    def magnetic_strength(self) -> np.ndarray:
        """(n,) square root of the summed squares of the components. [A/m rms]"""
        return np.sqrt((np.abs(self.magnetic) ** 2).sum(axis=1))


def near_field(currents, points) -> Field:
    """Total field of currents, ground included, at points (n, 3) [m].

    Raises
    ------
    PointError
        Where points lie below ground or within three radii of a conductor; nothing is returned then.
    """
    points = np.asarray(points, dtype=float).reshape(-1, 3)
    problem = currents.problem
    _check(points, problem)
    parts = [_fields(problem.k, points, emitter) for emitter in currents.emitters]
    if problem.half_space is not None:
        parts.append(fields_of_elements(problem.k, points, currents.ground_charges))
        parts.append(problem.half_space.fields(points, currents.smooth))
    return Field(*(sum(fields) for fields in zip(*parts, strict=True)))


def _check(points, problem):
    below = points[:, 2] < 0 if not isinstance(problem.ground, FreeSpace) else np.zeros(len(points), bool)
    mesh = problem.mesh
    close = np.zeros(len(points), bool)
    axes = np.stack([mesh.start, mesh.end], axis=1)
    for i in range(0, len(points), 1024):
        distance = axis_distances(points[i : i + 1024], axes)[0]
        close[i : i + 1024] = (distance < RADII * mesh.radius[None]).any(axis=1)
    if below.any() or close.any():
        raise PointError(
            f"{int(below.sum())} points are below ground, {int(close.sum())} within three radii of a "
            "conductor: no field is given there",
            below | close,
        )


def _fields(k, points, source: Emitter):
    electric = np.zeros((len(points), 3), complex)
    magnetic = np.zeros((len(points), 3), complex)
    for group in _groups(points, max(GROUP, CELLS // len(source.start))):
        at = points[group]
        centre = (at.min(axis=0) + at.max(axis=0)) / 2
        reach = np.linalg.norm(at - centre, axis=1).max()
        near = axis_distances(centre[None], source.axes)[0][0] - reach < FAR * source.length
        e, h = fields_of_elements(k, at, source.coarse[_expand(np.flatnonzero(~near), 2)])
        if near.any():
            for field, part in zip((e, h), _near(k, at, source, np.flatnonzero(near)), strict=True):
                field += part
        electric[group], magnetic[group] = e, h
    return electric, magnetic


def _expand(segments, count):
    return (segments[:, None] * count + np.arange(count)).reshape(-1)


def _groups(points, size):
    """Index arrays of neighbouring points, from halving along the longest side."""
    stack, groups = [np.arange(len(points))], []
    while stack:
        index = stack.pop()
        if len(index) <= size:
            groups.append(index)
            continue
        axis = int(np.argmax(np.ptp(points[index], axis=0)))
        order = index[np.argsort(points[index, axis], kind="stable")]
        stack += [order[: len(order) // 2], order[len(order) // 2 :]]
    return [group for group in groups if len(group)]


def _near(k, at, source, segments):
    """Fields of the segments near a group of points."""
    distance, _ = axis_distances(at, source.axes[segments])
    close = distance < NEAR * source.length[segments]
    electric, magnetic = fields_of_elements(
        k, at, source.fine[_expand(segments, 4)], np.repeat(close, 4, axis=1)
    )
    point, local = np.nonzero(close)
    if len(point):
        e, h = _singly(k, at[point], source, segments[local], distance[point, local])
        np.add.at(electric, point, e)
        np.add.at(magnetic, point, h)
    return electric, magnetic


def _singly(k, at, source, segment, distance):
    """Field of one segment at each point, (n, 3) each, by 16 points with s = foot + rho sinh t.

    Along a straight segment the sums of eq 8 are sums of scalars: of I g, and of c G and I G with and
    without the place on the segment.
    """
    vector, length = source.vector[segment], source.length[segment]
    offset = at - source.start[segment]
    fraction, weight = _condensed(offset, vector, length, distance)
    place = fraction * length[:, None]
    along = np.einsum("nc,nc->n", offset, vector) / length
    square = (offset**2).sum(axis=1)[:, None] - 2 * along[:, None] * place + place**2
    r = np.sqrt(square)
    g = phasor(k * r) / r
    gradient = (1 + 1j * k * r) * g / square * weight
    first, last = source.currents[segment].T
    current = first[:, None] * (1 - fraction) + last[:, None] * fraction
    moving = current * gradient
    direction = source.tangent[segment]
    slope = ((last - first) * source.charge / k**2)[:, None]
    vector_part = ((current * g * weight).sum(axis=1) * length)[:, None] * (direction * source.electric)
    charge_part = slope * (
        gradient.sum(axis=1)[:, None] * offset - (gradient * fraction).sum(axis=1)[:, None] * vector
    )
    lever = moving.sum(axis=1)[:, None] * offset - (moving * fraction).sum(axis=1)[:, None] * vector
    magnetic = np.cross(lever, direction * source.magnetic * length[:, None])
    factor = -1j * k * FREE_SPACE_IMPEDANCE / (4 * np.pi)
    return factor * (vector_part - charge_part), magnetic / (-4 * np.pi)


def _condensed(offset, vector, length, distance):
    """Fractions of a segment and their weights, (n, 16), condensed at the foot of the perpendicular."""
    foot = np.einsum("nc,nc->n", offset, vector) / length
    rho = np.maximum(np.sqrt(np.maximum((offset**2).sum(axis=1) - foot**2, 0)), 0.5 * distance)
    low, high = np.arcsinh(-foot / rho), np.arcsinh((length - foot) / rho)
    nodes, weights = gauss(16)
    t = low[:, None] + (high - low)[:, None] * nodes
    fraction = (foot[:, None] + rho[:, None] * np.sinh(t)) / length[:, None]
    return fraction, (rho * (high - low) / length)[:, None] * np.cosh(t) * weights
