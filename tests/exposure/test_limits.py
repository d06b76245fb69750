"""Rules of use of the limits, and the traps in them: each test's name says one.

Sources: the documents named; numbers as in tests/published.  f in MHz.
"""

import subprocess
import sys

import pytest

from exposure import OutOfScopeError, reference_levels
from exposure.limits import (
    DOCUMENTS,
    ceilings,
    document,
    not_limited,
    stimulation_sum_levels,
    usable_quantities,
)
from exposure.limits.use import zone

GENERAL, WORKER = "general_public", "occupational"
ETA = 376.730313668


def levels(limits, population, megahertz, effect="heating", scope="whole_body"):
    return [
        level
        for level in reference_levels(limits, population, megahertz * 1e6)
        if (level.effect, level.scope) == (effect, scope)
    ]


def the(*asked):
    (level,) = levels(*asked)
    return level


def populations():
    return [(limits, population) for limits in DOCUMENTS for population in document(limits).POPULATIONS]


# --- the sixteen documents


def test_the_sixteen_documents_in_order():
    assert DOCUMENTS == (
        "us_fcc",
        "icnirp_1998",
        "icnirp_2010",
        "icnirp_2020",
        "eu_1999_519",
        "eu_2013_35",
        "ieee_c95_1_2019",
        "ca_sc6_2015",
        "au_rps_s1_2021",
        "jp_mic",
        "uk_icnirp_1998",
        "uk_icnirp_2020",
        "de_26bimschv",
        "de_emfv_2016",
        "ch_nisv",
        "it_dpcm_2003",
    )


@pytest.mark.parametrize("limits", DOCUMENTS)
def test_a_document_says_what_it_is(limits):
    module = document(limits)

    assert module.TITLE and module.EDITION and module.REFERENCE and module.SUMMATION.clause
    assert module.USE.cautions and set(module.POPULATIONS) <= {GENERAL, WORKER}


@pytest.mark.parametrize("limits, population", populations())
@pytest.mark.parametrize("megahertz", [0.475, 1.9, 7.1, 28.5, 50.0, 146.0, 440.0, 1296.0, 5760.0, 24_000.0])
def test_every_level_has_a_clause_and_something_to_compare_with(limits, population, megahertz):
    for level in levels_or_none(limits, population, megahertz):
        values = [v for v in (level.electric, level.magnetic, level.power_density) if v is not None]
        assert level.clause and values and min(values) > 0


@pytest.mark.parametrize("limits", [l for l in DOCUMENTS if len(document(l).POPULATIONS) == 2])
@pytest.mark.parametrize("megahertz", [0.5, 3.7, 7.1])
def test_workers_never_have_the_lower_level(limits, megahertz):
    public, worker = (
        min(
            level.electric
            for level in reference_levels(limits, population, megahertz * 1e6)
            if level.electric is not None
        )
        for population in (GENERAL, WORKER)
    )

    assert public <= worker


def test_unknown_documents_and_populations_are_refused_by_name():
    with pytest.raises(OutOfScopeError, match="no limits called 'icnirp'"):
        reference_levels("icnirp", GENERAL, 7e6)
    with pytest.raises(OutOfScopeError, match="us_fcc has no levels for 'visitor'"):
        reference_levels("us_fcc", "visitor", 7e6)


# --- traps


def test_trap_1_fcc_density_is_in_watts_per_square_metre_and_of_a_plane_wave():
    """180/f^2 mW/cm2 is 1800/f^2 W/m2 = E^2/377 within print, 0.5 %."""
    level = the("us_fcc", GENERAL, 14.2)

    assert level.power_density == pytest.approx(1800 / 14.2**2, rel=1e-12)
    assert level.electric**2 / ETA == pytest.approx(level.power_density, rel=0.005)


@pytest.mark.parametrize(
    "limits, column, public_edge, worker_edge",
    [
        ("us_fcc", "electric", 1.34, 3.0),
        ("ieee_c95_1_2019", "electric", 1.34, 1.0),
        ("ca_sc6_2015", "electric", 300.0, 100.0),
    ],
)
def test_trap_2_levels_change_at_different_frequencies_for_each_population(
    limits, column, public_edge, worker_edge
):
    """Beyond its own edge a level leaves the constant of the row before, or reaches it."""

    def flat(population, low, high):
        return getattr(the(limits, population, low), column) == getattr(the(limits, population, high), column)

    for population, edge in ((GENERAL, public_edge), (WORKER, worker_edge)):
        assert flat(population, 0.85 * edge, 0.95 * edge)
        assert not flat(population, 1.05 * edge, 1.15 * edge)


