"""The US regulator's modelled tables for half-wave dipoles (source in ``oet65b_modelled``)."""

import pytest

from tests.published.oet65b_modelled import agrees, comparison

# (table, power W, height m, tier).  The field runs nearly parallel to the limit there: the exposure ratio at
# the printed distance is 0.95, 1.04, 0.94 and 0.91, and half a foot moves it by 2 to 4 % (docs/accuracy.md).
GRAZING = {
    ("18", 750.0, 1.8, "unc"),
    ("21", 1500.0, 1.8, "unc"),
    ("26", 500.0, 6.1, "unc"),
    ("26", 1000.0, 1.8, "unc"),
}


@pytest.fixture(scope="module")
def cells():
    return list(comparison())


def test_every_cell_but_the_grazing_ones_agrees_within_print(cells):
    """0.2 m (half a foot of grid, 0.1 m of print) plus 5 % (wire and length are not published).

    The tolerance is that of the case (published_cases A07); a zero must be a zero.
    """
    differing = {
        (row.table, row.power, row.level, tier)
        for row, tier, printed, found in cells
        if not agrees(printed, found)
    }

    assert len(cells) == 256
    assert differing == GRAZING


def test_the_mean_of_all_differences_is_less_than_the_rounding(cells):
    """No bias: the mean signed difference of the non-zero cells is 0.05 m or less, half the printed step."""
    differences = [found - printed for _, _, printed, found in cells if printed and found]

    assert abs(sum(differences) / len(differences)) < 0.06
