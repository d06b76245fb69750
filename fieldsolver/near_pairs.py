"""Pairs of segments too near each other for two Gauss points, and their moments.

Which of the three rules of ``kernels`` applies is decided here.
"""

from dataclasses import dataclass

import numpy as np

from fieldsolver.kernels import coaxial_moments, gauss, mean_and_slope, near_moments
from fieldsolver.segments import Mesh

NEAR = 2.6  # distance of centres over the longer segment, up to which integrals are analytic
MIDDLE = 5.6  # and up to which four Gauss points are used instead of two
BLOCK = 128


@dataclass(frozen=True)
class Sources:
    """Segments as sources: the mesh itself or its mirror image. start, vector (S, 3). [m]"""

    start: np.ndarray
    vector: np.ndarray
    mirrored: bool

    def points(self, fractions) -> np.ndarray:
        """(S, q, 3) points at fractions (q,) of every segment. [m]"""
        return self.start[:, None] + fractions[None, :, None] * self.vector[:, None]

    def same_line(self, mesh: Mesh, p, q) -> np.ndarray:
        """True where test segments p and source segments q lie on one line."""
        same = mesh.line[p] == mesh.line[q]
        return same & (np.abs(mesh.tangent[p, 2]) > 1 - 1e-12) if self.mirrored else same


@dataclass(frozen=True)
class NearPairs:
    """test, source (n,) segment indices sorted by source; moments (2, 2, n) with 1 and N_1 - N_0. [m]"""

    test: np.ndarray
    source: np.ndarray
    moments: np.ndarray

    def between(self, low: int, high: int):
        """Those with source segments low <= q < high and tests p >= low."""
        part = slice(*np.searchsorted(self.source, [low, high]))
        keep = self.test[part] >= low
        return self.test[part][keep], self.source[part][keep], self.moments[:, :, part][:, :, keep]


def near_pairs(k: float, mesh: Mesh, sources: Sources) -> NearPairs:
    """All near pairs of a mesh and its sources, integrated."""
    p, q, gap = _candidates(mesh, sources)
    moments = np.empty((2, 2, len(p)), dtype=complex)
    near = gap < NEAR
    equal = np.abs(mesh.radius[p] / mesh.radius[q] - 1) < 1e-9
    coaxial = near & equal & sources.same_line(mesh, p, q)
    for mask, rule in ((coaxial, _coaxial), (near & ~coaxial, _near), (~near, _middle)):
        if mask.any():
            moments[:, :, mask] = mean_and_slope(rule(k, mesh, p[mask], q[mask], sources))
    return NearPairs(p, q, moments)


def _candidates(mesh, sources):
    """Pairs (p, q) sorted by q with their distance of centres over the longer length below MIDDLE."""
    middle = (mesh.start + mesh.end) / 2
    other = sources.start + sources.vector / 2
    found = []
    for low in range(0, mesh.count, BLOCK):
        columns = slice(low, low + BLOCK)
        square = (
            (middle**2).sum(axis=1)
            + (other[columns] ** 2).sum(axis=1)[:, None]
            - 2 * other[columns] @ middle.T
        )
        reach = np.maximum(mesh.length[columns, None], mesh.length[None])
        q, p = np.nonzero(square < (MIDDLE * reach) ** 2)
        found.append((p, q + low))
    p, q = (np.concatenate(parts) for parts in zip(*found, strict=True))
    gap = np.linalg.norm(middle[p] - other[q], axis=1) / np.maximum(mesh.length[p], mesh.length[q])
    return p, q, gap


def _coaxial(k, mesh, p, q, sources) -> np.ndarray:
    """Pairs on one line; equal configurations are integrated once."""
    tangent, length = mesh.tangent, mesh.length
    forward = np.einsum("nc,nc->n", tangent[p], sources.vector[q]) > 0
    first = np.where(forward[:, None], sources.start[q], sources.start[q] + sources.vector[q])
    offset = np.einsum("nc,nc->n", first - mesh.start[p], tangent[p])
    cases = np.column_stack([offset, length[p], length[q], mesh.radius[p]])
    key = np.round(cases / length[p, None] * 1e9)
    _, index, inverse = np.unique(
        np.column_stack([key, cases[:, 1]]).round(12), axis=0, return_index=True, return_inverse=True
    )
    moments = coaxial_moments(k, *cases[index].T)[:, :, inverse.reshape(-1)]
    return np.where(forward, moments, moments[:, ::-1])


def _near(k, mesh, p, q, sources) -> np.ndarray:
    extra = _radius_square(mesh, p, q, sources)
    return near_moments(
        k, mesh.start[p], (mesh.end - mesh.start)[p], sources.start[q], sources.vector[q], extra
    )


def _middle(k, mesh, p, q, sources) -> np.ndarray:
    from_line = _radius_square(mesh, p, q, sources)
    return _paired_moments(
        k, mesh.start[p], (mesh.end - mesh.start)[p], sources.start[q], sources.vector[q], from_line
    )


def _paired_moments(k, start_test, vector_test, start_source, vector_source, radius_square) -> np.ndarray:
    """Moments of n pairs by four Gauss points at both segments, (2, 2, n). [m]"""
    g, w = gauss(4)
    shape = np.stack([1 - g, g]) * w
    test = start_test[:, None] + g[:, None] * vector_test[:, None]
    source = start_source[:, None] + g[:, None] * vector_source[:, None]
    distance = np.sqrt(
        ((test[:, :, None] - source[:, None]) ** 2).sum(axis=-1) + radius_square[:, None, None]
    )
    lengths = np.linalg.norm(vector_test, axis=1) * np.linalg.norm(vector_source, axis=1)
    return np.einsum("ai,bj,nij->abn", shape, shape, np.exp(-1j * k * distance) / distance) * lengths


def _radius_square(mesh, p, q, sources) -> np.ndarray:
    """What rules 1 (unequal radii), 2 and 3 of the kernel add to the squared distance of the axes. [m2]"""
    both = mesh.radius[p] ** 2 + mesh.radius[q] ** 2
    same_line = sources.same_line(mesh, p, q)
    factor = np.where(same_line, 1.0, 0.0)
    direction = sources.vector[q] / mesh.length[q, None]
    for a in (0, 1):
        for b in (0, 1):
            meets = mesh.nodes[p, a] == mesh.nodes[q, b]
            if sources.mirrored:
                meets = meets & mesh.grounded[mesh.nodes[p, a]]
            outward = np.einsum("nc,nc->n", mesh.tangent[p], direction) * (1 if a == b else -1)
            turn = np.clip(1 - 1.5 * (1 + outward) / 2, 0.25, 1.0)
            factor = np.where(meets & ~same_line, turn, factor)
    return both * factor
