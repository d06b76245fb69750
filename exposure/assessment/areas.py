"""The greatest exposure ratio in an area, and the place where it is.

Branch and bound on adaptive boxes: a box is halved while the interpolated field, enlarged by its
error, could exceed the greatest ratio known from true fields by more than `TOLERANCE` (of a ratio
far below one by `QUIET_TOLERANCE`), for any of the ratio functions.  All share the same points.
Because the nodes of a box include its faces, edges and corners, and the outline of the area is
sampled where it is no rectangle, a maximum at the rim (the usual place) is found as well as one
inside.
"""

from dataclasses import dataclass

import numpy as np
import shapely

from exposure.assessment.panels import blind, cut, halved, node_points, sampled, strengths_of
from exposure.assessment.prisms import Prism, frame
from exposure.assessment.strengths import FieldStrengths, remembered

TOLERANCE = 0.005  # of the exposure ratio
QUIET = 0.1  # below that ratio `upper` may be farther off, by
QUIET_TOLERANCE = 0.02
ORDER = 5  # nodes a side: 125 in a box
CANDIDATES = 9  # places a side where the interpolated field is looked at
OUTLINE_STEPS = 256
SMALLEST_SIDE = 0.03  # m; boxes are not halved below
MOST_POINTS = 60_000  # of one area; then `upper` says how much is left open
BODY_HEIGHT = 2.0  # m
CORNERS = ((False, False), (True, False), (True, True), (False, True))


@dataclass(frozen=True)
class Extreme:
    """The greatest exposure ratio of a region.

    Attributes
    ----------
    position : (3,) float
        Where it is (for a body average: where the feet are). [m]
    ratio : float
        From the true field there; inf where a conductor passes.
    upper : float
        What the ratio may be anywhere in the region, by the search's own estimate of its error.
    values : (m,) float
        The squared strengths there (for a body average: their means).
    """

    position: tuple[float, float, float]
    ratio: float
    upper: float
    values: np.ndarray


def greatest(strengths: FieldStrengths, ratios, prism: Prism) -> tuple[Extreme, ...]:
    """The greatest value of each ratio function over the closed prism."""
    return _Search(strengths, tuple(ratios), prism).run()


def greatest_body_average(strengths: FieldStrengths, ratios, prism: Prism, floor=None) -> tuple[Extreme, ...]:
    """The greatest ratio of the squared strengths averaged over a standing body, 0-2 m above `floor`.

    The mean is Gauss's rule in height, four nodes and two more for each half wavelength in 2 m: the
    squared strength of standing waves turns once in half a wavelength.  `floor` is the prism's
    bottom unless said. [m above ground]
    """
    floor = prism.bottom if floor is None else floor
    places, weights = _gauss(4 + int(np.ceil(4 * BODY_HEIGHT / strengths.wavelength)))
    heights = floor + BODY_HEIGHT * places

    def means(points):
        stacked = np.repeat(points, len(heights), axis=0)
        stacked[:, 2] = np.tile(heights, len(points))
        values = strengths.values(stacked).reshape(len(points), len(heights), -1)
        return np.einsum("h,nhm->nm", weights, values)

    averaged = FieldStrengths(means, strengths.conductors, strengths.wavelength)
    return greatest(averaged, ratios, Prism(prism.outline, floor, floor))


def _gauss(count):
    places, weights = np.polynomial.legendre.leggauss(count)
    return 0.5 * (places + 1), 0.5 * weights


