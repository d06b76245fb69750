"""Comparison of returned levels with what is printed; cells are written as on the page, f in MHz."""

import pytest

from exposure import reference_levels

EXACT = 1e-9  # relative: printed digits, only the arithmetic of the formula is rounded


def level(limits, population, megahertz, effect, scope):
    """The one level of a test at a frequency."""
    (found,) = (
        level
        for level in reference_levels(limits, population, megahertz * 1e6)
        if (level.effect, level.scope) == (effect, scope)
    )
    return found


def assert_cells(found, electric, magnetic, density):
    """E [V/m], H [A/m], S [W/m2]; None where nothing is printed."""
    for value, printed in (
        (found.electric, electric),
        (found.magnetic, magnetic),
        (found.power_density, density),
    ):
        assert value is None if printed is None else value == pytest.approx(printed, rel=EXACT)


def kinds(limits, population, megahertz):
    """(effect, scope, spatial, averaging time in minutes) of every level, in order."""
    return [
        (level.effect, level.scope, level.spatial, level.averaging_time_s / 60)
        for level in reference_levels(limits, population, megahertz * 1e6)
    ]
