"""The words of drawings: limits, powers, planes and extents, from the assessment alone."""

from math import atan2, degrees, hypot

import shapely

from exposure.assessment.model import Assessment, Boundary, TransmissionFinding
from exposure.outputs.formats import digits, heights, minutes
from exposure.outputs.words import POPULATIONS

GENERAL_PUBLIC = "general_public"
STANDING = "0–2 m above ground"


def limit_words(assessment: Assessment, limits: str, population: str) -> str:
    """The limit set in words, for the title of a drawing."""
    title = next((f"{x.title}, {x.edition}" for x in assessment.limits if x.id == limits), limits)
    return f"{title}, {POPULATIONS[population]}"


def levels_of(assessment: Assessment, limits: str, population: str):
    """The levels that the limit set has for that population."""
    return [x for x in assessment.levels if (x.limits, x.population) == (limits, population)]


def clauses(assessment: Assessment, limits: str, population: str) -> str:
    """The clauses of the levels, in printed order."""
    found = dict.fromkeys(x.clause for x in levels_of(assessment, limits, population))
    return "; ".join(found) or "a clause that is not known"


def averaging(assessment: Assessment, limits: str, population: str) -> str:
    """The averaging times of the levels."""
    times = sorted({x.averaging_time_s for x in levels_of(assessment, limits, population)})
    return " and ".join(minutes(time) for time in times) or "not known"


def power_words(assessment: Assessment, limits: str, population: str, found: TransmissionFinding) -> str:
    """Frequency and powers of a transmission, at the averaging times of the limit."""
    times = {x.averaging_time_s for x in levels_of(assessment, limits, population)}
    means = [
        f"{digits(x.power_w)} W ({minutes(x.averaging_time_s)})"
        for x in found.average_powers
        if x.averaging_time_s in times and x.averaging_time_s > 0
    ]
    parts = [
        f"{digits(found.frequency_hz / 1e6, 6)} MHz",
        f"transmitter {digits(found.peak_power_w)} W peak",
        f"antenna {digits(found.accepted_power_w)} W peak",
        *(["mean " + ", ".join(means)] if means else []),
    ]
    if found.exclusive:
        parts.append("exclusive")
    return f"{found.name}: " + ", ".join(parts)


def doubts(assessment: Assessment, limits: str, population: str) -> list[str]:
    """Why the drawn line cannot be relied on: failed checks, boundaries not seen to end."""
    failed = [t.name for t in assessment.transmissions if not t.quality.passed]
    endless = [
        t.name
        for t in assessment.transmissions
        for r in t.results
        if (r.limits, r.population) == (limits, population) and None in (r.setback_m, r.compliance_distance_m)
    ]
    found = []
    if failed:
        found.append(f"The solution of {_names(failed)} did not pass its checks: do not rely on the line.")
    if endless:
        found.append(
            f"The zone of {_names(endless)} is not known to its end: it may reach farther than drawn."
        )
    return found


def _names(names) -> str:
    more = f" and {len(names) - 2} more" if len(names) > 2 else ""
    return " and ".join(f"'{name[:40]}'" for name in names[:2]) + more


def geometry(boundary: Boundary | None):
    """The zone of a boundary as one shapely geometry, empty where the limit is not reached."""
    polygons = boundary.polygons if boundary else ()
    return shapely.union_all([shapely.Polygon(p.outline, p.holes).buffer(0) for p in polygons])


def extent_words(zone, middle, where: str) -> str:
    """How far a zone in plan reaches from the middle of the antennas, and towards where."""
    if zone.is_empty:
        return f"The limit is reached nowhere at {where}."
    far, bearing = farthest(zone, middle)
    west, south, east, north = zone.bounds
    return (
        f"At {where} the zone covers {digits(zone.area)} m²; largest extent {far:.1f} m "
        f"towards {bearing:.0f} degrees from the middle of the antennas; east {west:.1f} to {east:.1f} m, "
        f"north {south:.1f} to {north:.1f} m."
    )


def farthest(zone, middle) -> tuple[float, float]:
    """Distance [m] and bearing [degrees from north] of the corner farthest from a point."""
    corners = shapely.get_coordinates(zone)
    east, north = max((corners - middle).tolist(), key=lambda d: hypot(*d))
    return hypot(east, north), degrees(atan2(east, north)) % 360


def area_words(assessment: Assessment, limits: str, population: str) -> list[tuple[str, str, str]]:
    """Name, heights, and result of every area in the order of its number."""
    rows = []
    for area in assessment.areas:
        result = next((r for r in area.results if r.limits == limits), None)
        if area.population != population:
            words = f"judged as {POPULATIONS[area.population]}"
        elif result is None:
            words = "not covered by this limit set: cannot be decided"
        elif result.exposure_ratio is None:
            words = f"exposure ratio not known, {result.verdict}"
        else:
            words = f"{ratio_words(result.exposure_ratio)}, {result.verdict}"
        rows.append((area.name, heights(area.bottom_m, area.top_m), words))
    return rows


def ratio_words(ratio: float) -> str:
    """An exposure ratio; with more digits beside 1, so that none is rounded onto the limit."""
    return digits(ratio, 6 if 0.99 < ratio < 1.01 else 3)


def area_sentence(rows) -> str:
    """The rows of areas as text."""
    start = "Exposure ratio and verdict: " if rows else ""
    return start + " ".join(
        f"Area {n}, {name}, {height}: {words}." for n, (name, height, words) in enumerate(rows, 1)
    )
