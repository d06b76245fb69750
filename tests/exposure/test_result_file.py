"""The result file and the map file."""

import json
import math
from dataclasses import replace

import pytest
from shapely.geometry import shape

from exposure.assessment.model import (
    Assessment,
    Boundary,
    LimitInfo,
    Polygon,
    QualityInfo,
    SiteInfo,
    Software,
    TransmissionFinding,
)
from exposure.errors import ExposureError
from exposure.outputs.geojson import boundaries_geojson
from exposure.outputs.result_file import dumps, read_result, write_geojson, write_result

SQUARE = ((0.0, 0.0), (0.0, 10.0), (10.0, 10.0), (10.0, 0.0))
HOLE = ((4.0, 4.0), (6.0, 4.0), (6.0, 6.0), (4.0, 6.0))


def assessment(**changes) -> Assessment:
    finding = TransmissionFinding(
        name="voice",
        antenna="dipole",
        frequency_hz=14.2e6,
        peak_power_w=100.0,
        line_loss_db=0.5,
        accepted_power_w=89.125093813,
        average_powers=(),
        feed_impedances_ohm=((73.1234567891, -3.0),),
        unknowns=19,
        quality=QualityInfo(1e-7, 0.15, math.inf, False, "the mesh was not compared"),
        results=(),
    )
    boundary = Boundary("us_fcc", "general_public", "all", 5.0, None, (Polygon(SQUARE, (HOLE,)),))
    whole = Assessment(
        site=SiteInfo("lot", "lot.toml", "0" * 64, place_deg=(47.4, 11.9)),
        software=Software("exposure", "0.1.0"),
        limits=(LimitInfo("us_fcc", "FCC", "2020"),),
        verdict="cannot be decided",
        reasons=("because",),
        conditions=(),
        transmissions=(finding,),
        areas=(),
        property=None,
        boundaries=(boundary, replace(boundary, height_m=None, polygons=())),
        warnings=(),
    )
    return replace(whole, **changes)


def test_a_result_survives_the_file_to_nine_digits(tmp_path):
    path = tmp_path / "assessment.json"
    write_result(assessment(), path)

    found = read_result(path)

    assert found.transmissions[0].feed_impedances_ohm == ((73.1234568, -3.0),)
    assert found.boundaries == assessment().boundaries
    assert found.site == assessment().site
    assert dumps(found) == path.read_text()


def test_numbers_in_the_file_are_finite(tmp_path):
    """JSON has no infinity (RFC 8259, section 6); what is unknown is null."""
    text = dumps(assessment())

    assert json.loads(text)["transmissions"][0]["quality"]["mesh_change"] is None
    assert "Infinity" not in text and "NaN" not in text


def test_the_core_keys_are_those_of_the_published_format():
    """docs/result-file.md."""
    keys = set(json.loads(dumps(assessment())))

    assert keys >= {
        *(
            "format",
            "site",
            "software",
            "limits",
            "verdict",
            "reasons",
            "conditions",
            "transmissions",
            "areas",
        ),
        *("property", "boundaries", "warnings"),
    }


@pytest.mark.parametrize(
    "text, words",
    [
        ("{", "is not a result file"),
        ("[]", "format is None"),
        ('{"format": "exposure-assessment/2"}', "exposure-assessment/1"),
        ('{"format": "exposure-assessment/1"}', "assessment.site is missing"),
    ],
)
def test_another_file_is_refused_in_one_sentence(tmp_path, text, words):
    path = tmp_path / "other.json"
    path.write_text(text)

    with pytest.raises(ExposureError, match=words):
        read_result(path)


def test_a_value_of_the_wrong_kind_is_named_by_its_place(tmp_path):
    found = json.loads(dumps(assessment()))
    found["transmissions"][0]["frequency_hz"] = "high"
    path = tmp_path / "broken.json"
    path.write_text(json.dumps(found))

    with pytest.raises(ExposureError, match=r"transmissions\[0\].frequency_hz is 'high', not a number"):
        read_result(path)


def test_a_file_that_is_not_there_is_said_to_be_so(tmp_path):
    with pytest.raises(ExposureError, match="cannot be read: No such file"):
        read_result(tmp_path / "nothing.json")


def test_ten_metres_are_the_right_fraction_of_a_degree():
    """A minute of latitude is a nautical mile (1852 m) to 0.5 %; of longitude that times cos(latitude)."""
    (feature, _) = boundaries_geojson(assessment())["features"]
    west, south, east, north = shape(feature["geometry"]).bounds

    assert (west, south) == (11.9, 47.4)
    assert (north - south) * 60 * 1852 == pytest.approx(10, rel=0.005)
    assert (east - west) * 60 * 1852 * math.cos(math.radians(47.4)) == pytest.approx(10, rel=0.005)


def test_rings_turn_by_the_right_hand_rule():
    """RFC 7946, section 3.1.6: outside anticlockwise, holes clockwise, first point repeated."""
    (feature, empty) = boundaries_geojson(assessment())["features"]
    polygon = shape(feature["geometry"]).geoms[0]

    assert polygon.is_valid and polygon.exterior.is_ccw and not polygon.interiors[0].is_ccw
    assert empty["geometry"]["coordinates"] == [] and empty["properties"]["height_m"] is None


def test_a_map_without_a_place_or_too_large_is_refused(tmp_path):
    lost = assessment(site=replace(assessment().site, place_deg=None))
    with pytest.raises(ExposureError, match="no \\[place\\]"):
        write_geojson(lost, tmp_path / "map.geojson")
    far = Boundary(
        "us_fcc",
        "general_public",
        "all",
        5.0,
        None,
        (
            Polygon(
                ((0, 0), (2000, 0), (0, 1)),
            ),
        ),
    )
    with pytest.raises(ExposureError, match="2000 m from"):
        write_geojson(assessment(boundaries=(far,)), tmp_path / "map.geojson")
    assert not list(tmp_path.iterdir())
