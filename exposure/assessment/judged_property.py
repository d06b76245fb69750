"""Whether the zone where the general public's limits are reached stays on the property."""

import shapely

from exposure.assessment.model import PropertyFinding
from exposure.assessment.prisms import prism
from exposure.assessment.ratios import Rule
from exposure.assessment.scene import GENERAL_PUBLIC, Scene
from exposure.assessment.verdict import EXCEEDS, UNDECIDED, WITHIN
from exposure.assessment.zones import STANDING, Zones

LINE_ERROR = 0.01  # of the reach: a boundary is known to 2 % of the ratio, 1 % of distance (regions.KNOWN),
LEAST_LINE_ERROR = 0.02  # m, where that is more (regions.KNOWN_DISTANCE)
SMALLEST_ZONE = 1e-4  # m2


def judged_property(scene: Scene, rules: tuple[Rule, ...], zones: Zones, doubts):
    """(finding, verdict); (None, None) where the site has no property."""
    corners = scene.site.property_corners
    if corners is None:
        return None, None
    mine = [rule for rule in rules if rule.population == GENERAL_PUBLIC]
    outline = shapely.Polygon(corners)
    doubts = [*doubts, *(text for rule in mine for text in rule.missing)]
    if not any(rule.tests for rule in mine):
        why = "; ".join(doubts) or "no chosen limit set has levels for the general public"
        return PropertyFinding(tuple(corners), None, None, None, why), UNDECIDED
    if not zones.bounded:
        doubts.append("the boundary was not seen to end")
    zone, error = zones.standing, line_error(zones)
    margin = _margin(outline, zone, error)
    inside = margin is None or margin > 0
    if not inside:
        reason = f"at 0-2 m above ground the limit is reached up to {-margin:.2f} m beyond the property"
        return PropertyFinding(tuple(corners), False, False, margin, reason), EXCEEDS
    everywhere = _at_all_heights(outline, zones)
    reason = "" if margin is not None else "the limit is reached nowhere at 0-2 m above ground"
    if doubts:
        return PropertyFinding(tuple(corners), None, None, margin, "; ".join(doubts)), UNDECIDED
    return PropertyFinding(tuple(corners), True, everywhere, margin, reason), WITHIN


def line_error(zones: Zones) -> float:
    """How far a judged boundary may be from where it was drawn. [m]"""
    return max(LINE_ERROR * zones.farthest, LEAST_LINE_ERROR)


def _margin(outline, zone, error: float) -> float | None:
    """Least distance of the zone to the outline, negative where it leaves it; None without a zone. [m]"""
    if zone.is_empty:
        return None
    outside = zone.difference(outline)
    if not outside.is_empty:
        beyond = max(shapely.distance(outline, shapely.points(p)) for p in shapely.get_coordinates(outside))
        return -float(beyond) - error
    return float(zone.distance(outline.exterior)) - error


def _at_all_heights(outline, zones: Zones) -> bool | None:
    """Yes where all space within reach of the wires is above the property; no where a drawn plane says so."""
    if not zones.elsewhere.difference(outline).is_empty:
        return False
    grown = zones.wires.buffer(zones.farthest + line_error(zones) + 1e-6)
    return True if outline.contains(grown) else None


def unguarded_zone(scene: Scene, zones: Zones):
    """The zone at 0-2 m that no area covers, on the property where there is one; None without one."""
    zone = zones.standing.buffer(line_error(zones)) if not zones.standing.is_empty else zones.standing
    if scene.site.property_corners is not None:
        zone = zone.intersection(shapely.Polygon(scene.site.property_corners))
    for area in scene.site.areas:
        shape = prism(area)
        covers = shape.bottom <= STANDING[0] and shape.top >= STANDING[1]
        if covers and isinstance(shape.outline, shapely.Polygon):
            zone = zone.difference(shape.outline)
    return zone if zone.area > SMALLEST_ZONE else None
