"""ICNIRP 2020, Tables 5 and 6 (Health Physics 118 (2020) 483) and the nerve stimulation levels up to
10 MHz (values of ICNIRP 2010, Health Physics 99 (2010) 818, Tables 3 and 4; the number of the table that
carries them in 2020 is from memory)."""

import pytest

from exposure import OutOfScopeError, reference_levels

WHOLE_BODY = {
    "general_public": [
        # MHz    E V/m            H A/m          S W/m2
        (0.1, 300 / 0.1**0.7, 2.2 / 0.1, None),
        (7.1, 300 / 7.1**0.7, 2.2 / 7.1, None),
        (30.0, 300 / 30**0.7, 2.2 / 30, None),
        (30.001, 27.7, 0.073, 2),
        (400.0, 27.7, 0.073, 2),
        (400.001, 1.375 * 400.001**0.5, 0.0037 * 400.001**0.5, 400.001 / 200),
        (900.0, 1.375 * 30, 0.0037 * 30, 4.5),
        (2000.0, 1.375 * 2000**0.5, 0.0037 * 2000**0.5, 10),
        (2000.001, None, None, 10),
        (300_000.0, None, None, 10),
    ],
    "occupational": [
        (0.1, 660 / 0.1**0.7, 4.9 / 0.1, None),
        (7.1, 660 / 7.1**0.7, 4.9 / 7.1, None),
        (30.0, 660 / 30**0.7, 4.9 / 30, None),
        (30.001, 61, 0.16, 10),
        (400.0, 61, 0.16, 10),
        (900.0, 3 * 30, 0.008 * 30, 22.5),
        (2000.0, 3 * 2000**0.5, 0.008 * 2000**0.5, 50),
        (2000.001, None, None, 50),
        (300_000.0, None, None, 50),
    ],
}
LOCAL = {
    "general_public": [
        (0.1, 671 / 0.1**0.7, 4.9 / 0.1, None),
        (30.0, 671 / 30**0.7, 4.9 / 30, None),
        (30.001, 62, 0.163, 10),
        (400.0, 62, 0.163, 10),
        (900.0, 4.72 * 900**0.43, 0.0123 * 900**0.43, 0.058 * 900**0.86),
        (2000.0, 4.72 * 2000**0.43, 0.0123 * 2000**0.43, 0.058 * 2000**0.86),
        (2000.001, None, None, 40),
        (6000.0, None, None, 40),
        (10_000.0, None, None, 55 / 10**0.177),
        (300_000.0, None, None, 20),
    ],
    "occupational": [
        (0.1, 1504 / 0.1**0.7, 10.8 / 0.1, None),
        (30.0, 1504 / 30**0.7, 10.8 / 30, None),
        (30.001, 139, 0.36, 50),
        (400.0, 139, 0.36, 50),
        (900.0, 10.58 * 900**0.43, 0.0274 * 900**0.43, 0.29 * 900**0.86),
        (2000.001, None, None, 200),
        (6000.0, None, None, 200),
        (10_000.0, None, None, 275 / 10**0.177),
        (300_000.0, None, None, 100),
    ],
}


def cases(table):
    return [(population, *row) for population, rows in table.items() for row in rows]


def the(population, megahertz, scope):
    (level,) = (
        level
        for level in reference_levels("icnirp_2020", population, megahertz * 1e6)
        if level.scope == scope
    )
    return level


def same(found, printed):
    assert found is None if printed is None else found == pytest.approx(printed, rel=1e-9)


@pytest.mark.parametrize("population, megahertz, electric, magnetic, density", cases(WHOLE_BODY))
def test_every_cell_of_table_5(population, megahertz, electric, magnetic, density):
    """Whole body, 30 minutes, mean over the body; the lower end of each range belongs to the row below."""
    level = the(population, megahertz, "whole_body")

    same(level.electric, electric)
    same(level.magnetic, magnetic)
    same(level.power_density, density)
    assert (level.effect, level.spatial, level.averaging_time_s) == ("heating", "mean", 1800)


@pytest.mark.parametrize("population, megahertz, electric, magnetic, density", cases(LOCAL))
def test_every_cell_of_table_6(population, megahertz, electric, magnetic, density):
    """Local, 6 minutes, spatial peak."""
    level = the(population, megahertz, "local")

    same(level.electric, electric)
    same(level.magnetic, magnetic)
    same(level.power_density, density)
    assert (level.effect, level.spatial, level.averaging_time_s) == ("heating", "peak", 360)


@pytest.mark.parametrize(
    "population, electric, magnetic", [("general_public", 83, 21), ("occupational", 170, 80)]
)
@pytest.mark.parametrize("megahertz", [0.1, 3.5, 10.0])
def test_nerve_stimulation_up_to_10_mhz(population, electric, magnetic, megahertz):
    """rms, spatial peak, no time averaging: peak envelope power counts."""
    level = the(population, megahertz, "any")

    assert (level.effect, level.electric, level.magnetic) == ("stimulation", electric, magnetic)
    assert (level.spatial, level.averaging_time_s) == ("peak", 0)


def test_above_10_mhz_there_is_no_stimulation_level():
    levels = reference_levels("icnirp_2020", "general_public", 10.001e6)

    assert [level.effect for level in levels] == ["heating", "heating"]


@pytest.mark.parametrize("population", ["general_public", "occupational"])
@pytest.mark.parametrize("megahertz", [1.0, 20.0, 100.0])
def test_whole_body_and_local_fields_differ_by_the_root_of_five(population, megahertz):
    """Table 6 is Table 5 times sqrt(5) below 400 MHz within print, 2.5 %."""
    whole, local = the(population, megahertz, "whole_body"), the(population, megahertz, "local")

    assert local.electric / whole.electric == pytest.approx(5**0.5, rel=0.025)
    assert local.magnetic / whole.magnetic == pytest.approx(5**0.5, rel=0.025)


@pytest.mark.parametrize("megahertz", [0.0999, 300_001.0])
def test_outside_the_tables_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="icnirp_2020"):
        reference_levels("icnirp_2020", "general_public", megahertz * 1e6)


def test_an_unknown_document_or_population_is_refused_by_name():
    with pytest.raises(OutOfScopeError, match="known are us_fcc, icnirp_1998"):
        reference_levels("no_such", "general_public", 1e7)
    with pytest.raises(OutOfScopeError, match="general_public, occupational"):
        reference_levels("us_fcc", "visitors", 1e7)


def test_a_burst_below_the_local_level_is_below_the_limit_of_brief_exposure():
    """Table 7 (from memory): U(t) = S_L 360 (0.05 + 0.95 sqrt(t/360)) is at least S_L t for t up to 360 s."""
    for t in range(1, 361):
        assert 360 * (0.05 + 0.95 * (t / 360) ** 0.5) >= t - 1e-9
