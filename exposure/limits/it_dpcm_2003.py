"""Italy: exposure limit and attention value, 100 kHz to 300 GHz."""

from exposure.limits.tables import Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import RulesOfUse

TITLE = "DPCM 8 luglio 2003 (100 kHz to 300 GHz): exposure limits, attention values and quality objectives"
EDITION = "2003, attention values as changed on 29 April 2024"
REFERENCE = "DPCM 8 July 2003, Annex B, Tables 1 to 3 (numbers of the tables from memory)"
POPULATIONS = ("general_public",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: no limit of brief local exposure
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="DPCM 8 July 2003, several sources (the way to sum was not seen)",
    verified=False,
)
USE = RulesOfUse(
    cautions=(
        "the attention value (24 hours) holds in buildings occupied 4 hours a day or more and their grounds; "
        "it is returned everywhere, which is the safe side",
        "H above 3 GHz is 0.1 A/m as in DM 381/1998 (40/377 = 0.106); the decree of 2003 prints 0.01",
    ),
)

# f in MHz; the lower end of a range is exclusive
TABLE_1_LIMIT = (
    #   MHz             E V/m   H A/m   S W/m2
    Row(0.1, 3.0, 60.0, 0.2, None, without_low=True),
    Row(3.0, 3000.0, 20.0, 0.05, 1.0, without_low=True),
    Row(3000.0, 300_000.0, 40.0, 0.1, 4.0, without_low=True),
)
# S is printed from 3 MHz (from memory)
TABLE_2_ATTENTION = (
    Row(0.1, 3.0, 15.0, 0.039, None, without_low=True),
    Row(3.0, 300_000.0, 15.0, 0.039, 0.59, without_low=True),
)
TABLES = (
    Table("heating", "whole_body", "mean", 360.0, "DPCM 8 July 2003, Annex B, Table 1", TABLE_1_LIMIT),
    Table(
        "heating",
        "whole_body",
        "mean",
        86_400.0,
        "DPCM 8 July 2003, Annex B, Table 2 (attention value since 29 April 2024)",
        TABLE_2_ATTENTION,
    ),
)


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """Limit and attention value at a frequency [Hz]."""
    return levels_of("it_dpcm_2003", TABLES, frequency, "the lower end is exclusive")
