"""What a document says at a frequency, for people and for machines."""

from dataclasses import asdict

from exposure.errors import OutOfScopeError
from exposure.limits import ceilings, document, reference_levels, stimulation_sum_levels
from exposure.limits.tables import spoken
from exposure.limits.types import Level

HEADS = ("effect", "scope", "in space", "E [V/m]", "H [A/m]", "S [W/m2]", "averaged over", "clause")
UNITS = {
    "electric": "electric_v_per_m",
    "magnetic": "magnetic_a_per_m",
    "power_density": "power_density_w_per_m2",
}


def describe(limits_id: str, frequency_hz: float) -> str:
    """An aligned table for every population, with ceilings, sums and cautions.

    Raises
    ------
    OutOfScopeError
        No population has a level there.
    """
    module = document(limits_id)
    blocks = [f"{module.TITLE}, {module.EDITION}\n{spoken(frequency_hz)}, field strengths rms"]
    for population, levels in levels_by_population(limits_id, frequency_hz).items():
        blocks.append(f"{population}\n{_aligned([HEADS, *map(_row, levels)])}")
        blocks += _more("besides, at peak envelope power", ceilings(limits_id, population, frequency_hz))
        sums = stimulation_sum_levels(limits_id, population, frequency_hz)
        blocks += _more("besides, where two or more transmissions are summed linearly", sums)
    blocks.append(f"sums: {module.SUMMATION.clause}{_mark(module.SUMMATION.verified)}")
    blocks.append(f"cautions: {'; '.join(module.USE.cautions)}")
    return "\n\n".join(blocks)


def as_dicts(limits_id: str, frequency_hz: float) -> list[dict]:
    """One dictionary a level, units in the keys, ready for JSON; errors as `describe`."""
    return [
        {"population": population, **{UNITS.get(name, name): value for name, value in asdict(level).items()}}
        for population, levels in levels_by_population(limits_id, frequency_hz).items()
        for level in levels
    ]


def levels_by_population(limits_id: str, frequency_hz: float) -> dict[str, tuple[Level, ...]]:
    """Levels of every population that has some; errors as `describe`."""
    found, refused = {}, None
    for population in document(limits_id).POPULATIONS:
        try:
            found[population] = reference_levels(limits_id, population, frequency_hz)
        except OutOfScopeError as error:
            refused = error
    if not found:
        raise refused
    return found


def _more(title: str, levels) -> list[str]:
    return [f"{title}\n{_aligned([HEADS, *map(_row, levels)])}"] if levels else []


def _row(level: Level) -> tuple[str, ...]:
    values = (level.electric, level.magnetic, level.power_density)
    fields = ("-" if value is None else f"{value:.4g}" for value in values)
    seconds = level.averaging_time_s
    time = f"{seconds / 60:.4g} min" if seconds else "not averaged"
    return (level.effect, level.scope, level.spatial, *fields, time, level.clause + _mark(level.verified))


def _mark(verified: bool) -> str:
    return "" if verified else " (not verified)"


def _aligned(rows) -> str:
    widths = [max(len(row[i]) for row in rows) for i in range(len(HEADS))]
    lines = ("  ".join(cell.ljust(width) for cell, width in zip(row, widths, strict=True)) for row in rows)
    return "\n".join(line.rstrip() for line in lines)
