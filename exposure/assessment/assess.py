"""From a site to its assessment: complete before anything is drawn."""

from dataclasses import dataclass

import numpy as np
import shapely
import shapely.ops

from exposure import __version__
from exposure.assessment import wording
from exposure.assessment.judged_areas import SearchedArea, judged, searched
from exposure.assessment.judged_property import judged_property, unguarded_zone
from exposure.assessment.model import Assessment, Software
from exposure.assessment.ratios import Rule
from exposure.assessment.reach import Reach, reaches
from exposure.assessment.scene import Part, Scene, own_rule, scene
from exposure.assessment.transmissions import transmission_findings
from exposure.assessment.uncertainty import MESHES, Numerics, numerics
from exposure.assessment.verdict import UNDECIDED, DecisionRule, worst
from exposure.assessment.zones import Zones, heights_of, lines, zones
from exposure.site.model import Site
from exposure.station.sources import SourceError, Sources

REACTIVE = 0.1  # wavelengths: nearer than four segments the field is that of single segments


def assess(site: Site, progress=None) -> Assessment:
    """The assessment of a site, with every limit set it names.

    progress : called with a line of text before each long step.

    Raises
    ------
    ExposureError
        Conductors that cannot be modelled.
    """
    progress = progress or (lambda text: None)
    sources = Sources(site)
    return assessment_of(scene(site, sources, progress), sources, progress)


def assessment_of(scene_: Scene, sources: Sources, progress) -> Assessment:
    """The same from a scene whose transmissions are solved, or known to have no solution."""
    return _assessment(_checked(scene_, sources, progress), progress)


@dataclass(frozen=True)
class Found:
    """A scene whose worst places are known and whose fields were compared there on a finer mesh."""

    scene: Scene
    rules: tuple[Rule, ...]
    reaches: tuple[tuple[Reach, ...], ...]
    areas: tuple[SearchedArea, ...]
    numerics: tuple[Numerics, ...]

    @property
    def factor(self) -> float:
        """What an exposure ratio may be too small by."""
        return max((n.factor for n in self.numerics), default=1.0)

    @property
    def doubts(self) -> list[str]:
        """Why nothing may be called within limits: each source that did not pass."""
        return [
            f"antenna '{part.source.model.antenna}' at {part.source.model.frequency / 1e6:g} MHz: {why}"
            for part, quality in zip(self.scene.parts, self.numerics, strict=True)
            for why in quality.objections()
        ]


def _checked(scene_: Scene, sources: Sources, progress) -> Found:
    """Worst places, then quality there; once more on a finer mesh where fields still move."""
    for mesh in MESHES:
        found = _searched(scene_, progress)
        poor = [i for i, n in enumerate(found.numerics) if not n.passed and n.mesh_change is not None]
        if mesh == MESHES[-1] or not poor:
            return found
        finer = MESHES[MESHES.index(mesh) + 1]
        for i in poor:
            part = found.scene.parts[i]
            progress(f"antenna '{part.source.model.antenna}': a finer mesh is needed")
            try:
                scene_ = scene_.with_source(i, sources.source(part.transmissions[0], finer))
            except SourceError:
                return found
    return found


def _searched(scene_: Scene, progress) -> Found:
    rules = scene_.rules()
    if not scene_.parts:
        areas = tuple(SearchedArea(a, _of(rules, a), (None,) * len(_of(rules, a))) for a in scene_.site.areas)
        return Found(scene_, rules, (), areas, ())
    progress("compliance distances")
    distances = tuple(reaches(scene_, part) for part in scene_.parts)
    areas = []
    for area in scene_.site.areas:
        progress(f"area '{area.name}'")
        areas.append(searched(scene_, rules, area))
    progress("quality of the solution")
    points = _deciding_points(scene_, areas)
    quality = tuple(
        _numerics(scene_, rules, part, _with_reach(points, part, found))
        for part, found in zip(scene_.parts, distances, strict=True)
    )
    return Found(scene_, rules, distances, tuple(areas), quality)