class _Search:
    """One search: the region's own axes, the best so far, and the boxes still open."""

    def __init__(self, strengths, ratios, prism):
        self.strengths, self.ratios, self.prism = strengths, ratios, prism
        self.origin, self.axes, sides = frame(prism.outline)
        self.lower = np.array([0.0, 0.0, prism.bottom])
        self.upper = np.array([*sides, prism.top])
        self.orders = tuple(ORDER if b > a else 1 for a, b in zip(self.lower, self.upper, strict=True))
        self.counts = tuple(CANDIDATES if q > 1 else 1 for q in self.orders)
        self.function = remembered(lambda local: strengths.values(self.points(local)))
        self.rim = self._rim()
        self.best = [None] * len(ratios)
        self.best_ratio = np.full(len(ratios), -1.0)
        self.bound = np.zeros(len(ratios))
        self.asked = 0

    def run(self):
        lower, upper = cut(self.lower, self.upper, 0.75 * self.strengths.wavelength)
        while len(lower):
            lower, upper = self._within(lower, upper)
            self.asked += len(lower) * int(np.prod(self.orders))
            panels = sampled(self.function, lower, upper, self.orders)
            self._try(node_points(lower, upper, self.orders).reshape(-1, 3))
            bounds = self._look(panels)
            across = self._across(panels, bounds)
            open_ = across >= 0
            self.bound = np.maximum(self.bound, bounds[~open_].max(axis=0, initial=0.0))
            lower, upper = halved(lower[open_], upper[open_], across[open_])
        return tuple(self._extreme(i) for i in range(len(self.ratios)))

    def points(self, local):
        """East, north, up of points in the region's own axes."""
        return np.column_stack([self.origin + local[:, :2] @ self.axes, local[:, 2]])

    def _rim(self):
        """Points of the outline in the region's axes where it is no rectangle, (k, 2)."""
        outline = self.prism.outline
        if not isinstance(outline, shapely.Polygon) or outline.area > 0.999999 * np.prod(self.upper[:2]):
            return np.zeros((0, 2))
        ring = shapely.segmentize(outline.exterior, outline.exterior.length / OUTLINE_STEPS)
        return (np.array(ring.coords)[:-1, :2] - self.origin) @ self.axes.T

    def _within(self, lower, upper):
        """Only the boxes that touch the outline."""
        ends = [np.where(pick, upper[:, :2], lower[:, :2]) for pick in CORNERS]
        plan = np.stack([self.origin + e @ self.axes for e in ends], axis=1)
        hulls = [shapely.MultiPoint(p).convex_hull for p in plan]
        near = shapely.distance(np.array(hulls, dtype=object), self.prism.outline) < 1e-9
        return lower[near], upper[near]

    def _try(self, local):
        """True fields at points of the region: the best so far may rise."""
        points = self.points(local)
        inside = self.prism.contains(points)
        if not inside.any():
            return
        values = self.function(local[inside])
        for i, ratio in enumerate(self.ratios):
            found = ratio(values)
            top = int(np.argmax(found))
            if found[top] > self.best_ratio[i]:
                self.best_ratio[i] = found[top]
                self.best[i] = (points[inside][top], values[top])

    def _look(self, panels):
        """Bounds (n, ratios) of the boxes; the true field is taken at the most promising places."""
        errors = np.where(self._blind(panels)[:, None], np.inf, panels.errors)
        grid = self._grid(panels)
        logs = panels.grid(self.counts).reshape(len(panels), -1, panels.logs.shape[-1])
        inside = self.prism.contains(self.points(grid.reshape(-1, 3))).reshape(grid.shape[:2])
        panel, place = np.nonzero(inside)
        where, seen = grid[panel, place], logs[panel, place]
        rim_panel, rim = self._rim_points(panels)
        if len(rim):
            panel = np.concatenate([panel, rim_panel])
            where = np.concatenate([where, rim])
            seen = np.concatenate([seen, panels.at(rim_panel, rim)])
        if not len(panel):
            return np.zeros((len(panels), len(self.ratios)))
        bounds = np.zeros((len(panels), len(self.ratios)))
        tops = []
        for i, ratio in enumerate(self.ratios):
            tops.append(int(np.argmax(ratio(strengths_of(seen)))))
            np.maximum.at(bounds[:, i], panel, ratio(strengths_of(seen, errors[panel])))
        self._try(where[tops])
        return bounds

    def _blind(self, panels):
        return blind(panels, lambda local: self.strengths.distance(self.points(local)))

    def _grid(self, panels):
        axes = [np.linspace(0, 1, n) if n > 1 else np.full(1, 0.5) for n in self.counts]
        unit = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1).reshape(-1, 3)
        return panels.lower[:, None, :] + unit * panels.sides[:, None, :]

    def _rim_points(self, panels):
        """Panel and place of each point of the outline, at the candidates' heights."""
        if not len(self.rim):
            return np.zeros(0, int), np.zeros((0, 3))
        low, high = panels.lower[:, None, :2] - 1e-9, panels.upper[:, None, :2] + 1e-9
        panel, which = np.nonzero(((self.rim >= low) & (self.rim <= high)).all(axis=2))
        heights = np.linspace(panels.lower[panel, 2], panels.upper[panel, 2], self.counts[2], axis=1)
        plan = np.repeat(self.rim[which], self.counts[2], axis=0)
        return np.repeat(panel, self.counts[2]), np.column_stack([plan, heights.ravel()])

    def _across(self, panels, bounds):
        """Direction to halve each box across, -1 where nothing greater can hide in it."""
        tolerance = np.where(self.best_ratio < QUIET, QUIET_TOLERANCE, TOLERANCE)
        promising = (bounds > self.best_ratio * (1 + tolerance)).any(axis=1)
        sides = panels.sides
        longest = np.argmax(sides, axis=1)
        worst = np.argmax(np.where(sides > 0, panels.tails.max(axis=2), -1.0), axis=1)
        unclear = np.isinf(panels.errors).any(axis=1) | self._blind(panels)
        across = np.where(unclear, longest, worst)
        small = sides[np.arange(len(sides)), across] < SMALLEST_SIDE
        if self.asked > MOST_POINTS or np.isinf(self.best_ratio).all():
            return np.full(len(panels), -1)
        return np.where(promising & ~small, across, -1)

    def _extreme(self, i):
        position, values = self.best[i]
        best = float(self.best_ratio[i])
        return Extreme(tuple(float(x) for x in position), best, max(best, float(self.bound[i])), values)
