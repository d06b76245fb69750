"""The space of an area: a plan outline between two heights."""

from dataclasses import dataclass

import numpy as np
import shapely

from exposure.site.model import Area


@dataclass(frozen=True)
class Prism:
    """Plan outline (polygon, or a point) between bottom and top. [m above ground]"""

    outline: shapely.Geometry
    bottom: float
    top: float

    def contains(self, points, margin=1e-9):
        """Whether (n, 3) points lie in the closed prism."""
        points = np.asarray(points, float)
        plan = shapely.distance(self.outline, shapely.points(points[:, :2])) <= margin
        return plan & (points[:, 2] >= self.bottom - margin) & (points[:, 2] <= self.top + margin)

    @property
    def corners(self):
        """Corners of the outline, (k, 2), the first not repeated. [m]"""
        if isinstance(self.outline, shapely.Polygon):
            return np.array(self.outline.exterior.coords)[:-1, :2]
        return np.array(self.outline.coords)[:, :2]


def prism(area: Area) -> Prism:
    """The prism of an area; a path is widened by half its width with round ends, a point stays one.

    The round ends go to the safe side: whoever turns at the end of the path is inside.  The circle
    is drawn by chords, widened so that they touch it from outside.
    """
    if area.shape == "point":
        return Prism(shapely.Point(area.corners[0]), area.bottom, area.top)
    if area.shape == "path":
        outer = 0.5 * area.width / np.cos(np.pi / 32)
        return Prism(shapely.LineString(area.corners).buffer(outer, quad_segs=8), area.bottom, area.top)
    outline = shapely.Polygon(area.corners)
    return Prism(shapely.geometry.polygon.orient(outline), area.bottom, area.top)


def frame(outline):
    """The upright rectangle that fits the outline best: origin (2,), axes (2, 2), sides (2,)."""
    rectangle = shapely.minimum_rotated_rectangle(outline)
    if not isinstance(rectangle, shapely.Polygon):
        return np.array(outline.centroid.coords[0]), np.eye(2), np.zeros(2)
    corners = np.array(rectangle.exterior.coords)
    edges = np.array([corners[1] - corners[0], corners[3] - corners[0]])
    sides = np.linalg.norm(edges, axis=1)
    return corners[0], edges / sides[:, None], sides
