"""ICNIRP 1998: reference levels, carried from 3 kHz (occupational 0.82 kHz) to 300 GHz."""

from exposure.limits.tables import GHZ, MINUTE, Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import Pulses, RulesOfUse

TITLE = "ICNIRP guidelines for limiting exposure to time-varying fields (up to 300 GHz)"
EDITION = "1998"
REFERENCE = "ICNIRP, Health Physics 74 (1998) 494-522 (volume and pages from memory)"
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="ICNIRP 1998, simultaneous exposure: squares of E and of H apart above 100 kHz, "
    "linear sums up to 10 MHz",
)

# f in MHz.  Edges are not assigned by the text: the lower value counts.
TABLE_6_OCCUPATIONAL = (
    #   MHz             E V/m         H A/m        S W/m2
    Row(0.00082, 0.065, 610.0, 24.4, None),
    Row(0.065, 1.0, 610.0, (1.6, -1), None),
    Row(1.0, 10.0, (610.0, -1), (1.6, -1), None),
    Row(10.0, 400.0, 61.0, 0.16, 10.0),
    Row(400.0, 2000.0, (3.0, 0.5), (0.008, 0.5), (1 / 40, 1)),
    Row(2000.0, 300_000.0, 137.0, 0.36, 50.0),
)
TABLE_7_GENERAL = (
    Row(0.003, 0.15, 87.0, 5.0, None),
    Row(0.15, 1.0, 87.0, (0.73, -1), None),
    Row(1.0, 10.0, (87.0, -0.5), (0.73, -1), None),
    Row(10.0, 400.0, 28.0, 0.073, 2.0),
    Row(400.0, 2000.0, (1.375, 0.5), (0.0037, 0.5), (1 / 200, 1)),
    Row(2000.0, 300_000.0, 61.0, 0.16, 10.0),
)
ROWS = {"occupational": TABLE_6_OCCUPATIONAL, "general_public": TABLE_7_GENERAL}
CLAUSES = {"occupational": "ICNIRP 1998, Table 6", "general_public": "ICNIRP 1998, Table 7"}

# 6 minutes from 100 kHz to 10 GHz, 68/f^1.05 minutes (f in GHz) above, not averaged below 100 kHz
NOT_AVERAGED = Band(0.0, 0.1, without_high=True)
SIX_MINUTES = Band(0.1, 10_000.0)
SHORTER = Band(10_000.0, 300_000.0, without_low=True)

PULSES = Pulses(
    fields=((Band(0.1, 10.0), (6.93, 0.664)), (Band(10.0, 300_000.0, without_low=True), 32.0)),
    densities=((Band(10.0, 300_000.0, without_low=True), 1000.0),),
    clause="ICNIRP 1998, peak values (6.93 f^0.664 times the level to 10 MHz, 32 times above; S 1000 times)",
)

# what a linear sum over two or more transmissions divides by, 100 kHz to 10 MHz: for E the level to 1 MHz and
# a = 87 (610) V/m above, the same number; for H the level to 150 (65) kHz and b = 5 (24.4) A/m above
SUMS = {
    "occupational": (Row(0.1, 10.0, 610.0, 24.4, None),),
    "general_public": (Row(0.1, 10.0, 87.0, 5.0, None),),
}


def tables(population: str, clause: str, spatial="mean") -> tuple[Table, ...]:
    """The table of a population under the clause of the document that prints it."""
    rows = ROWS[population]
    return (
        Table("stimulation", "any", "peak", 0.0, clause, rows, band=NOT_AVERAGED),
        Table("heating", "whole_body", spatial, 360.0, clause, rows, band=SIX_MINUTES),
        Table("heating", "whole_body", spatial, (68 * MINUTE, -1.05, GHZ), clause, rows, band=SHORTER),
    )


def stimulation_sum(population: str) -> Table:
    """Levels of the linear sum over two or more transmissions, 100 kHz to 10 MHz."""
    clause = "ICNIRP 1998, simultaneous exposure, electrical stimulation (constants a and b)"
    return Table("stimulation", "any", "peak", 0.0, clause, SUMS[population])


USE = RulesOfUse(
    cautions=(
        "averages over the body only where the local limits of absorption are not exceeded",
        "limb current 45 mA (general public), 100 mA (occupational), 10 to 110 MHz, is a test of its own",
        "contact current 20 mA (general public), 40 mA (occupational), 100 kHz to 110 MHz, is another",
        "the document begins at lower frequencies than are carried here",
    ),
    pulses={population: PULSES for population in POPULATIONS},
    stimulation_sums={population: stimulation_sum(population) for population in POPULATIONS},
)


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The level of Table 6 or 7 at a frequency [Hz]."""
    return levels_of("icnirp_1998", tables(population, CLAUSES[population]), frequency)
