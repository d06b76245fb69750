"""Sets that take their numbers from ICNIRP 2020 (ARPANSA RPS S-1 by ARPANSA's statement, 0.95; the British
licence condition for the public), so that tests/published/test_icnirp_2020.py has their cells."""

from dataclasses import replace

import pytest

from exposure import reference_levels

FREQUENCIES = [0.1, 3.7, 10.0, 10.001, 30.0, 30.001, 400.0, 400.001, 2000.0, 2000.001, 6000.0, 6000.001, 3e5]


def without_clause(limits, population, megahertz):
    return [replace(level, clause="") for level in reference_levels(limits, population, megahertz * 1e6)]


@pytest.mark.parametrize("megahertz", FREQUENCIES)
@pytest.mark.parametrize(
    "limits, population",
    [
        ("au_rps_s1_2021", "general_public"),
        ("au_rps_s1_2021", "occupational"),
        ("uk_icnirp_2020", "general_public"),
    ],
)
def test_numbers_are_those_of_icnirp_2020(limits, population, megahertz):
    expected = without_clause("icnirp_2020", population, megahertz)

    assert without_clause(limits, population, megahertz) == expected


@pytest.mark.parametrize(
    "limits, words",
    [
        ("au_rps_s1_2021", "RPS S-1 (Rev. 1), values of ICNIRP 2020, Table 5"),
        ("uk_icnirp_2020", "Ofcom licence condition: ICNIRP 2020, Table 5"),
    ],
)
def test_the_clause_names_the_document_that_binds(limits, words):
    assert reference_levels(limits, "general_public", 7e6)[0].clause == words
