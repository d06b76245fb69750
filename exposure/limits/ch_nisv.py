"""Switzerland: immission limits, the values of ICNIRP 1998 for the general public."""

from dataclasses import replace

from exposure.limits.icnirp_1998 import SUMMATION as _SUMMATION
from exposure.limits.icnirp_1998 import USE as _USE
from exposure.limits.icnirp_1998 import tables
from exposure.limits.tables import levels_of
from exposure.limits.types import Level

TITLE = "Verordnung über den Schutz vor nichtionisierender Strahlung (NISV), immission limits"
EDITION = "1999, as amended (date of the consolidation from memory)"
REFERENCE = "NISV of 23 December 1999 (SR 814.710), Annexes 1 and 2; values are those of ICNIRP 1998"
POPULATIONS = ("general_public",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = _SUMMATION
# Annex 1, no. 7, other services (from memory, 0.8): not a level of every station, so never returned
INSTALLATION_LIMIT = 3.0  # V/m, installation's own field at places of sensitive use
USE = replace(
    _USE,
    cautions=(
        "fixed transmitters from 6 W ERP that are on air 800 h a year or more at a site also have an "
        "installation limit of 3.0 V/m at places of sensitive use (from memory): not judged here",
        "value at the place: no average over the body",
        *_USE.cautions[1:],
    ),
)


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The immission limit at a frequency [Hz]."""
    return levels_of("ch_nisv", tables(population, "NISV, Annex 2 (immission limits)", "peak"), frequency)
