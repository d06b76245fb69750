"""Where the exposure ratio is one or more, as polygons in horizontal and vertical planes.

The plane is covered by adaptive panels as far as the compliance distance reaches.  A panel is
halved while, at some place in it, the interpolated ratio with its error is neither surely above nor
surely below one nor known to `KNOWN`; so no island is lost that the tails of the panels can see.  A
raster of the interpolated logarithm is then contoured and every vertex is moved onto the line by
the true fields.

Safe side: panels that a conductor crosses count as inside when all their nodes are far above the
limit, and every conductor in the plane is inside at least `CONDUCTOR` wide.
"""

from dataclasses import dataclass

import numpy as np
import shapely

from exposure.assessment.contours import polygons, rings
from exposure.assessment.model import Polygon
from exposure.assessment.panels import blind, cut, interpolation, nodes, refined, strengths_of
from exposure.assessment.strengths import FieldStrengths, remembered

ORDER = 5  # nodes a side: 49 in a panel
LOOKS = 9  # places a side where the interpolated ratio is looked at
KNOWN = 0.02  # of the logarithm of the ratio: 1 % of the distance where it falls off as 1/r^2
SURELY = 1.2  # ratio at every node of a panel that a conductor crosses
CELLS_IN_SMALLEST_PANEL = 4
MARGIN = 1.05  # on the compliance distance, for its own tolerance
NEAR = 0.01  # m; vertices are moved until this near to the line, or NEAR_RELATIVE of the reach
NEAR_RELATIVE = 1e-3
HALF_THE_LAYERS = 0.1  # of the ratio: then all of them are good to about its square
CONDUCTOR = 0.06  # m, least width drawn
FARTHEST = 1000.0  # m, where a boundary that has no end is cut off
MOST_CELLS = 200_000
LAYERS = (5, 9, 17)  # heights in a band, each set holds the one before


@dataclass(frozen=True)
class _Plane:
    """A plane, or a band of heights above a plan: places (n, 2) -> points (n, layers, 3).

    outlines : the conductors in it, as shapely geometry in its own coordinates.
    """

    points: object
    layers: int
    lower: np.ndarray
    upper: np.ndarray
    outlines: shapely.Geometry


def horizontal(strengths: FieldStrengths, ratios, bottom, top, reach) -> tuple[tuple[Polygon, ...], ...]:
    """For each ratio function, where in plan it is one or more at some height from bottom to top.

    reach : compliance distance of each ratio function [m], None where it has no bound: then the
    boundary is cut off at `FARTHEST`.  Coordinates are (east, north). [m]
    """
    farthest = _farthest(reach)
    aside = max(strengths.box[0, 2] - top, bottom - strengths.box[1, 2], 0.0)
    if farthest <= aside:
        return tuple(() for _ in ratios)
    grown = np.sqrt(farthest**2 - aside**2)
    lower, upper = strengths.box[0, :2] - grown, strengths.box[1, :2] + grown
    outlines = _in_band(strengths, bottom, top)
    for layers in LAYERS if top > bottom else (1,):
        heights = bottom + (top - bottom) * 0.5 * (nodes(layers) + 1)
        plane = _Plane(_above(heights), layers, lower, upper, outlines)
        found = _Regions(strengths, tuple(ratios), plane, tuple(reach)).run()
        if found is not None:
            break
    return found


def section(strengths: FieldStrengths, ratios, origin, bearing, half_width, top, reach):
    """The same in the vertical plane through `origin` (east, north) along `bearing` [rad from north].

    Coordinates are (distance along, up), |along| <= half_width and 0 <= up <= top. [m]
    """
    along = np.array([np.sin(bearing), np.cos(bearing)])

    def points(places):
        plan = np.asarray(origin) + places[:, :1] * along
        return np.column_stack([plan, places[:, 1]])[:, None, :]

    lower, upper = np.array([-half_width, 0.0]), np.array([half_width, top])
    plane = _Plane(points, 1, lower, upper, _in_section(strengths, origin, along))
    return _Regions(strengths, tuple(ratios), plane, tuple(reach)).run()


