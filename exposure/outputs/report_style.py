"""Paper, fonts and text styles of the report."""

import re
from pathlib import Path
from xml.sax.saxutils import escape

import matplotlib
from reportlab.lib.colors import HexColor
from reportlab.lib.pagesizes import A4, LETTER
from reportlab.lib.styles import ParagraphStyle
from reportlab.pdfbase import pdfmetrics
from reportlab.pdfbase.ttfonts import TTFont
from reportlab.platypus import Paragraph

BODY, BOLD, MONO = "ExposureSans", "ExposureSans-Bold", "ExposureMono"
FILES = {BODY: "DejaVuSans.ttf", BOLD: "DejaVuSans-Bold.ttf", MONO: "DejaVuSansMono.ttf"}
MARGIN = 15 * 72 / 25.4  # points
HEAD = 18 * 72 / 25.4
INK, GREY, PALE, RULE = HexColor("#000000"), HexColor("#555555"), HexColor("#ececec"), HexColor("#999999")


def register_fonts():
    """DejaVu (free licence, comes with matplotlib) for every letter, so that all is embedded."""
    directory = Path(matplotlib.get_data_path()) / "fonts" / "ttf"
    for name, file in FILES.items():
        if name not in pdfmetrics.getRegisteredFontNames():
            pdfmetrics.registerFont(TTFont(name, directory / file))
    pdfmetrics.registerFontFamily(BODY, normal=BODY, bold=BOLD, italic=BODY, boldItalic=BOLD)


register_fonts()
GLYPHS = {name: frozenset(pdfmetrics.getFont(name).face.charToGlyph) for name in FILES}


def _style(name: str, size: float, font: str = BODY, **more) -> ParagraphStyle:
    fonts = {"fontName": font, "bulletFontName": font, "splitLongWords": 1}
    return ParagraphStyle(name, fontSize=size, leading=1.3 * size, **fonts, **more)


TITLE = _style("title", 16, BOLD, spaceAfter=2)
TEXT = _style("text", 8.5, spaceAfter=4)
NOTE = _style("note", 7.5, spaceAfter=4, textColor=GREY)
SECTION = _style("section", 11.5, BOLD, spaceBefore=11, spaceAfter=4)
PART = _style("part", 8.5, BOLD, spaceBefore=6, spaceAfter=3)
CAPTION = _style("caption", 7.5, spaceBefore=3, spaceAfter=3)
VERDICT = _style("verdict", 17, BOLD, spaceAfter=5)
CELL = _style("cell", 7)
HEADING_CELL = _style("heading cell", 7, BOLD)
INPUT = _style("input", 7, MONO)


def page_size(limits_ids) -> tuple[float, float]:
    """Letter where every set of limits is of the USA, else A4. [points]"""
    return LETTER if limits_ids and all(name.startswith("us_") for name in limits_ids) else A4


def drawable(text: str, font: str = BODY) -> str:
    """Text with a box for every character that the font does not have."""
    known = GLYPHS[font]
    return re.sub(r"[^ -~\n]", lambda c: c[0] if ord(c[0]) in known and c[0].isprintable() else "□", text)


def marked(text: str) -> str:
    """Text as a paragraph takes it: no markup of its own, line breaks kept."""
    return escape(drawable(text)).replace("\n", "<br/>")


def paragraph(text: str, style: ParagraphStyle = TEXT) -> Paragraph:
    """A paragraph of plain text."""
    return Paragraph(marked(text), style)


def bullets(texts, style: ParagraphStyle = TEXT) -> list[Paragraph]:
    """A list, each item a paragraph of its own; nothing where there are no texts."""
    hanging = ParagraphStyle("item", style, leftIndent=11, bulletIndent=2, bulletFontSize=style.fontSize)
    return [Paragraph(marked(text), hanging, bulletText="–") for text in texts]
