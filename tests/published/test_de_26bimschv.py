"""German 26. BImSchV, Annex 1a (3 kHz to 10 MHz, 83 V/m and 27 microtesla rms, not averaged) and Annex 1b
(from 100 kHz, 6 minutes); read.  f in MHz."""

from math import pi

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

ANNEX_1B = [
    # MHz     E V/m                  H A/m
    (0.1, 87, 7.3),
    (0.15, 87, 0.73 / 0.15),
    (1.0, 87, 0.73),
    (3.65, 87 / 3.65**0.5, 0.73 / 3.65),
    (10.0, 87 / 10**0.5, 0.073),
    (10.001, 28, 0.073),
    (145.0, 28, 0.073),
    (400.0, 27.5, 0.073),
    (1296.0, 1.375 * 36, 0.0037 * 36),
    (2000.0, 61, 0.16),
    (300_000.0, 61, 0.16),
]


@pytest.mark.parametrize("megahertz, electric, magnetic", ANNEX_1B)
def test_every_cell_of_annex_1b(megahertz, electric, magnetic):
    """There is no column of S."""
    found = level("de_26bimschv", "general_public", megahertz, "heating", "whole_body")

    assert_cells(found, electric, magnetic, None)
    assert (found.spatial, found.averaging_time_s) == ("peak", 360)


@pytest.mark.parametrize("megahertz", [0.003, 0.05, 10.0])
def test_annex_1a(megahertz):
    found = level("de_26bimschv", "general_public", megahertz, "stimulation", "any")

    assert_cells(found, 83, 27e-6 / (4e-7 * pi), None)
    assert (found.spatial, found.averaging_time_s) == ("peak", 0)


def test_1a_and_1b_both_apply_from_100_khz_to_10_mhz():
    assert len(kinds("de_26bimschv", "general_public", 0.0999)) == 1
    assert [kind[0] for kind in kinds("de_26bimschv", "general_public", 0.1)] == ["stimulation", "heating"]
    assert [kind[0] for kind in kinds("de_26bimschv", "general_public", 10.0)] == ["stimulation", "heating"]
    assert [kind[0] for kind in kinds("de_26bimschv", "general_public", 10.001)] == ["heating"]


def test_outside_it_refuses():
    with pytest.raises(OutOfScopeError, match="de_26bimschv has levels from 3 kHz to 300 GHz"):
        reference_levels("de_26bimschv", "general_public", 2.9e3)
    with pytest.raises(OutOfScopeError, match="no levels for 'occupational'"):
        reference_levels("de_26bimschv", "occupational", 7e6)
