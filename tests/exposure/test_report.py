"""The PDF report, read back with pypdf: what it must say, in which order, with which means."""

import subprocess
import sys
import zlib
from dataclasses import replace
from io import BytesIO

import pytest
from matplotlib.backends.backend_pdf import FigureCanvasPdf
from matplotlib.figure import Figure
from pypdf import PdfReader
from pypdf.generic import StreamObject

from exposure.assessment.model import (
    AreaFinding,
    AreaResult,
    Assessment,
    AveragePower,
    Conductor,
    Governing,
    LevelInfo,
    LimitInfo,
    PowerStep,
    PropertyFinding,
    QualityInfo,
    Share,
    SiteInfo,
    Software,
    TransmissionFinding,
    TransmissionResult,
)
from exposure.errors import ExposureError
from exposure.outputs import words
from exposure.outputs.report import report_pdf, write_report
from exposure.outputs.report_parts import Picture
from exposure.outputs.result_file import dumps, read_result, write_result

SITE_TEXT = 'version = 1\nname = "Lot"\n' + "# a long remark " * 20 + "\n"
LONG = "Terrace_of_the_neighbours_" * 6 + "with a roof"
POSITION = (1.25, -3.5, 1.8)


def result(limits="us_fcc", ratio=0.25, verdict="within limits", **more) -> AreaResult:
    cause = Governing("heating", "magnetic field", "voice", "Table 1(ii)")
    return AreaResult(limits, ratio, None, ratio, POSITION, 12.34, 0.0567, cause, verdict, **more)


def area(name="lawn", *results, **more) -> AreaFinding:
    ring = ((0.0, 0.0), (4.0, 0.0), (4.0, 3.0))
    return AreaFinding(name, "general_public", ring, 0.0, 2.0, results or (result(),), **more)


def transmission(name="voice", **more) -> TransmissionFinding:
    facts = {
        "antenna": "dipole",
        "frequency_hz": 14.2e6,
        "peak_power_w": 100.0,
        "line_loss_db": 0.5,
        "accepted_power_w": 89.125,
        "average_powers": (AveragePower(0.0, 89.125), AveragePower(1800.0, 17.825)),
        "feed_impedances_ohm": ((73.1, -3.0),),
        "unknowns": 19,
        "quality": QualityInfo(1e-7, 0.15, 4e-5, True),
        "results": (TransmissionResult("us_fcc", "general_public", 0.51, None, "the search was left open"),),
        "exclusive": "the transmitter",
        "power_steps": (PowerStep("duty factor of the mode", 0.2, 17.825, "speech"),),
        "states": ("as built",),
        "notes": ("the outside of the feed line is not modelled",),
    }
    return TransmissionFinding(name, **{**facts, **more})


def assessment(**changes) -> Assessment:
    level = ("us_fcc", "general_public", 14.2e6, "heating", "whole_body", "mean", 58.03, 0.154, 8.93, 1800.0)
    whole = Assessment(
        site=SiteInfo("Lot <7> & garden", "lot.toml", "ab" * 32, "2026-12-01", "Invented operator"),
        software=Software("exposure", "0.1.0"),
        limits=(LimitInfo("us_fcc", "FCC limits", "2020"), LimitInfo("icnirp_2020", "ICNIRP", "2020")),
        verdict="within limits",
        reasons=("the greatest exposure ratio in any area is 0.25",),
        conditions=("nobody enters the drawn zone",),
        transmissions=(transmission(), transmission("data")),
        areas=(area(),),
        property=PropertyFinding(((0.0, 0.0), (9.0, 0.0), (9.0, 9.0)), True, True, 1.5),
        boundaries=(),
        warnings=("the boundary was not seen to end",),
        levels=(LevelInfo(*level, "Table 1(ii)", True), LevelInfo(*level, "Table 9", False)),
        conductors=(Conductor("dipole", "antenna", ((-5.0, 0.0, 9.1), (5.0, 0.0, 9.1)), 0.001),),
        choices=("mismatch is not credited",),
        not_assessed=("touch and contact current",),
        left_out=("a fence 40 m away",),
        site_text=SITE_TEXT,
    )
    return replace(whole, **changes)


