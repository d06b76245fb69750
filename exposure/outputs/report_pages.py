"""Pages of the report: heads, page numbers, bookmarks, attached files, the same bytes each time."""

from dataclasses import dataclass
from io import BytesIO

from reportlab.pdfbase.pdfdoc import PDFArray, PDFDictionary, PDFStream, PDFString, PDFZCompress
from reportlab.platypus import BaseDocTemplate, Flowable, Frame, PageTemplate, Paragraph

from exposure.outputs.report_style import BODY, GREY, HEAD, MARGIN, RULE, drawable

TOTAL = "total"  # the form that holds the number of pages, drawn when it is known
SMALL = 7  # points


@dataclass(frozen=True)
class Paper:
    """What every page carries. size [points]."""

    size: tuple[float, float]
    title: str
    verdict: str
    author: str
    origin: str

    @property
    def frame(self) -> tuple[float, float]:
        """Width and height of the text. [points]"""
        return self.size[0] - 2 * MARGIN, self.size[1] - 2 * HEAD


class Heading(Paragraph):
    """A paragraph that is also a bookmark, at a level from 0."""

    def __init__(self, text: str, style, level: int, bookmark: str):
        super().__init__(text, style)
        self.level, self.bookmark = level, bookmark

    def draw(self):
        """Draw it and note its place."""
        self.canv.bookmarkHorizontal(self.bookmark, 0, self.height + 6)
        self.canv.addOutlineEntry(self.getPlainText(), self.bookmark, self.level, closed=False)
        super().draw()


class _Total(Flowable):
    """Stands at the end of the story and tells all pages how many they are."""

    def wrap(self, *available):
        return 0, 0

    def draw(self):
        number = str(self.canv.getPageNumber())
        self.canv.beginForm(TOTAL, 0, -SMALL, 4 * SMALL, 2 * SMALL)
        self.canv.setFont(BODY, SMALL)
        self.canv.setFillColor(GREY)
        self.canv.drawString(0, 0, number)
        self.canv.endForm()


def pdf_pages(story: list, paper: Paper, attachments: dict[str, tuple[str, bytes]]) -> bytes:
    """The PDF of a story; attachments: file name -> (MIME type, content)."""
    target = BytesIO()
    document = BaseDocTemplate(
        target,
        pagesize=paper.size,
        invariant=1,
        title=drawable(paper.title),
        author=drawable(paper.author),
        subject=drawable(f"Radio-frequency exposure: {paper.verdict}"),
        creator=paper.origin,
        producer=paper.origin,
        lang="en",
        initialFontName=BODY,
        displayDocTitle=1,
    )
    width, height = paper.frame
    frame = Frame(MARGIN, HEAD, width, height, 0, 0, 0, 0)

    def around(canvas, _document):
        if canvas.getPageNumber() == 1:
            _attach(canvas, attachments)
            canvas.showOutline()
        _head_and_foot(canvas, paper)

    document.addPageTemplates([PageTemplate(frames=[frame], onPage=around)])
    document.build([*story, _Total()])
    return target.getvalue()


def _head_and_foot(canvas, paper: Paper):
    width, height = paper.size
    canvas.saveState()
    canvas.setFont(BODY, SMALL)
    canvas.setFillColor(GREY)
    canvas.setStrokeColor(RULE)
    canvas.setLineWidth(0.4)
    for y in (height - HEAD + 6, HEAD - 6):
        canvas.line(MARGIN, y, width - MARGIN, y)
    room = width - 2 * MARGIN - canvas.stringWidth(paper.verdict, BODY, SMALL) - 12
    canvas.drawString(MARGIN, height - HEAD + 10, _fitted(canvas, drawable(paper.title), room))
    canvas.drawRightString(width - MARGIN, height - HEAD + 10, paper.verdict)
    canvas.drawString(MARGIN, HEAD - 16, paper.origin)
    start = width - MARGIN - 2 * SMALL
    canvas.drawRightString(start, HEAD - 16, f"page {canvas.getPageNumber()} of ")
    canvas.translate(start, HEAD - 16)
    canvas.doForm(TOTAL)
    canvas.restoreState()


def _fitted(canvas, text: str, room: float) -> str:
    if canvas.stringWidth(text, BODY, SMALL) <= room:
        return text
    return next(
        cut
        for cut in (text[:end].rstrip() + "…" for end in range(len(text) - 1, -1, -1))
        if canvas.stringWidth(cut, BODY, SMALL) <= room or cut == "…"
    )


def _attach(canvas, attachments):
    """Embedded files (PDF 1.7, 7.11.4), in order of their names."""
    document, names = canvas._doc, []
    for name, (kind, content) in sorted(attachments.items()):
        head = {
            "Type": "/EmbeddedFile",
            "Subtype": "/" + kind.replace("/", "#2F"),
            "Params": PDFDictionary({"Size": len(content)}),
        }
        stream = document.Reference(PDFStream(PDFDictionary(head), content, [PDFZCompress]))
        file = {"Type": "/Filespec", "F": PDFString(name), "UF": PDFString(name)}
        names += [
            PDFString(name),
            document.Reference(PDFDictionary({**file, "EF": PDFDictionary({"F": stream, "UF": stream})})),
        ]
    if names:
        document.Catalog.Names = PDFDictionary({"EmbeddedFiles": PDFDictionary({"Names": PDFArray(names)})})
