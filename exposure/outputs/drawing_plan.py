"""The site from above, to scale: who is where, and where the limit is reached at which height."""

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
    north_arrow,
    scale_bar,
    title_height,
    write_title,
    zone_symbol,
)
from exposure.outputs.drawing_paper import GREY, INK, Drawing, Paper
from exposure.outputs.drawing_words import (
    STANDING,
    area_sentence,
    area_words,
    averaging,
    clauses,
    doubts,
    extent_words,
    geometry,
    limit_words,
    power_words,
)
from exposure.outputs.formats import digits

MANY = 4  # traces of sections: more are drawn by their ends alone
LOWEST = 70.0  # mm, height of the map
LOW = 2.0  # m: up to here the zone where people stand says it all
APART = 0.5  # m: of heights nearer than this the larger zone is drawn


@dataclass(frozen=True)
class Lines:
    """Boundaries of a plan: where people stand (None: not computed), other heights drawn, the rest."""

    standing: Boundary | None
    drawn: tuple[Boundary, ...]
    crowded: tuple[float, ...]
    nowhere: tuple[float, ...]

    @property
    def known(self) -> bool:
        """Whether anything was computed at all."""
        return self.standing is not None or bool(self.drawn or self.nowhere)


def plan(assessment: Assessment, limits: str, population: str, own: tuple[Boundary, ...], traces) -> Drawing:
    """The plan for a limit set and population.

    own : its boundaries of all transmissions together; traces : (letter, origin, bearing in degrees)
    of the vertical sections.
    """
    lines = _lines(assessment, own)
    title = f"Plan: {limit_words(assessment, limits, population)}"
    state = (
        f"{assessment.site.name}. Line: exposure ratio 1 by {clauses(assessment, limits, population)}; "
        f"averaging time {averaging(assessment, limits, population)}."
    )
    above = title_height(title, state)
    room = TALLEST - above - LOWEST - BAR - BELOW
    key = fitting_key(lambda *most: _key(assessment, limits, population, lines, traces, *most), room)
    under = key.height + BAR + BELOW
    tallest = max(LOWEST, min(MAP_HEIGHT - BELOW, TALLEST - above - under))
    window = fitted(_extent(assessment, lines), tallest, min(75.0, tallest), under)
    paper = Paper(WIDTH, under + window.size[1] + above)
    write_title(paper, title, state)
    draw_axes(paper, window, "metres east", "metres north")
    scale_bar(paper, under - BELOW - BAR + 3, window.scale)
    key.write(paper, under - BELOW - BAR + 1)
    north_arrow(paper, window)
    _draw(paper, window, assessment, population, lines, traces)
    alt = _alt(assessment, limits, population, lines)
    caption = _caption(assessment, limits, population, lines, window.scale)
    name = f"plan-{limits}-{population}"
    return Drawing(name, title, caption, alt, WIDTH, paper.height, window.scale, paper.figure)


def _lines(assessment: Assessment, own) -> Lines:
    """Above 2 m the largest zone and those at the heights of people; three at most."""
    flat = [b for b in own if b.section is None]
    standing = next((b for b in flat if b.height_m is None), None)
    covered = LOW if standing else -1.0
    others = sorted((b for b in flat if b.height_m is not None and b.height_m > covered), key=_height)
    reached = [b for b in others if b.polygons]
    by_size = sorted(reached, key=lambda b: -geometry(b).area)
    wanted = [*by_size[:1], *sorted(by_size[1:], key=lambda b: not _someone(assessment, b.height_m))]
    chosen = []
    for boundary in wanted:
        apart = all(abs(boundary.height_m - other.height_m) >= APART for other in chosen)
        if apart and len(chosen) < len(marks.HEIGHT_STYLES):
            chosen.append(boundary)
    return Lines(
        standing,
        tuple(b for b in reached if b in chosen),
        tuple(b.height_m for b in reached if b not in chosen),
        tuple(b.height_m for b in others if not b.polygons),
    )


