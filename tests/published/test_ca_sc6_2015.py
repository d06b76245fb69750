"""Health Canada, Safety Code 6 (2015): tables of the uncontrolled (general public) and controlled
(occupational) environment.  Read but for H above 10 MHz, 87/sqrt(f) and 0.73/f (memory, continuity exact).
f in MHz."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

HEATING = {
    "general_public": [
        # MHz     E V/m               H A/m                  S W/m2
        (0.1, None, 7.3, None),
        (0.475, None, 0.73 / 0.475, None),
        (1.0999, None, 0.73 / 1.0999, None),
        (1.10, 87 / 1.1**0.5, 0.73 / 1.1, None),
        (7.15, 87 / 7.15**0.5, 0.73 / 7.15, None),
        (10.0, 27.46, 0.0728, 2),
        (14.2, 27.46, 0.0728, 2),
        (20.0, 58.07 / 20**0.25, 0.0728, 8.944 / 20**0.5),
        (28.5, 58.07 / 28.5**0.25, 0.1540 / 28.5**0.25, 8.944 / 28.5**0.5),
        (48.0, 22.06, 0.1540 / 48**0.25, 8.944 / 48**0.5),
        (146.0, 22.06, 0.05852, 1.291),
        (299.0, 22.06, 0.05852, 1.291),
        (301.0, 3.142 * 301**0.3417, 0.008335 * 301**0.3417, 0.02619 * 301**0.6834),
        (1296.0, 3.142 * 1296**0.3417, 0.008335 * 1296**0.3417, 0.02619 * 1296**0.6834),
        (6001.0, 61.4, 0.163, 10),
        (24_000.0, 61.4, 0.163, 10),
        (200_000.0, 0.158 * 200_000**0.5, 4.21e-4 * 200_000**0.5, 6.67e-5 * 200_000),
        (300_000.0, 0.158 * 300_000**0.5, 4.21e-4 * 300_000**0.5, 6.67e-5 * 300_000),
    ],
    "occupational": [
        (0.1, None, 16, None),
        (1.2899, None, 1.6 / 1.2899, None),
        (1.29, 193 / 1.29**0.5, 1.6 / 1.29, None),
        (7.15, 193 / 7.15**0.5, 1.6 / 7.15, None),
        (14.2, 61.4, 0.163, 10),
        (28.5, 129.8 / 28.5**0.25, 0.3444 / 28.5**0.25, 44.72 / 28.5**0.5),
        (50.0, 49.33, 0.1309, 6.455),
        (99.0, 49.33, 0.1309, 6.455),
        (101.0, 15.60 * 101**0.25, 0.04138 * 101**0.25, 0.6455 * 101**0.5),
        (1296.0, 15.60 * 6, 0.04138 * 6, 0.6455 * 36),
        (6001.0, 137, 0.364, 50),
        (24_000.0, 137, 0.364, 50),
        (200_000.0, 0.354 * 200_000**0.5, 9.40e-4 * 200_000**0.5, 3.33e-4 * 200_000),
    ],
}
CASES = [(population, row) for population, rows in HEATING.items() for row in rows]


@pytest.mark.parametrize("population, row", CASES)
def test_every_cell_of_the_heating_tables(population, row):
    found = level("ca_sc6_2015", population, row[0], "heating", "whole_body")

    assert_cells(found, *row[1:])
    assert found.spatial == "mean"


@pytest.mark.parametrize("megahertz", [0.003, 0.137, 10.0])
@pytest.mark.parametrize(
    "population, electric, magnetic", [("general_public", 83, 90), ("occupational", 170, 180)]
)
def test_nerve_stimulation(population, electric, magnetic, megahertz):
    found = level("ca_sc6_2015", population, megahertz, "stimulation", "any")

    assert_cells(found, electric, magnetic, None)
    assert (found.spatial, found.averaging_time_s) == ("peak", 0)


@pytest.mark.parametrize(
    "megahertz, minutes",
    [(0.5, 6), (14_999.0, 6), (15_000.0, 616000 / 15_000**1.2), (24_000.0, 616000 / 24_000**1.2)],
)
def test_six_minutes_and_from_15_ghz_a_shorter_time(megahertz, minutes):
    """616000/f^1.2 minutes, f in MHz: 3.4 at 24 GHz."""
    found = level("ca_sc6_2015", "general_public", megahertz, "heating", "whole_body")

    assert found.averaging_time_s == pytest.approx(60 * minutes, rel=1e-12)


@pytest.mark.parametrize("population", ["general_public", "occupational"])
@pytest.mark.parametrize("megahertz", [14.2, 28.5, 60.0, 440.0, 1296.0, 10_000.0])
def test_fields_and_density_are_one_plane_wave(population, megahertz):
    """Within print: 22.06^2/377 = 1.291; 61.4^2/377 = 10.0 while 137^2/377 = 49.8: 1 %."""
    found = level("ca_sc6_2015", population, megahertz, "heating", "whole_body")

    assert found.electric**2 / 376.73 == pytest.approx(found.power_density, rel=0.01)
    assert found.magnetic**2 * 376.73 == pytest.approx(found.power_density, rel=0.01)


@pytest.mark.parametrize("edge", [20.0, 48.0, 100.0, 300.0, 6000.0, 150_000.0])
@pytest.mark.parametrize("population", ["general_public", "occupational"])
def test_neighbouring_rows_meet(population, edge):
    """The code is drawn continuous: densities agree within 0.6 % (6.67e-5 f at 150 GHz: 10.005)."""
    below, above = (
        level("ca_sc6_2015", population, edge * side, "heating", "whole_body")
        for side in (1 - 1e-7, 1 + 1e-7)
    )

    assert below.power_density == pytest.approx(above.power_density, rel=0.006)


def test_nerve_stimulation_stands_first():
    assert [kind[0] for kind in kinds("ca_sc6_2015", "occupational", 3.7)] == ["stimulation", "heating"]


@pytest.mark.parametrize("megahertz", [0.0029, 300_001.0])
def test_outside_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="ca_sc6_2015 has levels from 3 kHz to 300 GHz"):
        reference_levels("ca_sc6_2015", "general_public", megahertz * 1e6)
