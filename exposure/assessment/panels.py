"""Adaptive Chebyshev panels: a function of position known everywhere from few points.

The logarithm of each squared strength is interpolated on the extremal Chebyshev nodes of each
panel, ends included (so corners, edges and faces of a region are sampled as they stand).  The last
coefficients tell the error; panels are halved across the direction that is worst, a whole level in
one call.  Trefethen, Approximation Theory and Approximation Practice, SIAM 2013, ch. 3 and 8.
"""

from dataclasses import dataclass
from functools import lru_cache

import numpy as np

SMALLEST_VALUE = 1e-300
LARGEST_LOG = 600.0  # stands for inf


@dataclass(frozen=True)
class Panels:
    """Panels with the logarithms at their nodes.

    Attributes
    ----------
    lower, upper : (n, d) float
        Corners in the coordinates of the region. [m]
    logs : (n, q1, ..., qd, c) float
        Natural logarithms of the values at the nodes; ``LARGEST_LOG`` where the value is inf.
    tails : (n, d, c) float
        Size of the last coefficients in each direction, the error of the logarithm.
    """

    lower: np.ndarray
    upper: np.ndarray
    logs: np.ndarray
    tails: np.ndarray

    def __len__(self):
        return len(self.lower)

    def __getitem__(self, chosen):
        return Panels(self.lower[chosen], self.upper[chosen], self.logs[chosen], self.tails[chosen])

    @property
    def errors(self):
        """Error of the logarithm of each value, (n, c); inf where a node is within a conductor."""
        infinite = (self.logs >= LARGEST_LOG).any(axis=tuple(range(1, self.logs.ndim - 1)))
        return np.where(infinite, np.inf, self.tails.sum(axis=1))

    @property
    def sides(self):
        return self.upper - self.lower

    def grid(self, counts):
        """Logarithms on evenly spaced points, ends included: (n, *counts, c)."""
        result = self.logs
        for axis, count in enumerate(counts):
            order = result.shape[axis + 1]
            rows = (
                interpolation(order, np.linspace(-1, 1, count)) if count > 1 else np.ones((1, order)) / order
            )
            result = np.moveaxis(np.tensordot(rows, result, (1, axis + 1)), 0, axis + 1)
        return result

    def at(self, panel, points):
        """Logarithms at points (n, d), each within the panel of its index (n,): (n, c)."""
        unit = 2 * (points - self.lower[panel]) / np.maximum(self.sides[panel], 1e-30) - 1
        result = self.logs[panel]
        for axis in range(unit.shape[1]):
            rows = interpolation(result.shape[1], unit[:, axis])
            result = np.einsum("np,np...->n...", rows, result)
        return result


def nodes(order):
    """Extremal Chebyshev nodes on [-1, 1], ascending; one node is the middle."""
    return -np.cos(np.pi * np.arange(order) / (order - 1)) if order > 1 else np.zeros(1)


@lru_cache(maxsize=64)
def coefficients(order):
    """Matrix from values at the nodes to Chebyshev coefficients, (order, order)."""
    return np.linalg.inv(np.polynomial.chebyshev.chebvander(nodes(order), order - 1))


def interpolation(order, places):
    """Matrix from values at the nodes to values at places in [-1, 1], (len(places), order)."""
    return np.polynomial.chebyshev.chebvander(places, order - 1) @ coefficients(order)


def node_points(lower, upper, orders):
    """Nodes of panels, (n, q1 * ... * qd, d)."""
    axes = [0.5 * (nodes(q) + 1) for q in orders]
    unit = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1).reshape(-1, len(orders))
    return lower[:, None, :] + unit * (upper - lower)[:, None, :]


def sampled(function, lower, upper, orders):
    """Panels of `function`, (n, d) -> (n, c), from one call."""
    points = node_points(lower, upper, orders)
    values = function(points.reshape(-1, points.shape[2]))
    logs = np.minimum(np.log(np.maximum(values, SMALLEST_VALUE)), LARGEST_LOG)
    logs = logs.reshape(len(lower), *orders, -1)
    return Panels(lower, upper, logs, _tails(logs))


