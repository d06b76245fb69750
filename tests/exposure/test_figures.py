"""Drawings: to scale, readable without colour, the same in every run, and never silent about what is unknown.

The station is invented: no field is computed, so every expected number follows from its corners.
"""

import dataclasses
import hashlib
import os
import pathlib
import subprocess
import sys
from functools import cache
from io import BytesIO
from itertools import combinations

import matplotlib
import numpy as np
import pytest
import shapely
from matplotlib.backends.backend_agg import FigureCanvasAgg
from matplotlib.lines import Line2D
from matplotlib.patches import PathPatch
from pypdf import PdfReader

from exposure.assessment.model import (
    AreaFinding,
    AreaResult,
    Assessment,
    AveragePower,
    Boundary,
    Conductor,
    LevelInfo,
    LimitInfo,
    Polygon,
    PropertyFinding,
    QualityInfo,
    SiteInfo,
    Software,
    TransmissionFinding,
    TransmissionResult,
)
from exposure.outputs import figures
from exposure.outputs.drawing_map import TALLEST, WIDTH, scale_bar
from exposure.outputs.drawing_paper import Paper
from exposure.outputs.drawing_words import farthest

PUBLIC, WORKERS = "general_public", "occupational"
MM = 1 / 25.4
ZONE = ((7.1, 0.0), (-3.0, 1.0), (-3.0, -1.0))  # reaches 7.1 m east; covers 10.1 m2


def _area(name, corners, ratio, population=PUBLIC, heights=(0.0, 2.0)):
    verdict = "cannot be decided" if ratio is None else "exceeds limits" if ratio > 1 else "within limits"
    result = AreaResult("us_fcc", ratio, None, ratio, None, None, None, None, verdict)
    return AreaFinding(name, population, corners, *heights, (result,))


def _transmission(number, setback=3.0, passed=True):
    results = tuple(
        TransmissionResult("us_fcc", population, 3.0, setback) for population in (PUBLIC, WORKERS)
    )
    powers = (AveragePower(360.0, 40.0), AveragePower(1800.0, 30.0))
    quality = QualityInfo(0.001, 0.01, 0.001, passed)
    return TransmissionFinding(
        f"band {number} $x_1$", "wire", 14.2e6, 100.0, 0.5, 90.0, powers, ((50.0, 0.0),), 99, quality, results
    )


def _boundaries(population, shrunk):
    polygon = Polygon(tuple((shrunk * x, shrunk * y) for x, y in ZONE))
    side = Polygon(tuple((shrunk * x, 5 + shrunk * y) for x, y in ZONE))
    plane = {"section_origin_m": (0.0, 0.0), "section_bearing_deg": 90.0}
    return (
        Boundary("us_fcc", population, "all", None, None, (polygon,)),
        Boundary("us_fcc", population, "all", 2.5, None, ()),
        Boundary("us_fcc", population, "all", 5.0, None, (polygon,)),
        Boundary("us_fcc", population, "all", None, "along wire", (side,), **plane),
        Boundary("us_fcc", population, "band 1", None, None, (side,)),
    )


def station(**changes) -> Assessment:
    """A wire over a garden of 24 by 20 m, with a house, a window and a roof for workers."""
    level = LevelInfo(
        "us_fcc", PUBLIC, 14.2e6, "heating", "any", "peak", 58.0, 0.15, None, 1800.0, "Table 1", True
    )
    worker = dataclasses.replace(level, population=WORKERS, averaging_time_s=360.0, clause="Table 2")
    square = ((8.0, 2.0), (12.0, 2.0), (12.0, 6.0), (8.0, 6.0))
    whole = Assessment(
        site=SiteInfo("Invented garden", "garden.toml", "0" * 64),
        software=Software("exposure", "1"),
        limits=(LimitInfo("us_fcc", "Limits", "2020"),),
        verdict="within limits",
        reasons=(),
        conditions=(),
        transmissions=(_transmission(1), _transmission(2)),
        areas=(
            _area("house", square, 0.2),
            _area("house, upper floor", square, 0.4, heights=(2.5, 5.0)),
            _area("window", ((-4.0, -3.0),), 1.7, heights=(1.5, 1.5)),
            _area("roof", ((-9.0, -6.0), (-6.0, -6.0), (-6.0, -4.0), (-9.0, -4.0)), 0.3, WORKERS),
        ),
        property=PropertyFinding(
            ((-12.0, -10.0), (12.0, -10.0), (12.0, 10.0), (-12.0, 10.0)), True, True, 4.9
        ),
        boundaries=(*_boundaries(PUBLIC, 1.0), *_boundaries(WORKERS, 0.5)),
        warnings=(),
        levels=(level, worker),
        conductors=(
            Conductor("wire", "antenna", ((-3.0, 0.0, 5.0), (3.0, 0.0, 5.0)), 0.001),
            Conductor("wire", "feed line", ((0.0, 0.0, 5.0), (0.0, 0.0, 0.1)), 0.003),
            Conductor("gutter", "structure", ((8.0, 2.0, 4.0), (8.0, 6.0, 4.0)), 0.05),
        ),
    )
    return dataclasses.replace(whole, **changes)


