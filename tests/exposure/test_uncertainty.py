"""Numerical uncertainty, and that no failed check becomes a pass."""

import numpy as np
import pytest

from exposure.assessment.assess import assess, assessment_of
from exposure.assessment.judged_areas import judged, searched
from exposure.assessment.rules import rule
from exposure.assessment.scene import Scene, own_rule, scene
from exposure.assessment.uncertainty import Numerics, mesh_change, other_mesh
from exposure.assessment.verdict import UNDECIDED, WITHIN
from exposure.site.site_file import read_site
from exposure.station.sources import Sources, solved
from tests.exposure.stations import STATION, changed


@pytest.fixture(scope="module")
def station(tmp_path_factory):
    path = tmp_path_factory.mktemp("site") / "site.toml"
    path.write_text(STATION)
    site = read_site(path)
    return scene(site, Sources(site), lambda text: None)


@pytest.mark.parametrize(
    ("balance", "change", "passed"),
    [
        (0.0, 0.0, True),
        (0.01, 0.01, True),
        (-0.0101, 0.0, False),
        (0.0101, 0.0, False),
        (0.0, 0.0101, False),
        (0.0, None, False),
        (float("nan"), 0.0, False),
        (0.0, float("nan"), False),
    ],
)
def test_quality_passes_within_one_percent_of_power_and_of_field(balance, change, passed):
    """Design, section 6; what is not known does not pass."""
    found = Numerics(balance, 0.1, change)

    assert found.passed is passed
    assert bool(found.objections()) is not passed


def test_first_order_convergence_leaves_three_times_the_change():
    """1/(1 - 1/1.5) = 3; twice in a squared field; then 1 % of power: 1.03^2 * 1.01."""
    assert Numerics(-0.01, 0.1, 0.01).factor == pytest.approx(1.03**2 * 1.01, rel=1e-12)


@pytest.mark.parametrize("doubt", ["powers do not balance", "fields move on a finer mesh"])
def test_an_area_far_below_every_level_is_not_within_limits_when_a_check_failed(station, doubt):
    found = searched(station, station.rules(), station.site.areas[0])

    trusted, doubted = (judged(station, found, 1.0, doubts) for doubts in ([], [doubt]))

    assert [r.verdict for r in trusted.results] == [WITHIN, WITHIN]
    assert [r.verdict for r in doubted.results] == [UNDECIDED, UNDECIDED]
    assert all(doubt in r.reason for r in doubted.results)


def test_an_area_is_not_within_limits_when_one_transmission_has_no_solution(station):
    unsolved = rule("us_fcc", "general_public", station.emissions, [("other", "no solution was found")])

    found = judged(station, searched(station, (unsolved,), station.site.areas[0]), 1.0, [])

    assert found.results[0].verdict == UNDECIDED
    assert "other: no solution was found" in found.results[0].reason


def test_a_station_without_any_solution_has_a_complete_assessment_that_decides_nothing(station):
    unsolved = Scene(station.site, (), (("voice", "no solution was found: singular"),))

    found = assessment_of(unsolved, Sources(station.site), lambda text: None)

    assert found.verdict == UNDECIDED
    assert found.property.inside is None
    assert any("singular" in text for text in found.reasons)
    assert found.transmissions[0].quality.passed is False


def test_an_area_whose_population_no_rule_covers_cannot_be_decided(station):
    workers = rule("us_fcc", "occupational", station.emissions)

    found = judged(station, searched(station, (workers,), station.site.areas[0]), 1.0, [])

    assert {r.verdict for r in found.results} == {UNDECIDED}
    assert found.results[0].exposure_ratio is None


def test_fields_near_the_wire_move_more_on_a_coarse_mesh_than_on_the_usual_one(station):
    """Half a metre below the wire's end; a third of the segments, an error of first order or more: thrice."""
    part = station.parts[0]
    points = np.array([[4.9, 0.0, 8.6]])
    rules = [own_rule(("us_fcc", "general_public"), part, part.transmissions[0])]

    usual, coarse = (
        mesh_change(source, rules, points, [np.zeros(1)])
        for source in (part.source, solved(part.source.model, 13.0))
    )

    assert 0 < usual < 0.05
    assert coarse > 3 * usual


def test_a_tube_too_thick_for_a_finer_mesh_is_compared_with_a_coarser_one(tmp_path):
    """A tube of 0.1 m radius and 10.1 m length has at most 50 segments of two radii; asked for 240."""
    path = tmp_path / "site.toml"
    path.write_text(changed("wire_radius_mm = 1.0", "wire_radius_mm = 100"))
    site = read_site(path)
    source = solved(Sources(site).model(site.transmissions[0]), 120.0)

    assert other_mesh(source).unknowns < source.unknowns


def test_an_assessment_near_a_wire_takes_a_finer_mesh_by_itself(tmp_path):
    """0.23 m below the end of the wire, where the usual segments of 0.5 m are too long."""
    near = changed(
        "[[18, -4], [26, -4], [26, 4], [18, 4]]", "[[4.6, -0.1], [5.2, -0.1], [5.2, 0.1], [4.6, 0.1]]"
    )
    near = near.replace("bottom_m = 2.8", "bottom_m = 8.5").replace("top_m = 4.8", "top_m = 8.87")
    path = tmp_path / "site.toml"
    path.write_text(near)

    found = assess(read_site(path)).transmissions[0]

    assert found.quality.passed and found.quality.mesh_change <= 0.01
    assert any("refined" in note for note in found.notes)