def test_trap_2_magnetic_levels_of_1998_turn_at_150_and_at_65_khz():
    at = "icnirp_1998"

    assert the(at, GENERAL, 0.149).magnetic == 5 and the(at, GENERAL, 0.16).magnetic < 5
    assert the(at, WORKER, 0.064, "stimulation", "any").magnetic == 24.4
    assert the(at, WORKER, 0.066, "stimulation", "any").magnetic < 24.4


@pytest.mark.parametrize(
    "limits, population, scope, minutes",
    [
        ("us_fcc", GENERAL, "whole_body", [30]),
        ("us_fcc", WORKER, "whole_body", [6]),
        ("icnirp_2020", GENERAL, "whole_body", [30]),
        ("icnirp_2020", WORKER, "whole_body", [30]),
        ("icnirp_2020", GENERAL, "local", [6]),
        ("icnirp_1998", GENERAL, "whole_body", [6]),
        ("ieee_c95_1_2019", WORKER, "whole_body", [30]),
        ("ca_sc6_2015", GENERAL, "whole_body", [6]),
        ("de_26bimschv", GENERAL, "whole_body", [6]),
        ("it_dpcm_2003", GENERAL, "whole_body", [6, 24 * 60]),
    ],
)
def test_trap_3_each_document_has_its_own_averaging_time(limits, population, scope, minutes):
    found = levels(limits, population, 14.2, "heating", scope)

    assert [level.averaging_time_s / 60 for level in found] == minutes


@pytest.mark.parametrize("population, crossing", [(GENERAL, 6.27), (WORKER, 6.94)])
def test_trap_4_below_its_crossing_the_stimulation_level_of_2020_rules(population, crossing):
    """83 (170) V/m is lower than 300 (660)/f^0.7 below 6.27 (6.94) MHz, printed to 0.01 MHz."""
    for megahertz, lower in ((crossing - 0.02, "stimulation"), (crossing + 0.02, "heating")):
        nerve = the("icnirp_2020", population, megahertz, "stimulation", "any").electric
        heat = the("icnirp_2020", population, megahertz).electric
        assert ("stimulation" if nerve < heat else "heating") == lower


def test_trap_4_heating_levels_of_2020_are_looser_at_hf_than_those_of_1998():
    """3.7 MHz, general public: 120 against 45 V/m, to the printed digits."""
    assert round(the("icnirp_2020", GENERAL, 3.7).electric) == 120
    assert round(the("icnirp_1998", GENERAL, 3.7).electric) == 45


@pytest.mark.parametrize("limits", ["icnirp_2020", "ca_sc6_2015", "de_26bimschv", "jp_mic"])
def test_trap_4_the_stimulation_level_takes_no_average_in_time_or_space(limits):
    level = the(limits, GENERAL, 3.7, "stimulation", "any")

    assert (level.electric, level.averaging_time_s, level.spatial) == (83, 0, "peak")


def test_trap_5_stimulation_adds_linearly_in_documents_that_print_it_only_for_sums():
    """ICNIRP 1998: a = 87 (610) V/m, b = 5 (24.4) A/m to 10 MHz; five carriers at 44 % of it fail: 2.2."""
    (public,) = stimulation_sum_levels("icnirp_1998", GENERAL, 3.7e6)
    (worker,) = stimulation_sum_levels("icnirp_1998", WORKER, 3.7e6)

    assert (public.electric, public.magnetic, public.averaging_time_s) == (87, 5, 0)
    assert (worker.electric, worker.magnetic) == (610, 24.4)
    assert public.effect == "stimulation"


@pytest.mark.parametrize("limits", ["icnirp_1998", "eu_1999_519", "uk_icnirp_1998", "ch_nisv"])
def test_trap_5_such_sums_end_at_10_mhz(limits):
    assert len(stimulation_sum_levels(limits, GENERAL, 10e6)) == 1
    assert stimulation_sum_levels(limits, GENERAL, 10.001e6) == ()


def test_trap_6_only_icnirp_2020_adds_squares_of_e_and_h_and_only_up_to_30_mhz():
    adding = {
        limits: document(limits).SUMMATION.electric_and_magnetic_add
        for limits in DOCUMENTS
        if document(limits).SUMMATION.electric_and_magnetic_add
    }
    rule = (("heating", "whole_body", 30e6),)

    assert adding == {"icnirp_2020": rule, "au_rps_s1_2021": rule, "uk_icnirp_2020": rule}


