"""Published limits: one module for each edition of a document."""

from types import ModuleType

from exposure.errors import OutOfScopeError
from exposure.limits import (
    au_rps_s1_2021,
    ca_sc6_2015,
    ch_nisv,
    de_26bimschv,
    de_emfv_2016,
    eu_1999_519,
    eu_2013_35,
    icnirp_1998,
    icnirp_2010,
    icnirp_2020,
    ieee_c95_1_2019,
    it_dpcm_2003,
    jp_mic,
    uk_icnirp_1998,
    uk_icnirp_2020,
    us_fcc,
)
from exposure.limits.types import Level
from exposure.limits.use import ALL_PRINTED, Alternatives, Zone

_MODULES = {
    "us_fcc": us_fcc,
    "icnirp_1998": icnirp_1998,
    "icnirp_2010": icnirp_2010,
    "icnirp_2020": icnirp_2020,
    "eu_1999_519": eu_1999_519,
    "eu_2013_35": eu_2013_35,
    "ieee_c95_1_2019": ieee_c95_1_2019,
    "ca_sc6_2015": ca_sc6_2015,
    "au_rps_s1_2021": au_rps_s1_2021,
    "jp_mic": jp_mic,
    "uk_icnirp_1998": uk_icnirp_1998,
    "uk_icnirp_2020": uk_icnirp_2020,
    "de_26bimschv": de_26bimschv,
    "de_emfv_2016": de_emfv_2016,
    "ch_nisv": ch_nisv,
    "it_dpcm_2003": it_dpcm_2003,
}
DOCUMENTS = tuple(_MODULES)


def document(limits_id: str) -> ModuleType:
    """The module of a document: TITLE, EDITION, REFERENCE, POPULATIONS, SUMMATION, USE, reference_levels.

    Raises
    ------
    OutOfScopeError
        An id that is not known.
    """
    if limits_id not in _MODULES:
        raise OutOfScopeError(f"there are no limits called {limits_id!r}; known are {', '.join(DOCUMENTS)}")
    return _MODULES[limits_id]


def reference_levels(limits_id: str, population: str, frequency_hz: float) -> tuple[Level, ...]:
    """Every row of a document that applies at a frequency [Hz], in printed order.

    Raises
    ------
    OutOfScopeError
        An unknown document, a population it has no levels for, or a frequency outside it.
    """
    module = document(limits_id)
    if population not in module.POPULATIONS:
        raise OutOfScopeError(
            f"{limits_id} has no levels for {population!r}; it has {', '.join(module.POPULATIONS)}"
        )
    return module.reference_levels(population, float(frequency_hz))


def ceilings(limits_id: str, population: str, frequency_hz: float) -> tuple[Level, ...]:
    """Ceilings of instantaneous exposure that a document's rule of pulses adds to its averaged levels.

    They are judged at peak envelope power and must be met besides `reference_levels`; errors as there.
    """
    levels = reference_levels(limits_id, population, frequency_hz)
    pulses = document(limits_id).USE.pulses.get(population)
    if pulses is None:
        return ()
    averaged = (level for level in levels if level.averaging_time_s > 0)
    found = (pulses.level(level, frequency_hz) for level in averaged)
    return tuple(level for level in found if level is not None)


def stimulation_sum_levels(limits_id: str, population: str, frequency_hz: float) -> tuple[Level, ...]:
    """Levels of a linear sum that a document asks for only where two or more transmissions are summed.

    Instantaneous, at peak envelope power, besides `reference_levels`; errors as there.
    """
    reference_levels(limits_id, population, frequency_hz)
    table = document(limits_id).USE.stimulation_sums.get(population)
    level = None if table is None else table.level(frequency_hz)
    return () if level is None else (level,)


def not_limited(limits_id: str, frequency_hz: float) -> str | None:
    """What a document leaves to others at a frequency [Hz], so that a pass by it alone decides nothing."""
    silent = document(limits_id).USE.silent
    return silent[1] if silent is not None and frequency_hz > silent[0] else None


def usable_quantities(limits_id: str, frequency_hz: float, zone: Zone) -> Alternatives:
    """Which quantities show compliance in a zone (`use.zone`) at a frequency [Hz].

    One alternative must be met with all its quantities; () : the document has no reference level there.
    Where a document has no such rule every printed quantity counts.
    """
    rows = document(limits_id).USE.zones
    covering = (row for row in rows if row.band.covers(frequency_hz / 1e6))
    row = next(covering, None)
    return ALL_PRINTED if row is None else getattr(row, zone)
