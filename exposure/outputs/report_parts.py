"""What the sections of the report hold, each a function from the assessment to a list for the page."""

from dataclasses import dataclass

from reportlab.lib.colors import black
from reportlab.platypus import CondPageBreak, KeepTogether, Paragraph, Preformatted, Spacer, Table

from exposure.assessment.model import Assessment
from exposure.outputs import tables, tables_station, words
from exposure.outputs.formats import metres
from exposure.outputs.report_style import (
    BODY,
    CAPTION,
    CELL,
    INPUT,
    MONO,
    NOTE,
    PART,
    TEXT,
    bullets,
    drawable,
    marked,
    paragraph,
)
from exposure.outputs.report_tables import paper_table
from exposure.outputs.vector_figures import VectorFigure

HEADING_ROOM = 40  # points of a section heading above the first figure
LEAST_CAPTION = 60  # points kept below a figure for the beginning of its words
ROOM_FOR_A_PART = 70  # points that must be left on a page to begin one
NOT_REDUCED = 0.999  # a part in a thousand is less than what paper shrinks
SHORT = 260  # points: what is not longer stays on one page
LINE_OF_INPUT = 112  # characters


@dataclass(frozen=True)
class Picture:
    """A figure as the report takes it: a one-page vector PDF with its size [mm] and words.

    scale : 200 for 1:200, None where it has none.
    """

    name: str
    title: str
    caption: str
    alt: str
    width_mm: float
    height_mm: float
    scale: float | None
    pdf: bytes


def figure_parts(pictures, room: tuple[float, float]) -> list:
    """Each picture at its scale, its words kept with it where they fit; room: width, height [points]."""
    if not pictures:
        return [paragraph("There are no figures: nothing was found to draw.")]
    return [
        part
        for number, picture in enumerate(pictures, 1)
        for part in _figure(picture, number, room[0], room[1] - (HEADING_ROOM if number == 1 else 0))
    ]


def _figure(picture: Picture, number: int, width: float, height: float) -> list:
    figure = VectorFigure(f"figure{number}", picture.pdf, picture.width_mm, picture.height_mm, picture.alt)
    figure = figure.reduced_to(width, height - LEAST_CAPTION)
    told = [
        Paragraph(f"<b>Figure {number}.</b> {marked(_caption(picture, figure.reduction))}", CAPTION),
        Spacer(1, 8),
    ]
    tall = figure.height + sum(part.wrap(width, height)[1] + part.getSpaceBefore() for part in told)
    if tall <= height - LEAST_CAPTION / 2:
        return [KeepTogether([figure, *told])]
    return [KeepTogether([figure, told[0]]), *told[1:]]


def figures_in_words(pictures) -> list:
    """What each figure shows, for readers who do not see it."""
    return [
        Paragraph(f"<b>Figure {number}, {marked(picture.title)}.</b> {marked(picture.alt)}", TEXT)
        for number, picture in enumerate(pictures, 1)
        if picture.alt
    ]


def _caption(picture: Picture, reduction: float) -> str:
    """The caption, and what became of the scale."""
    if reduction < NOT_REDUCED:
        return f"{picture.caption} Drawn at {100 * reduction:.0f} % of its size: use the scale bar."
    scale = "" if picture.scale is None else f"1:{picture.scale:g}"
    return picture.caption if scale in picture.caption else f"{picture.caption} Scale {scale} at full size."


def areas(assessment: Assessment, width: float) -> list:
    """A table for each set of limits; shares and reasons below."""
    if not assessment.areas:
        return [paragraph("The site file names no area.")]
    parts = [
        paragraph(words.EXPOSURE_RATIO),
        paragraph(words.AREA_COLUMNS, NOTE),
    ]
    for limits in dict.fromkeys(result.limits for area in assessment.areas for result in area.results):
        parts += _part(f"By {limits}", paper_table(tables.areas(assessment, limits), width))
    parts += _part("Reasons", bullets(tables.area_reasons(assessment)))
    parts += _part(
        "Parts of the transmissions at the worst place", paper_table(tables.shares(assessment), width)
    )
    parts += _part(
        "Areas that are not judged as general public", paper_table(tables.informed(assessment), width)
    )
    return parts


def property_words(assessment: Assessment) -> list:
    """Whether the zone stays on the operator's land."""
    land = assessment.property
    if land is None:
        return [
            paragraph("The site file states no property: whether the zone stays on it was not looked at.")
        ]
    told = {True: "yes", False: "NO", None: "cannot be decided"}
    facts = [
        f"The zone at 0–2 m above ground stays on the property: {told[land.inside]}.",
        f"The zone at every height stays above the property: {told[land.inside_at_all_heights]}.",
    ]
    if land.least_margin_m is not None:
        side = "beyond its edge" if land.least_margin_m < 0 else "inside its edge, at the closest place"
        distance = metres(abs(land.least_margin_m), tables.feet(assessment))
        facts.append(f"The zone at 0–2 m above ground reaches to {distance} {side}.")
    return [
        paragraph("The zone is where all transmissions together reach a limit of the general public."),
        *bullets([*facts, *([land.reason] if land.reason else [])]),
    ]


