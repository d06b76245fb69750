"""A page of another PDF as a drawing of the report: vectors and fonts stay what they are."""

from io import BytesIO

from pypdf import PdfReader
from pypdf.generic import ArrayObject, DictionaryObject, IndirectObject, StreamObject
from reportlab.pdfbase.pdfdoc import PDFArray, PDFDictionary, PDFObjectReference, PDFStream, PDFZCompress
from reportlab.platypus import Flowable

POINTS_PER_MM = 72 / 25.4
REWRITTEN = ("/Length", "/Filter", "/DecodeParms")  # streams are unpacked and packed again


class VectorFigure(Flowable):
    """The only page of `pdf` (bytes) at width by height [mm]; reduced if it is larger than the frame.

    `name` tells the figure's objects from those of others in the report; `alternative` says in words
    what is seen, for readers that speak.
    """

    hAlign = "CENTER"

    def __init__(self, name: str, pdf: bytes, width_mm: float, height_mm: float, alternative: str = ""):
        super().__init__()
        self.name, self.pdf, self.alternative = name, pdf, alternative
        self.full = (width_mm * POINTS_PER_MM, height_mm * POINTS_PER_MM)
        self.width, self.height = self.full

    def reduced_to(self, width: float, height: float) -> "VectorFigure":
        """The same figure, made smaller where it does not fit into width by height [points]."""
        factor = min(1.0, width / self.full[0], height / self.full[1])
        self.width, self.height = factor * self.full[0], factor * self.full[1]
        return self

    @property
    def reduction(self) -> float:
        """Drawn size over true size; 1 where the scale holds."""
        return self.width / self.full[0]

    def wrap(self, *available):
        """Size. [points]"""
        return self.width, self.height

    def draw(self):
        """Place the page, stretched to its size, as one object with words beside it."""
        page = PdfReader(BytesIO(self.pdf)).pages[0]
        box = [float(edge) for edge in page.mediabox]
        self.canv._doc.addForm(self.name, _form(page, box, self.canv._doc, self.name))
        self.canv.saveState()
        self.canv.scale(self.width / (box[2] - box[0]), self.height / (box[3] - box[1]))
        self.canv.translate(-box[0], -box[1])
        words = self.alternative.encode("utf-16-be").hex()
        self.canv._code.append(f"/Span <</Alt <FEFF{words}>>> BDC")
        self.canv.doForm(self.name)
        self.canv._code.append("EMC")
        self.canv.restoreState()


def _form(page, box, document, name: str) -> PDFStream:
    """The page as a form, all that it refers to taken along."""
    head = {"Type": "/XObject", "Subtype": "/Form", "FormType": 1, "BBox": PDFArray(box)}
    for key in ("/Resources", "/Group"):
        if key in page:
            head[key[1:]] = _taken(page[key], document, name, set())
    return PDFStream(PDFDictionary(head), page.get_contents().get_data(), [PDFZCompress])


def _taken(value, document, name: str, taken: set):
    """An object of the page as an object of the report; `taken` holds the numbers already there."""
    if isinstance(value, IndirectObject):
        key = f"{name}.{value.idnum}"
        if key not in taken:
            taken.add(key)
            document.Reference(_taken(value.get_object(), document, name, taken), key)
        return PDFObjectReference(key)
    if isinstance(value, StreamObject):
        head = {k: v for k, v in value.items() if k not in REWRITTEN}
        return PDFStream(_dictionary(head, document, name, taken), value.get_data(), [PDFZCompress])
    if isinstance(value, DictionaryObject):
        return _dictionary(value, document, name, taken)
    if isinstance(value, ArrayObject):
        return PDFArray([_taken(item, document, name, taken) for item in value])
    written = BytesIO()
    value.write_to_stream(written)
    return written.getvalue()


def _dictionary(value, document, name: str, taken: set) -> PDFDictionary:
    return PDFDictionary({k[1:]: _taken(item, document, name, taken) for k, item in value.items()})
