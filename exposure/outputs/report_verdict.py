"""The first page: what is assessed, the verdict in a frame, and what it says nothing about."""

from reportlab.platypus import Table, TableStyle

from exposure.assessment.model import Assessment
from exposure.outputs import words
from exposure.outputs.formats import computed, digits, share
from exposure.outputs.report_pages import Heading
from exposure.outputs.report_style import (
    BODY,
    INK,
    NOTE,
    PALE,
    PART,
    TITLE,
    VERDICT,
    bullets,
    marked,
    paragraph,
)

DECISIONS = {
    "upper_bound": "the exposure ratio with its numerical error added must stay below 1",
    "best_estimate": "the best estimate of the exposure ratio must stay below 1, numerical error not added",
    "margin": "the best estimate of the exposure ratio must stay below {margin}",
}
MOST_REASONS = 10
SPATIAL = {
    "peak": "the greatest value in an area decides, also where a document allows an average over the body",
    "body_average": "where a document allows it, the average over a standing body decides",
}


def title(assessment: Assessment) -> list:
    """Name of the site, who, when, by which limits."""
    site = assessment.site
    facts = [
        f"Date: {site.date or 'not stated'}",
        f"Operator: {site.operator or 'not stated'}",
        f"Licence: {site.licence or 'not stated'}",
    ]
    return [
        paragraph("Radio-frequency exposure assessment", NOTE),
        paragraph(site.name, TITLE),
        paragraph(" · ".join(facts)),
        *(
            paragraph(f"Limits: {limit.id}: {limit.title} ({limit.edition})", NOTE)
            for limit in assessment.limits
        ),
    ]


def verdict_frame(assessment: Assessment, width: float, warnings_at: str) -> list:
    """The verdict in words, its reasons, its conditions, the worst place, the rule."""
    site = assessment.site
    inside = [
        Heading(marked(f"Verdict: {assessment.verdict.upper()}"), VERDICT, 0, "verdict"),
        paragraph(words.VERDICTS[assessment.verdict]),
        *_list("Why", shortened(assessment.reasons)),
        *_list("Conditions: they are part of the verdict", assessment.conditions),
        *_list("Worst place", worst_places(assessment)),
        *_list("How it is decided", (_decision(site), SPATIAL[site.spatial])),
    ]
    if assessment.warnings:
        inside.append(
            paragraph(
                f"This site has {_count(len(assessment.warnings), 'warning')}: see {warnings_at}.", PART
            )
        )
    heavy = 1.0 if assessment.verdict == "within limits" else 2.5
    look = [
        ("FONTNAME", (0, 0), (-1, -1), BODY),
        ("BOX", (0, 0), (-1, -1), heavy, INK),
        ("LEFTPADDING", (0, 0), (-1, -1), 10),
        ("RIGHTPADDING", (0, 0), (-1, -1), 10),
        ("TOPPADDING", (0, 0), (-1, 0), 8),
        ("BOTTOMPADDING", (0, -1), (-1, -1), 8),
    ]
    if assessment.verdict != "within limits":
        look.append(("BACKGROUND", (0, 0), (-1, 0), PALE))
    narrow = [("TOPPADDING", (0, 1), (-1, -1), 0), ("BOTTOMPADDING", (0, 0), (-1, -2), 2)]
    headings = [row for row, flowable in enumerate(inside) if getattr(flowable, "style", None) is PART]
    narrow += [("TOPPADDING", (0, row), (0, row), 6) for row in headings]
    narrow += [("BOTTOMPADDING", (0, 0), (0, 0), 9), ("TOPPADDING", (0, 1), (0, 1), 5)]
    rows = [[flowable] for flowable in inside]
    return [Table(rows, colWidths=[width], style=TableStyle(narrow + look), spaceBefore=8, spaceAfter=6)]


def shortened(reasons) -> tuple[str, ...]:
    """The first reasons; the areas' own stand with the table of areas too."""
    more = len(reasons) - MOST_REASONS
    return (*reasons[:MOST_REASONS], *([f"and {more} more, see the section on areas"] if more > 0 else ()))


def worst_places(assessment: Assessment) -> tuple[str, ...]:
    """For each set of limits the area with the largest ratio, and areas without one."""
    found = []
    for limits in dict.fromkeys(result.limits for area in assessment.areas for result in area.results):
        results = [(area, r) for area in assessment.areas for r in area.results if r.limits == limits]
        known = [(area, r) for area, r in results if r.upper_bound_ratio is not None]
        if known:
            found.append(_worst(limits, *max(known, key=lambda pair: pair[1].upper_bound_ratio)))
        found += [
            f"{limits}: {area.name}: no number; {r.verdict}"
            for area, r in results
            if r.upper_bound_ratio is None
        ]
    return tuple(found)


def _worst(limits, area, result) -> str:
    upper = result.upper_bound_ratio
    found = (
        f"{limits}: {area.name}: exposure ratio {computed(result.exposure_ratio)}, {computed(upper)} with "
        "numerical error; 1 is the limit"
    )
    if upper >= 1:
        return f"{found}, so it is used {computed(upper)} times"
    if result.verdict != "within limits":
        return f"{found}, but this number alone does not decide"
    return f"{found}, so {share(upper)} is used and {digits(100 * (1 - upper))} % is left"


def _decision(site) -> str:
    margin = "a margin that is not stated" if site.margin is None else digits(site.margin)
    return DECISIONS[site.decision].format(margin=margin)


def _list(heading: str, texts) -> list:
    return [paragraph(heading, PART), *bullets(texts)] if texts else []


def _count(number: int, word: str) -> str:
    return f"{number} {word}" + ("" if number == 1 else "s")
