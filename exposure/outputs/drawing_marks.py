"""How each thing on a site looks, in plan and in section, and its row of the key."""

import numpy as np
import shapely

from exposure.assessment.model import Assessment
from exposure.outputs.drawing_map import Row, Window, line_symbol, number_symbol
from exposure.outputs.drawing_paper import AREA_FILL, DISC, GREY, INK, ZONE_FILL, ZONE_INK, Paper, shortened
from exposure.outputs.drawing_words import GENERAL_PUBLIC, area_words, power_words
from exposure.outputs.formats import digits

PROPERTY = (0, (9, 2, 1.5, 2, 1.5, 2))
TRACE = (0, (8, 2, 1.5, 2))
HEIGHT_FILL = "#edf2f7"
HEIGHT_STYLES = ((0, (1.2, 1.4)), (0, (7, 1.6, 1.4, 1.6)), (0, (12, 2.5)))
ROLES = {  # width [points], style, colour, words
    "antenna": (2.2, "-", INK, "antenna"),
    "feed line": (1.2, (0, (2.5, 1)), GREY, "feed line"),
    "structure": (1.6, "-", "#8c8c8c", "metal structure"),
}


def zone_looks(population: str) -> dict:
    """Fill, hatch and line of the zone in which the limit of a population is reached."""
    public = population == GENERAL_PUBLIC
    return {
        "fill": ZONE_FILL,
        "hatch": "////" if public else "xxxx",
        "colour": ZONE_INK,
        "width": 1.6,
        "style": (0, (4.5, 1.8)) if public else "-",
    }


def height_looks(style) -> dict:
    """Fill and line of the zone at another height."""
    return {"fill": HEIGHT_FILL, "colour": ZONE_INK, "width": 1.4, "style": style}


def draw_polygons(paper: Paper, window: Window, boundary, **looks):
    """The polygons of a boundary."""
    for polygon in boundary.polygons if boundary else ():
        paper.zone([window.mm(ring) for ring in (polygon.outline, *polygon.holes)], **looks)


def draw_area(paper: Paper, ring, behind: bool = False):
    """A place where people are: light fill and thin outline; one corner alone is a diamond. [mm]"""
    if len(ring) < 3:
        paper.dot(*np.mean(ring, axis=0), 4.0, "D", GREY if behind else INK)
        return
    if not behind:
        paper.zone([ring], AREA_FILL, width=0, layer=1.0)
    paper.zone([ring], colour=GREY, style=(0, (3, 2)) if behind else "-", layer=1.7)  # seen through zones


def number_area(paper: Paper, window: Window, number: int, ring):
    """The area's number inside it if it fits, else beside it with a leader. [mm]"""
    size = 2 * DISC + 0.6
    if len(ring) > 2:
        shape = shapely.Polygon(ring).buffer(0)
        spots = _inside(shape, size / 2)
        away = np.hypot(*(spots - spots[:1]).T) if len(spots) else []
        spot = paper.place(spots, size, size, window.frame, 0.3 * np.asarray(away))
        if spot:
            paper.disc(*spot, number)
            return
        inner = shape.representative_point()
        start = np.array([inner.x, inner.y])
    else:
        start = np.mean(ring, axis=0)
    turns = np.arange(16) * np.pi / 8
    around = np.column_stack([np.cos(turns), np.sin(turns)])
    gaps = np.array([4, 7, 11, 16, 24, 35, 50])
    spots = np.vstack([start + around * gap for gap in gaps])
    spot = paper.place(spots, size, size, window.frame, np.repeat(gaps, len(around)))
    if spot is None:
        return
    way = np.subtract(spot, start)
    end = spot - way * (DISC / np.hypot(*way))
    paper.line([start, end], 0.5, colour=GREY, layer=7)
    paper.disc(*spot, number)


def _inside(shape, room: float):
    """Places inside a polygon that keep a distance from its edge, the middle first. [mm]"""
    inner = shape.buffer(-room)
    if inner.is_empty:
        return np.empty((0, 2))
    left, bottom, right, top = inner.bounds
    step = max(2.0, min(right - left, top - bottom) / 12, max(right - left, top - bottom) / 40)
    x, y = np.meshgrid(np.arange(left, right + 1e-6, step), np.arange(bottom, top + 1e-6, step))
    spots = np.column_stack([x.ravel(), y.ravel()])
    middle = np.array(shape.representative_point().coords[0])
    spots = np.vstack([middle, spots[shapely.contains_xy(inner, *spots.T)]])
    return spots[np.argsort(np.hypot(*(spots - middle).T), kind="stable")]


def draw_conductors(paper: Paper, chains):
    """Conductors as (role, points in mm); a dot where one is seen from its end."""
    for role, points in chains:
        width, style, colour, _ = ROLES[role]
        if np.ptp(points, axis=0).max() < 1.2:
            paper.dot(*points.mean(axis=0), 5.0 if role == "antenna" else 3.5, "o", colour)
        else:
            paper.line(points, width, style, colour, layer=5.0 if role == "antenna" else 4.0)


def label_owners(paper: Paper, window: Window, owners) -> list[str]:
    """Names beside antennas and structures, owners as {name: points in mm}; returns those without room."""
    left_out = []
    for name, points in owners.items():
        points = np.asarray(points)
        ends = [points[0], points[-1], *_between(points), points.mean(axis=0)][:8]
        if not paper.label(ends, shortened(name, 42, bold=True), window.frame, bold=True):
            left_out.append(name)
    return left_out


def _between(points):
    return (points[:-1] + points[1:]) / 2


def label_boundary(paper: Paper, window: Window, boundary, text: str):
    """Words beside a boundary's outermost corners."""
    points = window.mm([corner for polygon in boundary.polygons for corner in polygon.outline])
    ways = np.array([(1, 0.3), (-1, 0.3), (0.3, 1), (0.3, -1), (1, 1), (-1, 1), (-1, -1), (1, -1)])
    paper.label([points[(points @ way).argmax()] for way in ways], text, window.frame)


def conductor_rows(assessment: Assessment, shown):
    """Key rows of the kinds of conductors that are drawn."""
    return [
        Row(line_symbol(width, style, colour), words)
        for role, (width, style, colour, words) in ROLES.items()
        if any(c.role == role and c.owner in shown for c in assessment.conductors)
    ]


def power_rows(assessment: Assessment, limits: str, population: str, most: int = 8):
    """Key rows of frequencies and powers."""
    texts = [power_words(assessment, limits, population, t) for t in assessment.transmissions]
    exclusive = any(t.exclusive for t in assessment.transmissions)
    alternating = "; of exclusive ones one at a time" if exclusive else ""
    rows = [
        Row(None, "Transmissions, all together" + alternating, bold=True),
        *(Row(None, text) for text in texts[:most]),
    ]
    if len(texts) > most:
        rows.append(Row(None, f"and {len(texts) - most} more, see the table of transmissions"))
    return rows if texts else []


def area_rows(assessment: Assessment, limits: str, population: str, shown, most: int = 16):
    """Key rows of areas: number, name, heights, ratio and verdict."""
    rows = [
        Row(number_symbol(number), f"{shortened(name, 52)}, {height}: {words}")
        for number, (name, height, words) in enumerate(area_words(assessment, limits, population), 1)
        if number in shown
    ]
    if len(rows) > most:
        rows = [*rows[:most], Row(None, f"and {len(rows) - most} more, see the table of areas")]
    return [Row(None, "Areas: height, exposure ratio, verdict", bold=True), *rows] if rows else []


def nowhere(heights_) -> str:
    """Heights as words."""
    return ", ".join(digits(height) for height in heights_)