def picture(name="plan") -> Picture:
    """A hatched triangle by matplotlib, as figures make it."""
    figure = Figure((100 / 25.4, 60 / 25.4))
    axes = figure.subplots()
    axes.fill([0, 1, 1], [0, 0, 1], hatch="//", facecolor="0.9", edgecolor="0")
    axes.set_title("µ λ ≤ in a figure")
    target = BytesIO()
    FigureCanvasPdf(figure).print_pdf(target, metadata={"CreationDate": None})
    return Picture(
        name, "Plan", "Where the limit is reached.", "The zone is 3 m wide.", 100, 60, 200, target.getvalue()
    )


def report(found: Assessment | None = None, drawn=()) -> PdfReader:
    return PdfReader(BytesIO(report_pdf(found or assessment(), tuple(drawn))))


def text(reader: PdfReader) -> str:
    """All words, one space apart, so that line breaks do not matter."""
    return " ".join(" ".join(page.extract_text() for page in reader.pages).split())


def squeezed(words_: str) -> str:
    return "".join(words_.split())


def bookmarks(reader: PdfReader) -> list[str]:
    return [entry.title for entry in reader.outline]


@pytest.mark.parametrize("verdict", ["within limits", "exceeds limits", "cannot be decided"])
def test_the_verdict_is_the_first_heading(verdict):
    """conventions.md: the report says one of three verdicts before any picture."""
    reader = report(assessment(verdict=verdict), [picture()])

    first_page = reader.pages[0].extract_text()

    assert bookmarks(reader)[0] == f"Verdict: {verdict.upper()}"
    assert f"Verdict: {verdict.upper()}" in first_page
    assert first_page.index(verdict.upper()) < first_page.index("1. ")


def test_cautions_and_deference_are_printed_in_full():
    found = squeezed(text(report()))

    for sentence in (*words.CAUTIONS, *words.DEFERENCE, *words.ACCESS, words.ASSESS_AGAIN):
        assert squeezed(sentence) in found


def test_reasons_conditions_warnings_choices_and_gaps_are_printed():
    whole = assessment()
    found = text(report(whole))

    for told in (
        whole.reasons,
        whole.conditions,
        whole.warnings,
        whole.choices,
        whole.not_assessed,
        whole.left_out,
    ):
        assert told[0] in found


def test_every_area_stands_with_its_verdict_in_the_table_of_each_limit_set():
    names = [f"place {letter}" for letter in "ABCDEFGHIJKL"]
    verdicts = ["within limits", "exceeds limits", "cannot be decided"] * 4
    areas = tuple(
        area(name, result(verdict=verdict), result("icnirp_2020", verdict=verdict, reason=f"why {name}"))
        for name, verdict in zip(names, verdicts, strict=True)
    )

    found = text(report(assessment(areas=areas, verdict="exceeds limits")))

    for number, (name, verdict) in enumerate(zip(names, verdicts, strict=True), 1):
        assert found.count(f"{number} {name} 0–2 m, general public") == 2
        assert f"{number} {name}, icnirp_2020: {verdict}: why {name}" in found


def test_numbers_have_three_digits_and_units():
    found = text(report())

    for told in (
        "58.0",
        "0.154",
        "8.93",
        "12.3",
        "0.0567",
        "0.250",
        "14.2 MHz",
        "17.8 W over 30 min",
        "0.51 m (1.7 ft)",
    ):
        assert told in found


def test_unknown_numbers_are_said_to_be_unknown():
    empty = AreaResult("us_fcc", None, None, None, None, None, None, None, "cannot be decided", "no solution")
    quality = QualityInfo(None, None, None, False, "not solved")
    bare = transmission(
        quality=quality, feed_impedances_ohm=(), results=(), average_powers=(), power_steps=()
    )

    found = text(report(assessment(areas=(area("attic", empty),), transmissions=(bare,), property=None)))

    assert "us_fcc: attic: no number; cannot be decided" in found
    assert "NOT PASSED: not solved" in found
    assert "None" not in found and "nan" not in found.lower().split()


