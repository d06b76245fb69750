"""The whole chain from a site to its assessment, with real solutions of small stations."""

import dataclasses
import math

import numpy as np
import pytest
import shapely

from exposure.assessment.assess import assess
from exposure.errors import ExposureError
from exposure.limits import reference_levels
from exposure.site.site_file import read_site
from exposure.station.powers import powers
from exposure.station.sources import source
from tests.exposure.stations import FENCE, STATION, changed

LINE = '[transmission.line]\ncable = "RG-213"\nlength_m = 20\n'
AREA = STATION[STATION.index("[[area]]") :]
PROPERTY = "[property]\ncorners_m = [[-15, -20], [15, -20], [15, 20], [-15, 20]]\n"
STRONG = changed('transmitter_power_w = 100\nmode = "ssb"', 'transmitter_power_w = 1500\nmode = "carrier"')
LOW = changed("height_m = 9.1", "height_m = 3", STRONG)


@pytest.fixture(scope="module")
def assessed(tmp_path_factory):
    """Assessments of texts, each made once."""
    known = {}

    def of(text):
        if text not in known:
            path = tmp_path_factory.mktemp("site") / "site.toml"
            path.write_text(text)
            site = read_site(path)
            known[text] = (site, assess(site))
        return known[text]

    return of


def test_a_quiet_dipole_far_from_everybody_is_within_limits_with_every_check_passed(assessed):
    """100 W SSB at 20 % and a third of the time, 18 m from the house: far below every level."""
    _, found = assessed(STATION)

    assert found.verdict == "within limits"
    assert all(t.quality.passed for t in found.transmissions)
    assert all(r.upper_bound_ratio < 0.01 for area in found.areas for r in area.results)
    assert found.property.inside is True


def test_the_ratio_of_an_area_is_that_of_its_place_from_levels_powers_and_fields(assessed):
    """Another road: the same number by hand from the public functions, at the reported place.

    Both are evaluated by the same source; only rounding of the place to a micrometre is between them.
    """
    site, found = assessed(STATION)
    transmission = site.transmissions[0]
    power = powers(transmission)
    for result in found.areas[0].results:
        values = source(transmission, site).squared_strengths([result.position_m])[0]
        levels = reference_levels(result.limits, "general_public", transmission.frequency)
        by_hand = max(
            power.averaged(level.averaging_time_s)
            * max(values[0] / level.electric**2, values[1] / level.magnetic**2)
            for level in levels
        )
        assert result.exposure_ratio == pytest.approx(by_hand, rel=1e-3)
        assert result.upper_bound_ratio > result.exposure_ratio


def test_no_place_of_the_area_exceeds_the_reported_maximum(assessed):
    """A grid of 9 x 9 x 5 against the search, which may be 0.5 % low (areas.TOLERANCE)."""
    site, found = assessed(STATION)
    result = found.areas[0].results[0]
    axes = np.linspace(18, 26, 9), np.linspace(-4, 4, 9), np.linspace(2.8, 4.8, 5)
    grid = np.stack(np.meshgrid(*axes), axis=-1).reshape(-1, 3)
    level = reference_levels("us_fcc", "general_public", 14.2e6)[0]

    values = source(site.transmissions[0], site).squared_strengths(grid)
    power = powers(site.transmissions[0]).averaged(level.averaging_time_s)
    ratios = power * np.maximum(values[:, 0] / level.electric**2, values[:, 1] / level.magnetic**2)

    assert ratios.max() <= result.exposure_ratio * 1.005


def test_twice_the_power_gives_twice_the_ratio(assessed):
    """Heating at 14 MHz; design, section 5: proportional to power."""
    double = changed("transmitter_power_w = 100", "transmitter_power_w = 200")

    once, twice = (assessed(text)[1].areas[0].results for text in (STATION, double))

    for one, other in zip(once, twice, strict=True):
        assert other.exposure_ratio == pytest.approx(2 * one.exposure_ratio, rel=0.005)  # areas.TOLERANCE


