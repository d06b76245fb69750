"""Currents and charges on the mesh as weighted points."""

import numpy as np

from fieldsolver.kernels import gauss
from fieldsolver.segments import Mesh


def current_nodes(mesh: Mesh, ends: np.ndarray, count: int):
    """Gauss points of every segment with what sits there.

    Parameters
    ----------
    ends : (2S,) complex
        Currents at segment ends. [A]
    count : int
        Points a segment, q.

    Returns
    -------
    points (S, q, 3) [m], moments I dl (S, q, 3) [A m], slopes dI/ds dl (S, q) [A]
    """
    nodes, weights = gauss(count)
    current = ends.reshape(-1, 2) @ np.stack([1 - nodes, nodes])
    length = mesh.length[:, None]
    moments = (current * weights * length)[..., None] * mesh.tangent[:, None, :]
    slopes = (ends[1::2] - ends[::2])[:, None] * weights
    return mesh.points(nodes), moments, slopes
