"""Directive 2013/35/EU, Annex II (Tables B1, B2) and Annex III (Table B1): E and S read, B of Annex III from
memory (0.97).  f in Hz and B in microtesla, as printed; H = B/mu0 with mu0 = 4 pi 1e-7 H/m.  The British
regulations for workers (CEMFAW 2016) print the same."""

from math import pi

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

MU0 = 4e-7 * pi
ANNEX_III = [
    # Hz       AL(E) V/m        AL(B) microtesla    AL(S) W/m2
    (1e5, 610, 2.0e6 / 1e5, None),
    (9.99e5, 610, 2.0e6 / 9.99e5, None),
    (1e6, 6.1e8 / 1e6, 2.0e6 / 1e6, None),
    (7e6, 6.1e8 / 7e6, 2.0e6 / 7e6, None),
    (10e6, 61, 0.2, None),
    (145e6, 61, 0.2, None),
    (399e6, 61, 0.2, None),
    (400e6, 3e-3 * 400e6**0.5, 1e-5 * 400e6**0.5, None),
    (1.3e9, 3e-3 * 1.3e9**0.5, 1e-5 * 1.3e9**0.5, None),
    (1.999e9, 3e-3 * 1.999e9**0.5, 1e-5 * 1.999e9**0.5, None),
    (2e9, 140, 0.45, None),
    (5.8e9, 140, 0.45, None),
    (6e9, 140, 0.45, 50),
    (300e9, 140, 0.45, 50),
]


@pytest.mark.parametrize("limits", ["eu_2013_35", "uk_icnirp_1998", "uk_icnirp_2020"])
@pytest.mark.parametrize("frequency, electric, microtesla, density", ANNEX_III)
def test_every_cell_of_annex_iii(limits, frequency, electric, microtesla, density):
    """The lower end of a range belongs to it, the upper to the next."""
    found = level(limits, "occupational", frequency / 1e6, "heating", "whole_body")

    assert_cells(found, electric, microtesla * 1e-6 / MU0, density)


@pytest.mark.parametrize("megahertz", [0.003, 0.475, 10.0])
def test_annex_ii_low_action_levels(megahertz):
    """170 V/m and 100 microtesla (79.6 A/m), rms, instantaneous, maximum at the worker's position."""
    found = level("eu_2013_35", "occupational", megahertz, "stimulation", "any")

    assert_cells(found, 170, 100e-6 / MU0, None)
    assert (found.spatial, found.averaging_time_s) == ("peak", 0)


@pytest.mark.parametrize(
    "megahertz, expected",
    [
        (0.05, [("stimulation", "any", "peak", 0)]),
        (7.0, [("stimulation", "any", "peak", 0), ("heating", "whole_body", "peak", 6)]),
        (10.1, [("heating", "whole_body", "peak", 6)]),
        (10_000.0, [("heating", "whole_body", "peak", 6)]),
    ],
)
def test_annex_ii_then_annex_iii(megahertz, expected):
    assert kinds("eu_2013_35", "occupational", megahertz) == expected


def test_above_10_ghz_the_shorter_time():
    found = level("eu_2013_35", "occupational", 24_000.0, "heating", "whole_body")

    assert found.averaging_time_s == pytest.approx(60 * 68 / 24**1.05, rel=1e-12)


def test_the_directive_is_for_workers_only():
    with pytest.raises(OutOfScopeError, match="eu_2013_35 has no levels for 'general_public'"):
        reference_levels("eu_2013_35", "general_public", 7e6)


@pytest.mark.parametrize("megahertz", [0.0029, 300_001.0])
def test_outside_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="eu_2013_35 has levels from 3 kHz to 300 GHz"):
        reference_levels("eu_2013_35", "occupational", megahertz * 1e6)
