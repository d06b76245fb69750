"""ICNIRP 2010: nerve stimulation, carried from 3 kHz to 10 MHz."""

from exposure.limits.tables import Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import RulesOfUse

TITLE = (
    "ICNIRP guidelines for limiting exposure to time-varying electric and magnetic fields (1 Hz to 100 kHz)"
)
EDITION = "2010"
REFERENCE = "ICNIRP, Health Physics 99 (2010) 818-836"
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: every level is instantaneous
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="ICNIRP 2010, simultaneous exposure: linear sums to 10 MHz, E and H apart",
)
USE = RulesOfUse(
    cautions=(
        "nerve stimulation only: above 100 kHz heating has to be judged by another set",
        "above 100 kHz ICNIRP 2020 carries the same values: only one of the two is to be applied there",
        "levels take the peak envelope power: no averaging, no duty factor",
        "contact current (Table 5): 0.2 f (0.4 f) mA from 2.5 to 100 kHz, f in kHz; 20 (40) mA to 10 MHz",
    ),
    silent=(0.1e6, "heating above 100 kHz is not limited by icnirp_2010: another set has to judge it"),
)

# f in MHz; printed from 3 kHz to 10 MHz as one row
TABLE_3_OCCUPATIONAL = (Row(0.003, 10.0, 170.0, 80.0, None),)
TABLE_4_GENERAL = (Row(0.003, 10.0, 83.0, 21.0, None),)
TABLES = {
    "occupational": Table("stimulation", "any", "peak", 0.0, "ICNIRP 2010, Table 3", TABLE_3_OCCUPATIONAL),
    "general_public": Table("stimulation", "any", "peak", 0.0, "ICNIRP 2010, Table 4", TABLE_4_GENERAL),
}


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The level of Table 3 or 4 at a frequency [Hz]."""
    remark = "its rows below 3 kHz are not carried, above 10 MHz there are none"
    return levels_of("icnirp_2010", (TABLES[population],), frequency, remark)
