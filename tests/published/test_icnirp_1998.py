"""ICNIRP 1998, Table 6 (occupational) and Table 7 (general public), and the sets that print the same
numbers: 1999/519/EC Annex III Table 2, the British licence condition, the Swiss immission limits.
General public read; occupational partly from memory (0.97).  f in MHz."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

GENERAL = [
    # MHz     E V/m                  H A/m                S W/m2
    (0.12, 87, 5, None),
    (0.15, 87, 0.73 / 0.15, None),
    (0.5, 87, 0.73 / 0.5, None),
    (1.0, 87, 0.73, None),
    (3.7, 87 / 3.7**0.5, 0.73 / 3.7, None),
    (10.0, 87 / 10**0.5, 0.073, 2),
    (10.001, 28, 0.073, 2),
    (146.0, 28, 0.073, 2),
    (400.0, 1.375 * 20, 0.073, 2),
    (900.0, 1.375 * 30, 0.0037 * 30, 4.5),
    (2000.0, 61, 0.16, 10),
    (10_000.0, 61, 0.16, 10),
    (300_000.0, 61, 0.16, 10),
]
OCCUPATIONAL = [
    (0.12, 610, 1.6 / 0.12, None),
    (1.0, 610, 1.6, None),
    (3.7, 610 / 3.7, 1.6 / 3.7, None),
    (10.0, 61, 0.16, 10),
    (146.0, 61, 0.16, 10),
    (400.0, 60, 0.16, 10),
    (900.0, 90, 0.24, 22.5),
    (1999.0, 3 * 1999**0.5, 0.008 * 1999**0.5, 1999 / 40),
    (2000.0, 3 * 2000**0.5, 0.008 * 2000**0.5, 50),
    (2001.0, 137, 0.36, 50),
    (300_000.0, 137, 0.36, 50),
]
SAME_FOR_THE_PUBLIC = ["icnirp_1998", "eu_1999_519", "uk_icnirp_1998", "ch_nisv"]


@pytest.mark.parametrize("limits", SAME_FOR_THE_PUBLIC)
@pytest.mark.parametrize("row", GENERAL)
def test_every_cell_for_the_general_public(limits, row):
    """At an edge, which the text leaves open, the lower of each column: 0.15 MHz 4.87 for 5 A/m."""
    assert_cells(level(limits, "general_public", row[0], "heating", "whole_body"), *row[1:])


@pytest.mark.parametrize("row", OCCUPATIONAL)
def test_every_cell_of_table_6(row):
    assert_cells(level("icnirp_1998", "occupational", row[0], "heating", "whole_body"), *row[1:])


@pytest.mark.parametrize(
    "population, megahertz, electric, magnetic",
    [
        ("general_public", 0.003, 87, 5),
        ("general_public", 0.0999, 87, 5),
        ("occupational", 0.00082, 610, 24.4),
        ("occupational", 0.065, 610, 24.4),
        ("occupational", 0.0651, 610, 1.6 / 0.0651),
        ("occupational", 0.0999, 610, 1.6 / 0.0999),
    ],
)
def test_below_100_khz_levels_are_not_averaged(population, megahertz, electric, magnetic):
    assert kinds("icnirp_1998", population, megahertz) == [("stimulation", "any", "peak", 0)]
    assert_cells(level("icnirp_1998", population, megahertz, "stimulation", "any"), electric, magnetic, None)


@pytest.mark.parametrize(
    "megahertz, minutes",
    [(0.1, 6), (7.1, 6), (10_000.0, 6), (10_368.0, 68 / 10.368**1.05), (24_000.0, 68 / 24**1.05)],
)
@pytest.mark.parametrize("limits", SAME_FOR_THE_PUBLIC)
def test_six_minutes_and_above_10_ghz_a_shorter_time(limits, megahertz, minutes):
    """68/f^1.05 minutes, f in GHz: 5.8 at 10.368 GHz, 2.4 at 24 GHz."""
    found = level(limits, "general_public", megahertz, "heating", "whole_body")

    assert found.averaging_time_s == pytest.approx(60 * minutes, rel=1e-12)


def test_the_averaging_times_of_the_microwave_bands_to_two_figures():
    minutes = [
        level("icnirp_1998", "general_public", f, "heating", "whole_body").averaging_time_s / 60
        for f in (10_368.0, 24_000.0)
    ]

    assert [round(m, 1) for m in minutes] == [5.8, 2.4]


@pytest.mark.parametrize(
    "limits, spatial",
    [("icnirp_1998", "mean"), ("eu_1999_519", "mean"), ("uk_icnirp_1998", "mean"), ("ch_nisv", "peak")],
)
def test_the_swiss_limit_holds_at_the_place_the_others_average_over_the_body(limits, spatial):
    assert level(limits, "general_public", 7.1, "heating", "whole_body").spatial == spatial


@pytest.mark.parametrize(
    "limits, clause",
    [
        ("icnirp_1998", "ICNIRP 1998, Table 7"),
        ("eu_1999_519", "1999/519/EC, Annex III, Table 2"),
        ("uk_icnirp_1998", "Ofcom licence condition: ICNIRP 1998, Table 7"),
        ("ch_nisv", "NISV, Annex 2 (immission limits)"),
    ],
)
def test_each_document_answers_with_its_own_clause(limits, clause):
    assert level(limits, "general_public", 7.1, "heating", "whole_body").clause == clause


@pytest.mark.parametrize("limits", ["eu_1999_519", "ch_nisv"])
def test_documents_for_the_public_refuse_workers(limits):
    with pytest.raises(OutOfScopeError, match=f"{limits} has no levels for 'occupational'"):
        reference_levels(limits, "occupational", 7e6)


@pytest.mark.parametrize("limits", SAME_FOR_THE_PUBLIC)
@pytest.mark.parametrize("megahertz", [0.0029, 300_001.0])
def test_outside_the_table_it_refuses(limits, megahertz):
    with pytest.raises(OutOfScopeError, match=f"{limits} has levels from 3 kHz to 300 GHz"):
        reference_levels(limits, "general_public", megahertz * 1e6)
