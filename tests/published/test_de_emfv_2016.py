"""German EMFV 2016, Annex 3 (heating, rms) and Annex 2 (stimulation, printed as peak values); read.
f in MHz but where the page has Hz."""

from math import pi

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

ANNEX_3 = [
    # MHz     E V/m                       H A/m                      S W/m2
    (0.1, 614, 16.3, None),
    (0.999, 614, 1.63 / 0.999, None),
    (1.0, 614, 1.63, None),
    (7.0, 614 / 7, 1.63 / 7, None),
    (9.999, 614 / 9.999, 1.63 / 9.999, None),
    (10.0, 61.4, 0.163, 10),
    (399.0, 61.4, 0.163, 10),
    (400.0, 3.07e-3 * 400e6**0.5, 8.14e-6 * 400e6**0.5, 25e-9 * 400e6),
    (1300.0, 3.07e-3 * 1.3e9**0.5, 8.14e-6 * 1.3e9**0.5, 25e-9 * 1.3e9),
    (2000.0, 137.3, 0.364, 50),
    (300_000.0, 137.3, 0.364, 50),
]


@pytest.mark.parametrize("row", ANNEX_3)
def test_every_cell_of_annex_3(row):
    assert_cells(level("de_emfv_2016", "occupational", row[0], "heating", "whole_body"), *row[1:])


@pytest.mark.parametrize("megahertz", [0.003, 1.0, 10.0])
def test_annex_2_is_printed_as_peak_and_given_back_as_rms(megahertz):
    """236 V/m peak is 166.9 V/m rms, 140 microtesla peak 78.8 A/m rms."""
    found = level("de_emfv_2016", "occupational", megahertz, "stimulation", "any")

    assert_cells(found, 236 / 2**0.5, 140e-6 / (4e-7 * pi) / 2**0.5, None)
    assert round(found.electric) == 167


def test_both_annexes_to_10_mhz():
    assert kinds("de_emfv_2016", "occupational", 7.0) == [
        ("stimulation", "any", "peak", 0),
        ("heating", "whole_body", "peak", 6),
    ]


@pytest.mark.parametrize("megahertz", [20.0, 100.0, 1300.0, 5000.0])
def test_fields_and_density_are_one_plane_wave(megahertz):
    """Within print: 61.4^2/377 = 10.0, 137.3^2/377 = 50.0; 1 %."""
    found = level("de_emfv_2016", "occupational", megahertz, "heating", "whole_body")

    assert found.electric**2 / 376.73 == pytest.approx(found.power_density, rel=0.01)
    assert found.magnetic**2 * 376.73 == pytest.approx(found.power_density, rel=0.01)


def test_outside_it_refuses():
    with pytest.raises(OutOfScopeError, match="de_emfv_2016 has levels from 3 kHz to 300 GHz"):
        reference_levels("de_emfv_2016", "occupational", 300.1e9)
    with pytest.raises(OutOfScopeError, match="no levels for 'general_public'"):
        reference_levels("de_emfv_2016", "general_public", 7e6)