def _height(boundary: Boundary) -> float:
    return boundary.height_m


def _someone(assessment: Assessment, height: float) -> bool:
    return any(area.bottom_m - 0.05 <= height <= area.top_m + 0.05 for area in assessment.areas)


def _extent(assessment: Assessment, lines: Lines):
    points = [corner for area in assessment.areas for corner in area.corners_m]
    points += [point[:2] for c in assessment.conductors for point in c.points_m]
    points += assessment.property.corners_m if assessment.property else ()
    for boundary in (lines.standing, *lines.drawn):
        points += [corner for p in (boundary.polygons if boundary else ()) for corner in p.outline]
    points = np.array(points or [(-5.0, -5.0), (5.0, 5.0)])
    low, high = points.min(0), points.max(0)
    grown = np.maximum(0.0, 4.0 - (high - low)) / 2
    return (*(low - grown), *(high + grown))


def _draw(paper, window, assessment, population, lines, traces):
    for area in assessment.areas:
        marks.draw_area(paper, window.mm(area.corners_m))
    if assessment.property:
        corners = assessment.property.corners_m
        paper.line(window.mm((*corners, corners[0])), 1.1, marks.PROPERTY, layer=3.5)
    marks.draw_polygons(paper, window, lines.standing, **marks.zone_looks(population))
    for boundary, style in zip(lines.drawn, marks.HEIGHT_STYLES, strict=False):
        marks.draw_polygons(paper, window, boundary, **marks.height_looks(style), layer=1.5)
    chains = [(c.role, window.mm([p[:2] for p in c.points_m])) for c in assessment.conductors]
    marks.draw_conductors(paper, chains)
    _draw_traces(paper, window, traces)
    for number, area in enumerate(assessment.areas, 1):
        marks.number_area(paper, window, number, window.mm(area.corners_m))
    for boundary in ([lines.standing] if lines.standing else []) + [*lines.drawn]:
        if boundary.polygons:
            where = "0–2 m" if boundary.height_m is None else f"{digits(boundary.height_m)} m"
            marks.label_boundary(paper, window, boundary, f"limit at {where} up")
    marks.label_owners(paper, window, _owners(assessment, window))
    if assessment.property:
        corners = window.mm(assessment.property.corners_m)
        paper.label([*((corners + np.roll(corners, -1, 0)) / 2), *corners], "property line", window.frame)


def _draw_traces(paper, window, traces):
    """Thick ends with letters at the edges of the window; thin lines between, unless they are many."""
    ends = []
    for letter, origin, bearing in traces:
        line = _trace(window, origin, bearing)
        if line is None:
            continue
        if len(traces) <= MANY:
            paper.line(line, 0.5, marks.TRACE, GREY, layer=2.2, avoided=False)
        for end, other, mark in ((line[0], line[-1], letter), (line[-1], line[0], f"{letter}′")):
            inward = (other - end) / np.hypot(*(other - end))
            paper.line([end, end + 4 * inward], 1.8, layer=6)
            ends.append((end, inward, mark))
    for end, inward, mark in ends:
        aside = np.array([inward[1], -inward[0]])
        spots = [end + side * aside * 2.8 + along * inward for along in (2, 0, 4, -2, 7) for side in (1, -1)]
        spot = paper.place(spots, 5.0, 3.6, window.frame, np.arange(len(spots)) * 0.5)
        if spot:
            paper.write(spot[0], spot[1] - 0.95, mark, 8, bold=True, align="center")


def _trace(window, origin, bearing):
    """The part of a plane's trace inside the window. [mm]"""
    way = np.array([sin(radians(bearing)), cos(radians(bearing))])
    west, south, east, north = window.bounds
    inset = 5.0 * window.scale / 1000
    far = (east - west) + (north - south)
    line = shapely.LineString([np.subtract(origin, far * way), np.add(origin, far * way)])
    cut = line.intersection(shapely.box(west + inset, south + inset, east - inset, north - inset))
    return None if cut.is_empty or cut.length == 0 else window.mm(cut.coords)


