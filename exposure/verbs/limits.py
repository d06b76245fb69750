"""``exposure limits ID FREQUENCY_MHZ``: every row of a document that applies at a frequency."""

import sys
from dataclasses import asdict

from exposure.errors import ExposureError, OutOfScopeError
from exposure.keys.values import unknown_word
from exposure.limits import DOCUMENTS, ceilings, document, reference_levels, stimulation_sum_levels
from exposure.verbs.screen import figures, print_json, print_table

OUTSIDE = 3
POPULATIONS = ("general_public", "occupational")


def run(arguments) -> int:
    """Print the levels; 3 where the document has none there."""
    if arguments.id not in DOCUMENTS:
        raise ExposureError(unknown_word("limit set", arguments.id, DOCUMENTS))
    wanted = (arguments.population,) if arguments.population else POPULATIONS
    found, reasons = _levels(arguments.id, wanted, arguments.frequency * 1e6)
    for population, reason in reasons.items():
        print(f"exposure: {population}: {reason}", file=sys.stderr)
    if not found:
        return OUTSIDE
    title = document(arguments.id).TITLE
    if arguments.json:
        print_json(_as_json(arguments, title, found, reasons))
    else:
        _print(arguments, title, found)
    return 0


def _levels(limits: str, populations, frequency: float):
    found, reasons = {}, {}
    for population in populations:
        try:
            found[population] = reference_levels(limits, population, frequency)
        except OutOfScopeError as error:
            reasons[population] = str(error)
    return found, reasons


def _print(arguments, title: str, found):
    print(f"{title}\n{arguments.frequency:g} MHz, field strengths rms")
    heads = ("effect", "scope", "in space", "E [V/m]", "H [A/m]", "S [W/m2]", "averaged over", "clause")
    for population, levels in found.items():
        print(f"\n{population}")
        print_table(heads, [_row(level) for level in levels])
        for title, more in _besides(arguments, population):
            print(title)
            print_table(heads, [_row(level) for level in more])
    module = document(arguments.id)
    print(f"\nsums of several transmissions: {module.SUMMATION.clause}")
    for caution in module.USE.cautions:
        print(f"caution: {caution}")


def _besides(arguments, population: str):
    """What a document's rules of pulses and of sums add to its levels, with a title each."""
    place = arguments.id, population, arguments.frequency * 1e6
    both = (
        ("besides, at peak envelope power:", ceilings(*place)),
        ("besides, where two or more transmissions are summed linearly:", stimulation_sum_levels(*place)),
    )
    return [(title, levels) for title, levels in both if levels]


def _row(level) -> tuple[str, ...]:
    seconds = level.averaging_time_s
    time = f"{seconds / 60:g} min" if seconds else "not averaged"
    clause = level.clause if level.verified else f"{level.clause} (from memory, not verified)"
    fields = (figures(value, 4) for value in (level.electric, level.magnetic, level.power_density))
    return (level.effect, level.scope, level.spatial, *fields, time, clause)


def _as_json(arguments, title: str, found, reasons):
    return {
        "limits": arguments.id,
        "title": title,
        "frequency_hz": arguments.frequency * 1e6,
        "levels": [
            {"population": population, **_named(level)}
            for population, levels in found.items()
            for level in levels
        ],
        "reasons": reasons,
    }


def _named(level) -> dict:
    units = {
        "electric": "electric_v_per_m",
        "magnetic": "magnetic_a_per_m",
        "power_density": "power_density_w_per_m2",
    }
    return {units.get(name, name): value for name, value in asdict(level).items()}
