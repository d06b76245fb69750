"""Exposure ratios of all areas as bars on a log axis, with the limit at 1."""

from dataclasses import dataclass
from math import ceil, floor, log10

from exposure.assessment.model import Assessment
from exposure.outputs.drawing_map import TALLEST, WIDTH, title_height, write_title
from exposure.outputs.drawing_paper import (
    DISC,
    GREY,
    INK,
    PALE,
    ROW,
    ZONE_FILL,
    ZONE_INK,
    Drawing,
    Paper,
    shortened,
    wrapped,
)
from exposure.outputs.drawing_words import GENERAL_PUBLIC, ratio_words
from exposure.outputs.words import POPULATIONS

NAMES, VALUES = 66.0, 42.0  # mm beside the bars
PITCH, GAP = 4.6, 2.2  # mm from bar to bar, and between areas
HEADING = 18.0  # mm, at least that of the title
AXIS = 20.0  # mm below the bars
LOWEST, HIGHEST = 1e-8, 1e8


@dataclass(frozen=True)
class Group:
    """An area with its number and its results."""

    number: int
    area: object

    @property
    def height(self) -> float:
        """On paper. [mm]"""
        return max(1, len(self.area.results)) * PITCH + GAP


def charts(assessment: Assessment) -> tuple[Drawing, ...]:
    """One bar chart of areas, or several where there are many; none without areas."""
    sheets, room = [], TALLEST - HEADING - AXIS - GAP
    for group in (Group(number, area) for number, area in enumerate(assessment.areas, 1)):
        if not sheets or sum(g.height for g in sheets[-1]) + group.height > room:
            sheets.append([])
        sheets[-1].append(group)
    span = _span(assessment)
    return tuple(_chart(assessment, groups, n, len(sheets), span) for n, groups in enumerate(sheets, 1))


def _span(assessment: Assessment) -> tuple[int, int]:
    """Decades of the axis; the limit is always on it."""
    results = [r for area in assessment.areas for r in area.results]
    values = [v for r in results for v in (r.exposure_ratio, r.upper_bound_ratio) if v is not None and v > 0]
    values = [min(max(v, LOWEST), HIGHEST) for v in values]
    return min([-2, *(floor(log10(v)) for v in values)]), max([1, *(ceil(log10(v)) for v in values)])


def _chart(assessment, groups, sheet: int, sheets: int, span) -> Drawing:
    title = "Exposure ratio of each area" + (f", sheet {sheet} of {sheets}" if sheets > 1 else "")
    state = (
        f"{assessment.site.name}. All transmissions together, at the worst place of each area; proportional "
        "to power, 1 at the limit. Thin mark: with its numerical error added."
    )
    above = title_height(title, state)
    paper = Paper(WIDTH, above + sum(g.height for g in groups) + GAP + AXIS)
    write_title(paper, title, state)
    top = paper.height - above
    left, right = NAMES, WIDTH - VALUES
    step = (right - left) / (span[1] - span[0])

    def across(value):
        return left + (min(max(log10(value), span[0]), span[1]) - span[0]) * step if value > 0 else left

    every = max(1, ceil(9.0 / step))
    for decade in range(span[0], span[1] + 1):
        x = left + (decade - span[0]) * step
        paper.line([(x, AXIS), (x, top)], 0.4, colour=PALE, layer=0.5, avoided=False)
        if decade % every == 0:
            paper.write(x, AXIS - 3.6, _decade(decade), 7, align="center")
    paper.line([(left, AXIS), (right, AXIS)], 0.7)
    paper.line([(across(1), AXIS), (across(1), top)], 1.6, layer=5)
    paper.write(across(1), AXIS - 7.4, "limit", bold=True, align="center")
    paper.write((left + right) / 2, AXIS - 11.2, "exposure ratio, log scale", 7, align="center", colour=GREY)
    _legend(paper, groups)
    y = top - GAP
    for group in groups:
        _group(paper, group, y, left, across)
        y -= group.height
    caption = (
        "Exposure ratio of each area for each limit set and its population, all transmissions together, on a "
        "log axis with the limit at 1. The thin mark is the value with its numerical error added. "
        "Not to scale."
    )
    name = "areas" if sheet == 1 else f"areas-{sheet}"
    return Drawing(name, title, caption, _alt(groups), WIDTH, paper.height, None, paper.figure)


def _legend(paper, groups):
    x = 1.0
    for population in dict.fromkeys(g.area.population for g in groups):
        paper.zone([_bar(x, 2.0, x + 9, 5.0)], **_looks(population))
        paper.write(x + 11, 2.4, POPULATIONS[population])
        x += 48


def _group(paper, group, top, left, across):
    names = wrapped(group.area.name, left - 33)[: max(1, int(group.height / ROW))]
    if names != wrapped(group.area.name, left - 33):
        names[-1] = shortened(names[-1] + " …", left - 33)
    paper.disc(DISC + 1, top - PITCH / 2, group.number)
    for n, name in enumerate(names):
        paper.write(7, top - PITCH / 2 - 0.9 - n * 3.4, name)
    if not group.area.results:
        paper.write(left + 2, top - PITCH + 1.4, "no chosen limit covers it: cannot be decided")
    for n, result in enumerate(group.area.results):
        middle = top - PITCH * (n + 0.5)
        ident = shortened(result.limits, 24, 7)
        paper.write(left - 1.5, middle - 0.85, ident, 7, align="right", colour=GREY)
        if result.exposure_ratio is None:
            words = "exceeds limits" if result.verdict == "exceeds limits" else "cannot be decided"
            paper.write(left + 2, middle - 0.9, words, bold=True)
            continue
        end = max(across(result.exposure_ratio), left + 0.3)
        paper.zone([_bar(left, middle - 1.5, end, middle + 1.5)], **_looks(group.area.population))
        if result.upper_bound_ratio is not None:
            x = across(result.upper_bound_ratio)
            paper.line([(x, middle - 2.0), (x, middle + 2.0)], 0.9, layer=6)
        paper.write(WIDTH - VALUES + 2, middle - 0.9, _value(result))


def _looks(population):
    public = population == GENERAL_PUBLIC
    return {
        "fill": ZONE_FILL if public else "#f0f0f0",
        "hatch": "////" if public else "xxxx",
        "colour": ZONE_INK if public else INK,
        "avoided": False,
    }


def _value(result) -> str:
    return f"{ratio_words(result.exposure_ratio)}  {result.verdict}"


def _decade(decade: int) -> str:
    return f"{10.0**decade:g}" if -4 <= decade <= 4 else f"1e{decade}"


def _bar(left, bottom, right, top):
    return [(left, bottom), (right, bottom), (right, top), (left, top)]


def _alt(groups) -> str:
    parts = []
    for group in groups:
        values = ", ".join(_spoken(result) for result in group.area.results) or "no limit covers it"
        parts.append(f"Area {group.number}, {group.area.name}: {values}.")
    return "Exposure ratios. " + " ".join(parts)


def _spoken(result) -> str:
    ratio = "not known" if result.exposure_ratio is None else ratio_words(result.exposure_ratio)
    return f"{result.limits} {ratio}, {result.verdict}"
