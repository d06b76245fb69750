"""Australia: the ARPANSA standard, which takes the values of ICNIRP 2020."""

from dataclasses import replace

from exposure.limits.icnirp_2020 import BRIEF_LOCAL_ABOVE as _BRIEF_LOCAL_ABOVE
from exposure.limits.icnirp_2020 import SUMMATION as _SUMMATION
from exposure.limits.icnirp_2020 import USE as _USE
from exposure.limits.icnirp_2020 import tables
from exposure.limits.tables import levels_of
from exposure.limits.types import Level

TITLE = "ARPANSA standard for limiting exposure to radiofrequency fields (100 kHz to 300 GHz), RPS S-1"
EDITION = "Rev. 1, 2021"
REFERENCE = (
    "ARPANSA, Radiation Protection Series S-1 (Rev. 1), 2021; its tables were not seen: that the numbers are "
    "those of ICNIRP 2020 rests on ARPANSA's statement (confidence 0.95)"
)
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = _BRIEF_LOCAL_ABOVE
SUMMATION = replace(_SUMMATION, clause=f"RPS S-1 (Rev. 1), as {_SUMMATION.clause}")
USE = replace(
    _USE,
    cautions=(
        "basic restrictions are mandatory, reference levels are evidence",
        "pregnant workers: levels of the general public; avoidable public exposure is to be minimised",
        *_USE.cautions,
    ),
)
CLAUSES = tuple(f"RPS S-1 (Rev. 1), values of ICNIRP 2020, Table {number}" for number in (5, 6, 8))


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The levels at a frequency [Hz]."""
    return levels_of("au_rps_s1_2021", tables(population, CLAUSES), frequency)