def refined(function, lower, upper, orders, direction, wanted):
    """Leaves of the panels that start from `lower`, `upper`, (n, d).

    direction : Panels -> (n,) int, the direction to halve a panel across, or -1 to keep it.
    wanted : lower, upper -> (n,) bool; other panels are dropped before anything is evaluated.
    """
    leaves = []
    while True:
        keep = wanted(lower, upper)
        panels = sampled(function, lower[keep], upper[keep], orders)
        across = direction(panels)
        leaves.append(panels[across < 0])
        open_ = across >= 0
        if not open_.any():
            return joined(leaves)
        lower, upper = halved(panels.lower[open_], panels.upper[open_], across[open_])


def joined(parts):
    """Several sets of panels as one."""
    names = ("lower", "upper", "logs", "tails")
    return Panels(*(np.concatenate([getattr(p, name) for p in parts]) for name in names))


def halved(lower, upper, across):
    """Both halves of each box, cut in the middle across the given direction."""
    rows = np.arange(len(lower))
    first, second = upper.copy(), lower.copy()
    middle = 0.5 * (lower + upper)[rows, across]
    first[rows, across] = middle
    second[rows, across] = middle
    return np.concatenate([lower, second]), np.concatenate([first, upper])


def cut(lower, upper, side):
    """Equal boxes, no side longer than `side`, that fill one box; (n, d) lower and upper corners."""
    lower, upper = np.asarray(lower, float), np.asarray(upper, float)
    counts = np.maximum(1, np.ceil((upper - lower) / side - 1e-9).astype(int))
    edges = [np.linspace(a, b, n + 1) for a, b, n in zip(lower, upper, counts, strict=True)]
    low = np.stack(np.meshgrid(*(e[:-1] for e in edges), indexing="ij"), axis=-1)
    high = np.stack(np.meshgrid(*(e[1:] for e in edges), indexing="ij"), axis=-1)
    return low.reshape(-1, len(lower)), high.reshape(-1, len(lower))


def _tails(logs):
    """Per direction the size of the last coefficient, or half the one before where that is larger.

    Both are needed because a function that is even or odd about the middle has every second
    coefficient zero; the rest of the series is smaller than its last term where it converges.
    """
    dimensions = logs.ndim - 2
    series = logs
    for axis in range(dimensions):
        matrix = coefficients(logs.shape[axis + 1])
        series = np.moveaxis(np.tensordot(matrix, series, (1, axis + 1)), 0, axis + 1)
    sizes = np.abs(series)
    others = [tuple(a + 1 for a in range(dimensions) if a != axis) for axis in range(dimensions)]
    tails = [_last(sizes.sum(axis=others[axis])) for axis in range(dimensions)]
    return np.stack(tails, axis=1)


def _last(sizes):
    if sizes.shape[1] == 1:
        return np.zeros_like(sizes[:, 0])
    return np.maximum(sizes[:, -1], 0.5 * sizes[:, -2])


def strengths_of(logs, errors=0.0):
    """Values from their logarithms, enlarged by their errors; inf from ``LARGEST_LOG`` on."""
    raised = logs + errors
    return np.where(raised >= LARGEST_LOG, np.inf, np.exp(np.minimum(raised, LARGEST_LOG)))


def blind(panels, distance):
    """Panels that a conductor may cross, (n,) bool: their tails are not to be trusted.

    distance : (n, d) -> (n,), from points of the region to the nearest conductor.
    Every point of a panel is within half the diagonal of the widest mesh of nodes from some node,
    so that no conductor can hide between the nodes, whatever the tails say.
    """
    orders = panels.logs.shape[1:-1]
    mesh = np.array([0.5 * np.diff(nodes(q)).max(initial=0.0) for q in orders])
    points = node_points(panels.lower, panels.upper, orders)
    nearest = distance(points.reshape(-1, points.shape[2])).reshape(points.shape[:2]).min(axis=1)
    return nearest <= 0.5 * np.linalg.norm(mesh * panels.sides, axis=1) * (1 + 1e-9)
