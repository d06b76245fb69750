"""The site cut by a vertical plane, to scale: ground, conductors, areas, and the zone in height."""

from dataclasses import dataclass
from math import cos, radians, sin

import numpy as np
import shapely

from exposure.assessment.model import Assessment, Boundary
from exposure.outputs import drawing_marks as marks
from exposure.outputs.drawing_map import (
    BAR,
    BELOW,
    MAP_HEIGHT,
    TALLEST,
    WIDTH,
    Key,
    Row,
    draw_axes,
    fitted,
    fitting_key,
    line_symbol,
    scale_bar,
    title_height,
    write_title,
    zone_symbol,
)
from exposure.outputs.drawing_paper import GREY, INK, Drawing, Paper
from exposure.outputs.drawing_words import (
    area_sentence,
    area_words,
    averaging,
    clauses,
    doubts,
    geometry,
    limit_words,
    power_words,
)
from exposure.outputs.formats import digits

IN_PLANE = 0.5  # m: a point nearer than this lies in the plane
BEHIND = 5.0  # m from the plane: areas nearer than this are dashed, conductors are drawn
LOWEST = 55.0  # mm, height of the window where much else is written
GROUND = 6.0  # mm of ground below the line
COMPASS = ("north", "north-east", "east", "south-east", "south", "south-west", "west", "north-west")


@dataclass(frozen=True)
class Seen:
    """An area in the plane: its number, box or mark in (along, up) [m], and whether it lies beside it."""

    number: int
    ring: np.ndarray
    behind: bool


@dataclass(frozen=True)
class Plane:
    """A vertical plane through origin (east, north) towards a bearing [degrees]."""

    origin: tuple[float, float]
    bearing: float

    @property
    def way(self):
        """Unit vector along the plane."""
        return np.array([sin(radians(self.bearing)), cos(radians(self.bearing))])

    def along(self, points) -> np.ndarray:
        """Distance along the plane of points (n, 2). [m]"""
        return (np.asarray(points, float)[:, :2] - self.origin) @ self.way

    def off(self, points) -> np.ndarray:
        """Signed distance from the plane of points (n, 2). [m]"""
        return (np.asarray(points, float)[:, :2] - self.origin) @ (self.way[1], -self.way[0])

    def cuts(self, polygon) -> list[tuple[float, float]]:
        """Where the plane is inside a polygon, (from, to) along it. [m]"""
        far = 2 * shapely.hausdorff_distance(shapely.Point(self.origin), polygon) + 1
        line = shapely.LineString([self.origin - far * self.way, self.origin + far * self.way])
        inside = shapely.intersection(polygon.buffer(0), line)
        parts = [p for p in shapely.get_parts(inside) if p.length > 0]
        return [tuple(sorted(self.along(shapely.get_coordinates(part))[[0, -1]])) for part in parts]


def section(assessment: Assessment, boundary: Boundary, letter: str) -> Drawing:
    """The vertical section of one boundary, its trace in the plan marked with a letter."""
    limits, population = boundary.limits, boundary.population
    plane = Plane(boundary.section_origin_m, boundary.section_bearing_deg % 360)
    right = f"{plane.bearing:.0f} degrees ({COMPASS[round(plane.bearing / 45) % 8]})"
    title = f"Section {letter}–{letter}′, {boundary.section}, towards {right}: "
    title += limit_words(assessment, limits, population)
    state = (
        f"{assessment.site.name}. Line: exposure ratio 1 by {clauses(assessment, limits, population)}; "
        f"averaging time {averaging(assessment, limits, population)}."
    )
    chains, areas = _chains(assessment, plane), _areas(assessment, plane)
    above = title_height(title, state)
    owners = {c.owner for c, _ in chains}
    room = TALLEST - above - LOWEST - BAR - BELOW
    key = fitting_key(lambda *most: _key(assessment, boundary, owners, areas, *most), room)
    under = key.height + BAR + BELOW
    tallest = max(LOWEST, min(MAP_HEIGHT - BELOW, TALLEST - above - under))
    window = fitted(_extent(boundary, chains, areas), tallest, 45.0, under, GROUND)
    paper = Paper(WIDTH, under + window.size[1] + above)
    write_title(paper, title, state)
    draw_axes(paper, window, f"metres along the section, to the right: {right}", "metres above ground")
    scale_bar(paper, under - BELOW - BAR + 3, window.scale)
    key.write(paper, under - BELOW - BAR + 1)
    _draw(paper, window, assessment, boundary, plane, chains, areas, letter)
    caption = _caption(assessment, boundary, letter, right, window.scale)
    name = f"section-{letter.lower()}-{limits}-{population}"
    alt = _alt(assessment, boundary, letter)
    return Drawing(name, title, caption, alt, WIDTH, paper.height, window.scale, paper.figure)


def _chains(assessment: Assessment, plane: Plane):
    """Conductors that come near the plane, projected onto it: (conductor, points (along, up))."""
    found = []
    for conductor in assessment.conductors:
        points = np.asarray(conductor.points_m, float)
        off = plane.off(points)
        if off.min() <= BEHIND and off.max() >= -BEHIND:
            found.append((conductor, np.column_stack([plane.along(points), points[:, 2]])))
    return found


def _areas(assessment: Assessment, plane: Plane):
    found = []
    for number, area in enumerate(assessment.areas, 1):
        shape = _shape(area.corners_m)
        cuts = plane.cuts(shape) if shape.area > 0 else []
        behind = not cuts
        if behind:
            off, along = plane.off(area.corners_m), plane.along(area.corners_m)
            near = 0.0 if off.min() <= 0 <= off.max() else abs(off).min()
            cuts = [(along.min(), along.max())] if near <= BEHIND else []
            behind = shape.area > 0 or near > IN_PLANE
        low, high = area.bottom_m, area.top_m
        for left, right in cuts:
            ring = [(left, low), (right, low), (right, high), (left, high)]
            if left == right:
                ring = [(left, low)] if low == high else [(left, low), (left, high)]
            found.append(Seen(number, np.array(ring), behind))
    return found


