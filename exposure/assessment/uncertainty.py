"""Numerical uncertainty: how far fields move on a finer mesh, and what that does to exposure ratios.

Only numerical error is in it.  Soil, dimensions and powers other than stated, and people in the field,
are not: they belong to the choice of input.
"""

from dataclasses import dataclass

import numpy as np

from exposure.assessment.ratios import Rule
from exposure.station.sources import Source, SourceError, solved

LARGEST_CHANGE = 0.01  # in field, and of power in the balance (design, section 6)
REFINED = 1.5  # segments of the finer mesh over those of the mesh in use
# Convergence of order p leaves change / (1 - REFINED^-p) of error in the mesh in use; first order, the
# slowest that a feed gap or a joint shows, leaves three times the change.
REMAINING = 3.0
OWN_MESH = 40.0  # segments a wavelength of the solver where none are asked for (design, section 6)
MESHES = (None, 80.0, 160.0)  # tried one after the other
CLEAR_STEP = 1.2  # in unknowns: enough to tell
LEAST_STEP = 1.05  # where thick wires are at their finest (segments of two radii) in every mesh near by


@dataclass(frozen=True)
class Numerics:
    """Of one solved antenna: worst of its states; mesh_change None where no point could be compared."""

    power_balance: float
    boundary_residual: float
    mesh_change: float | None
    note: str = ""

    @property
    def passed(self) -> bool:
        """Whether both are small enough for a verdict."""
        return (
            self.mesh_change is not None
            and abs(self.power_balance) <= LARGEST_CHANGE
            and self.mesh_change <= LARGEST_CHANGE
        )

    @property
    def factor(self) -> float:
        """What an exposure ratio may be too small by, as a factor."""
        change = self.mesh_change or 0.0
        return (1 + REMAINING * change) ** 2 * (1 + abs(self.power_balance))

    def objections(self) -> list[str]:
        """Why it did not pass."""
        found = []
        if self.mesh_change is None:
            found.append("fields could not be compared on another mesh at any point that decides")
        elif not self.mesh_change <= LARGEST_CHANGE:
            found.append(f"fields move by {100 * self.mesh_change:.2g} % on a finer mesh; allowed is 1 %")
        if not abs(self.power_balance) <= LARGEST_CHANGE:
            found.append(f"the powers do not balance by {100 * self.power_balance:.2g} %; allowed is 1 %")
        return found


def numerics(source: Source, rules: tuple[Rule, ...], points, largest) -> Numerics:
    """Quality of a source, its fields compared at points (n, 3) with those of a finer mesh.

    rules : of each transmission alone, on the values of this source.
    largest : (n,) for each rule, the greatest exposure ratio there of all transmissions together; the
    change of a field counts in proportion to the field that it is part of.
    """
    qualities = source.qualities()
    balance = max((q.power_balance for q in qualities), key=abs)
    residual = max(q.boundary_residual for q in qualities)
    return Numerics(float(balance), float(residual), mesh_change(source, rules, points, largest))


def mesh_change(source: Source, rules, points, largest) -> float | None:
    """Largest change in field, as a part of the whole field that decides, on another mesh. [1]

    None where there is no point to compare at, or no other mesh.
    """
    values = source.squared_strengths(points)
    usable = np.isfinite(values).all(axis=1)
    if not usable.any() or not any(rule.tests for rule in rules):
        return None
    points, values = points[usable], values[usable]
    finer = values.copy()
    for state in _governing_states(rules, values):
        other = other_mesh(source.of_state(state))
        if other is None:
            return None
        finer[:, 2 * state : 2 * state + 2] = other.squared_strengths(points)
    changes = [
        np.abs(np.sqrt(rule.ratio(finer)) - np.sqrt(rule.ratio(values)))
        / np.sqrt(np.maximum(np.maximum(whole[usable], rule.ratio(values)), 1e-300))
        for rule, whole in zip(rules, largest, strict=True)
        if rule.tests
    ]
    return float(np.max(changes))


def other_mesh(source: Source) -> Source | None:
    """The same on a finer mesh; on a coarser one, whose change is larger, where wires are too thick.

    None where neither mesh differs enough to tell anything.
    """
    density = source.segments_per_wavelength or OWN_MESH
    found = []
    for step in (REFINED, 1 / REFINED):
        try:
            other = solved(source.model, density * step)
        except SourceError:
            continue
        differs = max(other.unknowns / source.unknowns, source.unknowns / other.unknowns)
        if differs >= CLEAR_STEP:
            return other
        found += [other] * (differs >= LEAST_STEP)
    return found[0] if found else None


def _governing_states(rules, values) -> list[int]:
    """States that are the worst at some point by some rule."""
    count = values.shape[1] // 2
    if count == 1:
        return [0]
    found = set()
    for rule in (r for r in rules if r.tests):
        each = []
        for state in range(count):
            only = np.zeros_like(values)
            only[:, 2 * state : 2 * state + 2] = values[:, 2 * state : 2 * state + 2]
            each.append(rule.ratio(only))
        found |= set(np.argmax(each, axis=0).tolist())
    return sorted(found)
