"""The impedance matrix of the mixed-potential electric field integral equation.

    Z_mn = (j k eta / 4 pi) double integral of f_m . f_n g  +  (eta / j k 4 pi) double integral of f_m' f_n' g

(R. F. Harrington, Field Computation by Moment Methods, 1968, ch. 4, with Galerkin testing), plus the
same with the images and the ground's potentials (docs/theory.md).  Four moments per pair of segments
carry both terms; they are computed once and gathered into the unknowns by the basis matrix B.
"""

import numpy as np
from scipy import sparse

from fieldsolver.constants import FREE_SPACE_IMPEDANCE
from fieldsolver.images import MIRROR
from fieldsolver.kernels import coaxial_moments, far_moments, gauss, near_moments

BLOCK = 48
NEAR = 2.6  # distance of centres over the longer segment, up to which integrals are analytic
MIDDLE = 5.6  # and up to which four Gauss points are used instead of two


def impedance_matrix(problem) -> np.ndarray:
    """(N, N) complex symmetric matrix of a problem: wires, images, ground, skin effect and loads. [ohm]"""
    mesh, basis, k, image = problem.mesh, problem.basis, problem.k, problem.image
    half = _half(mesh, basis, k, mesh.start, mesh.end, np.ones(3), 1.0)
    if image is not None:
        half += _half(mesh, basis, k, mesh.start * MIRROR, mesh.end * MIRROR, image.tensor, image.charge)
    half += half.T.copy()
    rows = problem.load_rows @ basis
    lumped = rows.T @ sparse.diags(problem.load_impedances) @ rows + basis.T @ problem.skin @ basis
    half += lumped.toarray()
    return half


def _half(mesh, basis, k, start, end, tensor, charge) -> np.ndarray:
    """Matrix Y with Z = Y + Y^T, for sources at start, end (S, 3), from blocks of rows."""
    mirrored = start is not mesh.start
    out = np.zeros((basis.shape[1],) * 2, dtype=complex)
    for low in range(0, mesh.count, BLOCK):
        high = min(low + BLOCK, mesh.count)
        rows, columns = np.arange(low, high), np.arange(low, mesh.count)
        local = _local_block(mesh, k, rows, columns, start, end, tensor, charge, mirrored)
        local[: 2 * len(rows)] *= 0.5
        _gather(out, basis, local, low, high)
    return out


def _local_block(mesh, k, rows, columns, start, end, tensor, charge, mirrored) -> np.ndarray:
    """(2Q, 2P) interaction of the end currents of source segments (columns) with tests (rows). [ohm]"""
    moments = _moments(mesh, k, rows, columns, start, end, mirrored)
    length = mesh.length
    tangent = mesh.tangent
    vector = (1j * k * FREE_SPACE_IMPEDANCE / (4 * np.pi)) * ((tangent[rows] * tensor) @ tangent[columns].T)
    scalar = moments.sum(axis=(0, 1))
    scalar *= FREE_SPACE_IMPEDANCE * charge / (4j * np.pi * k) / (length[rows, None] * length[None, columns])
    local = np.empty((len(columns), 2, len(rows), 2), dtype=complex)
    for a in (0, 1):
        for b in (0, 1):
            part = moments[a, b]
            part *= vector
            part += scalar if a == b else -scalar
            local[:, b, :, a] = part.T
    return local.reshape(2 * len(columns), 2 * len(rows))


def _gather(out, basis, local, low, high):
    sources = basis[2 * low :].T.tocsr() @ local
    tests = basis[2 * low : 2 * high].tocsc()
    touched = np.flatnonzero(np.diff(tests.indptr))
    out[touched] += tests[:, touched].T.tocsr() @ np.ascontiguousarray(sources.T)


