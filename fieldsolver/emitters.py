"""Currents made ready for field evaluation: once for each solution, whatever the points."""

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from fieldsolver.images import MIRROR
from fieldsolver.kernels import gauss
from fieldsolver.pieces import pieces
from fieldsolver.radiation import Elements


@dataclass(frozen=True)
class Emitter:
    """Segments that carry currents, or their mirror images.

    start, vector (S, 3) [m]; currents (S, 2) at both ends [A]; tangent (S, 3); electric, magnetic (3,)
    and charge: what E, H and the charges are multiplied with (images in a ground).
    """

    start: np.ndarray
    vector: np.ndarray
    currents: np.ndarray
    tangent: np.ndarray
    electric: np.ndarray
    magnetic: np.ndarray
    charge: complex

    @cached_property
    def length(self) -> np.ndarray:
        return np.linalg.norm(self.vector, axis=1)

    @cached_property
    def axes(self) -> np.ndarray:
        """(S, 2, 3) ends. [m]"""
        return np.stack([self.start, self.start + self.vector], axis=1)

    @cached_property
    def coarse(self) -> Elements:
        """Two Gauss points a segment."""
        return self._gauss(2)

    @cached_property
    def fine(self) -> Elements:
        """Four Gauss points a segment."""
        return self._gauss(4)

    def _gauss(self, count):
        nodes, weights = gauss(count)
        shape = (len(self.start), 1)
        return self.elements(np.tile(nodes, shape), np.tile(weights, shape), np.arange(len(self.start)))

    def elements(self, fraction, weight, segment) -> Elements:
        """Elements at fractions (..., q) of segments (...), flattened."""
        current = (
            self.currents[segment, 0, None] * (1 - fraction) + self.currents[segment, 1, None] * fraction
        )
        moment = (current * weight * self.length[segment, None])[..., None] * self.tangent[segment, None, :]
        slope = (self.currents[segment, 1] - self.currents[segment, 0])[:, None] * weight * self.charge
        points = self.start[segment, None] + fraction[..., None] * self.vector[segment, None]
        return Elements(
            points.reshape(-1, 3),
            (moment * self.electric).reshape(-1, 3),
            (moment * self.magnetic).reshape(-1, 3),
            slope.reshape(-1),
        )


@dataclass(frozen=True)
class Smooth:
    """Few points for what a real ground adds beyond its image: points (n, 3) [m], moments (n, 3) [A m],
    slopes (n,) [A]."""

    points: np.ndarray
    moments: np.ndarray
    slopes: np.ndarray


def emitters(problem, ends: np.ndarray) -> tuple[Emitter, ...]:
    """The wires and, over ground, their images, for end currents (2S,)."""
    mesh, one = problem.mesh, np.ones(3)
    vector, pairs = mesh.end - mesh.start, ends.reshape(-1, 2)
    wires = Emitter(mesh.start, vector, pairs, mesh.tangent, one, one, 1.0)
    if problem.image is None:
        return (wires,)
    electric, magnetic = problem.image.tensor, problem.image.magnetic_tensor
    image = Emitter(
        mesh.start * MIRROR, vector * MIRROR, pairs, mesh.tangent, electric, magnetic, problem.image.charge
    )
    return wires, image


def ground_charges(problem, ends: np.ndarray) -> Elements:
    """The charges where wires end on real ground, with their images."""
    at = problem.ground_ends
    nothing = np.zeros((len(at.points), 3))
    return Elements(at.points, nothing, nothing, (1 + problem.image.charge) * (at.slopes @ ends))


def smooth(problem, ends: np.ndarray) -> Smooth:
    """Currents and ground-end charges as the rest of a real ground sees them."""
    few, at = pieces(problem.mesh, problem.k), problem.ground_ends
    moments = (few.moment @ ends)[:, None] * few.tangents
    return Smooth(
        np.concatenate([few.points, at.points]),
        np.concatenate([moments, np.zeros_like(at.points)]),
        np.concatenate([few.slope @ ends, at.slopes @ ends]),
    )
