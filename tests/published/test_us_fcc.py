"""Table 1 of 47 CFR 1.1310(e)(1), as printed (read in OET Bulletin 65 Supplement B, 1997, appendix A,
p. 47, which prints the same numbers; verified against the rule's text in the project's facts)."""

import pytest

from exposure import OutOfScopeError, reference_levels

ETA = 376.730313668

OCCUPATIONAL = [
    # MHz      E V/m          H A/m         S mW/cm2        minutes
    (0.3, 614, 1.63, 100, 6),
    (2.0, 614, 1.63, 100, 6),
    (3.0, 614, 1.63, 100, 6),
    (7.0, 1842 / 7.0, 4.89 / 7.0, 900 / 49.0, 6),
    (29.9, 1842 / 29.9, 4.89 / 29.9, 900 / 29.9**2, 6),
    (100.0, 61.4, 0.163, 1.0, 6),
    (299.0, 61.4, 0.163, 1.0, 6),
    (440.0, None, None, 440 / 300, 6),
    (1500.0, None, None, 5, 6),
    (10_000.0, None, None, 5, 6),
    (100_000.0, None, None, 5, 6),
]
GENERAL = [
    (0.3, 614, 1.63, 100, 30),
    (1.0, 614, 1.63, 100, 30),
    (1.34, 614, 1.63, 100, 30),
    (1.9, 824 / 1.9, 2.19 / 1.9, 180 / 1.9**2, 30),
    (14.2, 824 / 14.2, 2.19 / 14.2, 180 / 14.2**2, 30),
    (29.9, 824 / 29.9, 2.19 / 29.9, 180 / 29.9**2, 30),
    (50.0, 27.5, 0.073, 0.2, 30),
    (299.0, 27.5, 0.073, 0.2, 30),
    (440.0, None, None, 440 / 1500, 30),
    (1500.0, None, None, 1.0, 30),
    (5800.0, None, None, 1.0, 30),
    (100_000.0, None, None, 1.0, 30),
]


@pytest.mark.parametrize(
    "population, row",
    [("occupational", row) for row in OCCUPATIONAL] + [("general_public", row) for row in GENERAL],
)
def test_every_cell_of_table_1(population, row):
    """Printed digits, exact; 1 mW/cm2 is 10 W/m2.  At an edge of two rows the lower value counts."""
    megahertz, electric, magnetic, density, minutes = row

    (level,) = reference_levels("us_fcc", population, megahertz * 1e6)

    assert level.electric == (None if electric is None else pytest.approx(electric, rel=1e-12))
    assert level.magnetic == (None if magnetic is None else pytest.approx(magnetic, rel=1e-12))
    assert level.power_density == pytest.approx(10 * density, rel=1e-9)
    assert level.averaging_time_s == 60 * minutes
    assert (level.effect, level.scope, level.spatial) == ("heating", "whole_body", "mean")
    assert "1.1310(e)(1)" in level.clause and level.verified


@pytest.mark.parametrize(
    "population, edge, electric, magnetic, density",
    [
        # both rows hold where the text assigns no edge; the lower of each column
        ("occupational", 3.0, min(614, 1842 / 3), min(1.63, 4.89 / 3), 1000.0),
        ("occupational", 30.0, min(1842 / 30, 61.4), min(4.89 / 30, 0.163), 10.0),
        ("general_public", 1.34, min(614, 824 / 1.34), min(1.63, 2.19 / 1.34), min(1000.0, 1800 / 1.34**2)),
        ("general_public", 30.0, 824 / 30, min(2.19 / 30, 0.073), 2.0),
    ],
)
def test_at_an_edge_the_lower_of_each_column_counts(population, edge, electric, magnetic, density):
    (level,) = reference_levels("us_fcc", population, edge * 1e6)

    assert level.electric == pytest.approx(electric, rel=1e-12)
    assert level.magnetic == pytest.approx(magnetic, rel=1e-12)
    assert level.power_density == pytest.approx(density, rel=1e-9)


@pytest.mark.parametrize("population", ["occupational", "general_public"])
def test_at_300_mhz_the_fields_of_the_lower_row_still_hold(population):
    (level,) = reference_levels("us_fcc", population, 300e6)

    assert level.electric is not None and level.magnetic is not None and level.power_density is not None


@pytest.mark.parametrize("edge", [1.34, 3.0, 30.0, 300.0, 1500.0])
@pytest.mark.parametrize("population", ["occupational", "general_public"])
def test_levels_do_not_jump_at_an_edge_by_more_than_print(population, edge):
    """47 CFR 1.1310: neighbouring rows differ by at most 0.4 % in field, 0.8 % in density."""
    (below,), (above,) = (
        reference_levels("us_fcc", population, edge * 1e6 * side) for side in (0.999999, 1.000001)
    )

    assert below.power_density == pytest.approx(above.power_density, rel=0.008)
    if below.electric and above.electric:
        assert below.electric == pytest.approx(above.electric, rel=0.004)
        assert below.magnetic == pytest.approx(above.magnetic, rel=0.004)


@pytest.mark.parametrize("megahertz", [0.5, 2.0, 14.2, 100.0])
@pytest.mark.parametrize("population", ["occupational", "general_public"])
def test_fields_and_density_are_one_plane_wave(population, megahertz):
    """E^2/377 and 377 H^2 give the printed S within its rounding (OET 65 Supplement B, p. 47): 1 %."""
    (level,) = reference_levels("us_fcc", population, megahertz * 1e6)

    assert level.electric**2 / ETA == pytest.approx(level.power_density, rel=0.01)
    assert level.magnetic**2 * ETA == pytest.approx(level.power_density, rel=0.01)


@pytest.mark.parametrize("megahertz", [0.2999, 100_001.0])
def test_outside_the_table_it_refuses(megahertz):
    with pytest.raises(OutOfScopeError, match="us_fcc"):
        reference_levels("us_fcc", "general_public", megahertz * 1e6)
