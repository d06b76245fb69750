"""The tests of a document for a population and the transmissions of a station."""

from dataclasses import replace

from exposure.assessment.ratios import Rule
from exposure.assessment.sums import of_levels
from exposure.errors import OutOfScopeError
from exposure.limits import ceilings, document, not_limited, reference_levels, stimulation_sum_levels
from exposure.limits.types import Level


def populations(limits_id: str) -> tuple[str, ...]:
    """Populations for which a document has levels."""
    return tuple(document(limits_id).POPULATIONS)


def rule(limits_id: str, population: str, emissions, unsolved=()) -> Rule:
    """All tests of a document, with a reason for each emission that it cannot judge.

    unsolved : (name, reason) of transmissions without a source; the set cannot be decided for them.
    """
    levels, missing = {}, [f"{name}: {reason}" for name, reason in unsolved]
    for emission in emissions:
        try:
            found = _judged_levels(limits_id, population, emission.frequency, len(emissions) > 1)
        except OutOfScopeError as error:
            missing.append(f"{emission.name}: {error}")
            continue
        left_to_others = not_limited(limits_id, emission.frequency)
        if left_to_others is not None:
            missing.append(f"{emission.name}: {left_to_others}")
        levels[emission.name] = tuple(level for level in found if _usable(level))
        missing += [
            f"{emission.name}: {limits_id} has no level to compare with for {level.effect}, {level.scope} "
            f"({level.clause})"
            for level in found
            if not _usable(level)
        ]
        if not found:
            missing.append(f"{emission.name}: {limits_id} gives no level at {emission.frequency / 1e6:g} MHz")
    return of_levels(limits_id, population, emissions, levels, document(limits_id).SUMMATION, tuple(missing))


def brief_local_above(limits_id: str) -> float:
    """Frequency above which a document also limits brief local exposure; infinite if never. [Hz]"""
    return getattr(document(limits_id), "BRIEF_LOCAL_ABOVE", float("inf"))


def _judged_levels(limits_id: str, population: str, frequency: float, several: bool) -> tuple[Level, ...]:
    """The levels as they are compared, with what a document's rules of pulses and of linear sums add.

    A local level is taken without time average where brief exposures are limited.
    """
    brief = frequency > brief_local_above(limits_id)
    printed = tuple(
        replace(level, averaging_time_s=0.0) if brief and level.scope == "local" else level
        for level in reference_levels(limits_id, population, frequency)
    )
    summed = stimulation_sum_levels(limits_id, population, frequency) if several else ()
    return (*printed, *ceilings(limits_id, population, frequency), *summed)


def averaging_times(limits_id: str, population: str, frequency: float) -> tuple[float, ...]:
    """Averaging times [s] of a document's levels at a frequency [Hz]; none outside the document."""
    try:
        return tuple(level.averaging_time_s for level in reference_levels(limits_id, population, frequency))
    except OutOfScopeError:
        return ()


def _usable(level: Level) -> bool:
    return not (level.electric is None and level.magnetic is None and level.power_density is None)
