"""How far each transmission, and all together, reach the limit."""

from dataclasses import dataclass, replace

import numpy as np

from exposure.assessment.distances import Distance, compliance_distances, setbacks
from exposure.assessment.model import TransmissionResult
from exposure.assessment.ratios import Rule
from exposure.assessment.scene import Part, Scene, beside_other_metal, own_rule, own_strengths
from exposure.site.model import Transmission

NEARLY = 0.9  # exposure ratio at the place of another lobe, which is known to a few percent


@dataclass(frozen=True)
class Reach:
    """Of one transmission by one rule (on the values of its own part)."""

    transmission: Transmission
    rule: Rule
    compliance: Distance | None
    setback: Distance | None

    def result(self) -> TransmissionResult:
        """For the result file."""
        if self.compliance is None:
            return TransmissionResult(
                self.rule.limits, self.rule.population, None, None, "; ".join(self.rule.missing)
            )
        notes = list(self.rule.missing)
        if not self.compliance.bounded:
            notes.append("the exposure ratio was not seen to fall below one: no distance is given")
        notes += _elsewhere(self.compliance, "from the wires") + _elsewhere(self.setback, "in plan at 0-2 m")
        return TransmissionResult(
            self.rule.limits,
            self.rule.population,
            self.compliance.distance if not self.rule.missing else None,
            self.setback.distance if not self.rule.missing else None,
            "; ".join(notes),
        )

    def places(self, beyond: float) -> list:
        """Where the limit is reached farthest out, as far as that is beyond a distance [m] of the wires."""
        if self.compliance is None or not (self.compliance.distance or 0.0) > beyond:
            return []
        found = [d.position for d in (self.compliance, self.setback) if d is not None]
        return [place for place in found if place is not None]


def reaches(scene: Scene, part: Part) -> tuple[Reach, ...]:
    """Of every transmission of a part, by every set and population, from one search."""
    asked = [
        (transmission, own_rule(pair, part, transmission))
        for transmission in part.transmissions
        for pair in scene.pairs()
    ]
    usable = [i for i, (_, rule) in enumerate(asked) if rule.tests]
    ratios = [asked[i][1].ratio for i in usable]
    strengths = own_strengths(part)
    beside = beside_other_metal(part)
    compliance = compliance_distances(strengths, ratios, beside=beside) if ratios else ()
    aside = setbacks(strengths, ratios, compliance, beside) if ratios else ()
    found = {
        i: tuple(_seen(strengths, ratios[j], distance) for distance in (compliance[j], aside[j]))
        for j, i in enumerate(usable)
    }
    return tuple(Reach(*pair, *found.get(i, (None, None))) for i, pair in enumerate(asked))


def _seen(strengths, ratio, found: Distance) -> Distance:
    """Only those other lobes that do reach the limit, or nearly, at the place that is named."""
    if not found.islands:
        return found
    ratios = ratio(strengths.values(np.array([place for _, place in found.islands])))
    islands = tuple(island for island, r in zip(found.islands, ratios, strict=True) if r >= NEARLY)
    return replace(found, islands=islands)


def _elsewhere(found: Distance, words: str) -> list[str]:
    """Other lobes that reach the limit about as far."""
    if not found.islands:
        return []
    distances = [distance for distance, _ in found.islands]
    return [
        f"the limit is also reached at other places, about {min(distances):.2g} to "
        f"{max(distances):.2g} m {words}"
    ]
