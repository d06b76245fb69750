"""Piecewise-linear currents on the mesh, continuous at every node by Kirchhoff's law."""

import numpy as np
from scipy import sparse
from scipy.sparse.linalg import splu

from fieldsolver.segments import Mesh


def basis(mesh: Mesh) -> sparse.csr_matrix:
    """Matrix B (2S, N): current at end e of segment s, along the segment, is (B x)[2s + e].

    At a node where m ends meet there are m - 1 unknowns, each flowing from one end (the first) into
    one other end, so that the sum into the node is zero.  A free end carries none.  An end on the
    ground has an unknown of its own that flows into the ground.
    """
    order = np.argsort(mesh.nodes.reshape(-1), kind="stable")
    node = mesh.nodes.reshape(-1)[order]
    first = np.r_[True, node[1:] != node[:-1]]
    reference = order[np.maximum.accumulate(np.where(first, np.arange(len(node)), 0))]
    unknown = mesh.grounded[node] | ~first
    column = np.cumsum(unknown) - 1
    outflow = np.where(order % 2 == 0, 1.0, -1.0)
    rows, columns, values = [order[unknown]], [column[unknown]], [outflow[unknown]]
    through = unknown & ~mesh.grounded[node]
    rows.append(reference[through])
    columns.append(column[through])
    values.append(np.where(reference[through] % 2 == 0, -1.0, 1.0))
    shape = (2 * mesh.count, int(unknown.sum()))
    data = np.concatenate(values), (np.concatenate(rows), np.concatenate(columns))
    return sparse.csr_matrix(data, shape=shape)


def unknowns(basis_matrix: sparse.csr_matrix, ends: np.ndarray) -> np.ndarray:
    """(N,) unknowns of end currents (2S,) that obey Kirchhoff's law: B^T B x = B^T ends. [A]"""
    square = (basis_matrix.T @ basis_matrix).tocsc()
    return splu(square.astype(ends.dtype)).solve(basis_matrix.T @ ends)


def ends_at_node(mesh: Mesh, segment: int, end: int) -> int:
    """How many segment ends meet at an end of a segment."""
    return int((mesh.nodes == mesh.nodes[segment, end]).sum())
