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
from fieldsolver.kernels import far_moments, gauss
from fieldsolver.near_pairs import NearPairs, Sources, near_pairs

BLOCK = 48


def impedance_matrix(problem) -> np.ndarray:
    """(N, N) complex symmetric matrix of a problem: wires, images, ground, skin effect and loads. [ohm]"""
    mesh, basis, k, image = problem.mesh, problem.basis, problem.k, problem.image
    half = _half(mesh, basis, k, Sources(mesh.start, mesh.end - mesh.start, False), np.ones(3), 1.0)
    if image is not None:
        mirrored = Sources(mesh.start * MIRROR, (mesh.end - mesh.start) * MIRROR, True)
        half += _half(mesh, basis, k, mirrored, image.tensor, image.charge)
    factor = 1j * k * FREE_SPACE_IMPEDANCE / (4 * np.pi)
    half *= factor
    half += half.T.copy()
    if problem.half_space is not None:
        half += factor * problem.half_space.matrix(mesh, basis, problem.ground_ends)
    rows = problem.load_rows @ basis
    lumped = rows.T @ sparse.diags(problem.load_impedances) @ rows + basis.T @ problem.skin @ basis
    half += lumped.toarray()
    return half


def _half(mesh, basis, k, sources: Sources, tensor, charge) -> np.ndarray:
    """Matrix Y with Z = (j k eta/4 pi) (Y + Y^T), by blocks.

    The current on a segment is its mean times 1 plus half its difference times N_1 - N_0; only the
    second has a charge.
    """
    pairs = near_pairs(k, mesh, sources)
    mean = ((basis[::2] + basis[1::2]) / 2).tocsr()
    slope = ((basis[1::2] - basis[::2]) / 2).tocsr()
    out = np.zeros((basis.shape[1],) * 2, dtype=complex)
    for low in range(0, mesh.count, BLOCK):
        rows = np.arange(low, mesh.count)
        columns = np.arange(low, min(low + BLOCK, mesh.count))
        local = _local_block(k, mesh, rows, columns, sources, pairs, tensor, charge)
        local[:, :, : len(columns)] *= 0.5
        _gather(out, (mean[low:].T.tocsr(), slope[low:].T.tocsr()), (mean[columns], slope[columns]), local)
    return out


def _local_block(k, mesh, rows, columns, sources, pairs, tensor, charge) -> np.ndarray:
    """(2, 2, P, Q) interaction of means and slopes of tests (rows) and sources (columns)."""
    local = _moments(k, mesh, rows, columns, sources, pairs)
    scalar = local[0, 0] * (-4 * charge / k**2 / (mesh.length[rows, None] * mesh.length[None, columns]))
    local *= (mesh.tangent[rows] * tensor) @ mesh.tangent[columns].T
    local[1, 1] += scalar
    return local


def _gather(out, tests, sources, local):
    """Add B^T local B to the columns of ``out`` that the block of sources touches."""
    for b, source in enumerate(sources):
        tested = tests[0] @ local[0, b] + tests[1] @ local[1, b]
        touched = np.unique(source.indices)
        out[:, touched] += (source.T.tocsr()[touched] @ tested.T).T


def _moments(k, mesh, rows, columns, sources: Sources, pairs: NearPairs) -> np.ndarray:
    """(2, 2, P, Q) moments with 1 and N_1 - N_0 of all pairs of a block."""
    nodes = gauss(2)[0]
    same_line = sources.same_line(mesh, rows[:, None], columns[None])
    extra = np.where(same_line, mesh.radius[rows, None] ** 2 + mesh.radius[None, columns] ** 2, 0.0)
    moments = far_moments(
        k,
        mesh.points(nodes)[rows],
        sources.points(nodes)[columns],
        mesh.length[rows],
        mesh.length[columns],
        extra,
    )
    p, q, near = pairs.between(columns[0], columns[-1] + 1)
    moments[:, :, p - rows[0], q - columns[0]] = near
    return moments
