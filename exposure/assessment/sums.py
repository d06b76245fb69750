"""Levels of several transmissions joined to tests, summed as the document says."""

from exposure.assessment.ratios import APART, LARGEST, TOGETHER, Emission, Rule, Term, Test
from exposure.limits.types import Level


def of_levels(limits_id, population, emissions, levels, summation, missing=()) -> Rule:
    """A rule from the levels of each emission, name -> tuple of Level, and the document's way to sum."""
    rows = {emission.name: _rows(levels.get(emission.name, ())) for emission in emissions}
    made = tuple(
        _test(key, number, [(emission, rows[emission.name].get(key)) for emission in emissions], summation)
        for key in dict.fromkeys(key for found in rows.values() for key in found)
        for number in range(max(len(found.get(key, ())) for found in rows.values()))
    )
    return Rule(limits_id, population, made, missing, _notes(summation, made))


def _rows(levels) -> dict:
    """Levels by what they test; a document may print several rows for the same test."""
    found = {}
    for level in levels:
        found.setdefault((level.effect, level.scope, level.spatial), []).append(level)
    return found


def _test(key, number: int, rows, summation) -> Test:
    """The test made of row `number` of each emission, or of its last where it has fewer."""
    pairs = [(emission, found[min(number, len(found) - 1)]) for emission, found in rows if found]
    terms = (
        Term(
            emission,
            level,
            emission.powers.averaged(level.averaging_time_s),
            _sum(summation, level, emission),
        )
        for emission, level in pairs
    )
    return Test(*key, tuple(terms))


def _sum(summation, level: Level, emission: Emission) -> str:
    """How E and H of one emission count in a sum of several.

    A document that adds (E/E_L)^2 and (H/H_L)^2 in some test up to a frequency takes the larger of the
    two in its other heating tests and above it (ICNIRP 2020, limits.md 2.7).  Where its way to sum was
    not verified, both are added: no other way gives more.
    """
    if level.effect == "stimulation":
        return APART
    if not summation.verified:
        return TOGETHER
    for effect, scope, upper in summation.electric_and_magnetic_add:
        if (effect, scope) == (level.effect, level.scope):
            return TOGETHER if emission.frequency <= upper else LARGEST
    return LARGEST if summation.electric_and_magnetic_add else APART


def _notes(summation, tests) -> tuple[str, ...]:
    if not any(test.several for test in tests):
        return ()
    notes = [f"sums over transmissions: {summation.clause}"]
    if not summation.verified:
        notes.append(
            "the way to sum was not verified in print: squared quotients of electric and magnetic field "
            "are added, which no other way exceeds"
        )
    return tuple(notes)
