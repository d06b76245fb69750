"""Exposure ratios from squared field strengths, one at the limit and proportional to power.

Heating, for each transmission i with power P_i averaged over the test's own time:

    e_i = P_i E_i^2 / E_L^2,   h_i = P_i H_i^2 / H_L^2,   and where only S_L is given
    e_i = h_i = P_i max(E_i^2 / eta, eta H_i^2) / S_L

One transmission alone: max(e, h).  Two or more that can run at once: sums of e and of h apart, the
larger counts, or sums as the document prints them.  Stimulation, with peak envelope powers:
max((sum sqrt e_i)^2, (sum sqrt h_i)^2), linear in the field strengths (ICNIRP 2020; limits.md 2.7).
Of transmissions that exclude each other the worst counts, of the states of an antenna the worst.

In a near field no real power density exceeds max(E^2/eta, eta H^2) (formulas.md 17), so that it is a
safe stand-in for S.
"""

from dataclasses import dataclass, replace

import numpy as np

from exposure.limits.types import Level

FREE_SPACE_IMPEDANCE = 376.730313668  # ohm, CODATA 2018
SMALLEST_POWER = 1e-300  # so that inf stays inf

APART, LARGEST, TOGETHER = "apart", "largest", "together"


@dataclass(frozen=True)
class Emission:
    """A transmission as ratios see it.

    name; group : transmissions of one group exclude each other (None: a group of its own);
    frequency [Hz]; powers : `averaged(averaging time [s])` is its accepted power [W];
    column : where its states' E^2, H^2 pairs begin in the values; states : how many.
    """

    name: str
    group: str | None
    frequency: float
    powers: object
    column: int
    states: int


@dataclass(frozen=True)
class Term:
    """One emission in one test: its level and power [W]; how its E and H count in a sum."""

    emission: Emission
    level: Level
    power: float
    sum: str = APART

    def sides(self, values) -> tuple[np.ndarray, np.ndarray]:
        """e and h of every state, (n, states) each."""
        first, last = self.emission.column, self.emission.column + 2 * self.emission.states
        power = max(self.power, SMALLEST_POWER)
        electric, magnetic = power * values[:, first:last:2], power * values[:, first + 1 : last : 2]
        level, eta = self.level, FREE_SPACE_IMPEDANCE
        if level.electric is None and level.magnetic is None:
            density = np.maximum(electric / eta, eta * magnetic) / level.power_density
            return density, density
        return (
            _quotient(electric, level.electric, electric / eta, level.power_density),
            _quotient(magnetic, level.magnetic, eta * magnetic, level.power_density),
        )

    def summed_sides(self, values) -> tuple[np.ndarray, np.ndarray]:
        """Its part in a sum of two or more, worst state, (n,) each."""
        e, h = self.sides(values)
        if self.sum == TOGETHER:
            e = h = e + h
        elif self.sum == LARGEST:
            e = h = np.maximum(e, h)
        return e.max(axis=1), h.max(axis=1)


@dataclass(frozen=True)
class Test:
    """One test of a document for one or more emissions: effect, scope, and what it is compared at."""

    __test__ = False  # not one of pytest's

    effect: str
    scope: str
    spatial: str
    terms: tuple[Term, ...]

    @property
    def verified(self) -> bool:
        """Whether every level is from a text that was read."""
        return all(term.level.verified for term in self.terms)

    @property
    def several(self) -> bool:
        """Whether two or more of its emissions can run at once."""
        return len(self._groups()) > 1

    def ratio(self, values) -> np.ndarray:
        """(n,) from values (n, m)."""
        e, h = self.totals(values)
        total = np.maximum(e, h)
        return total**2 if self.effect == "stimulation" else total

    def totals(self, values) -> tuple[np.ndarray, np.ndarray]:
        """Sums over groups of the worst of each group, (n,) each; of square roots for stimulation."""
        e, h = 0.0, 0.0
        for members in self._groups():
            parts = [self.parts(term, values) for term in members]
            e = e + np.max([p[0] for p in parts], axis=0)
            h = h + np.max([p[1] for p in parts], axis=0)
        return e, h

    def parts(self, term: Term, values) -> tuple[np.ndarray, np.ndarray]:
        """What one term adds to the two sums, (n,) each."""
        if self.effect == "stimulation":
            return tuple(np.sqrt(side.max(axis=1)) for side in term.sides(values))
        if self.several:
            return term.summed_sides(values)
        return tuple(side.max(axis=1) for side in term.sides(values))

    def counting(self, values, side: int) -> list[tuple[Term, float]]:
        """At one point (1, m): the terms that count in the sum of one side, with their parts of the ratio."""
        chosen = []
        for members in self._groups():
            parts = [(term, float(self.parts(term, values)[side][0])) for term in members]
            chosen.append(max(parts, key=lambda pair: pair[1]))
        if self.effect == "stimulation":
            total = sum(part for _, part in chosen)
            return [(term, part * total) for term, part in chosen]
        return chosen

    def _groups(self) -> tuple[tuple[Term, ...], ...]:
        groups = {}
        for i, term in enumerate(self.terms):
            key = ("alone", i) if term.emission.group is None else ("group", term.emission.group)
            groups.setdefault(key, []).append(term)
        return tuple(tuple(members) for members in groups.values())


