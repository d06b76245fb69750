"""Japanese table of the general environment (read, 0.97; 10 kHz to 10 MHz 0.85) and guideline of the managed
environment (from memory, 0.85).  The lower end of a range is exclusive, the upper inclusive.  f in MHz."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level

UNIFORM = {
    "general_public": [
        # MHz     E V/m                  H A/m                   S W/m2
        (0.1001, 275, 2.18 / 0.1001, None),
        (3.0, 275, 2.18 / 3, None),
        (3.0001, 824 / 3.0001, 2.18 / 3.0001, None),
        (30.0, 824 / 30, 2.18 / 30, None),
        (30.001, 27.5, 0.0728, 2),
        (300.0, 27.5, 0.0728, 2),
        (300.001, 1.585 * 300.001**0.5, 300.001**0.5 / 237.8, 300.001 / 150),
        (1500.0, 1.585 * 1500**0.5, 1500**0.5 / 237.8, 10),
        (1500.001, 61.4, 0.163, 10),
        (300_000.0, 61.4, 0.163, 10),
    ],
    "occupational": [
        (0.1001, 614, 4.9 / 0.1001, None),
        (3.0, 614, 4.9 / 3, None),
        (30.0, 1842 / 30, 4.9 / 30, None),
        (30.001, 61.4, 0.163, 10),
        (300.0, 61.4, 0.163, 10),
        (1500.0, 3.54 * 1500**0.5, 1500**0.5 / 106, 50),
        (1500.001, 137, 0.365, 50),
        (300_000.0, 137, 0.365, 50),
    ],
}


@pytest.mark.parametrize(
    "population, row", [(population, row) for population, rows in UNIFORM.items() for row in rows]
)
def test_every_cell_of_the_uniform_table(population, row):
    found = level("jp_mic", population, row[0], "heating", "whole_body")

    assert_cells(found, *row[1:])
    assert (found.spatial, found.averaging_time_s) == ("mean", 360)


@pytest.mark.parametrize(
    "population, electric, magnetic, verified",
    [("general_public", 83, 21, True), ("occupational", 170, 80, False)],
)
@pytest.mark.parametrize("megahertz", [0.0101, 0.1, 10.0])
def test_stimulation(population, electric, magnetic, verified, megahertz):
    """The managed environment's value is from memory and marked so."""
    found = level("jp_mic", population, megahertz, "stimulation", "any")

    assert_cells(found, electric, magnetic, None)
    assert (found.averaging_time_s, found.verified) == (0, verified)


@pytest.mark.parametrize("megahertz, density", [(440.0, 40), (999.0, 40), (1000.0, 20), (2400.0, 20)])
def test_maximum_where_exposure_is_not_uniform(megahertz, density):
    """40 W/m2 from 300 MHz to 1 GHz, 20 W/m2 above, spatial maximum."""
    found = level("jp_mic", "general_public", megahertz, "heating", "local")

    assert_cells(found, None, None, density)
    assert found.spatial == "peak"


def test_which_tests_apply_where():
    assert [kind[0] for kind in kinds("jp_mic", "general_public", 0.1)] == ["stimulation"]
    assert [kind[:2] for kind in kinds("jp_mic", "general_public", 10.0)] == [
        ("stimulation", "any"),
        ("heating", "whole_body"),
    ]
    assert [kind[:2] for kind in kinds("jp_mic", "general_public", 10.001)] == [("heating", "whole_body")]


@pytest.mark.parametrize("megahertz", [0.01, 300_001.0])
def test_outside_it_refuses(megahertz):
    """10 kHz itself: the lower end is exclusive."""
    with pytest.raises(OutOfScopeError, match="jp_mic has levels from 10 kHz to 300 GHz"):
        reference_levels("jp_mic", "general_public", megahertz * 1e6)
