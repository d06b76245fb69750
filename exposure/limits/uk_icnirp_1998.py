"""United Kingdom by the edition of 1998: licence condition for the public, regulations for workers."""

from dataclasses import replace

from exposure.limits.eu_2013_35 import PULSES as WORKER_PULSES
from exposure.limits.eu_2013_35 import tables as worker_tables
from exposure.limits.icnirp_1998 import PULSES, stimulation_sum, tables
from exposure.limits.icnirp_1998 import SUMMATION as _SUMMATION
from exposure.limits.icnirp_1998 import USE as _USE
from exposure.limits.tables import levels_of
from exposure.limits.types import Level

TITLE = "Licence condition on electromagnetic fields (ICNIRP 1998); Control of Electromagnetic Fields at Work"
EDITION = "ICNIRP 1998 by choice of the licensee; CEMFAW 2016"
REFERENCE = (
    "Ofcom licence condition, in force by band November 2021 to November 2022 (choice of the edition from "
    "memory, 0.75); Control of Electromagnetic Fields at Work Regulations 2016, which carry 2013/35/EU"
)
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = _SUMMATION
CONDITION = (
    "applies to licences that permit more than 10 W EIRP (6.1 W ERP); records have to be kept",
    "the edition of ICNIRP is the licensee's choice (from memory): say which was used",
)
USE = replace(
    _USE,
    cautions=(*CONDITION, *_USE.cautions),
    pulses={"general_public": PULSES, "occupational": WORKER_PULSES},
    stimulation_sums={"general_public": stimulation_sum("general_public")},
)
WORKERS = (
    "CEMFAW 2016 (values of 2013/35/EU, Annex II, Tables B1 and B2)",
    "CEMFAW 2016 (values of 2013/35/EU, Annex III, Table B1)",
)
CLAUSE = "Ofcom licence condition: ICNIRP 1998, Table 7"


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """ICNIRP 1998 for the public, action levels for workers, at a frequency [Hz]."""
    mine = worker_tables(*WORKERS) if population == "occupational" else tables(population, CLAUSE)
    return levels_of("uk_icnirp_1998", mine, frequency)
