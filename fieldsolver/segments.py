"""The mesh: conductors cut into straight segments, and the nodes at which segments are joined.

Joints (docs/theory.md): ends nearer than a tenth of the smaller radius are one node; an end within
one radius of another wire's axis puts a node into that wire.  Feeds and loads put nodes too.
"""

import math
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from fieldsolver.clearances import axis_distances, check_clearances
from fieldsolver.constants import SPEED_OF_LIGHT
from fieldsolver.errors import GeometryError
from fieldsolver.ground import FreeSpace

SEGMENTS_PER_WAVELENGTH = 40
SEGMENTS_PER_WIRE = 10


@dataclass(frozen=True)
class Mesh:
    """Segments s = 0..S-1, each along the direction of its wire.

    start, end (S, 3) [m]; radius (S,) [m]; wire (S,) index of the conductor; line (S,) equal where
    two segments lie on one straight line; nodes (S, 2) node index of start and end; grounded (K,)
    bool for each node; fractions: for each wire the fractions (n+1,) of its nodes and first segment;
    warnings: texts.
    """

    start: np.ndarray
    end: np.ndarray
    radius: np.ndarray
    wire: np.ndarray
    line: np.ndarray
    nodes: np.ndarray
    grounded: np.ndarray
    fractions: tuple[np.ndarray, ...]
    first_segment: tuple[int, ...]
    warnings: tuple[str, ...]

    @property
    def count(self) -> int:
        return len(self.radius)

    @cached_property
    def length(self) -> np.ndarray:
        """(S,) lengths. [m]"""
        return np.linalg.norm(self.end - self.start, axis=1)

    @cached_property
    def tangent(self) -> np.ndarray:
        """(S, 3) unit vectors. [1]"""
        return (self.end - self.start) / self.length[:, None]

    def points(self, fractions: np.ndarray) -> np.ndarray:
        """Points at fractions (q,) of every segment, shape (S, q, 3). [m]"""
        return self.start[:, None, :] + fractions[None, :, None] * (self.end - self.start)[:, None, :]

    def end_at(self, wire: int, position: float) -> tuple[int, int]:
        """(segment, end 0 or 1) of the node at a fraction of a wire; inside it, the end before the node."""
        index = int(np.argmin(np.abs(self.fractions[wire] - position)))
        first = self.first_segment[wire]
        return (first, 0) if index == 0 else (first + index - 1, 1)


def mesh(conductors, cuts, frequency: float, ground, segments_per_wavelength=None) -> Mesh:
    """Segments and joints of the conductors.

    Parameters
    ----------
    conductors : sequence of Wire
    cuts : sequence of (wire, position)
        Where feeds and loads need a node.
    frequency : float
        [Hz]
    segments_per_wavelength : float, optional
        Default 40; every straight wire gets at least a quarter of that number.

    Raises
    ------
    GeometryError
        Conductors below or too near the ground, or that touch or cross without being joined.
    """
    if not conductors:
        raise GeometryError("there is no conductor to solve")
    density = segments_per_wavelength or SEGMENTS_PER_WAVELENGTH
    wires = [_on_the_ground(wire, i, ground) for i, wire in enumerate(conductors)]
    radius = np.array([wire.radius for wire in conductors])
    ends = np.array(wires)
    node_of_end, inner = _joints(ends, radius)
    warnings = check_clearances(ends, radius, node_of_end, inner)
    inner = _add_cuts(inner, cuts, len(wires))
    return _segments(
        ends, radius, node_of_end, inner, frequency / SPEED_OF_LIGHT * density, density, ground, warnings
    )


def _on_the_ground(wire, index: int, ground):
    """Ends of a wire with |up| below a tenth of the radius set to 0; refused where too low."""
    ends = np.array([wire.start, wire.end])
    if isinstance(ground, FreeSpace):
        return ends
    ends[np.abs(ends[:, 2]) < 0.1 * wire.radius, 2] = 0.0
    if (ends[:, 2] < 0).any():
        raise GeometryError(f"conductor {index} reaches below the ground (up = {ends[:, 2].min():.4g} m)")
    low = (ends[:, 2] > 0) & (ends[:, 2] < wire.radius)
    if low.any() or not ends[:, 2].any():
        raise GeometryError(
            f"conductor {index} lies in the surface of the ground: its axis must be at least one radius "
            f"({wire.radius:.4g} m) above it, or one end exactly on it"
        )
    return ends


