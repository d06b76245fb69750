"""Tables from print, and the lowest attenuation of cables."""

import csv
import math

import pytest

from exposure.published.cables import BANDS, CABLES, COLUMNS, LAW, POINTS, REGULATOR, attenuation
from exposure.published.metals import METALS
from exposure.published.modes import MODES, duty_factor_of_amplitude_modulation
from exposure.published.soils import SOILS

HUNDRED_FEET = 30.48


@pytest.mark.parametrize(
    ("mode", "percent"),
    [
        ("ssb", 20),
        ("ssb_processed", 50),
        ("fm", 100),
        ("rtty", 100),
        ("data", 100),
        ("cw", 40),
        ("carrier", 100),
    ],
)
def test_duty_factors_are_those_of_the_regulators_table(mode, percent):
    """FCC OET Bulletin 65 Supplement B, 1997, table 2, p. 14.  Exact."""
    assert MODES[mode].percent == percent


@pytest.mark.parametrize(("mode", "percent"), [("am", 50), ("sstv", 100), ("atv", 80)])
def test_of_two_printed_duty_factors_the_larger_is_taken(mode, percent):
    """The worksheet of the same document prints AM voice 0.5 and 0.3, television 0.6 and 0.8.  Exact."""
    assert MODES[mode].percent == percent


@pytest.mark.parametrize("depth", [0.1, 0.5, 0.8, 1.0])
def test_no_tone_exceeds_the_bound_for_amplitude_modulation(depth):
    """A tone has (1 + m^2/2)/(1 + m)^2 (facts/formulas.md 14); measured here over one period, 1e-12."""
    phases = [2 * math.pi * n / 64 for n in range(64)]
    mean = sum((1 + depth * math.cos(phase)) ** 2 for phase in phases) / 64
    tone = mean / (1 + depth) ** 2

    assert tone == pytest.approx((1 + depth**2 / 2) / (1 + depth) ** 2, rel=1e-12)
    assert tone < duty_factor_of_amplitude_modulation(depth)


@pytest.mark.parametrize(
    ("soil", "permittivity", "conductivity"),
    [
        ("average", 13, 0.005),
        ("wet", 30, 0.01),
        ("medium_dry", 15, 0.001),
        ("very_dry", 3, 0.0001),
        ("fresh_water", 80, 0.003),
        ("sea_water", 70, 5),
    ],
)
def test_soils_are_those_of_their_sources(soil, permittivity, conductivity):
    """OET 65 Supplement B p. 31 (average); ITU-R P.527-3 figure 1 (from memory).  Exact."""
    assert (SOILS[soil].relative_permittivity, SOILS[soil].conductivity) == (permittivity, conductivity)


@pytest.mark.parametrize(
    ("metal", "surface_resistance"),
    [("silver", 2.52e-7), ("copper", 2.61e-7), ("aluminium", 3.26e-7), ("brass", 5.01e-7)],
)
def test_metals_have_the_surface_resistance_of_the_textbook(metal, surface_resistance):
    """Rs = sqrt(pi f mu0 / sigma) [ohm at 1 Hz]; Ramo, Whinnery, Van Duzer (from memory), 3 digits: 0.5 %."""
    computed = math.sqrt(math.pi * 4e-7 * math.pi / METALS[metal])

    assert computed == pytest.approx(surface_resistance, rel=5e-3)


PRINTED = """\
20 m,1.7,1.1,0.8,0.6,0.5,0.3,0
2 m,6.5,3.6,3.0,2.0,1.6,1.0,0.7
70 cm,12,6.5,5.8,3.6,2.8,1.9,
"""


@pytest.mark.parametrize("row", list(csv.reader(PRINTED.splitlines())), ids=lambda row: row[0])
def test_rows_of_the_regulators_cable_table_are_as_printed(row):
    """OET 65 Supplement B, appendix B, worksheet instructions p. 3 (published case E01).  Exact."""
    assert REGULATOR[row[0]] == tuple(row[1:])


@pytest.mark.parametrize("cable", CABLES)
@pytest.mark.parametrize("band", BANDS)
def test_no_more_loss_is_credited_than_the_regulators_table_prints(cable, band):
    """Published case E01: the table overstates loss, so a credited loss lies below it, on both band edges."""
    printed = REGULATOR[band][COLUMNS.index(CABLES[cable])]

    for edge in BANDS[band]:
        credited = attenuation(cable, edge * 1e6).per_metre * HUNDRED_FEET
        assert 0 <= credited <= float(printed or math.inf)


@pytest.mark.parametrize(
    ("cable", "f", "printed"), [(c, *p) for c, sets in POINTS.items() for s in sets for p in s]
)
def test_no_more_loss_is_credited_than_any_other_source_prints(cable, f, printed):
    """Published case E02: maxima of MIL-C-17 and a guide, second-hand.  Rounding of a double."""
    assert attenuation(cable, f * 1e6).per_metre * HUNDRED_FEET <= printed * (1 + 1e-12)


@pytest.mark.parametrize(
    ("cable", "f", "decibels"), [("RG-213", 14.2, 0.62 * math.sqrt(14.2) + 0.006 * 14.2)]
)
def test_the_law_is_credited_where_it_is_the_lowest(cable, f, decibels):
    """k1 sqrt(f) + k2 f per 100 m (from memory): 2.42 dB, where the table prints 0.8 dB/100 ft."""
    assert attenuation(cable, f * 1e6).per_metre * 100 == pytest.approx(decibels, rel=1e-12)
    assert cable in LAW


@pytest.mark.parametrize("frequency", [1.0e6, 1.79e6, 2.5e9, 10e9])
@pytest.mark.parametrize("cable", CABLES)
def test_no_loss_is_credited_outside_the_tables(cable, frequency):
    """Never extrapolated: the safe value is zero, and the source says so."""
    found = attenuation(cable, frequency)

    assert found.per_metre == 0 and "none is credited" in found.source


def test_attenuation_never_falls_as_the_band_rises():
    """Conductor and dielectric loss both grow with frequency; the printed columns agree."""
    for column in range(len(COLUMNS)):
        printed = [float(row[column]) for row in REGULATOR.values() if row[column]]
        assert printed == sorted(printed)
