"""Where the exposure ratio is one or more, as polygons in horizontal and vertical planes.

A raster of the interpolated logarithm (regions.py) is contoured and every vertex is moved onto the
line by the true fields.

Safe side: panels that a conductor crosses count as inside when all their nodes are far above the
limit, and every conductor in the plane is inside at least `CONDUCTOR` wide.
"""

import numpy as np
import shapely

from exposure.assessment.contours import polygons, rings
from exposure.assessment.model import Polygon
from exposure.assessment.planes import Plane, band, upright
from exposure.assessment.regions import Regions
from exposure.assessment.strengths import FieldStrengths

MARGIN = 1.05  # on the compliance distance, for its own tolerance
NEAR = 0.01  # m; vertices are moved until this near to the line, or NEAR_RELATIVE of the reach
NEAR_RELATIVE = 1e-3
MOVES = 4  # of a vertex towards the line
CONDUCTOR = 0.06  # m, least width drawn
FARTHEST = 1000.0  # m, where a boundary that has no end is cut off


def horizontal(strengths: FieldStrengths, ratios, bottom, top, reach) -> tuple[tuple[Polygon, ...], ...]:
    """For each ratio function, where in plan it is one or more at some height from bottom to top.

    reach : compliance distance of each ratio function [m], None where it has no bound: then the
    boundary is cut off at `FARTHEST`.  Coordinates are (east, north). [m]
    """
    farthest = _farthest(reach)
    apart = max(strengths.box[0, 2] - top, bottom - strengths.box[1, 2], 0.0)
    if farthest <= apart:
        return tuple(() for _ in ratios)
    plane = band(strengths, bottom, top, np.sqrt(farthest**2 - apart**2))
    return _drawn(strengths, ratios, plane, reach)


def section(strengths: FieldStrengths, ratios, origin, bearing, half_width, top, reach):
    """The same in the vertical plane through `origin` (east, north) along `bearing` [rad from north].

    Coordinates are (distance along, up), |along| <= half_width and 0 <= up <= top. [m]
    """
    return _drawn(strengths, ratios, upright(strengths, origin, bearing, half_width, top), reach)


def _farthest(reach):
    return max(FARTHEST if r is None else MARGIN * r + 0.05 * (r > 0) for r in reach)


def _drawn(strengths, ratios, plane: Plane, reach):
    farthest = _farthest(reach)
    if farthest <= 0:
        return tuple(() for _ in ratios)
    regions = Regions(strengths, tuple(ratios), plane, tuple(reach), farthest)
    return tuple(
        _polygons(regions, i, r, f) for i, (r, f) in enumerate(zip(reach, regions.rasters(), strict=True))
    )


def _polygons(regions: Regions, i, reach, field):
    if not reach and reach is not None:
        return ()
    plane = regions.plane
    near = max(NEAR, NEAR_RELATIVE * (reach or FARTHEST))
    parts = [_onto(regions, i, field, r, near) for r in rings(field)]
    region = shapely.union_all([shapely.make_valid(p) for p in polygons([p for p in parts if p is not None])])
    region = shapely.union(region, plane.outlines.buffer(0.5 * CONDUCTOR, quad_segs=2))
    region = shapely.intersection(region, shapely.box(*plane.lower, *plane.upper)).simplify(0.5 * near)
    return tuple(_polygon(p) for p in shapely.get_parts(region) if p.geom_type == "Polygon" and p.area > 0)


def _onto(regions: Regions, i, field, ring, near):
    """A ring in raster steps, thinned, then moved onto the line by the true fields, (k, 2).

    Beside panels that were not asked the raster's slope may point the wrong way: of all places that a
    vertex has had, the one nearest to the line counts.
    """
    plane, step = regions.plane, regions.step
    places = plane.lower + ring * step
    if len(places) < 3:
        return None
    thinned = shapely.Polygon(places).simplify(near)
    places = np.array(thinned.exterior.coords)[:-1]
    if not len(places):
        return None
    places = np.clip(places, plane.lower, plane.upper)
    slope = _slope(regions, field, places)
    size = np.maximum(np.linalg.norm(slope, axis=1), 1e-6)
    best, miss = places.copy(), np.full(len(places), np.inf)
    active = np.arange(len(places))
    for _ in range(MOVES + 1):
        ratio = np.log(np.clip(regions.true_ratio(i, places[active]), 0.5, 2.0))
        nearer = np.abs(ratio) < miss[active]
        best[active[nearer]], miss[active[nearer]] = places[active[nearer]], np.abs(ratio[nearer])
        move = ratio / size[active]
        far = np.abs(move) > 0.5 * near
        if not far.any():
            break
        active, move = active[far], np.clip(move[far], -2 * step.max(), 2 * step.max())
        moved = places[active] - (move / size[active])[:, None] * slope[active]
        places[active] = np.clip(moved, plane.lower, plane.upper)
    return best


def _slope(regions: Regions, field, places):
    """Gradient of the logarithm of the ratio by central differences on the raster, (k, 2)."""
    steps = (places - regions.plane.lower) / regions.step
    x, y = np.clip(np.rint(steps).astype(int).T, 0, np.array(field.shape)[:, None] - 1)
    result = []
    for axis in range(2):
        low, high = np.array([x, y]), np.array([x, y])
        low[axis] = np.maximum(low[axis] - 1, 0)
        high[axis] = np.minimum(high[axis] + 1, field.shape[axis] - 1)
        run = (high[axis] - low[axis]) * regions.step[axis]
        result.append((field[tuple(high)] - field[tuple(low)]) / run)
    return np.column_stack(result)


def _polygon(part):
    part = shapely.geometry.polygon.orient(part)
    return Polygon(_ring(part.exterior), tuple(_ring(hole) for hole in part.interiors))


def _ring(ring):
    return tuple((float(x), float(y)) for x, y in list(ring.coords)[:-1])
