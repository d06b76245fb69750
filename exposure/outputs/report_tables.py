"""Tables on paper: headings repeated on each page, cells that wrap, thin rules."""

from reportlab.platypus import LongTable

from exposure.outputs.report_style import BODY, CELL, HEADING_CELL, INK, PALE, RULE, paragraph

LOOK = [
    ("FONTNAME", (0, 0), (-1, -1), BODY),
    ("VALIGN", (0, 0), (-1, -1), "TOP"),
    ("BACKGROUND", (0, 0), (-1, 0), PALE),
    ("LINEABOVE", (0, 0), (-1, 0), 0.8, INK),
    ("LINEBELOW", (0, 0), (-1, 0), 0.8, INK),
    ("LINEBELOW", (0, 1), (-1, -1), 0.3, RULE),
    ("LEFTPADDING", (0, 0), (-1, -1), 2.5),
    ("RIGHTPADDING", (0, 0), (-1, -1), 2.5),
    ("TOPPADDING", (0, 0), (-1, -1), 2),
    ("BOTTOMPADDING", (0, 0), (-1, -1), 3),
]


def paper_table(table, width: float) -> list:
    """A table of words (tables.Table) over the width [points]; nothing where it has no rows."""
    if not table.rows:
        return []
    rows = [
        [paragraph(text, HEADING_CELL) for text in table.columns],
        *([paragraph(text, CELL) for text in row] for row in table.rows),
    ]
    widths = [width * share / sum(table.widths) for share in table.widths]
    return [
        LongTable(
            rows, colWidths=widths, repeatRows=1, style=LOOK, spaceBefore=2, spaceAfter=6, hAlign="LEFT"
        )
    ]