def test_trap_7_no_value_is_none_and_not_that_of_an_older_edition():
    """No E and H above 2 GHz (1998: 61 V/m), no S up to 30 MHz."""
    above, below = the("icnirp_2020", GENERAL, 2400.0), the("icnirp_2020", GENERAL, 28.5)

    assert (above.electric, above.magnetic, above.power_density) == (None, None, 10)
    assert below.power_density is None


def test_trap_8_in_the_reactive_near_field_above_2_ghz_there_is_no_reference_level():
    assert usable_quantities("icnirp_2020", 2.4e9, "reactive") == ()
    assert usable_quantities("icnirp_2020", 2.0e9, "reactive") == (("electric", "magnetic"),)
    assert usable_quantities("icnirp_2020", 2.4e9, "radiative") == (("power_density",),)


@pytest.mark.parametrize("megahertz, metres", [(1.9, 25.1), (2400.0, 0.0199), (14.2, 3.36)])
def test_trap_8_the_reactive_zone_ends_at_a_wavelength_over_two_pi(megahertz, metres):
    """47.7/f m (FCC 19-126, note 143)."""
    assert zone(0.99 * metres, megahertz * 1e6, 0.01) == "reactive"
    assert zone(1.01 * metres, megahertz * 1e6, 0.01) == "far"


def test_trap_8_beyond_it_the_far_field_begins_at_twice_the_square_of_the_size():
    """2 D^2/lambda = 2 (2 m)^2 / 2.05 m = 3.9 m at 146 MHz."""
    assert zone(3.8, 146e6, 2.0) == "radiative"
    assert zone(4.0, 146e6, 2.0) == "far"


@pytest.mark.parametrize("limits, upper", [("us_fcc", 300.0), ("icnirp_2020", 2000.0)])
def test_trap_9_near_an_antenna_both_fields_count_far_away_one_of_them(limits, upper):
    near, far = (usable_quantities(limits, 0.9 * upper * 1e6, where) for where in ("reactive", "far"))

    assert near == (("electric", "magnetic"),)
    assert far == (("electric",), ("magnetic",), ("power_density",))


def test_trap_9_to_30_mhz_icnirp_2020_wants_both_fields_in_every_zone():
    for where in ("reactive", "radiative", "far"):
        assert usable_quantities("icnirp_2020", 30e6, where) == (("electric", "magnetic"),)


def test_trap_9_a_document_without_a_rule_of_zones_has_all_that_is_printed_count():
    assert usable_quantities("it_dpcm_2003", 7e6, "far") == (("electric", "magnetic", "power_density"),)


@pytest.mark.parametrize("limits", ["icnirp_2020", "ieee_c95_1_2019", "au_rps_s1_2021"])
def test_trap_10_whole_body_mean_and_local_peak_are_separate_tests(limits):
    """Local is sqrt(5) in field within print: 62/27.7, 2238."""
    whole, local = (the(limits, GENERAL, 146.0, "heating", scope) for scope in ("whole_body", "local"))

    assert (whole.spatial, local.spatial) == ("mean", "peak")
    assert local.electric / whole.electric == pytest.approx(5**0.5, rel=0.01)


def test_trap_11_formulas_keep_their_own_units_of_frequency():
    """2013/35/EU 6.1e8/f with f in Hz; 55/f^0.177 in GHz; 616000/f^1.2 in MHz."""
    assert the("eu_2013_35", WORKER, 7.0).electric == pytest.approx(6.1e8 / 7e6, rel=1e-12)
    assert the("icnirp_2020", GENERAL, 24e3, "heating", "local").power_density == pytest.approx(
        55 / 24**0.177, rel=1e-12
    )
    assert the("ca_sc6_2015", GENERAL, 24e3).averaging_time_s / 60 == pytest.approx(3.4, abs=0.05)


def test_trap_12_columns_are_never_converted_into_each_other():
    """28 V/m is 2.08, 0.073 A/m is 2.01 W/m2, printed is 2; H 0.073, 0.0728, 0.0729 in three documents."""
    level = the("icnirp_1998", GENERAL, 146.0)

    assert (level.electric, level.magnetic, level.power_density) == (28, 0.073, 2)
    assert [the(limits, GENERAL, 146.0).magnetic for limits in ("us_fcc", "jp_mic", "ieee_c95_1_2019")] == [
        0.073,
        0.0728,
        0.0729,
    ]


