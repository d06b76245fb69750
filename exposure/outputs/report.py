"""The report: an assessment as a PDF that a person can read, verdict first."""

from pathlib import PurePath

from reportlab.platypus import CondPageBreak, KeepTogether

from exposure.assessment.model import Assessment
from exposure.outputs import figures, report_parts, tables, words
from exposure.outputs.report_pages import Heading, Paper, pdf_pages
from exposure.outputs.report_parts import Picture
from exposure.outputs.report_style import SECTION, bullets, marked, page_size
from exposure.outputs.report_tables import paper_table
from exposure.outputs.report_verdict import title, verdict_frame
from exposure.outputs.result_file import dumps
from exposure.outputs.whole_files import write_whole

WARNINGS = "Warnings about this site"
ROOM_FOR_A_SECTION = 90  # points that must be left on a page to begin one


def write_report(assessment: Assessment, path, drawings=None):
    """Write the PDF, whole or not at all; the same bytes for the same assessment.

    drawings : those of ``figures.figures`` where they are made already.

    Raises
    ------
    ExposureError
        The place cannot be written to.
    """
    drawn = figures.figures(assessment) if drawings is None else drawings
    write_whole(path, report_pdf(assessment, pictures(drawn)))


def pictures(drawings) -> tuple[Picture, ...]:
    """Plans and sections, as vectors."""
    return tuple(
        Picture(d.name, d.title, d.caption, d.alt, d.width_mm, d.height_mm, d.scale, figures.pdf_bytes(d))
        for d in drawings
    )


def report_pdf(assessment: Assessment, drawn: tuple[Picture, ...]) -> bytes:
    """The PDF; nothing is computed here, everything stands in the assessment."""
    paper = Paper(
        size=page_size([limit.id for limit in assessment.limits]),
        title=assessment.site.name,
        verdict=assessment.verdict,
        author=assessment.site.operator or "",
        origin=f"{assessment.software.name} {assessment.software.version}",
    )
    return pdf_pages(_story(assessment, drawn, paper), paper, _attachments(assessment))


def _story(assessment: Assessment, drawn, paper: Paper) -> list:
    sections = [(name, parts) for name, parts in _sections(assessment, drawn, paper) if parts]
    numbered = {name: number for number, (name, _) in enumerate(sections, 1)}
    warnings_at = f"section {numbered.get(WARNINGS, 0)}, {WARNINGS.lower()}"
    story = [*title(assessment), *verdict_frame(assessment, paper.frame[0], warnings_at)]
    for name, parts in sections:
        number = numbered[name]
        heading = Heading(marked(f"{number}. {name}"), SECTION, 0, f"section{number}")
        story += [CondPageBreak(ROOM_FOR_A_SECTION), *_headed(heading, parts)]
    return story


def _headed(heading, parts) -> list:
    """A heading stays with what follows where that is kept together itself."""
    if isinstance(parts[0], KeepTogether):
        return [KeepTogether([heading, parts[0]]), *parts[1:]]
    return [heading, *parts]


def _sections(assessment: Assessment, drawn, paper: Paper):
    """(heading, what stands under it), in the order of the report; empty ones are left out."""
    width = paper.frame[0]
    return (
        ("Areas in short", paper_table(tables.areas_in_short(assessment), width)),
        ("What this verdict does not cover", bullets(assessment.not_assessed)),
        ("Plan and sections", report_parts.figure_parts(drawn, paper.frame)),
        ("Areas", report_parts.areas(assessment, width)),
        ("Property", report_parts.property_words(assessment)),
        ("Distances to keep", report_parts.distances(assessment, width)),
        ("Station", report_parts.station(assessment, width)),
        ("Limits and levels", report_parts.levels(assessment, width)),
        ("Method and its limits", report_parts.method(assessment, width)),
        ("Safe choices that were made", bullets(assessment.choices)),
        (WARNINGS, bullets(assessment.warnings)),
        ("Cautions", bullets(words.CAUTIONS)),
        ("Local rules and licensed practice", bullets(words.DEFERENCE)),
        ("Access", bullets(words.ACCESS)),
        ("Figures in words", report_parts.figures_in_words(drawn)),
        ("Validity and signature", report_parts.signature(assessment, width)),
        ("Input", report_parts.inputs(assessment)),
    )


def _attachments(assessment: Assessment) -> dict:
    """The result and the site file, so that the report carries its own evidence."""
    files = {"assessment.json": ("application/json", dumps(assessment).encode())}
    if assessment.site_text:
        files[PurePath(assessment.site.file).name or "site.toml"] = (
            "application/toml",
            assessment.site_text.encode(),
        )
    return files
