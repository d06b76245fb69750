"""IEEE Std C95.1-2019, Tables 7 and 8: second-hand (0.9), fields to 300 MHz read in the edition of 1991;
local levels below 6 GHz (0.7) and stimulation (0.78) from memory and marked so.  f in MHz."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, level

WHOLE_BODY = {
    "general_public": [
        # MHz     E V/m            H A/m                     S_E W/m2
        (0.1, 614, 163, 1000),
        (1.34, 614, 16.3 / 1.34, 1000),  # 823.8/1.34 is 614.8, 1800/1.34^2 1002
        (1.35, 823.8 / 1.35, 16.3 / 1.35, 1800 / 1.35**2),
        (14.2, 823.8 / 14.2, 16.3 / 14.2, 1800 / 14.2**2),
        (30.0, 823.8 / 30, 16.3 / 30, 2),
        (50.0, 27.5, 158.3 / 50**1.668, 2),
        (100.0, 27.5, 0.0729, 2),  # 158.3/100^1.668 is 0.0730
        (101.0, 27.5, 0.0729, 2),
        (400.0, 27.5, 0.0729, 2),
        (900.0, None, None, 4.5),
        (2000.0, None, None, 10),
        (300_000.0, None, None, 10),
    ],
    "occupational": [
        (0.1, 1842, 163, 9000),
        (1.0, 1842, 16.3, 9000),
        (14.2, 1842 / 14.2, 16.3 / 14.2, 9000 / 14.2**2),
        (30.0, 1842 / 30, 16.3 / 30, 10),
        (50.0, 61.4, 16.3 / 50, 10),
        (100.0, 61.4, 0.163, 10),
        (400.0, 61.4, 0.163, 10),
        (900.0, None, None, 22.5),
        (2000.0, None, None, 50),
        (300_000.0, None, None, 50),
    ],
}


@pytest.mark.parametrize(
    "population, row", [(population, row) for population, rows in WHOLE_BODY.items() for row in rows]
)
def test_every_cell_of_tables_7_and_8(population, row):
    """30 minutes for both, mean over the body; at an edge the lower of each column."""
    found = level("ieee_c95_1_2019", population, row[0], "heating", "whole_body")

    assert_cells(found, *row[1:])
    assert (found.spatial, found.averaging_time_s, found.verified) == ("mean", 1800, True)


@pytest.mark.parametrize("population, times", [("general_public", 1), ("occupational", 5)])
@pytest.mark.parametrize(
    "megahertz, density, verified",
    [
        (900.0, 0.058 * 900**0.86, False),
        (3000.0, 40, False),
        (6000.1, None, True),
        (24_000.0, None, True),
    ],
)
def test_local_levels(population, times, megahertz, density, verified):
    """0.058 (0.29) f^0.86, 40 (200), then 55 (274.8) over f^0.177 with f in GHz."""
    found = level("ieee_c95_1_2019", population, megahertz, "heating", "local")
    above = {"general_public": 55, "occupational": 274.8}[population] / (megahertz / 1000) ** 0.177

    assert found.power_density == pytest.approx(above if density is None else times * density, rel=1e-9)
    assert (found.spatial, found.averaging_time_s, found.verified) == ("peak", 360, verified)


@pytest.mark.parametrize("population", ["general_public", "occupational"])
@pytest.mark.parametrize("megahertz", [0.5, 14.2, 60.0, 200.0])
def test_local_fields_are_the_whole_body_fields_times_the_root_of_five_and_not_verified(
    population, megahertz
):
    whole, local = (
        level("ieee_c95_1_2019", population, megahertz, "heating", scope) for scope in ("whole_body", "local")
    )

    assert local.electric == pytest.approx(5**0.5 * whole.electric, rel=1e-12)
    assert local.magnetic == pytest.approx(5**0.5 * whole.magnetic, rel=1e-12)
    assert not local.verified


@pytest.mark.parametrize(
    "population, megahertz, electric, magnetic, verified",
    [
        ("general_public", 0.05, 614, 163, False),
        ("general_public", 0.475, None, 163, True),
        ("general_public", 5.0, None, 163, True),
        ("occupational", 0.05, 1842, 490, False),
        ("occupational", 5.0, None, 490, False),
    ],
)
def test_stimulation_to_5_mhz(population, megahertz, electric, magnetic, verified):
    found = level("ieee_c95_1_2019", population, megahertz, "stimulation", "any")

    assert_cells(found, electric, magnetic, None)
    assert (found.averaging_time_s, found.verified) == (0, verified)


def test_above_5_mhz_there_is_no_stimulation_level():
    effects = [found.effect for found in reference_levels("ieee_c95_1_2019", "general_public", 5.001e6)]

    assert effects == ["heating", "heating"]


@pytest.mark.parametrize("megahertz", [0.0033, 300_001.0])
def test_outside_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="ieee_c95_1_2019 has levels from 3.35 kHz to 300 GHz"):
        reference_levels("ieee_c95_1_2019", "general_public", megahertz * 1e6)
