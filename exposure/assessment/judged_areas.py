"""Every area against every set that has levels for its population."""

import math
from dataclasses import dataclass

from exposure.assessment.averaging import Exposure, exposures
from exposure.assessment.model import AreaFinding, AreaResult, Governing, Share
from exposure.assessment.prisms import prism
from exposure.assessment.ratios import Rule
from exposure.assessment.scene import Scene
from exposure.assessment.verdict import UNDECIDED, DecisionRule, Ratio, decide
from exposure.site.model import Area
from exposure.station.surroundings import nearest

NEAREST = 0.20  # m; nearer than this field levels do not stand for what the body absorbs (47 CFR 2.1091(b))


@dataclass(frozen=True)
class SearchedArea:
    """An area with its exposure by each rule that applies to it, before quality is known."""

    area: Area
    rules: tuple[Rule, ...]
    exposures: tuple[Exposure, ...]


def searched(scene: Scene, rules: tuple[Rule, ...], area: Area) -> SearchedArea:
    """The worst places of an area."""
    mine = tuple(rule for rule in rules if rule.population == area.population)
    usable = tuple(rule for rule in mine if rule.tests)
    if usable:
        loud, beside = scene.loud_strengths(usable, 1.0), scene.places_beside()
        found = exposures(scene.strengths, usable, prism(area), loud, beside)
    else:
        found = ()
    found = dict(zip(usable, found, strict=True))
    return SearchedArea(area, mine, tuple(found.get(rule) for rule in mine))


def judged(scene: Scene, searched_area: SearchedArea, factor: float, doubts) -> AreaFinding:
    """The finding of an area; factor of numerical error; doubts about every source."""
    area = searched_area.area
    near = _too_near(scene, area)
    results = tuple(
        _result(scene, rule, exposure, factor, (*doubts, *near))
        for rule, exposure in zip(searched_area.rules, searched_area.exposures, strict=True)
    )
    if not results:
        results = tuple(_no_levels(limits, area.population) for limits in scene.site.limits)
    outline = prism(area).corners
    return AreaFinding(
        area.name,
        area.population,
        tuple((float(x), float(y)) for x, y in outline),
        area.bottom,
        area.top,
        results,
        area.informed,
    )


def _result(scene: Scene, rule: Rule, exposure: Exposure | None, factor: float, doubts) -> AreaResult:
    doubts = [*rule.missing, *doubts]
    decision = DecisionRule(scene.site.decision, scene.site.margin)
    if exposure is None:
        verdict, reason = decide(
            decision, None, doubts or [f"{rule.limits} has no level for these transmissions"]
        )
        return AreaResult(rule.limits, None, None, None, None, None, None, None, verdict, reason)
    peak = exposure.peak
    values = peak.values[None, :]
    ratio = _decided(scene, exposure, factor)
    verdict, reason = decide(decision, ratio, [*doubts, rule.rests_on_memory(values)])
    cause = rule.cause(values)
    finite = math.isfinite(peak.ratio)
    return AreaResult(
        limits=rule.limits,
        exposure_ratio=_number(peak.ratio),
        body_average_ratio=_number(exposure.body_average),
        upper_bound_ratio=_number(ratio.upper),
        position_m=tuple(round(x, 6) + 0.0 for x in peak.position),
        electric_v_per_m=_number(cause.electric) if finite else None,
        magnetic_a_per_m=_number(cause.magnetic) if finite else None,
        governing=Governing(cause.effect, cause.quantity, cause.transmission, cause.clause)
        if finite
        else None,
        verdict=verdict,
        reason=reason,
        shares=tuple(Share(name, part) for name, part in cause.shares) if finite else (),
    )


def _decided(scene: Scene, exposure: Exposure, factor: float) -> Ratio:
    if scene.site.spatial == "body_average" and exposure.body_average is not None:
        return Ratio(exposure.body_average, exposure.body_searched, factor)
    return Ratio(exposure.peak.ratio, exposure.peak.upper, factor)


def _no_levels(limits: str, population: str) -> AreaResult:
    words = population.replace("_", " ")
    reason = f"no chosen limit set has levels for this population ({words})"
    return AreaResult(limits, None, None, None, None, None, None, None, UNDECIDED, reason)


def _too_near(scene: Scene, area: Area):
    """Doubts where people may touch or nearly touch what transmits."""
    for part in scene.parts:
        own = part.source.model.own
        if nearest(own, own[:0], (area,)) < NEAREST:
            yield (
                f"part of it is within {100 * NEAREST:.0f} cm of antenna '{part.source.model.antenna}', "
                "where levels of the undisturbed field do not stand for what a body absorbs"
            )


def _number(value):
    return None if value is None or not math.isfinite(value) else float(value)
