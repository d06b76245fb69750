"""European Union, workers: action levels, 3 kHz to 300 GHz."""

from exposure.limits.tables import GHZ, HZ, MICROTESLA, MINUTE, Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import Pulses, RulesOfUse

TITLE = "Directive 2013/35/EU on the exposure of workers to electromagnetic fields, action levels"
EDITION = "2013"
REFERENCE = "Official Journal L 179, 29.6.2013, pp. 1-21 (pages from memory)"
POPULATIONS = ("occupational",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="2013/35/EU: linear in field for Annex II, squares of E and of B apart for Annex III",
)
PULSES = Pulses(
    fields=(),
    densities=((Band(6000.0, 300_000.0), 1000.0),),
    clause="2013/35/EU, Annex III, Table B1 (S over a pulse at most 1000 times the action level)",
)
USE = RulesOfUse(
    cautions=(
        "low action levels of Annex II; the high ones (610 V/m; limbs 300 microtesla) need measures",
        "maximum at the worker's position: no average over the body",
        "limb current 100 mA, 10 to 110 MHz, and contact current 40 mA, 100 kHz to 110 MHz, are other tests",
        "E and B above 10 GHz are averaged over the shorter time that is printed for S: the safe side",
        "S above 10 GHz: mean over 20 cm2, on 1 cm2 at most 20 times the level",
    ),
    pulses={"occupational": PULSES},
)

# f in Hz, B in microtesla; edges in MHz.  "3 kHz <= f <= 10 MHz"; E low action level
ANNEX_II = (Row(0.003, 10.0, 170.0, 100.0, None),)
# "0.1 <= f < 1 MHz", ...: the upper end belongs to the next row.  B is from memory, confidence 0.97
ANNEX_III = (
    #   MHz          E V/m               B microtesla        S W/m2
    Row(0.1, 1.0, 610.0, (2.0e6, -1, HZ), None, without_high=True),
    Row(1.0, 10.0, (6.1e8, -1, HZ), (2.0e6, -1, HZ), None, without_high=True),
    Row(10.0, 400.0, 61.0, 0.2, None, without_high=True),
    Row(400.0, 2000.0, (3e-3, 0.5, HZ), (1e-5, 0.5, HZ), None, without_high=True),
    Row(2000.0, 6000.0, 140.0, 0.45, None, without_high=True),
    Row(6000.0, 300_000.0, 140.0, 0.45, 50.0),
)
SIX_MINUTES = Band(0.1, 10_000.0)
SHORTER = Band(10_000.0, 300_000.0, without_low=True)


def tables(annex_ii: str, annex_iii: str) -> tuple[Table, ...]:
    """Both annexes under the clauses of the document that prints them."""
    short = (68 * MINUTE, -1.05, GHZ)
    in_microtesla = {"magnetic_unit": MICROTESLA}
    return (
        Table("stimulation", "any", "peak", 0.0, annex_ii, ANNEX_II, **in_microtesla),
        Table(
            "heating", "whole_body", "peak", 360.0, annex_iii, ANNEX_III, band=SIX_MINUTES, **in_microtesla
        ),
        Table("heating", "whole_body", "peak", short, annex_iii, ANNEX_III, band=SHORTER, **in_microtesla),
    )


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The action levels of Annex II (to 10 MHz) and Annex III (from 100 kHz) at a frequency [Hz]."""
    clauses = "2013/35/EU, Annex II, Tables B1 and B2", "2013/35/EU, Annex III, Table B1"
    return levels_of("eu_2013_35", tables(*clauses), frequency, "lower frequencies are not carried")
