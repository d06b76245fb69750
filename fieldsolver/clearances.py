"""Distances between wire axes, and the refusal of wires that touch or cross without being joined."""

import numpy as np

from fieldsolver.errors import GeometryError


def axis_distances(points: np.ndarray, ends: np.ndarray):
    """Distance of points (n, 3) from the axes ends (W, 2, 3), and the fraction of the nearest point.

    Returns (n, W) [m] and (n, W) in 0..1.
    """
    direction = ends[:, 1] - ends[:, 0]
    offset = points[:, None, :] - ends[None, :, 0, :]
    fraction = np.einsum("nwc,wc->nw", offset, direction) / np.einsum("wc,wc->w", direction, direction)
    fraction = np.clip(fraction, 0, 1)
    nearest = offset - fraction[..., None] * direction[None]
    return np.linalg.norm(nearest, axis=2), fraction


def check_clearances(ends: np.ndarray, radius: np.ndarray, node_of_end: np.ndarray, inner: dict):
    """Warnings about narrow gaps between wires that are not joined; wires that touch are refused."""
    joined = _joined(node_of_end, inner)
    distance = _axis_to_axis(ends)
    touch = radius[:, None] + radius[None]
    upper = np.triu(np.ones_like(joined), 1).astype(bool)
    for i, j in np.argwhere(upper & ~joined & (distance < touch)):
        raise GeometryError(
            f"conductors {i} and {j} touch or cross without being joined: their axes "
            f"are {distance[i, j]:.4g} m apart, their radii {radius[i]:.4g} and {radius[j]:.4g} m; join them "
            "at an end or move them apart"
        )
    for i, j in np.argwhere(upper & joined):
        if _folded(ends[i], ends[j], touch[i, j]):
            raise GeometryError(
                f"conductors {i} and {j} are joined and lie on each other; remove one or open the angle"
            )
    narrow = np.argwhere(upper & ~joined & (distance < touch + 4 * np.maximum(radius[:, None], radius[None])))
    return tuple(
        f"conductors {i} and {j} pass at {distance[i, j] - touch[i, j]:.4g} m without being joined, less "
        "than four radii: fields in that gap are uncertain"
        for i, j in narrow
    )


def _joined(node_of_end, inner) -> np.ndarray:
    """(W, W) True where two wires share a node."""
    count = len(node_of_end)
    membership = np.zeros((count, int(node_of_end.max()) + 1), dtype=bool)
    membership[np.repeat(np.arange(count), 2), node_of_end.reshape(-1)] = True
    for wire, joints in inner.items():
        membership[wire, [node for _, node in joints]] = True
    shared = membership.astype(np.float32)
    return (shared @ shared.T) > 0


def _folded(first: np.ndarray, second: np.ndarray, touch: float) -> bool:
    """True where two joined wires run within each other for more than the joint itself."""
    samples = np.linspace(0, 1, 9)[:, None]
    points = first[0] + samples * (first[1] - first[0])
    distance = axis_distances(points, second[None])[0][:, 0]
    return int((distance < touch).sum()) >= 4 and np.linalg.norm(first[1] - first[0]) > 8 * touch


def _axis_to_axis(ends: np.ndarray) -> np.ndarray:
    """(W, W) least distance between axes. [m]

    Inside both wires the distance of the infinite lines counts where its foot points are inside;
    otherwise it is reached at an end.
    """
    flat = ends.reshape(-1, 3)
    to_axis = axis_distances(flat, ends)[0].reshape(len(ends), 2, len(ends)).min(axis=1)
    distance = np.minimum(to_axis, to_axis.T)
    u = ends[:, 1] - ends[:, 0]
    w = ends[:, None, 0] - ends[None, :, 0]
    a, b, c = np.einsum("ic,ic->i", u, u), u @ u.T, np.einsum("jc,jc->j", u, u)
    d, e = np.einsum("ic,ijc->ij", u, w), np.einsum("jc,ijc->ij", u, w)
    determinant = a[:, None] * c[None] - b * b
    skew = determinant > 1e-12 * a[:, None] * c[None]
    safe = np.where(skew, determinant, 1.0)
    s = (b * e - c[None] * d) / safe
    t = (a[:, None] * e - b * d) / safe
    inside = skew & (s > 0) & (s < 1) & (t > 0) & (t < 1)
    gap = np.linalg.norm(w + s[..., None] * u[:, None] - t[..., None] * u[None], axis=2)
    return np.where(inside, np.minimum(distance, gap), distance)