def test_an_infinite_ratio_is_not_called_within():
    """An antenna through an area has no number and exceeds: result.exposure_ratio is None there."""
    hot = AreaResult(
        "us_fcc", None, None, None, POSITION, None, None, None, "exceeds limits", "a conductor passes"
    )

    found = text(report(assessment(areas=(area("attic", hot),), verdict="exceeds limits", reasons=("hot",))))

    assert "us_fcc: attic: no number; exceeds limits" in found
    assert "WITHIN LIMITS" not in found


def test_levels_that_nobody_compared_with_print_are_marked():
    assert text(report()).count("NOT VERIFIED in print") == 1


def test_shares_are_told_where_two_transmissions_count():
    both = result(shares=(Share("voice", 0.2), Share("data", 0.05)))

    found = text(report(assessment(areas=(area("lawn", both),))))

    assert "1 lawn us_fcc voice 0.200" in found and "1 lawn us_fcc data 0.0500" in found


def test_the_site_file_is_printed_with_line_numbers_and_hash():
    reader = report()
    found = text(reader)

    assert '1 version = 1 2 name = "Lot" 3 # a long remark' in found
    assert "ab" * 32 in found
    assert found.count("a long remark") + found.count("a long re") >= 20


def test_result_and_site_file_are_attached():
    whole = assessment()

    attached = report(whole).attachments

    assert attached["lot.toml"] == [SITE_TEXT.encode()]
    assert attached["assessment.json"] == [dumps(whole).encode()]


def test_long_names_and_strange_letters_stay_on_the_paper():
    """Every piece of text begins inside the page; a letter that the font lacks is shown as a box."""
    whole = assessment(areas=(area(LONG), area("庭")), transmissions=(transmission(LONG),))
    reader, outside = report(whole), []

    def visit(piece, _matrix, place, *_font):
        if piece.strip() and not 0 <= place[4] <= 595:
            outside.append((piece, place))

    for page in reader.pages:
        page.extract_text(visitor_text=visit)

    assert not outside
    assert squeezed(LONG) in squeezed(text(reader)).replace("\n", "")
    assert "□" in text(reader)


def fonts(resources, seen):
    """Every font dictionary below a resource dictionary, forms included."""
    for font in resources.get("/Font", {}).values():
        yield font.get_object()
    for thing in resources.get("/XObject", {}).values():
        thing = thing.get_object()
        if "/Resources" in thing and id(thing) not in seen:
            seen.add(id(thing))
            yield from fonts(thing["/Resources"].get_object(), seen)


def embedded(font) -> bool:
    """Type 3 fonts carry their drawings; others need a font file in their descriptor."""
    if font["/Subtype"] == "/Type3":
        return "/CharProcs" in font
    descendant = font["/DescendantFonts"][0].get_object() if "/DescendantFonts" in font else font
    descriptor = descendant.get("/FontDescriptor", {})
    return any(key in descriptor for key in ("/FontFile", "/FontFile2", "/FontFile3"))


def test_every_font_is_embedded_also_those_of_figures():
    reader = report(drawn=[picture()])

    found = [font for page in reader.pages for font in fonts(page["/Resources"], set())]

    assert len(found) > len(reader.pages)
    assert [font["/BaseFont"] for font in found if not embedded(font)] == []


def test_there_is_no_raster_image_in_the_file():
    reader = report(drawn=[picture(), picture("section")])
    streams = [reader.get_object(number) for number in range(1, len(reader.xref[0]) + 1)]

    images = [s for s in streams if isinstance(s, StreamObject) and s.get("/Subtype") == "/Image"]

    assert images == []
    assert sum(s.get("/Subtype") == "/Form" for s in streams if isinstance(s, StreamObject)) >= 2


