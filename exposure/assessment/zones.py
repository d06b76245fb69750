"""Boundaries in the planes that matter, and whether the one where people stand stays on the property."""

from dataclasses import dataclass
from math import ceil, pi

import shapely

from exposure.assessment.boundaries import FARTHEST, horizontal, section
from exposure.assessment.distances import compliance_distances
from exposure.assessment.model import Boundary, Polygon
from exposure.assessment.ratios import Rule
from exposure.assessment.scene import GENERAL_PUBLIC, Scene
from exposure.assessment.strengths import FieldStrengths

STANDING = (0.0, 2.0)  # m above ground, where people stand
ALL = "all"
SAME_HEIGHT = 0.05  # m
NO_HIGHER = 0.1  # m above ground: antennas lower than this have no plane of their own


@dataclass(frozen=True)
class Line:
    """One boundary to be drawn in every plane: whose, its ratio function, and its level there.

    raised : not drawn, but judged: the general public's, all together, numerical error included.
    """

    limits: str
    population: str
    transmission: str
    ratio: object
    raised: bool = False


def lines(rules: tuple[Rule, ...], names, factor: float) -> tuple[Line, ...]:
    """All together, each alone, and for the general public the raised ones that the property is judged by."""
    found = []
    for rule in (r for r in rules if r.tests):
        found.append(Line(rule.limits, rule.population, ALL, rule.ratio))
        found += [
            Line(rule.limits, rule.population, name, alone.ratio)
            for name in names
            if (alone := rule.alone(name)).tests
        ]
        if rule.population == GENERAL_PUBLIC:
            found.append(Line(rule.limits, rule.population, ALL, _raised(rule, factor), raised=True))
    return tuple(found)


def _raised(rule: Rule, factor: float):
    return lambda values: factor * rule.ratio(values)


@dataclass(frozen=True)
class Zones:
    """Lines with their reach [m], and what was drawn: boundaries, and the judged polygons.

    wires : plan of the conductors that the reach is measured from.
    """

    lines: tuple[Line, ...]
    reach: tuple
    boundaries: tuple[Boundary, ...]
    standing: shapely.Geometry
    elsewhere: shapely.Geometry
    wires: shapely.Geometry = shapely.GeometryCollection()

    @property
    def farthest(self) -> float:
        """Reach of the judged lines. [m]"""
        judged = (r for line, r in zip(self.lines, self.reach, strict=True) if line.raised)
        return max((r for r in judged if r), default=0.0)

    @property
    def bounded(self) -> bool:
        """Whether every judged line was seen to end."""
        return all(r is not None for line, r in zip(self.lines, self.reach, strict=True) if line.raised)


def zones(scene: Scene, strengths: FieldStrengths, asked: tuple[Line, ...], heights) -> Zones:
    """Boundaries at 0-2 m, at `heights`, and in two vertical planes through every antenna."""
    different = _different(scene, asked)
    ratios = [line.ratio for line in different]
    reach = tuple(found.distance for found in compliance_distances(strengths, ratios)) if ratios else ()
    drawn, judged = [], {}
    for height in (None, *heights):
        bottom, top = STANDING if height is None else (height, height)
        found = horizontal(strengths, ratios, bottom, top, reach) if ratios else ()
        drawn += _boundaries(asked, different, found, height_m=height, section=None)
        raised = [polygons for line, polygons in zip(different, found, strict=True) if line.raised]
        judged[height] = shapely.union_all([_geometry(p) for polygons in raised for p in polygons])
    for label, origin, bearing in _planes(scene):
        half, top = _extent(strengths, origin, reach)
        if half > 0:
            found = section(strengths, ratios, origin, bearing, half, top, reach)
            drawn += _boundaries(
                asked,
                different,
                found,
                height_m=None,
                section=label,
                section_origin_m=origin,
                section_bearing_deg=bearing * 180 / pi,
            )
    return Zones(
        different,
        reach,
        tuple(drawn),
        judged[None],
        shapely.union_all([judged[h] for h in judged if h is not None]),
        shapely.MultiLineString([(a[:2], b[:2]) for a, b in zip(*strengths.segments, strict=True)]),
    )


def _different(scene: Scene, asked) -> tuple[Line, ...]:
    """A transmission alone is the same as all together where there is no other."""
    if len(scene.emissions) > 1:
        return asked
    return tuple(line for line in asked if line.transmission == ALL)


def _boundaries(asked, different, found, **plane):
    known = {
        (x.limits, x.population, x.transmission): p
        for x, p in zip(different, found, strict=True)
        if not x.raised
    }
    for line in asked:
        if not line.raised:
            own = (line.limits, line.population, line.transmission)
            polygons = known.get(own, known.get((*own[:2], ALL), ()))
            yield Boundary(*own, polygons=tuple(polygons), **plane)


def _planes(scene: Scene):
    """Label, origin (east, north) and bearing [rad] of the vertical planes: along and across each antenna."""
    used = {t.antenna for part in scene.parts for t in part.transmissions}
    for antenna in scene.site.antennas:
        if antenna.name in used:
            middle = _middle(scene, antenna)
            yield f"along {antenna.name}", middle, antenna.bearing
            yield f"across {antenna.name}", middle, antenna.bearing + pi / 2


def _middle(scene: Scene, antenna):
    """In plan the reference point, where it is under the antenna; else the middle of its conductors."""
    own = next(part.source.model.own for part in scene.parts if part.source.model.antenna == antenna.name)
    plan = shapely.MultiPoint([end[:2] for wire in own for end in (wire.start, wire.end)])
    if plan.convex_hull.buffer(0.5).contains(shapely.Point(antenna.position)):
        return tuple(float(x) for x in antenna.position)
    return (float(plan.envelope.centroid.x), float(plan.envelope.centroid.y))


def _extent(strengths, origin, reach):
    farthest = max((FARTHEST if r is None else r for r in reach), default=0.0)
    if farthest <= 0:
        return 0.0, 0.0
    lower, upper = strengths.box
    corners = shapely.box(*lower[:2], *upper[:2])
    half = shapely.hausdorff_distance(shapely.Point(origin), corners) + farthest
    return float(ceil(half + 0.5)), float(ceil(upper[2] + farthest + 0.5))


def _geometry(polygon: Polygon):
    return shapely.Polygon(polygon.outline, polygon.holes)


def heights_of(scene: Scene, worst) -> tuple[float, ...]:
    """Heights of planes: areas' worst places, their floors and tops above 2 m, antennas; none twice."""
    used = {t.antenna for part in scene.parts for t in part.transmissions}
    edges = [h for area in scene.site.areas for h in (area.bottom, area.top) if h > STANDING[1]]
    antennas = [a.height for a in scene.site.antennas if a.name in used and a.height > NO_HIGHER]
    wanted = [*worst, *edges, *antennas]
    found = []
    for height in sorted(float(h) for h in wanted):
        if not found or height - found[-1] > SAME_HEIGHT:
            found.append(height)
    return tuple(found)
