"""ICNIRP 2010, Tables 3 and 4, from 3 kHz to 10 MHz (full text read): 83 V/m, 27 microtesla (21 A/m) and
170 V/m, 100 microtesla (80 A/m)."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells, kinds, level


@pytest.mark.parametrize("megahertz", [0.003, 0.137, 1.9, 10.0])
@pytest.mark.parametrize(
    "population, electric, magnetic", [("general_public", 83, 21), ("occupational", 170, 80)]
)
def test_every_cell(population, electric, magnetic, megahertz):
    assert kinds("icnirp_2010", population, megahertz) == [("stimulation", "any", "peak", 0)]
    assert_cells(level("icnirp_2010", population, megahertz, "stimulation", "any"), electric, magnetic, None)


@pytest.mark.parametrize("megahertz", [0.0029, 10.001])
def test_outside_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="icnirp_2010 has levels from 3 kHz to 10 MHz"):
        reference_levels("icnirp_2010", "general_public", megahertz * 1e6)