@cache
def crowded() -> Assessment:
    """Forty areas and twenty transmissions: more than a key can hold."""
    corners = [(-20.0 + 5 * (n % 8), -12.0 + 6 * (n // 8)) for n in range(40)]
    areas = tuple(
        _area(
            f"place {n} that has a rather long name",
            ((x, y), (x + 3, y), (x + 3, y + 3), (x, y + 3)),
            10.0 ** (n % 7 - 5),
        )
        for n, (x, y) in enumerate(corners)
    )
    return station(areas=areas, transmissions=tuple(_transmission(n) for n in range(20)))


@cache
def drawn_crowded():
    """Its drawings, made once."""
    return figures.figures(crowded())


def drawing(assessment: Assessment, name: str):
    """The drawing of that name."""
    return next(d for d in figures.figures(assessment) if d.name == name)


def texts(d) -> list[str]:
    """All words of a drawing."""
    return [text.get_text() for text in d.figure.texts]


def patches(figure):
    """Filled and hatched shapes and their outlines."""
    return [artist for artist in figure.artists if isinstance(artist, PathPatch)]


def hatched(figure) -> int:
    """How many shapes are hatched."""
    return sum(bool(patch.get_hatch()) for patch in patches(figure))


def digest() -> str:
    """A hash of every byte that is written of every drawing."""
    found = hashlib.sha256()
    for d in figures.figures(station()):
        for content in (figures.svg_bytes, figures.png_bytes, figures.pdf_bytes):
            found.update(content(d))
    return found.hexdigest()


def test_plans_sections_and_chart_of_every_population_with_areas():
    names = [d.name for d in figures.figures(station())]
    assert names == [
        "plan-us_fcc-general_public",
        "section-a-us_fcc-general_public",
        "plan-us_fcc-occupational",
        "section-a-us_fcc-occupational",
        "areas",
    ]


def test_populations_without_areas_are_left_out_but_for_the_general_public():
    names = [d.name for d in figures.figures(station(areas=()))]
    assert names == ["plan-us_fcc-general_public", "section-a-us_fcc-general_public"]


def test_two_processes_with_different_hash_seeds_write_the_same_bytes():
    command = [sys.executable, "-c", "import tests.exposure.test_figures as t; print(t.digest())"]
    root = pathlib.Path(__file__).parents[2]
    results = {
        subprocess.run(
            command,
            cwd=root,
            env={**os.environ, "PYTHONHASHSEED": seed},
            capture_output=True,
            text=True,
            check=True,
        ).stdout
        for seed in ("1", "2")
    }
    assert len(results) == 1


def test_a_bar_of_10_m_measures_50_mm_at_1_to_200():
    paper = Paper(WIDTH, 20.0)
    length = scale_bar(paper, 5.0, 200)
    box = np.vstack([patch.get_path().vertices for patch in patches(paper.figure)])
    assert length == 10.0
    assert np.ptp(box[:, 0]) == pytest.approx(50.0, rel=1e-12)  # rounding of floats alone


@pytest.mark.parametrize("name", ["plan-us_fcc-general_public", "section-a-us_fcc-general_public"])
def test_lengths_on_paper_are_those_of_the_scale(name):
    """The wire of 6 m, through the transform to pixels; the key's sample has 10 mm."""
    d = drawing(station(), name)
    d.figure.set_dpi(100)
    lines = [a for a in d.figure.artists if isinstance(a, Line2D) and a.get_linewidth() == 2.2]
    widths = sorted(np.ptp(line.get_transform().transform(line.get_xydata())[:, 0]) for line in lines)
    assert np.array(widths) / 100 / MM == pytest.approx(sorted([6000 / d.scale, 10.0]), rel=1e-9)
    assert d.scale in (50, 100, 200, 250, 500, 1000)


def test_size_of_figure_is_that_of_the_drawing():
    for d in figures.figures(station()):
        assert d.figure.get_size_inches() == pytest.approx((d.width_mm * MM, d.height_mm * MM), rel=1e-12)
        page = PdfReader(BytesIO(figures.pdf_bytes(d))).pages[0]
        # the backend writes the page box with two decimals of a point or better
        assert float(page.mediabox.width) == pytest.approx(d.width_mm * MM * 72, abs=0.01)


def test_every_plan_has_scale_bar_north_labels_and_powers():
    for name in ("plan-us_fcc-general_public", "plan-us_fcc-occupational"):
        d = drawing(station(), name)
        words = texts(d)
        assert "N" in words and "wire" in words and "gutter" in words and "property line" in words
        assert any(f"1:{d.scale}" in text for text in words)
        assert {"1", "2", "3", "4", "A", "A'"} <= set(words)
        assert "limit at 0-2 m up" in words and "limit at 5 m up" in words
        assert any("14.2 MHz" in text and "90 W" in text for text in words)
        assert any("reached nowhere at 2.5 m" in text for text in words)


def test_zones_are_told_apart_by_hatch_and_line_without_colour():
    looks = {}
    for population in (PUBLIC, WORKERS):
        for name in (f"plan-us_fcc-{population}", f"section-a-us_fcc-{population}"):
            shapes = patches(drawing(station(), name).figure)
            hatches = {shape.get_hatch() for shape in shapes if shape.get_hatch()}
            assert len(hatches) == 1
            styles = {str(p.get_linestyle()) for p in shapes if p.get_linewidth() == 1.6}
            looks.setdefault(population, set()).add((hatches.pop(), *sorted(styles)))
    assert len(looks[PUBLIC]) == len(looks[WORKERS]) == 1
    assert looks[PUBLIC].isdisjoint(looks[WORKERS])


def test_hatches_and_words_arrive_in_the_svg():
    svg = figures.svg_bytes(drawing(station(), "plan-us_fcc-general_public")).decode()
    assert "<pattern" in svg
    assert ">limit at 0-2 m up<" in svg
    assert "<dc:date>" not in svg


@pytest.mark.parametrize(
    "drawings", [figures.figures(station()), drawn_crowded()], ids=["station", "crowded"]
)
def test_no_words_overlap_and_all_are_on_the_paper(drawings):
    """Boxes from the renderer; half a pixel at 150 dpi is the rounding of its boxes."""
    with matplotlib.rc_context(figures.SETTINGS):
        for d in drawings:
            d.figure.set_dpi(150)
            renderer = FigureCanvasAgg(d.figure).get_renderer()
            boxes = [(t.get_text(), t.get_window_extent(renderer).padded(-0.5)) for t in d.figure.texts]
            for (one, a), (other, b) in combinations(boxes, 2):
                assert not a.overlaps(b), (d.name, one, other)
            for text, box in boxes:
                assert box.x0 >= 0 and box.y0 >= 0 and box.x1 <= d.width_mm * MM * 150, (d.name, text)
                assert box.y1 <= d.height_mm * MM * 150, (d.name, text)


def test_letters_are_no_smaller_than_seven_points():
    for d in drawn_crowded():
        assert min(text.get_fontsize() for text in d.figure.texts) >= 7


def test_crowded_drawings_fit_a_page_and_say_what_they_leave_out():
    drawings = drawn_crowded()
    assert max(d.height_mm for d in drawings) <= TALLEST
    plan = drawings[0]
    assert any("more, see the table of areas" in text for text in texts(plan))
    assert {str(n) for n in range(1, 41)} <= set(texts(plan))


def test_alternative_text_has_the_numbers_of_the_polygons():
    """By hand: the corner (7.1, 0) is due east; half of 10.1 m times 2 m is 10.1 m2."""
    alt = drawing(station(), "plan-us_fcc-general_public").alt
    assert "10.1 m²; largest extent 7.1 m towards 90 degrees" in alt
    assert "reached nowhere at 2.5 m" in alt
    assert "Area 3, window, 1.5 m: 1.7, exceeds limits." in alt
    section = drawing(station(), "section-a-us_fcc-general_public").alt
    assert "from -3.0 to 7.1 m along the plane and from 4.0 to 6.0 m above ground" in section


def test_the_farthest_corner_is_that_of_the_hausdorff_distance():
    """The Hausdorff distance from a point to a polygon's corners is the largest of their distances."""
    turned = shapely.Polygon([(-2.0, -9.0), (4.0, 1.0), (-5.0, 3.0)])
    distance, bearing = farthest(turned, np.array([1.0, 1.0]))
    corners = shapely.MultiPoint(turned.exterior.coords)
    assert distance == pytest.approx(shapely.hausdorff_distance(shapely.Point(1.0, 1.0), corners), rel=1e-12)
    assert bearing == pytest.approx(180 + np.degrees(np.arctan2(3.0, 10.0)), rel=1e-12)


def test_where_nothing_is_known_the_plan_says_so():
    bare = station(boundaries=())
    plan = drawing(bare, "plan-us_fcc-general_public")
    assert "No boundary is known for this limit: it cannot be decided where it is reached." in " ".join(
        texts(plan)
    )
    assert hatched(plan.figure) == 0
    assert "not known" in plan.alt


def test_a_zone_without_end_and_a_failed_solution_are_said_on_the_drawing():
    doubtful = station(transmissions=(_transmission(1, setback=None), _transmission(2, passed=False)))
    for name in ("plan-us_fcc-general_public", "section-a-us_fcc-general_public"):
        d = drawing(doubtful, name)
        words = " ".join(texts(d))
        assert "may reach farther than drawn" in words and "do not rely on the line" in words
        assert "may reach farther than drawn" in d.alt and "do not rely on the line" in d.alt


def test_an_unknown_ratio_has_no_bar():
    unknown = station(areas=(_area("shed", ((0.0, 0.0),), None),))
    chart = drawing(unknown, "areas")
    assert "cannot be decided" in texts(chart)
    known = drawing(station(areas=(_area("shed", ((0.0, 0.0),), 0.1),)), "areas")
    assert hatched(known.figure) == hatched(chart.figure) + 1  # the legend is hatched in both
    assert "limit" in texts(chart) and "0.1  within limits" not in texts(chart)


def test_nothing_to_draw_gives_no_figure():
    empty = station(boundaries=(), areas=(), conductors=(), property=None, transmissions=(), levels=())
    assert figures.figures(empty) == ()


def test_files_are_written_whole_beside_each_other(tmp_path):
    paths = figures.write_figures(station(), tmp_path / "figures")
    assert sorted(p.name for p in (tmp_path / "figures").iterdir()) == sorted(p.name for p in paths)
    assert {p.suffix for p in paths} == {".svg", ".png"}


def test_words_of_the_pdf_can_be_searched_and_no_picture_is_in_it():
    page = PdfReader(BytesIO(figures.pdf_bytes(drawing(station(), "plan-us_fcc-general_public")))).pages[0]
    words = page.extract_text()
    assert "limit at 0-2 m up" in words and "1:200" in words
    assert not page.images


def test_a_ratio_beside_the_limit_is_not_rounded_onto_it():
    almost = station(areas=(_area("path", ((0.0, 0.0),), 0.9996),))
    words = " ".join(texts(drawing(almost, "plan-us_fcc-general_public")))
    assert "0.9996, within limits" in words
    assert "0.9996" in drawing(almost, "areas").alt


def test_areas_beside_a_section_are_dashed_and_those_cut_are_not():
    """The plane runs east through the origin: the house (2 to 6 m north) is beside it, 12 m is too far."""
    beside = drawing(station(), "section-a-us_fcc-general_public")
    assert any("beside the plane" in text for text in texts(beside))
    square = ((8.0, -2.0), (12.0, -2.0), (12.0, 2.0), (8.0, 2.0))
    cut = station(areas=(_area("terrace", square, 0.1), _area("far", ((0.0, 12.0),), 0.1)))
    section = drawing(cut, "section-a-us_fcc-general_public")
    assert not any("beside the plane" in text for text in texts(section))
    assert "1" in texts(section) and "2" not in texts(section)