def test_trap_13_peak_values_of_the_german_ordinance_are_given_back_as_rms():
    """236 V/m peak is 167 V/m rms."""
    assert round(the("de_emfv_2016", WORKER, 1.0, "stimulation", "any").electric) == 167


@pytest.mark.parametrize("megahertz", [0.137, 0.2999, 100_001.0])
def test_trap_14_fcc_has_nothing_below_300_khz_nor_above_100_ghz(megahertz):
    with pytest.raises(OutOfScopeError, match="us_fcc has levels from 0.3 MHz to 100 GHz"):
        reference_levels("us_fcc", GENERAL, megahertz * 1e6)


@pytest.mark.parametrize(
    "limits, population, count",
    [
        ("ca_sc6_2015", GENERAL, 2),
        ("de_26bimschv", GENERAL, 2),
        ("eu_2013_35", WORKER, 2),
        ("icnirp_2020", GENERAL, 3),
    ],
)
def test_trap_16_all_tables_that_cover_a_frequency_apply(limits, population, count):
    assert len(reference_levels(limits, population, 3.7e6)) == count


@pytest.mark.parametrize("megahertz", [50.0, 146.0, 222.0])
def test_trap_17_safety_code_6_dips_below_the_others(megahertz):
    """22.06 V/m and 1.291 W/m2 against 27.5 V/m and 2 W/m2: 20 % in field, 35 % in power."""
    canada, fcc = the("ca_sc6_2015", GENERAL, megahertz), the("us_fcc", GENERAL, megahertz)

    assert canada.electric / fcc.electric == pytest.approx(0.80, abs=0.005)
    assert canada.power_density / fcc.power_density == pytest.approx(0.65, abs=0.005)


@pytest.mark.parametrize("population, edge", [(GENERAL, 1.10), (WORKER, 1.29)])
def test_trap_18_safety_code_6_heats_by_h_alone_below_1_10_and_1_29_mhz(population, edge):
    below, at = the("ca_sc6_2015", population, edge - 0.001), the("ca_sc6_2015", population, edge)

    assert below.electric is None and below.magnetic is not None
    assert at.electric is not None


def test_trap_21_30_mhz_belongs_where_each_document_puts_it():
    """ICNIRP 2020: 300/f^0.7; FCC: the lower value; Japan: the row that ends there."""
    assert the("icnirp_2020", GENERAL, 30.0).electric == pytest.approx(300 / 30**0.7, rel=1e-12)
    assert the("us_fcc", GENERAL, 30.0).electric == pytest.approx(824 / 30, rel=1e-12)
    assert the("jp_mic", GENERAL, 30.0).electric == pytest.approx(824 / 30, rel=1e-12)
    assert the("jp_mic", GENERAL, 30.0).power_density is None


def test_trap_22_printed_steps_are_not_repaired():
    """2013/35/EU 134.2 to 140 V/m at 2 GHz, ICNIRP 1998 27.5 to 28 V/m at 10 MHz."""
    assert the("eu_2013_35", WORKER, 1999.999).electric == pytest.approx(134.2, abs=0.05)
    assert the("eu_2013_35", WORKER, 2000.0).electric == 140
    assert the("icnirp_1998", GENERAL, 9.999999).electric == pytest.approx(27.5, abs=0.02)
    assert the("icnirp_1998", GENERAL, 10.000001).electric == 28


@pytest.mark.parametrize("megahertz, times", [(0.67, 5.3), (3.65, 16.4)])
@pytest.mark.parametrize("limits", ["icnirp_1998", "eu_1999_519", "de_26bimschv", "ch_nisv"])
def test_trap_24_pulses_of_1998_are_checked_on_the_instantaneous_peak(limits, megahertz, times):
    """6.93 f^0.664: 5.3 at 0.67 MHz, 16.4 at 3.65 MHz; as rms at the peak of the envelope, over sqrt(2)."""
    (ceiling,) = ceilings(limits, GENERAL, megahertz * 1e6)
    level = the(limits, GENERAL, megahertz)

    assert ceiling.electric * 2**0.5 / level.electric == pytest.approx(times, abs=0.05)
    assert ceiling.magnetic * 2**0.5 / level.magnetic == pytest.approx(times, abs=0.05)
    assert (ceiling.averaging_time_s, ceiling.spatial) == (0, "peak")


