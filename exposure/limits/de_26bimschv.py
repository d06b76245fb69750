"""Germany, general public: the 26th ordinance, 3 kHz to 300 GHz."""

from exposure.limits.icnirp_1998 import PULSES
from exposure.limits.tables import MICROTESLA, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import Pulses, RulesOfUse

TITLE = "26. BImSchV (Verordnung über elektromagnetische Felder), as BEMFV applies it to transmitters"
EDITION = "2013"
REFERENCE = "26. BImSchV as announced on 14 August 2013, Annexes 1a and 1b; BEMFV"
POPULATIONS = ("general_public",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="26. BImSchV, Annex 2: linear sums for Annex 1a to 10 MHz, squares for Annex 1b above 100 kHz",
)
USE = RulesOfUse(
    cautions=(
        "Annexes 1a and 1b both apply from 100 kHz to 10 MHz; 1a takes the peak envelope power",
        "value at the place: no average over the body",
        "due from 10 W EIRP of all transmitters of a site; amateurs notify before the first use",
        "active implants, 9 kHz to 50 MHz: values of DIN EN 50527 also count and are not in this set",
        "peak values 9 to 100 kHz: at most 1.5 times Annex 1a",
    ),
    pulses={
        "general_public": Pulses(
            fields=PULSES.fields,
            densities=(),
            clause="26. BImSchV (peak at most 6.93 f^0.664 times Annex 1b to 10 MHz, 32 times above)",
        )
    },
)

# rms, not averaged; E in V/m, B in microtesla
ANNEX_1A = (Row(0.003, 10.0, 83.0, 27.0, None),)
# f in MHz, squares averaged over 6 minutes; no column of S.  The lower value counts at an edge
ANNEX_1B = (
    #   MHz             E V/m          H A/m
    Row(0.1, 1.0, 87.0, (0.73, -1), None),
    Row(1.0, 10.0, (87.0, -0.5), (0.73, -1), None),
    Row(10.0, 400.0, 28.0, 0.073, None),
    Row(400.0, 2000.0, (1.375, 0.5), (0.0037, 0.5), None),
    Row(2000.0, 300_000.0, 61.0, 0.16, None),
)
TABLES = (
    Table("stimulation", "any", "peak", 0.0, "26. BImSchV, Annex 1a", ANNEX_1A, magnetic_unit=MICROTESLA),
    Table("heating", "whole_body", "peak", 360.0, "26. BImSchV, Annex 1b", ANNEX_1B),
)


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The limits of Annex 1a (to 10 MHz) and Annex 1b (from 100 kHz) at a frequency [Hz]."""
    return levels_of("de_26bimschv", TABLES, frequency, "lower frequencies are not carried")