def _joints(ends: np.ndarray, radius: np.ndarray):
    """Node of each wire end (W, 2), and {wire: [(fraction, node)]} of ends joined along a wire."""
    count = len(radius)
    flat = ends.reshape(-1, 3)
    reach = np.repeat(radius, 2)
    parent = list(range(2 * count))

    def root(i):
        while parent[i] != i:
            parent[i] = parent[parent[i]]
            i = parent[i]
        return i

    distance = np.linalg.norm(flat[:, None] - flat[None], axis=2)
    near = np.argwhere(np.triu(distance < 0.1 * np.minimum(reach[:, None], reach[None]), 1))
    for a, b in near:
        parent[root(a)] = root(b)
    inner = {}
    distances, fractions = axis_distances(flat, ends)
    owner = np.repeat(np.arange(count), 2)
    lengths = np.linalg.norm(ends[:, 1] - ends[:, 0], axis=1)
    touching = (distances < np.maximum(reach[:, None], radius[None])) & (
        owner[:, None] != np.arange(count)[None]
    )
    for a, w in np.argwhere(touching):
        along = fractions[a, w] * lengths[w]
        if min(along, lengths[w] - along) < max(reach[a], radius[w]):
            parent[root(a)] = root(2 * w + int(along > lengths[w] / 2))
        else:
            inner.setdefault(int(w), []).append((float(fractions[a, w]), int(a)))
    roots = np.array([root(i) for i in range(2 * count)])
    node = np.unique(roots, return_inverse=True)[1].reshape(count, 2)
    return node, {w: [(f, int(node.reshape(-1)[a])) for f, a in items] for w, items in inner.items()}


def _add_cuts(inner: dict, cuts, count: int) -> dict:
    """Joints along each wire plus the nodes of feeds and loads (node None: a new one)."""
    result = {w: list(items) for w, items in inner.items()}
    for wire, position in cuts:
        if not 0 <= wire < count:
            raise GeometryError(f"a feed or load on conductor {wire}: there are conductors 0 to {count - 1}")
        if 0 < position < 1:
            result.setdefault(wire, []).append((position, None))
    return result


def _segments(ends, radius, node_of_end, inner, per_metre, density, ground, warnings) -> Mesh:
    next_node = int(node_of_end.max()) + 1
    merged: dict[int, int] = {}
    parts = {name: [] for name in ("start", "end", "radius", "wire", "nodes")}
    fractions, first, total = [], [], 0
    for w, (start, end) in enumerate(ends):
        length = float(np.linalg.norm(end - start))
        stops = _stops(node_of_end[w], inner.get(w, []), radius[w] / length, merged)
        least = math.ceil(SEGMENTS_PER_WIRE * density / SEGMENTS_PER_WAVELENGTH) / length
        wire_fractions, wire_nodes = [0.0], [stops[0][1]]
        for (f0, _), (f1, node) in zip(stops, stops[1:], strict=False):
            piece = (f1 - f0) * length
            number = math.ceil(piece * max(per_metre, least) - 1e-9)
            number = max(1, min(number, int(piece / (2 * radius[w]) + 1e-9)))
            wire_fractions += [f0 + (f1 - f0) * i / number for i in range(1, number)] + [f1]
            fresh = list(range(next_node, next_node + number - 1))
            next_node += number - 1
            if node is None:
                node, next_node = next_node, next_node + 1
            wire_nodes += [*fresh, node]
        t = np.array(wire_fractions)
        points = start + t[:, None] * (end - start)
        parts["start"].append(points[:-1])
        parts["end"].append(points[1:])
        parts["radius"].append(np.full(len(t) - 1, radius[w]))
        parts["wire"].append(np.full(len(t) - 1, w))
        parts["nodes"].append(np.column_stack([wire_nodes[:-1], wire_nodes[1:]]))
        fractions.append(t)
        first.append(total)
        total += len(t) - 1
    arrays = {name: np.concatenate(value) for name, value in parts.items()}
    nodes = np.vectorize(lambda n: merged.get(n, n), otypes=[int])(arrays.pop("nodes"))
    kept, compact = np.unique(nodes, return_inverse=True)
    nodes = compact.reshape(nodes.shape)
    grounded = np.zeros(len(kept), dtype=bool)
    if not isinstance(ground, FreeSpace):
        for side in ("start", "end"):
            grounded[nodes[:, int(side == "end")][arrays[side][:, 2] == 0]] = True
    return Mesh(
        **arrays,
        line=_lines(ends, radius)[arrays["wire"]],
        nodes=nodes,
        grounded=grounded,
        fractions=tuple(fractions),
        first_segment=tuple(first),
        warnings=warnings,
    )


def _stops(end_nodes, joints, least: float, merged: dict) -> list:
    """Sorted [(fraction, node)] of a wire; stops nearer than one radius to each other become one."""
    stops = [(0.0, int(end_nodes[0]))]
    for fraction, node in sorted(joints, key=lambda item: item[0]):
        if fraction - stops[-1][0] > least and 1 - fraction > least:
            stops.append((fraction, node))
        elif node is not None:
            raise GeometryError(
                "two conductors are joined to a third less than one of its radii from each other or from its "
                "end; join them at one point"
            )
    return [*stops, (1.0, int(end_nodes[1]))]


def _lines(ends: np.ndarray, radius: np.ndarray) -> np.ndarray:
    """(W,) equal numbers for wires on one straight line (within a tenth of the smaller radius)."""
    direction = ends[:, 1] - ends[:, 0]
    direction /= np.linalg.norm(direction, axis=1)[:, None]
    offset = ends[:, None, :, :] - ends[None, :, :1, :]
    across = np.cross(offset, direction[None, :, None, :])
    apart = np.linalg.norm(across, axis=3).max(axis=2)
    same = apart < 0.1 * np.minimum(radius[:, None], radius[None])
    return np.argmax(same & same.T, axis=1)