def test_an_area_through_which_the_antenna_passes_exceeds_limits(assessed):
    through = changed("[[18, -4], [26, -4], [26, 4], [18, 4]]", "[[-3, -4], [3, -4], [3, 4], [-3, 4]]")
    through = through.replace("bottom_m = 2.8", "bottom_m = 9.0").replace("top_m = 4.8", "top_m = 9.3")

    _, found = assessed(through)

    assert found.verdict == "exceeds limits"
    assert all(result.verdict == "exceeds limits" for result in found.areas[0].results)
    assert found.conditions == ()


def test_a_zone_on_the_own_ground_is_a_condition_and_stays_inside_the_property(assessed):
    """1500 W all the time on a dipole 3 m high: the zone reaches the ground below it."""
    site, found = assessed(LOW)
    standing = [b for b in found.boundaries if b.height_m is None and b.section is None]

    assert found.verdict == "within limits"
    assert any("nobody enters the drawn zone" in text for text in found.conditions)
    assert found.property.inside is True and found.property.least_margin_m > 0
    assert any(b.polygons for b in standing)
    plot = shapely.Polygon(site.property_corners)
    assert all(plot.contains(shapely.Polygon(p.outline)) for b in standing for p in b.polygons)


def test_the_margin_is_the_distance_from_the_zone_to_the_property_line(assessed):
    """The judged zone is a little larger than the drawn one: numerical error, and 1 % of its reach."""
    site, found = assessed(LOW)
    standing = [b for b in found.boundaries if b.height_m is None and b.section is None]
    line = shapely.Polygon(site.property_corners).exterior
    drawn = min(shapely.Polygon(p.outline).distance(line) for b in standing for p in b.polygons)

    assert drawn - 0.15 < found.property.least_margin_m <= drawn


def test_a_zone_that_leaves_the_property_exceeds_limits(assessed):
    """The wire's ends are 5.05 m from its middle; the property ends at 4 m."""
    small = LOW.replace(
        "[[-15, -20], [15, -20], [15, 20], [-15, 20]]", "[[-4, -20], [4, -20], [4, 20], [-4, 20]]"
    )

    _, found = assessed(small)

    assert found.verdict == "exceeds limits"
    assert found.property.inside is False and found.property.least_margin_m < -1


def test_compliance_distance_is_where_the_ratio_is_one(assessed):
    """At every point 3 % farther from the straight wire the ratio is below one: 1200 of them around it.

    3 %: the distance is found to 1 % of it or better; a pair of other lobes is known to a few percent.
    """
    site, found = assessed(LOW)
    transmission = site.transmissions[0]
    level = reference_levels("us_fcc", "general_public", 14.2e6)[0]
    power = powers(transmission).averaged(level.averaging_time_s)
    distance = next(r for r in found.transmissions[0].results if r.limits == "us_fcc").compliance_distance_m
    t = np.linspace(-5.05, 5.05, 40)
    a = np.linspace(0, 2 * np.pi, 30)
    around = np.stack(
        [
            np.repeat(t, 30),
            1.03 * distance * np.tile(np.cos(a), 40),
            3 + 1.03 * distance * np.tile(np.sin(a), 40),
        ],
        axis=-1,
    )

    values = source(transmission, site).squared_strengths(around[around[:, 2] >= 0])
    ratios = power * np.maximum(values[:, 0] / level.electric**2, values[:, 1] / level.magnetic**2)

    assert 0.5 < ratios.max() < 1


def test_without_areas_and_property_nothing_can_be_decided(assessed):
    bare = STATION.replace(PROPERTY, "").replace(AREA, "")

    _, found = assessed(bare)

    assert found.verdict == "cannot be decided"
    assert any("nothing to judge" in text for text in found.reasons)


