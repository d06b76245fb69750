"""ICNIRP 2020: reference levels from 100 kHz to 300 GHz."""

from exposure.limits.tables import GHZ, Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import ANY_ONE, E_AND_H, NONE_USABLE, ONLY_S, S_OR_BOTH, RulesOfUse, ZoneRow

TITLE = "ICNIRP guidelines for limiting exposure to electromagnetic fields (100 kHz to 300 GHz)"
EDITION = "2020"
REFERENCE = (
    "ICNIRP, Health Physics 118 (2020) 483-524; nerve stimulation: ICNIRP, Health Physics 99 (2010) 818-836"
)
POPULATIONS = ("general_public", "occupational")
# Table 7 (from memory, confidence 0.92) limits the energy of any burst of t < 360 s above 400 MHz to
# U(t) = S_L 360 s (0.05 + 0.95 sqrt(t/360 s)); since t <= 360 s is less than that, S at its peak below the
# level S_L of Table 6 is always enough.  Above this frequency [Hz] the assessment takes no time average.
BRIEF_LOCAL_ABOVE = 400e6
SUMMATION = Summation(
    electric_and_magnetic_add=(("heating", "whole_body", 30e6),),
    clause="ICNIRP 2020, simultaneous exposure, whole-body reference levels (from memory)",
)
_ZONES = "ICNIRP 2020, reference levels, far and near field zones"
USE = RulesOfUse(
    cautions=(
        "no level for E and H above 2 GHz, none for S up to 30 MHz: nothing is carried over from 1998",
        "in the reactive near field above 2 GHz there is no reference level: absorbed power has to be found",
        "local levels above 6 GHz are means over a square 4 cm2 (above 30 GHz also twice the level on 1 cm2)",
        "limb current 45 mA (general public), 100 mA (occupational), to 110 MHz, is a test of its own",
        "stimulation levels take the peak envelope power: no averaging, no duty factor",
    ),
    zones=(
        ZoneRow(Band(0.1, 30.0), E_AND_H, E_AND_H, E_AND_H, _ZONES),
        # the cell of the reactive near field is from memory, confidence 0.93
        ZoneRow(Band(30.0, 2000.0, without_low=True), E_AND_H, S_OR_BOTH, ANY_ONE, _ZONES),
        ZoneRow(Band(2000.0, 300_000.0, without_low=True), NONE_USABLE, ONLY_S, ONLY_S, _ZONES),
    ),
)

# f in MHz.  The text assigns edges: the lower end of a range is exclusive, 100 kHz is included.
TABLE_5 = {
    "occupational": (
        #   MHz             E V/m         H A/m        S W/m2
        Row(0.1, 30.0, (660.0, -0.7), (4.9, -1), None),
        Row(30.0, 400.0, 61.0, 0.16, 10.0, without_low=True),
        Row(400.0, 2000.0, (3.0, 0.5), (0.008, 0.5), (1 / 40, 1), without_low=True),
        Row(2000.0, 300_000.0, None, None, 50.0, without_low=True),
    ),
    "general_public": (
        Row(0.1, 30.0, (300.0, -0.7), (2.2, -1), None),
        Row(30.0, 400.0, 27.7, 0.073, 2.0, without_low=True),
        Row(400.0, 2000.0, (1.375, 0.5), (0.0037, 0.5), (1 / 200, 1), without_low=True),
        Row(2000.0, 300_000.0, None, None, 10.0, without_low=True),
    ),
}
TABLE_6 = {
    "occupational": (
        Row(0.1, 30.0, (1504.0, -0.7), (10.8, -1), None),
        Row(30.0, 400.0, 139.0, 0.36, 50.0, without_low=True),
        Row(400.0, 2000.0, (10.58, 0.43), (0.0274, 0.43), (0.29, 0.86), without_low=True),
        Row(2000.0, 6000.0, None, None, 200.0, without_low=True),
        Row(6000.0, 300_000.0, None, None, (275.0, -0.177, GHZ), without_low=True, without_high=True),
        Row(300_000.0, 300_000.0, None, None, 100.0),
    ),
    "general_public": (
        Row(0.1, 30.0, (671.0, -0.7), (4.9, -1), None),
        Row(30.0, 400.0, 62.0, 0.163, 10.0, without_low=True),
        Row(400.0, 2000.0, (4.72, 0.43), (0.0123, 0.43), (0.058, 0.86), without_low=True),
        Row(2000.0, 6000.0, None, None, 40.0, without_low=True),
        Row(6000.0, 300_000.0, None, None, (55.0, -0.177, GHZ), without_low=True, without_high=True),
        Row(300_000.0, 300_000.0, None, None, 20.0),
    ),
}
STIMULATION = {
    "occupational": (Row(0.1, 10.0, 170.0, 80.0, None),),
    "general_public": (Row(0.1, 10.0, 83.0, 21.0, None),),
}
CLAUSES = (
    "ICNIRP 2020, Table 5",
    "ICNIRP 2020, Table 6",
    "ICNIRP 2020, Table 8 (values of ICNIRP 2010, Tables 3 and 4)",
)


def tables(population: str, clauses=CLAUSES) -> tuple[Table, ...]:
    """Whole body, local and stimulation levels, under the clauses of the document that prints them."""
    whole_body, local, stimulation = clauses
    return (
        Table("heating", "whole_body", "mean", 1800.0, whole_body, TABLE_5[population]),
        Table("heating", "local", "peak", 360.0, local, TABLE_6[population]),
        Table("stimulation", "any", "peak", 0.0, stimulation, STIMULATION[population]),
    )


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The levels of Tables 5, 6 and, up to 10 MHz, 8 at a frequency [Hz]."""
    return levels_of("icnirp_2020", tables(population), frequency)
