"""Planes in which boundaries are drawn: a level band of heights, or an upright section.

A plane has coordinates of its own; a place in a band stands for all heights of the band at once.
"""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
import shapely

from exposure.assessment.panels import nodes

LAYERS = (5, 9, 17)  # heights in a band, each set holds the one before


@dataclass(frozen=True)
class Plane:
    """A plane, or a band of heights above a plan.

    Attributes
    ----------
    points : function (places (n, 2), layers) -> (n, layers, 3) [m]
    layers : tuple of int
        How many heights may stand for the band, fewest first.
    lower, upper : (2,) float
        Corners, in the plane's own coordinates. [m]
    outlines : shapely.Geometry
        The conductors in it, in its own coordinates.
    """

    points: Callable
    layers: tuple[int, ...]
    lower: np.ndarray
    upper: np.ndarray
    outlines: shapely.Geometry

    def distance(self, strengths, places):
        """Distance to the nearest conductor from any height of the plane or band, (n,). [m]

        Conductors outside the band are nearest to its lowest or highest layer, those in it in plan.
        """
        points = self.points(places, self.layers[0])[:, [0, -1]]
        near = strengths.distance(points.reshape(-1, 3)).reshape(-1, 2).min(axis=1)
        if self.outlines.is_empty:
            return near
        return np.minimum(near, shapely.distance(self.outlines, shapely.points(places)))


def band(strengths, bottom, top, aside) -> Plane:
    """Heights from bottom to top, as far as `aside` around the conductors in plan. [m]"""

    def points(places, layers):
        heights = bottom + (top - bottom) * 0.5 * (nodes(layers) + 1)
        plan = np.repeat(places[:, None, :], layers, axis=1)
        return np.concatenate([plan, np.broadcast_to(heights[:, None], (*plan.shape[:2], 1))], axis=2)

    lower, upper = strengths.box[0, :2] - aside, strengths.box[1, :2] + aside
    layers = LAYERS if top > bottom else (1,)
    return Plane(points, layers, lower, upper, _in_band(strengths, bottom, top))


def upright(strengths, origin, bearing, half_width, top) -> Plane:
    """The vertical plane through `origin` (east, north) along `bearing` [rad from north]; (along, up)."""
    along = np.array([np.sin(bearing), np.cos(bearing)])

    def points(places, layers):
        plan = np.asarray(origin) + places[:, :1] * along
        return np.column_stack([plan, places[:, 1]])[:, None, :]

    lower, upper = np.array([-half_width, 0.0]), np.array([half_width, top])
    return Plane(points, (1,), lower, upper, _in_section(strengths, origin, along))


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