def test_a_frequency_outside_a_document_cannot_be_decided(assessed):
    """0.2 MHz: ICNIRP 2020 has levels, the US rule has none; very little power, so that nothing exceeds."""
    low = STATION.replace("14.2", "0.2").replace("transmitter_power_w = 100", "transmitter_power_w = 1e-9")

    _, found = assessed(low.replace(LINE, ""))

    by_limits = {r.limits: r.verdict for r in found.areas[0].results}
    assert by_limits["us_fcc"] == "cannot be decided"
    assert found.verdict == "cannot be decided"
    assert any("0.3 MHz" in text for text in found.reasons)


def test_transmissions_that_exclude_each_other_do_not_add(assessed):
    """The same transmission twice: twice the ratio, or once where both share a word."""
    second = STATION[STATION.index("[[transmission]]") : STATION.index("[[area]]")].replace("voice", "again")
    free = STATION.replace("[[area]]", second + "[[area]]")
    bound = free.replace(
        'antenna = "garden dipole"\nfreq', 'antenna = "garden dipole"\nexclusive = "one"\nfreq'
    )
    only_fcc = '["us_fcc", "icnirp_2020"]', '["us_fcc"]'

    one, two, either = (assessed(text.replace(*only_fcc))[1] for text in (STATION, free, bound))

    ratio = one.areas[0].results[0].exposure_ratio
    assert two.areas[0].results[0].exposure_ratio == pytest.approx(2 * ratio, rel=0.005)
    assert either.areas[0].results[0].exposure_ratio == pytest.approx(ratio, rel=0.005)
    assert [s.transmission for s in two.areas[0].results[0].shares] == ["voice", "again"]


def test_occupational_areas_are_judged_by_occupational_levels_and_are_a_condition(assessed):
    worker = changed('population = "general_public"', 'population = "occupational"\ninformed = "A, 2026"')

    _, found = assessed(worker)

    public = assessed(STATION)[1].areas[0].results[0].exposure_ratio
    # 47 CFR 1.1310 at 14.2 MHz: (1842/824)^2 in E, (4.89/2.19)^2 in H; averaging 6 and 30 min alike here
    assert found.areas[0].results[0].exposure_ratio == pytest.approx(public * (824 / 1842) ** 2, rel=0.005)
    assert any("A, 2026" in text for text in found.conditions)


def test_every_number_of_an_assessment_is_finite(assessed):
    """Design, section 6: unknown is null."""
    for text in (STATION, LOW):
        for value in _numbers(dataclasses.asdict(assessed(text)[1])):
            assert math.isfinite(value)


def test_the_same_site_gives_the_same_assessment(assessed):
    site, found = assessed(STATION)

    assert assess(site) == found


def test_a_fence_on_the_property_line_is_no_reason_to_exceed(assessed):
    """The fence stands on the line; the fields at its side are far below the levels."""
    _, found = assessed(STATION + FENCE)

    assert found.verdict == "within limits"
    assert {c.owner for c in found.conductors} == {"garden dipole", "fence"}


def test_metal_that_crosses_the_antenna_is_told_in_the_operators_words(tmp_path):
    crossing = FENCE.replace("[[-15, 20, 1.2], [15, 20, 1.2]]", "[[0.3, -3, 9.1], [0.3, 3, 9.1]]")
    path = tmp_path / "site.toml"
    path.write_text(STATION + crossing)

    with pytest.raises(ExposureError, match="garden dipole"):
        assess(read_site(path))


def test_progress_is_told_in_words(tmp_path):
    path = tmp_path / "site.toml"
    path.write_text(STATION)
    told = []

    assess(read_site(path), told.append)

    assert any("garden dipole" in line for line in told) and any("bedroom" in line for line in told)


def _numbers(value):
    if isinstance(value, dict):
        value = list(value.values())
    if isinstance(value, (list, tuple)):
        for part in value:
            yield from _numbers(part)
    elif isinstance(value, float):
        yield value