def _moments(mesh, k, rows, columns, start, end, mirrored) -> np.ndarray:
    """(2, 2, P, Q) moments of all pairs of a block."""
    nodes = gauss(2)[0][None, :, None]
    length = mesh.length
    vector = end - start
    test = mesh.start[rows, None] + nodes * (mesh.end - mesh.start)[rows, None]
    source = start[columns, None] + nodes * vector[columns, None]
    same_line = mesh.line[rows, None] == mesh.line[None, columns]
    if mirrored:
        same_line &= _vertical(mesh)[rows, None]
    extra = np.where(same_line, mesh.radius[rows, None] ** 2 + mesh.radius[None, columns] ** 2, 0.0)
    moments = far_moments(k, test, source, length[rows], length[columns], extra)
    centre_test, centre_source = test.mean(axis=1), source.mean(axis=1)
    gap = np.linalg.norm(centre_test[:, None] - centre_source[None], axis=2)
    gap /= np.maximum(length[rows, None], length[None, columns])
    near = gap < NEAR
    exact = near & same_line & (np.abs(mesh.radius[rows, None] / mesh.radius[None, columns] - 1) < 1e-9)
    _fill(moments, exact, rows, columns, lambda p, q: _coaxial(mesh, k, p, q, start, vector))
    _fill(moments, near & ~exact, rows, columns, lambda p, q: _near(mesh, k, p, q, start, vector, mirrored))
    _fill(
        moments,
        (gap < MIDDLE) & ~near,
        rows,
        columns,
        lambda p, q: _middle(mesh, k, p, q, start, vector, mirrored),
    )
    return moments


def _fill(moments, mask, rows, columns, values):
    p, q = np.nonzero(mask)
    if len(p):
        moments[:, :, p, q] = values(rows[p], columns[q])


def _vertical(mesh) -> np.ndarray:
    return np.abs(mesh.tangent[:, 2]) > 1 - 1e-12


def _coaxial(mesh, k, p, q, start, vector) -> np.ndarray:
    """Pairs on one line; equal configurations are integrated once."""
    tangent, length = mesh.tangent, mesh.length
    forward = np.einsum("nc,nc->n", tangent[p], vector[q]) > 0
    first = np.where(forward[:, None], start[q], start[q] + vector[q])
    offset = np.einsum("nc,nc->n", first - mesh.start[p], tangent[p])
    cases = np.column_stack([offset, length[p], length[q], mesh.radius[p]])
    key = np.round(cases / length[p, None] * 1e9)
    _, index, inverse = np.unique(
        np.column_stack([key, cases[:, 1]]).round(12), axis=0, return_index=True, return_inverse=True
    )
    moments = coaxial_moments(k, *cases[index].T)[:, :, inverse.reshape(-1)]
    return np.where(forward, moments, moments[:, ::-1])


def _near(mesh, k, p, q, start, vector, mirrored) -> np.ndarray:
    extra = _radius_square(mesh, p, q, vector, mirrored)
    return near_moments(k, mesh.start[p], (mesh.end - mesh.start)[p], start[q], vector[q], extra)


def _middle(mesh, k, p, q, start, vector, mirrored) -> np.ndarray:
    from_line = _radius_square(mesh, p, q, vector, mirrored)
    return _paired_moments(k, mesh.start[p], (mesh.end - mesh.start)[p], start[q], vector[q], from_line)


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


def _radius_square(mesh, p, q, vector, mirrored) -> np.ndarray:
    """What rules 1 (unequal radii), 2 and 3 of the kernel add to the squared distance of the axes. [m2]"""
    both = mesh.radius[p] ** 2 + mesh.radius[q] ** 2
    same_line = mesh.line[p] == mesh.line[q]
    if mirrored:
        same_line = same_line & _vertical(mesh)[p]
    factor = np.where(same_line, 1.0, 0.0)
    direction = vector[q] / mesh.length[q, None]
    for a in (0, 1):
        for b in (0, 1):
            meets = mesh.nodes[p, a] == mesh.nodes[q, b]
            if mirrored:
                meets = meets & mesh.grounded[mesh.nodes[p, a]]
            outward = np.einsum("nc,nc->n", mesh.tangent[p], direction) * (1 if a == b else -1)
            turn = np.clip(1 - 1.5 * (1 + outward) / 2, 0.25, 1.0)
            factor = np.where(meets & ~same_line, turn, factor)
    return both * factor