def _shape(corners):
    return shapely.Polygon(corners) if len(corners) > 2 else shapely.MultiPoint(corners)


def _extent(boundary: Boundary, chains, areas):
    points = [points for _, points in chains] + [seen.ring for seen in areas]
    points += [polygon.outline for polygon in boundary.polygons]
    points = np.vstack([*points, [(-1.5, 0.0), (1.5, 2.5)]])
    return (points[:, 0].min(), 0.0, points[:, 0].max(), points[:, 1].max())


def _draw(paper, window, assessment, boundary, plane, chains, areas, letter):
    left, bottom, right, top = window.frame
    ground = window.mm([(0, 0)])[0, 1]
    paper.zone(
        [[(left, bottom), (right, bottom), (right, ground), (left, ground)]],
        "#e6e6e6",
        width=0,
        avoided=False,
    )
    paper.line([(left, ground), (right, ground)], 1.8, layer=3.2, avoided=False)
    paper.write(left + 2, bottom + 1.6, "ground", 7, colour=INK)
    for x, mark, align in ((left + 2, letter, "left"), (right - 2, f"{letter}′", "right")):
        paper.write(x, top - 4.2, mark, 9, bold=True, align=align)
    paper.keep_free(left, top - 5, left + 7, top)
    paper.keep_free(right - 7, top - 5, right, top)
    paper.keep_free(left, bottom, right, ground)
    for seen in areas:
        marks.draw_area(paper, window.mm(seen.ring), seen.behind)
    marks.draw_polygons(paper, window, boundary, **marks.zone_looks(boundary.population))
    edges = _property_edges(assessment, plane, window)
    for edge in edges:
        paper.line(window.mm([(edge, 0), (edge, 0)]) + [(0, 0), (0, 11)], 1.1, marks.PROPERTY, layer=3.4)
    marks.draw_conductors(paper, [(c.role, window.mm(points)) for c, points in chains])
    for seen in areas:
        marks.number_area(paper, window, seen.number, window.mm(seen.ring))
    if boundary.polygons:
        marks.label_boundary(paper, window, boundary, "limit")
    owners = {}
    for conductor, points in chains:
        if conductor.role != "feed line":
            owners.setdefault(conductor.owner, []).extend(window.mm(points))
    marks.label_owners(paper, window, owners)
    for edge in edges:
        at = window.mm([(edge, 0)])[0]
        paper.label([at + (0, 9), at + (0, 5)], "property line", window.frame)


def _property_edges(assessment, plane, window):
    if assessment.property is None:
        return []
    west, _, east, _ = window.bounds
    cuts = plane.cuts(shapely.Polygon(assessment.property.corners_m))
    return [edge for cut in cuts for edge in cut if west < edge < east]


def _key(assessment, boundary, owners, areas, most_areas, most_powers):
    limits, population = boundary.limits, boundary.population
    rows = [Row(None, text, bold=True) for text in doubts(assessment, limits, population)]
    if boundary.polygons:
        rows.append(
            Row(zone_symbol(**marks.zone_looks(population)), "limit reached or exceeded in this plane")
        )
    else:
        rows.append(Row(None, "Limit reached nowhere in this plane.", bold=True))
    rows += marks.conductor_rows(assessment, owners)
    if assessment.property:
        rows.append(Row(line_symbol(1.1, marks.PROPERTY, INK), "property line, where the plane crosses it"))
    if any(seen.behind for seen in areas):
        symbol = line_symbol(0.8, (0, (3, 2)), GREY)
        rows.append(Row(symbol, f"area up to {BEHIND:g} m beside the plane (a point: grey)"))
    shown = marks.area_rows(assessment, limits, population, {seen.number for seen in areas}, most_areas)
    return Key(
        tuple(rows),
        tuple(shown),
        tuple(marks.power_rows(assessment, limits, population, min(most_powers, 4))),
    )


def _caption(assessment, boundary, letter, right, scale) -> str:
    limits, population = boundary.limits, boundary.population
    powers = "; ".join(power_words(assessment, limits, population, t) for t in assessment.transmissions)
    return (
        f"Vertical section {letter}–{letter}′ ({boundary.section}), seen with {right} to the right, with the "
        f"line where the exposure ratio of all transmissions together is 1; its trace is marked in the plan. "
        f"Conductors within {BEHIND:g} m are projected onto the plane; the numerical error is not added to "
        "the line. "
        f"Limit: {limit_words(assessment, limits, population)}, {clauses(assessment, limits, population)}; "
        f"averaging time {averaging(assessment, limits, population)}. Transmissions: {powers or 'none'}. "
        f"Scale 1:{scale}, heights and lengths alike."
    )


def _alt(assessment, boundary, letter) -> str:
    zone = geometry(boundary)
    limits, population = boundary.limits, boundary.population
    parts = doubts(assessment, limits, population)
    if zone.is_empty:
        parts.append(f"In section {letter} the limit is reached nowhere.")
    else:
        left, low, right, high = zone.bounds
        parts.append(
            f"In section {letter} the zone reaches from {left:.1f} to {right:.1f} m along the plane and from "
            f"{low:.1f} to {high:.1f} m above ground, {digits(zone.area)} m² in all."
        )
    return " ".join([*parts, area_sentence(area_words(assessment, limits, population))]).strip()
