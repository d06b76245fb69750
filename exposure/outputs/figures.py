"""Every drawing of an assessment, and its files: SVG and PNG for others, PDF for the report."""

from io import BytesIO
from pathlib import Path

import matplotlib
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.backends.backend_pdf import FigureCanvasPdf
from matplotlib.backends.backend_svg import FigureCanvasSVG

from exposure.assessment.model import Assessment
from exposure.outputs.drawing_chart import charts
from exposure.outputs.drawing_paper import Drawing
from exposure.outputs.drawing_plan import plan
from exposure.outputs.drawing_section import section
from exposure.outputs.drawing_words import GENERAL_PUBLIC
from exposure.outputs.whole_files import write_whole

__all__ = ["Drawing", "figures", "pdf_bytes", "png_bytes", "svg_bytes", "write_drawings", "write_figures"]

SETTINGS = {
    "svg.fonttype": "none",  # text stays text
    "svg.hashsalt": "exposure",  # the same names in every run
    "pdf.fonttype": 3,  # outlines in the file; subsetting TrueType takes four times as long
    "path.simplify": False,
    "text.hinting": "no_hinting",  # widths on the screen are those on paper
}
DOTS_PER_INCH = 150


def figures(assessment: Assessment) -> tuple[Drawing, ...]:
    """Plans and vertical sections of every limit set and population, and the bars of areas."""
    letters = _letters(assessment)
    drawn = []
    for limits, population in _pairs(assessment):
        own = tuple(
            b
            for b in assessment.boundaries
            if (b.limits, b.population, b.transmission, b.level) == (limits, population, "all", 1.0)
        )
        cuts = [b for b in own if b.section is not None and b.section_origin_m is not None]
        traces = [(letters[b.section], b.section_origin_m, b.section_bearing_deg) for b in cuts]
        if own or assessment.areas or assessment.conductors or assessment.property:
            drawn.append(plan(assessment, limits, population, own, traces))
        drawn += [section(assessment, b, letters[b.section]) for b in cuts]
    return (*drawn, *charts(assessment))


def write_figures(assessment: Assessment, directory) -> list[Path]:
    """Draw and write as ``write_drawings``; returns the paths."""
    return write_drawings(figures(assessment), directory)


def write_drawings(drawings, directory) -> list[Path]:
    """Write <name>.svg of all, and <name>.png of plans, into a directory, which is made; returns the paths.

    Raises
    ------
    ExposureError
        The directory cannot be written to.
    """
    directory = Path(directory)
    directory.mkdir(parents=True, exist_ok=True)
    paths = []
    for drawing in drawings:
        wanted = [(".svg", svg_bytes)] + [(".png", png_bytes)] * drawing.name.startswith("plan")
        for ending, content in wanted:
            path = directory / f"{drawing.name}{ending}"
            write_whole(path, content(drawing))
            paths.append(path)
    return paths


def svg_bytes(drawing: Drawing) -> bytes:
    """SVG with text as text; the same bytes for the same assessment."""
    drawing.figure.set_dpi(72)
    return _printed(
        FigureCanvasSVG(drawing.figure).print_svg, {"Date": None, "Creator": None, "Title": drawing.title}
    )


def png_bytes(drawing: Drawing) -> bytes:
    """PNG on white at 150 dots per inch."""
    drawing.figure.set_dpi(DOTS_PER_INCH)
    return _printed(FigureCanvasAgg(drawing.figure).print_png, {"Software": None})


def pdf_bytes(drawing: Drawing) -> bytes:
    """A PDF page of the drawing's size: vectors, embedded TrueType fonts, no date."""
    drawing.figure.set_dpi(72)
    nothing = {"CreationDate": None, "Creator": None, "Producer": None}
    return _printed(FigureCanvasPdf(drawing.figure).print_pdf, nothing)


def _printed(printer, metadata) -> bytes:
    target = BytesIO()
    with matplotlib.rc_context(SETTINGS):
        printer(target, metadata=metadata)
    return target.getvalue()


def _pairs(assessment: Assessment) -> list[tuple[str, str]]:
    """Limit sets with each population that has areas, and with the general public."""
    peopled = {area.population for area in assessment.areas} | {GENERAL_PUBLIC}
    known = dict.fromkeys((x.limits, x.population) for x in (*assessment.boundaries, *assessment.levels))
    order = [x.id for x in assessment.limits]
    pairs = [pair for pair in known if pair[1] in peopled]
    pairs.sort(key=lambda p: (order.index(p[0]) if p[0] in order else len(order), p[1]))
    return pairs or [(limits, GENERAL_PUBLIC) for limits in order]


def _letters(assessment: Assessment) -> dict[str, str]:
    """A letter for each vertical section, the same in every drawing."""
    labels = dict.fromkeys(b.section for b in assessment.boundaries if b.section is not None)
    return {label: _letter(n) for n, label in enumerate(labels)}


def _letter(number: int) -> str:
    return (_letter(number // 26 - 1) if number >= 26 else "") + chr(ord("A") + number % 26)