def _owners(assessment, window):
    owners = {}
    for conductor in assessment.conductors:
        if conductor.role != "feed line":
            owners.setdefault(conductor.owner, []).extend(window.mm([p[:2] for p in conductor.points_m]))
    return owners


def _key(assessment, limits, population, lines, traces, most_areas, most_powers):
    rows = [Row(None, text, bold=True) for text in doubts(assessment, limits, population)]
    if not lines.known:
        rows.append(
            Row(None, "No boundary is known for this limit: it cannot be decided where it is reached.", True)
        )
    elif lines.standing is None:
        rows.append(Row(None, f"The boundary at {STANDING} is not known.", bold=True))
    elif lines.standing.polygons:
        symbol = zone_symbol(**marks.zone_looks(population))
        rows.append(Row(symbol, "limit reached or exceeded at 0–2 m up, where people stand"))
    else:
        rows.append(Row(None, f"Limit reached nowhere at {STANDING}, where people stand.", bold=True))
    for boundary, style in zip(lines.drawn, marks.HEIGHT_STYLES, strict=False):
        where = f"at {digits(boundary.height_m)} m up"
        rows.append(Row(zone_symbol(**marks.height_looks(style)), f"limit reached or exceeded {where}"))
    if lines.nowhere:
        rows.append(Row(None, f"Limit reached nowhere at {marks.nowhere(lines.nowhere)} m above ground."))
    if lines.crowded:
        rows.append(Row(None, f"Also reached, not drawn, at {marks.nowhere(lines.crowded)} m above ground."))
    rows += marks.conductor_rows(assessment, {c.owner for c in assessment.conductors})
    if assessment.property:
        rows.append(Row(line_symbol(1.1, marks.PROPERTY, INK), "property line"))
    if traces:
        names = ", ".join(f"{letter}–{letter}′" for letter, *_ in traces)
        rows.append(Row(line_symbol(0.5, marks.TRACE, GREY), f"planes of the vertical sections {names}"))
    everything = range(1, len(assessment.areas) + 1)
    areas = marks.area_rows(assessment, limits, population, everything, most_areas)
    return Key(
        tuple(rows), tuple(areas), tuple(marks.power_rows(assessment, limits, population, most_powers))
    )


def _caption(assessment, limits, population, lines, scale) -> str:
    levels = [STANDING, *(f"{digits(b.height_m)} m" for b in lines.drawn)]
    powers = "; ".join(power_words(assessment, limits, population, t) for t in assessment.transmissions)
    return (
        f"Plan of the site with the line where the exposure ratio of all transmissions together is 1, in "
        f"horizontal planes at {', '.join(levels)}; the numerical error is not added to the line. "
        f"Limit: {limit_words(assessment, limits, population)}, {clauses(assessment, limits, population)}; "
        f"averaging time {averaging(assessment, limits, population)}. "
        f"Transmissions: {powers or 'none'}. Scale 1:{scale}. North is up."
    )


def _alt(assessment, limits, population, lines) -> str:
    points = [p[:2] for c in assessment.conductors if c.role == "antenna" for p in c.points_m]
    middle = (np.min(points, 0) + np.max(points, 0)) / 2 if points else np.zeros(2)
    parts = doubts(assessment, limits, population)
    if lines.standing is None:
        parts.append(f"The boundary at {STANDING} is not known.")
    else:
        parts.append(extent_words(geometry(lines.standing), middle, STANDING))
    parts += [extent_words(geometry(b), middle, f"{digits(b.height_m)} m above ground") for b in lines.drawn]
    if lines.nowhere:
        parts.append(f"The limit is reached nowhere at {marks.nowhere(lines.nowhere)} m above ground.")
    return " ".join([*parts, area_sentence(area_words(assessment, limits, population))]).strip()