def distances(assessment: Assessment, width: float) -> list:
    """Compliance distance and setback of each transmission alone."""
    return [
        paragraph(words.DISTANCES),
        *(paper_table(tables.distances(assessment), width) or [paragraph("No distance was found.")]),
    ]


def station(assessment: Assessment, width: float) -> list:
    """Transmissions, powers step by step, groups, antennas as solved."""
    parts = [*paper_table(tables_station.transmissions(assessment), width)]
    parts += _part("Exclusive groups", bullets(tables_station.exclusive(assessment)))
    for finding in assessment.transmissions:
        parts += _part(f"Power of {finding.name}", paper_table(tables_station.power_steps(finding), width))
    parts += _part("Antennas at their feeds", paper_table(tables_station.antennas(assessment), width))
    parts += _part("Conductors as solved", paper_table(tables_station.conductors(assessment), width))
    parts += _part("Left out of the solution", bullets(assessment.left_out))
    site = assessment.site
    place = (
        "not stated"
        if site.place_deg is None
        else f"latitude {site.place_deg[0]:.6f}°, longitude {site.place_deg[1]:.6f}° (WGS84)"
    )
    lines = (
        f"Ground: {site.ground or 'not stated'}.",
        f"Origin of the coordinates: {place}. East, north and up are in metres from it; heights are above "
        "local ground, north is true north.",
    )
    return [*bullets(lines), *parts]


def levels(assessment: Assessment, width: float) -> list:
    """Documents and the levels used."""
    return [
        *paper_table(tables.limits(assessment), width),
        *_part("Levels as used", paper_table(tables.levels(assessment), width)),
        paragraph(words.LEVELS, NOTE),
    ]


def method(assessment: Assessment, width: float) -> list:
    """How it was computed, how well, and what it does not know."""
    return [
        *(paragraph(text) for text in words.METHOD),
        *_part("How well each solution did", paper_table(tables.quality(assessment), width)),
        *bullets(words.QUALITY, NOTE),
        paragraph("What the method leaves out", PART),
        *bullets(words.METHOD_LIMITS),
    ]


def signature(assessment: Assessment, width: float) -> list:
    """What the report holds for, and lines to sign on."""
    site = assessment.site
    lines = [
        [Spacer(1, 22)] * 3,
        [paragraph("Name", CELL), "", paragraph("Function (licensee, operator, engineer)", CELL)],
        [Spacer(1, 22)] * 3,
        [paragraph("Place, date", CELL), "", paragraph("Signature", CELL)],
    ]
    rules = [("LINEABOVE", (column, row), (column, row), 0.6, black) for column in (0, 2) for row in (1, 3)]
    table = Table(
        lines,
        colWidths=[0.46 * width, 0.08 * width, 0.46 * width],
        style=[*rules, ("LEFTPADDING", (0, 0), (-1, -1), 0), ("FONTNAME", (0, 0), (-1, -1), BODY)],
    )
    return [
        paragraph(words.VALIDITY),
        paragraph(words.ASSESS_AGAIN),
        KeepTogether(
            [
                paragraph(
                    f"Site: {site.name}. Verdict: {assessment.verdict}. Date: {site.date or 'not stated'}."
                ),
                paragraph(words.STATEMENT),
                table,
            ]
        ),
    ]


def inputs(assessment: Assessment) -> list:
    """The site file with line numbers, its hash, the software."""
    site, software = assessment.site, assessment.software
    lines = [
        piece
        for number, line in enumerate(assessment.site_text.splitlines(), 1)
        for piece in _numbered(number, line)
    ]
    return [
        *bullets(
            [
                f"File: {site.file}",
                f"SHA-256: {site.sha256}",
                f"Software: {software.name} {software.version}",
            ]
        ),
        paragraph(words.ATTACHED),
        CondPageBreak(60),
        Preformatted("\n".join(lines) or "the text of the site file is not in the result", INPUT),
    ]


def _numbered(number: int, line: str) -> list[str]:
    """A line with its number, broken where it is too long."""
    text = drawable(line.expandtabs(4), MONO)
    pieces = [text[i : i + LINE_OF_INPUT] for i in range(0, len(text), LINE_OF_INPUT)] or [""]
    return [f"{number if i == 0 else '':>4}  {piece}" for i, piece in enumerate(pieces)]


def _part(heading: str, content: list) -> list:
    """A small heading over its content, together where that is short; neither where there is no content."""
    if not content:
        return []
    whole = [Paragraph(marked(heading), PART), *content]
    return [CondPageBreak(ROOM_FOR_A_PART), KeepTogether(whole, maxHeight=SHORT)]
