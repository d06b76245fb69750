"""United Kingdom by the edition of 2020: licence condition for the public, regulations for workers."""

from dataclasses import replace

from exposure.limits.eu_2013_35 import PULSES as WORKER_PULSES
from exposure.limits.eu_2013_35 import tables as worker_tables
from exposure.limits.icnirp_2020 import BRIEF_LOCAL_ABOVE as _BRIEF_LOCAL_ABOVE
from exposure.limits.icnirp_2020 import SUMMATION as _SUMMATION
from exposure.limits.icnirp_2020 import USE as _USE
from exposure.limits.icnirp_2020 import tables
from exposure.limits.tables import levels_of
from exposure.limits.types import Level
from exposure.limits.uk_icnirp_1998 import CONDITION, WORKERS

TITLE = "Licence condition on electromagnetic fields (ICNIRP 2020); Control of Electromagnetic Fields at Work"
EDITION = "ICNIRP 2020 by choice of the licensee; CEMFAW 2016"
REFERENCE = (
    "Ofcom licence condition, in force by band November 2021 to November 2022 (choice of the edition from "
    "memory, 0.75); Control of Electromagnetic Fields at Work Regulations 2016, which carry 2013/35/EU"
)
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = _BRIEF_LOCAL_ABOVE
# workers' sums are by the directive (E and B apart); adding them as ICNIRP 2020 does is the safe side
SUMMATION = _SUMMATION
USE = replace(_USE, cautions=(*CONDITION, *_USE.cautions), pulses={"occupational": WORKER_PULSES})
CLAUSES = tuple(f"Ofcom licence condition: ICNIRP 2020, Table {number}" for number in (5, 6, 8))


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """ICNIRP 2020 for the public, action levels for workers, at a frequency [Hz]."""
    mine = worker_tables(*WORKERS) if population == "occupational" else tables(population, CLAUSES)
    return levels_of("uk_icnirp_2020", mine, frequency)
