"""European Union, general public: the values of ICNIRP 1998."""

from dataclasses import replace

from exposure.limits.icnirp_1998 import USE as USE_1998
from exposure.limits.icnirp_1998 import tables
from exposure.limits.tables import levels_of
from exposure.limits.types import Level, Summation

TITLE = "Council Recommendation 1999/519/EC on limiting exposure of the general public (0 Hz to 300 GHz)"
EDITION = "1999"
REFERENCE = (
    "Official Journal L 199, 30.7.1999, pp. 59-70 (pages from memory); values are those of ICNIRP 1998"
)
POPULATIONS = ("general_public",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="1999/519/EC, Annex IV: squares of E and of H apart above 100 kHz, linear sums up to 10 MHz",
)
USE = replace(
    USE_1998, cautions=("recommendation: national law decides whether it binds", *USE_1998.cautions)
)
CLAUSE = "1999/519/EC, Annex III, Table 2"


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The level of Table 2 at a frequency [Hz]."""
    return levels_of("eu_1999_519", tables(population, CLAUSE), frequency)
