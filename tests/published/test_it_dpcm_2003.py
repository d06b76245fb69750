"""Italian decree of 8 July 2003, limits (6 minutes) and attention values as they stand since 29 April 2024
(24 hours); read, numbers of its tables from memory.  The lower end of a range is exclusive.  f in MHz."""

import pytest

from exposure import OutOfScopeError, reference_levels
from tests.published.printed import assert_cells

LIMIT = [
    # MHz     E   H    S
    (0.1001, 60, 0.2, None),
    (3.0, 60, 0.2, None),
    (3.001, 20, 0.05, 1),
    (3000.0, 20, 0.05, 1),
    (3000.001, 40, 0.1, 4),
    (300_000.0, 40, 0.1, 4),
]


@pytest.mark.parametrize("row", LIMIT)
def test_every_cell_of_the_limit(row):
    """H above 3 GHz: 0.1 A/m of DM 381/1998; 0.01 of the decree cannot belong to 40 V/m (40/377 = 0.106)."""
    limit = reference_levels("it_dpcm_2003", "general_public", row[0] * 1e6)[0]

    assert_cells(limit, *row[1:])
    assert (limit.spatial, limit.averaging_time_s) == ("mean", 360)


@pytest.mark.parametrize("megahertz, density", [(1.0, None), (3.001, 0.59), (300_000.0, 0.59)])
def test_attention_value_over_24_hours(megahertz, density):
    attention = reference_levels("it_dpcm_2003", "general_public", megahertz * 1e6)[1]

    assert_cells(attention, 15, 0.039, density)
    assert attention.averaging_time_s == 24 * 3600


@pytest.mark.parametrize("megahertz", [0.1, 300_001.0])
def test_outside_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="it_dpcm_2003 has levels from 0.1 MHz to 300 GHz"):
        reference_levels("it_dpcm_2003", "general_public", megahertz * 1e6)