def _farthest(reach):
    return max(FARTHEST if r is None else MARGIN * r + 0.05 * (r > 0) for r in reach)


def _above(heights):
    def points(places):
        plan = np.repeat(places[:, None, :], len(heights), axis=1)
        return np.concatenate([plan, np.broadcast_to(heights[:, None], (*plan.shape[:2], 1))], axis=2)

    return points


class _Regions:
    """One plane: panels, raster, rings, and vertices moved onto the line."""

    def __init__(self, strengths, ratios, plane, reach):
        self.strengths, self.ratios, self.plane, self.reach = strengths, ratios, plane, reach
        self.farthest = _farthest(reach)
        self.cell = self._cell()
        places = np.linspace(-1, 1, 2 * (plane.layers - 1) + 1)
        self.between = interpolation(plane.layers, places) if plane.layers > 1 else np.ones((1, 1))
        self.values = remembered(self._layered)

    def run(self):
        """Polygons of each ratio function, or None where the heights of the band are too few."""
        if self.farthest <= 0:
            return tuple(() for _ in self.ratios)
        lower, upper = cut(self.plane.lower, self.plane.upper, 0.75 * self.strengths.wavelength)
        self.step = (upper - lower)[0] / 2 ** np.ceil(np.log2((upper - lower)[0] / self.cell))
        orders = (ORDER, ORDER)
        panels = refined(self.values, lower, upper, orders, self._across, self._wanted)
        if not self._settled(panels):
            return None
        return tuple(self._polygons(i, f) for i, f in enumerate(self._rasters(panels)))

    def _cell(self):
        area = np.prod(self.plane.upper - self.plane.lower)
        least = min((r for r in self.reach if r), default=self.farthest)
        return max(np.clip(least / 20, 0.02, 0.25), np.sqrt(area / MOST_CELLS))

    def _layered(self, places):
        """Values at all layers side by side, (n, layers * m)."""
        points = self.plane.points(places)
        return self.strengths.values(points.reshape(-1, 3)).reshape(len(places), -1)

    def _distance(self, places):
        """Distance to the nearest conductor from any height of the plane or band, (n,). [m]

        Conductors outside the band are nearest to its lowest or highest layer, those in it in plan.
        """
        points = self.plane.points(places)[:, [0, -1]]
        near = self.strengths.distance(points.reshape(-1, 3)).reshape(-1, 2).min(axis=1)
        if self.plane.outlines.is_empty:
            return near
        return np.minimum(near, shapely.distance(self.plane.outlines, shapely.points(places)))

    def _wanted(self, lower, upper):
        half = 0.5 * np.linalg.norm(upper - lower, axis=1)
        return self._distance(0.5 * (lower + upper)) - half <= self.farthest

    def _ratio(self, i, logs, errors=None, sign=1):
        """Ratio i, the largest of the band, from logarithms (..., layers * m) with their errors."""
        layers = logs.reshape(-1, self.plane.layers, logs.shape[-1] // self.plane.layers)
        finer = np.einsum("ab,nbm->nam", self.between, layers)
        if errors is not None:
            widest = np.broadcast_to(errors, logs.shape).reshape(layers.shape).max(axis=1, keepdims=True)
            finer = finer + sign * widest
        ratio = self.ratios[i](strengths_of(finer).reshape(-1, layers.shape[2]))
        return ratio.reshape(*logs.shape[:-1], len(self.between)).max(axis=-1)

    def _across(self, panels):
        if not len(panels):
            return np.zeros(0, int)
        hidden = blind(panels, self._distance)
        errors = np.where(hidden[:, None], np.inf, panels.errors)[:, None, None, :]
        seen = panels.grid((LOOKS, LOOKS))
        needed = np.zeros(len(panels), bool)
        for i in range(len(self.ratios)):
            least, most = self._ratio(i, seen, errors, -1), self._ratio(i, seen, errors)
            open_ = (least < 1) & (most > 1) & (most > least * (1 + 2 * KNOWN))
            needed |= open_.any(axis=(1, 2)) & ~(hidden & self._surely(i, panels))
        across = np.where(
            hidden, np.argmax(panels.sides, axis=1), np.argmax(panels.tails.max(axis=2), axis=1)
        )
        small = panels.sides <= CELLS_IN_SMALLEST_PANEL * self.step * (1 + 1e-9)
        across = np.where(small[np.arange(len(panels)), across], 1 - across, across)
        return np.where(needed & ~small.all(axis=1), across, -1)

    def _surely(self, i, panels):
        return (self._ratio(i, panels.logs) >= SURELY).all(axis=(1, 2))

    def _rasters(self, panels):
        """Logarithm of each ratio function on one raster; far below zero where nothing was asked."""
        counts = np.rint((self.plane.upper - self.plane.lower) / self.step).astype(int)
        fields = np.full((len(self.ratios), *(counts + 1)), -9.0)
        panels = panels[self._may_exceed(panels)]
        first = np.rint((panels.lower - self.plane.lower) / self.step).astype(int)
        cells = np.rint(panels.sides / self.step).astype(int)
        hidden = blind(panels, self._distance) | np.isinf(panels.errors).any(axis=1)
        for size in np.unique(cells, axis=0):
            chosen = np.flatnonzero((cells == size).all(axis=1))
            logs = panels[chosen].grid(size + 1)
            logs[hidden[chosen]] = self._direct(panels[chosen[hidden[chosen]]], size)
            for i in range(len(self.ratios)):
                found = np.log(np.clip(self._ratio(i, logs), 1e-4, 1e4))
                found[hidden[chosen] & self._surely(i, panels[chosen])] = np.log(SURELY)
                for (x, y), block in zip(first[chosen], found, strict=True):
                    fields[i, x : x + size[0] + 1, y : y + size[1] + 1] = block
        return fields

    def _may_exceed(self, panels):
        """Panels in which some ratio may be one or more."""
        errors = np.where(blind(panels, self._distance)[:, None], np.inf, panels.errors)[:, None, None, :]
        seen = panels.grid((LOOKS, LOOKS))
        most = [self._ratio(i, seen, errors).max(axis=(1, 2)) for i in range(len(self.ratios))]
        return np.max(most, axis=0) > 1 / (1 + 2 * KNOWN)

    def _direct(self, panels, size):
        """True fields on the raster of panels that no polynomial fits, unless they are surely inside."""
        inside = np.all([self._surely(i, panels) for i in range(len(self.ratios))], axis=0)
        logs = np.zeros((len(panels), *(size + 1), panels.logs.shape[-1]))
        axes = [np.linspace(0, 1, n + 1) for n in size]
        unit = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1)
        places = panels.lower[~inside][:, None, None, :] + unit * panels.sides[~inside][:, None, None, :]
        if len(places):
            values = self.values(places.reshape(-1, 2))
            logs[~inside] = np.log(np.clip(values, 1e-300, 1e260)).reshape(len(places), *(size + 1), -1)
        return logs

    def _settled(self, panels):
        """Whether every second height of the band would nearly do, where the ratio is near one."""
        layers = self.plane.layers
        if layers in (1, LAYERS[-1]) or not len(panels):
            return True
        panels = panels[self._may_exceed(panels)]
        logs = panels.logs.reshape(-1, layers, panels.logs.shape[-1] // layers)
        if not len(logs):
            return True
        fewer = np.einsum("ab,nbm->nam", interpolation(layers // 2 + 1, nodes(layers)), logs[:, ::2])
        for i in range(len(self.ratios)):
            full = self._ratio(i, logs.reshape(len(logs), -1))
            half = self._ratio(i, fewer.reshape(len(logs), -1))
            near = (full > 0.5) & (full < 2)
            if np.any(np.abs(half[near] - full[near]) > HALF_THE_LAYERS * full[near]):
                return False
        return True

    def _polygons(self, i, field):
        if not self.reach[i] and self.reach[i] is not None:
            return ()
        near = max(NEAR, NEAR_RELATIVE * (self.reach[i] or FARTHEST))
        parts = [self._onto(i, field, r, near) for r in rings(field)]
        region = shapely.union_all(
            [shapely.make_valid(p) for p in polygons([p for p in parts if p is not None])]
        )
        region = shapely.union(region, self.plane.outlines.buffer(0.5 * CONDUCTOR, quad_segs=2))
        frame = shapely.box(*self.plane.lower, *self.plane.upper)
        region = shapely.intersection(region, frame).simplify(0.5 * near)
        return tuple(
            _polygon(p) for p in shapely.get_parts(region) if p.geom_type == "Polygon" and p.area > 0
        )

    def _onto(self, i, field, ring, near):
        """A ring in raster steps, thinned, then moved onto the line by the true fields, (k, 2)."""
        places = self.plane.lower + ring * self.step
        if len(places) < 3:
            return None
        thinned = shapely.Polygon(places).simplify(near)
        places = np.array(thinned.exterior.coords)[:-1]
        if not len(places):
            return None
        places = np.clip(places, self.plane.lower, self.plane.upper)
        slope = self._slope(field, places)
        size = np.maximum(np.linalg.norm(slope, axis=1), 1e-6)
        active = np.arange(len(places))
        for _ in range(4):
            logs = np.log(np.clip(self.values(places[active]), 1e-300, 1e260))
            ratio = np.log(np.clip(self._ratio(i, logs), 0.5, 2.0))
            move = ratio / size[active]
            far = np.abs(move) > 0.5 * near
            if not far.any():
                break
            active, move = active[far], np.clip(move[far], -2 * self.step.max(), 2 * self.step.max())
            moved = places[active] - (move / size[active])[:, None] * slope[active]
            places[active] = np.clip(moved, self.plane.lower, self.plane.upper)
        return places

    def _slope(self, field, places):
        """Gradient of the logarithm of the ratio by central differences on the raster, (k, 2)."""
        steps = (places - self.plane.lower) / self.step
        x, y = np.clip(np.rint(steps).astype(int).T, 0, np.array(field.shape)[:, None] - 1)
        result = []
        for axis in range(2):
            low, high = np.array([x, y]), np.array([x, y])
            low[axis] = np.maximum(low[axis] - 1, 0)
            high[axis] = np.minimum(high[axis] + 1, field.shape[axis] - 1)
            run = (high[axis] - low[axis]) * self.step[axis]
            result.append((field[tuple(high)] - field[tuple(low)]) / run)
        return np.column_stack(result)


def _polygon(part):
    part = shapely.geometry.polygon.orient(part)
    return Polygon(_ring(part.exterior), tuple(_ring(hole) for hole in part.interiors))


def _ring(ring):
    return tuple((float(x), float(y)) for x, y in list(ring.coords)[:-1])


def _in_band(strengths, bottom, top):
    """Plan of the parts of conductors from bottom to top."""
    parts = []
    for start, end in zip(*strengths.segments, strict=True):
        rise = end[2] - start[2]
        if abs(rise) < 1e-9:
            low, high = (0.0, 1.0) if bottom - 1e-6 <= start[2] <= top + 1e-6 else (1.0, 0.0)
        else:
            low, high = np.clip(sorted([(bottom - start[2]) / rise, (top - start[2]) / rise]), 0, 1)
            if low == high and not bottom <= start[2] + low * rise <= top:
                continue
        if low <= high:
            parts.append(
                shapely.LineString(
                    [start[:2] + low * (end - start)[:2], start[:2] + high * (end - start)[:2]]
                )
            )
    return shapely.union_all(parts) if parts else shapely.GeometryCollection()


def _in_section(strengths, origin, along):
    """Parts of conductors in a vertical plane, and the points where others cross it."""
    across = np.array([along[1], -along[0]])
    parts = []
    for start, end in zip(*strengths.segments, strict=True):
        aside = np.array([(p[:2] - origin) @ across for p in (start, end)])
        place = np.array([[(p[:2] - origin) @ along, p[2]] for p in (start, end)])
        if np.abs(aside).max() < 1e-3:
            parts.append(shapely.LineString(place))
        elif aside[0] * aside[1] <= 0:
            fraction = aside[0] / (aside[0] - aside[1])
            parts.append(shapely.Point(place[0] + fraction * (place[1] - place[0])))
    return shapely.union_all(parts) if parts else shapely.GeometryCollection()