def test_a_figure_is_drawn_at_its_size_with_caption_scale_and_words():
    reader = report(drawn=[picture()])
    page = next(
        page for page in reader.pages if "Figure 1. Where the limit is reached." in page.extract_text()
    )
    form = next(v.get_object() for k, v in page["/Resources"]["/XObject"].items() if "figure" in k)

    assert "Figure 1. Where the limit is reached. Scale 1:200 at full size." in " ".join(
        page.extract_text().split()
    )
    assert [float(x) for x in form["/BBox"]] == pytest.approx([0, 0, 100 / 25.4 * 72, 60 / 25.4 * 72])
    assert "The zone is 3 m wide.".encode("utf-16-be").hex() in page.get_contents().get_data().decode(
        "latin-1"
    )
    assert "µ λ ≤ in a figure" in page.extract_text()


def test_a_figure_that_is_too_large_is_made_smaller_and_says_so():
    large = replace(picture(), width_mm=400, height_mm=240)

    assert "Drawn at 45 % of its size: use the scale bar." in text(report(drawn=[large]))


@pytest.mark.parametrize(
    ("limits", "size"),
    [(("us_fcc",), (612, 792)), (("us_fcc", "icnirp_2020"), (595.28, 841.89)), ((), (595.28, 841.89))],
)
def test_paper_is_letter_for_limits_of_the_usa_alone(limits, size):
    """ISO 216 A4 is 210 mm x 297 mm; ANSI letter is 8.5 in x 11 in; a point is 1/72 in."""
    infos = tuple(LimitInfo(name, name, "2020") for name in limits)

    box = report(assessment(limits=infos)).pages[0].mediabox

    assert (float(box.width), float(box.height)) == pytest.approx(size, abs=0.01)


def test_pages_are_counted_and_few():
    reader = report(drawn=[picture()])
    count = len(reader.pages)

    assert 4 <= count <= 9
    for number, page in enumerate(reader.pages, 1):
        assert f"page {number} of {count}" in " ".join(page.extract_text().split())


def test_every_section_has_a_bookmark_and_numbers_run():
    found = bookmarks(report())

    assert [int(name.split(".")[0]) for name in found[1:]] == list(range(1, len(found)))
    assert found[-2:] == [f"{len(found) - 2}. Validity and signature", f"{len(found) - 1}. Input"]


WRITE_IN_ANOTHER_PROCESS = """
import sys
from exposure.outputs.report import report_pdf
from tests.exposure.test_report import assessment, picture
sys.stdout.buffer.write(report_pdf(assessment(), (picture(),)))
"""


def test_the_same_assessment_gives_the_same_bytes_in_any_process():
    written = [
        subprocess.run(
            [sys.executable, "-c", WRITE_IN_ANOTHER_PROCESS],
            env={"PYTHONHASHSEED": seed, "PATH": "", "TZ": zone},
            capture_output=True,
            check=True,
        ).stdout
        for seed, zone in (("1", "UTC"), ("2", "Asia/Tokyo"))
    ]

    assert len(written[0]) > 10_000
    assert zlib.crc32(written[0]) == zlib.crc32(written[1])
    assert written[0] == written[1]


def test_the_report_can_be_made_from_the_result_file_alone(tmp_path):
    """Whole and half numbers lose nothing in the file, so that even the bytes are the same."""
    write_result(assessment(), tmp_path / "assessment.json")

    again = read_result(tmp_path / "assessment.json")

    assert report_pdf(again, ()) == report_pdf(assessment(), ())


def test_a_report_appears_whole_or_not_at_all(tmp_path):
    with pytest.raises(ExposureError, match="cannot be written"):
        write_report(assessment(), tmp_path / "missing" / "report.pdf")

    write_report(assessment(), tmp_path / "report.pdf")

    assert [path.name for path in tmp_path.iterdir()] == ["report.pdf"]
    assert (tmp_path / "report.pdf").read_bytes().startswith(b"%PDF-1")