@dataclass(frozen=True)
class Rule:
    """All tests of one document for one population.

    missing : why the set cannot be decided for some emission (outside the document, a test without
    a level, a source that was not solved); notes : how sums were made.
    """

    limits: str
    population: str
    tests: tuple[Test, ...]
    missing: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()

    def ratio(self, values) -> np.ndarray:
        """The worst of the tests, (n,) from values (n, m)."""
        if not self.tests:
            return np.zeros(len(values))
        return np.max([test.ratio(values) for test in self.tests], axis=0)

    def alone(self, name: str) -> "Rule":
        """The same for one emission."""
        tests = (
            replace(test, terms=tuple(term for term in test.terms if term.emission.name == name))
            for test in self.tests
        )
        return replace(self, tests=tuple(test for test in tests if test.terms))

    def of_mean(self) -> "Rule":
        """Only tests whose level is a mean over the body."""
        return replace(self, tests=tuple(test for test in self.tests if test.spatial == "mean"))

    def of_peak(self) -> "Rule":
        """Only tests whose level is a peak in the body."""
        return replace(self, tests=tuple(test for test in self.tests if test.spatial != "mean"))

    def verified(self) -> "Rule":
        """Only tests whose levels were read."""
        return replace(self, tests=tuple(test for test in self.tests if test.verified))

    def rests_on_memory(self, values) -> str | None:
        """Why a pass at this point (1, m) would rest on levels that were not verified; None where not."""
        for test in self.tests:
            if test.verified:
                continue
            others = [t for t in self.tests if t.verified and t.effect == test.effect]
            least = max((float(t.ratio(values)[0]) for t in others), default=-1.0)
            if not others or float(test.ratio(values)[0]) >= least:
                clause = next(term.level.clause for term in test.terms if not term.level.verified)
                return f"a pass would rest on a level that was not verified in print ({clause})"
        return None

    def cause(self, values) -> "Cause | None":
        """What governs at one point, values (1, m)."""
        if not self.tests:
            return None
        test = max(self.tests, key=lambda t: float(t.ratio(values)[0]))
        e, h = test.totals(values)
        side = 0 if e[0] >= h[0] else 1
        counting = sorted(test.counting(values, side), key=lambda pair: -pair[1])
        term = counting[0][0]
        own_e, own_h = (float(x.max()) for x in term.sides(values))
        shares = tuple((t.emission.name, part) for t, part in counting)
        electric, magnetic = self._strengths(term, values)
        return Cause(
            test.effect,
            _quantity(term, own_e >= own_h if term.sum != APART and test.several else side == 0),
            term.emission.name,
            term.level.clause,
            shares,
            electric,
            magnetic,
        )

    def _strengths(self, term: Term, values):
        first, last = term.emission.column, term.emission.column + 2 * term.emission.states
        pair = values[0, first:last].reshape(-1, 2).max(axis=0)
        return tuple(float(np.sqrt(max(term.power, SMALLEST_POWER) * x)) for x in pair)


@dataclass(frozen=True)
class Cause:
    """What governs at a point; shares (name, part of the ratio), largest first.

    electric [V/m], magnetic [A/m] : of the emission with the largest share at the power of the
    governing test, each of its own worst state.
    """

    effect: str
    quantity: str
    transmission: str
    clause: str
    shares: tuple[tuple[str, float], ...]
    electric: float
    magnetic: float


def _quotient(squared, level, density, density_level):
    if level is not None:
        return squared / level**2
    return density / density_level if density_level is not None else np.zeros_like(squared)


def _quantity(term: Term, electric: bool) -> str:
    level = term.level
    if (level.electric if electric else level.magnetic) is None:
        return "power density"
    return "electric field" if electric else "magnetic field"