def _of(rules, area):
    return tuple(rule for rule in rules if rule.population == area.population)


def _deciding_points(scene_: Scene, areas) -> np.ndarray:
    """Worst places of areas, and the place on the property line nearest to the wires."""
    found = [
        exposure_.peak.position
        for area in areas
        for exposure_ in area.exposures
        if exposure_ is not None and np.isfinite(exposure_.peak.ratio)
    ]
    if scene_.site.property_corners is not None:
        starts, ends = scene_.strengths.segments
        wires = shapely.MultiLineString([(a[:2], b[:2]) for a, b in zip(starts, ends, strict=True)])
        line = shapely.Polygon(scene_.site.property_corners).exterior
        at = shapely.ops.nearest_points(line, wires)[0]
        found += [(at.x, at.y, 0.0), (at.x, at.y, 2.0)]
    return np.array(list(dict.fromkeys(found)), dtype=float).reshape(-1, 3)


def _with_reach(points, part: Part, found: tuple[Reach, ...]) -> np.ndarray:
    """And where the limit is reached, unless that is so near to the wires that no verdict hangs on it."""
    for beyond in (REACTIVE * part.source.model.wavelength, 0.0):
        places = [place for reach in found for place in reach.places(beyond)]
        points = np.concatenate([points, np.array(places, dtype=float).reshape(-1, 3)])
        if len(points):
            break
    return points


def _numerics(scene_: Scene, rules, part, points) -> Numerics:
    whole = scene_.values(points)
    asked = [
        (own_rule(pair, part, transmission), rule)
        for transmission in part.transmissions
        for pair, rule in zip(scene_.pairs(), rules, strict=True)
    ]
    return numerics(part.source, [own for own, _ in asked], points, [rule.ratio(whole) for _, rule in asked])


def _assessment(found: Found, progress) -> Assessment:
    scene_, site = found.scene, found.scene.site
    decision = DecisionRule(site.decision, site.margin)
    areas = tuple(judged(scene_, area, found.factor, found.doubts) for area in found.areas)
    drawn = _zones(found, decision.raised(found.factor), progress)
    property_, property_verdict = judged_property(scene_, found.rules, drawn, found.doubts)
    verdicts = [result.verdict for area in areas for result in area.results]
    verdicts += [property_verdict] if property_verdict else []
    verdicts += [UNDECIDED] if found.doubts or scene_.unsolved else []
    verdict = worst(verdicts)
    unguarded = unguarded_zone(scene_, drawn)
    return Assessment(
        site=wording.site_info(site),
        software=Software("exposure", __version__),
        limits=wording.limit_infos(site),
        verdict=verdict,
        reasons=wording.reasons(verdict, areas, property_, property_verdict, found.doubts, scene_.unsolved),
        conditions=wording.conditions(site, verdict, unguarded),
        transmissions=transmission_findings(scene_, found.reaches, found.numerics),
        areas=areas,
        property=property_,
        boundaries=drawn.boundaries,
        warnings=wording.warnings(site, scene_, drawn),
        levels=wording.level_infos(found.rules),
        conductors=wording.conductors(scene_),
        choices=wording.choices(site, decision, found.factor, scene_, found.rules),
        not_assessed=wording.not_assessed(site, scene_),
        left_out=wording.left_out(scene_),
        site_text=site.text,
    )


def _zones(found: Found, raised: float, progress) -> Zones:
    if not found.scene.parts:
        return Zones((), (), (), shapely.GeometryCollection(), shapely.GeometryCollection())
    progress("boundaries")
    names = [emission.name for emission in found.scene.emissions]
    worst_heights = [
        max((e for e in area.exposures if e is not None), key=lambda e: e.peak.ratio).peak.position[2]
        for area in found.areas
        if any(e is not None for e in area.exposures)
    ]
    strengths = found.scene.loud_strengths(found.rules, raised)
    return zones(
        found.scene, strengths, lines(found.rules, names, raised), heights_of(found.scene, worst_heights)
    )