def test_trap_24_above_10_mhz_32_times_the_field_and_1000_times_the_density():
    (ceiling,) = ceilings("icnirp_1998", GENERAL, 146e6)

    assert ceiling.electric == pytest.approx(32 * 28 / 2**0.5, rel=1e-12)
    assert ceiling.power_density == 2000


def test_trap_24_the_directive_limits_pulses_by_density_where_it_prints_one():
    (ceiling,) = ceilings("eu_2013_35", WORKER, 10e9)

    assert (ceiling.electric, ceiling.power_density) == (None, 50_000)
    assert ceilings("eu_2013_35", WORKER, 146e6) == ()
    assert ceilings("uk_icnirp_1998", WORKER, 7e6) == ()


@pytest.mark.parametrize("limits", ["us_fcc", "icnirp_2020", "ca_sc6_2015"])
def test_trap_24_other_documents_have_no_such_ceiling(limits):
    assert ceilings(limits, GENERAL, 7e6) == ()


def test_trap_24_bursts_above_400_mhz_are_for_the_documents_after_icnirp_2020():
    brief = {limits for limits in DOCUMENTS if document(limits).BRIEF_LOCAL_ABOVE < float("inf")}

    assert brief == {"icnirp_2020", "au_rps_s1_2021", "uk_icnirp_2020"}


def test_trap_25_local_law_stands_in_the_cautions():
    def words(limits):
        return " ".join(document(limits).USE.cautions)

    assert "10 W EIRP" in words("uk_icnirp_1998") and "10 W EIRP" in words("de_26bimschv")
    assert "800 h" in words("ch_nisv") and "4 hours a day" in words("it_dpcm_2003")
    assert "implants" in words("de_26bimschv")


@pytest.mark.parametrize(
    "limits, population, minutes",
    [
        ("icnirp_1998", GENERAL, 68 / 24**1.05),
        ("eu_2013_35", WORKER, 68 / 24**1.05),
        ("us_fcc", GENERAL, 30),
        ("icnirp_2020", GENERAL, 30),
        ("ieee_c95_1_2019", GENERAL, 30),
    ],
)
def test_trap_26_only_documents_after_1998_shorten_the_window_above_10_ghz(limits, population, minutes):
    assert the(limits, population, 24_000.0).averaging_time_s == pytest.approx(60 * minutes, rel=1e-12)


# --- what was not read


def test_values_from_memory_below_0_8_are_marked():
    """limits.md, confidences: IEEE local below 6 GHz 0.7, stimulation 0.78; Japan's managed environment."""
    marked = {
        (limits, population, level.effect, level.scope)
        for limits, population in populations()
        for megahertz in (0.05, 0.475, 7.1, 440.0)
        for level in levels_or_none(limits, population, megahertz)
        if not level.verified
    }

    assert marked == {
        ("ieee_c95_1_2019", GENERAL, "stimulation", "any"),
        ("ieee_c95_1_2019", WORKER, "stimulation", "any"),
        ("ieee_c95_1_2019", GENERAL, "heating", "local"),
        ("ieee_c95_1_2019", WORKER, "heating", "local"),
        ("jp_mic", WORKER, "stimulation", "any"),
        ("jp_mic", WORKER, "heating", "local"),
    }


def levels_or_none(limits, population, megahertz):
    try:
        return reference_levels(limits, population, megahertz * 1e6)
    except OutOfScopeError:
        return ()


def test_ways_to_sum_that_were_not_seen_are_marked():
    unseen = {limits for limits in DOCUMENTS if not document(limits).SUMMATION.verified}

    assert unseen == {"ieee_c95_1_2019", "it_dpcm_2003"}


def test_icnirp_2010_alone_says_nothing_about_heating_above_100_khz():
    assert not_limited("icnirp_2010", 0.1e6) is None
    assert "heating" in not_limited("icnirp_2010", 7e6)
    assert [limits for limits in DOCUMENTS if not_limited(limits, 7e6)] == ["icnirp_2010"]


def test_limits_start_without_numerical_packages():
    """The verb `limits` has to start fast: nothing of numpy, scipy, matplotlib or reportlab is imported."""
    code = (
        "import sys, exposure.verbs.limits; "
        "print([m for m in ('numpy', 'scipy', 'matplotlib', 'reportlab') if m in sys.modules])"
    )

    told = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)

    assert told.stdout.strip() == "[]"
