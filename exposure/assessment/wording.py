"""What an assessment says in words: reasons, conditions, choices, cautions, and what it leaves open."""

from exposure.assessment.model import Conductor, LevelInfo, LimitInfo, SiteInfo
from exposure.assessment.rules import brief_local_above, populations
from exposure.assessment.scene import GENERAL_PUBLIC, Scene
from exposure.assessment.uncertainty import REMAINING
from exposure.assessment.verdict import EXCEEDS, UNDECIDED, WITHIN, DecisionRule
from exposure.assessment.zones import Zones
from exposure.limits import document
from exposure.site.model import Site

NOT_ASSESSED = (
    "induced limb current, and touch and contact current",
    "people with implants or other medical devices worn on the body",
    "ignition of fuels or explosives, and interference with other equipment",
    "what a body absorbs (SAR) within 20 cm of an antenna, and exposure by hand-held transmitters",
    "other emitters on or near the site that the site file does not name",
    "a person's own effect on the fields: levels refer to the undisturbed field",
)


def site_info(site: Site) -> SiteInfo:
    """The site as the report names it."""
    place = site.place
    constants = (
        f", relative permittivity {site.ground.relative_permittivity:g}, {site.ground.conductivity:g} S/m"
        if site.ground.kind == "real"
        else ""
    )
    return SiteInfo(
        name=site.name,
        file=site.file,
        sha256=site.sha256,
        date=None if site.date is None else site.date.isoformat(),
        operator=site.operator,
        licence=site.licence,
        place_deg=None if place is None else (place.latitude_deg, place.longitude_deg),
        ground=site.ground.name + constants,
        decision=site.decision,
        margin=site.margin,
        spatial=site.spatial,
    )


def limit_infos(site: Site) -> tuple[LimitInfo, ...]:
    """The documents."""
    return tuple(LimitInfo(id_, document(id_).TITLE, document(id_).EDITION) for id_ in site.limits)


def level_infos(rules) -> tuple[LevelInfo, ...]:
    """Every level that was used, each once."""
    found = (
        LevelInfo(
            rule.limits,
            rule.population,
            term.emission.frequency,
            test.effect,
            test.scope,
            test.spatial,
            term.level.electric,
            term.level.magnetic,
            term.level.power_density,
            term.level.averaging_time_s,
            term.level.clause,
            term.level.verified,
        )
        for rule in rules
        for test in rule.tests
        for term in test.terms
    )
    return tuple(dict.fromkeys(found))


def conductors(scene: Scene) -> tuple[Conductor, ...]:
    """Every conductor that was solved, each once."""
    pieces = dict.fromkeys(piece for part in scene.parts for piece in part.source.model.pieces)
    drawn = {(p.owner, p.points): Conductor(p.owner, p.role, p.points, p.radius) for p in pieces}
    return tuple(drawn.values())


def left_out(scene: Scene) -> tuple[str, ...]:
    """What no solve holds, and why."""
    return tuple(dict.fromkeys(text for part in scene.parts for text in part.source.model.left_out))


def reasons(verdict, areas, property_, property_verdict, doubts, unsolved) -> tuple[str, ...]:
    """Why the verdict is what it is."""
    if verdict == WITHIN:
        return (_within(areas, property_),)
    found = [
        f"area '{area.name}', {result.limits}: {result.reason}"
        for area in areas
        for result in area.results
        if result.verdict == verdict
    ]
    if property_verdict == verdict:
        found.append(f"property: {property_.reason}")
    if verdict == UNDECIDED:
        found += [*doubts, *(f"{name}: {reason}" for name, reason in unsolved)]
        if not areas and property_ is None:
            found.append("the site file has no area and no property: there is nothing to judge")
    return tuple(dict.fromkeys(found))


def _within(areas, property_) -> str:
    ratios = [
        (result.upper_bound_ratio, area.name, result.limits)
        for area in areas
        for result in area.results
        if result.upper_bound_ratio is not None
    ]
    found = []
    if ratios:
        ratio, area, limits = max(ratios)
        found.append(
            f"the greatest exposure ratio in any area is {ratio:.3g} with its numerical error "
            f"(area '{area}', {limits}); 1 is at the limit"
        )
    if property_ is not None and property_.least_margin_m is not None:
        found.append(
            "where people stand, the limits of the general public are reached "
            f"{property_.least_margin_m:.2f} m inside the property, or more"
        )
    elif property_ is not None:
        found.append("the limits of the general public are reached nowhere at 0-2 m above ground")
    return "; ".join(found)


def conditions(site: Site, verdict: str, unguarded) -> tuple[str, ...]:
    """On what 'within limits' depends."""
    if verdict == EXCEEDS:
        return ()
    found = [
        f"only the people who were informed ({area.informed}) are in area '{area.name}' while transmitting: "
        "it is judged by occupational levels"
        for area in site.areas
        if area.population == "occupational"
    ]
    return (*found, *([] if unguarded is None else [_keep_out(site, unguarded)]))


def _keep_out(site: Site, zone) -> str:
    where = "on the property" if site.property_corners is not None else "around the antennas"
    west, south, east, north = zone.bounds
    return (
        "within limits provided nobody enters the drawn zone while transmitting: at 0-2 m above ground "
        f"{where} the limits of the general public are reached over {zone.area:.3g} m2 (east {west:.1f} to "
        f"{east:.1f} m, north {south:.1f} to {north:.1f} m)"
    )


def choices(site: Site, decision: DecisionRule, factor: float, scene: Scene, rules) -> tuple[str, ...]:
    """Safe choices, aloud."""
    body = (
        "where a document allows the average over a standing body it decides, otherwise the spatial peak"
        if site.spatial == "body_average"
        else "the spatial peak decides, also where a document allows an average over the body"
    )
    found = [
        decision.words(),
        f"numerical error: exposure ratios may be {100 * (factor - 1):.2g} % too small ({REMAINING:g} times "
        "the change of the fields on another mesh, and the power balance); soil, dimensions and powers are "
        "taken as stated",
        body,
        "mismatch is not credited: the transmitter is taken to be tuned to give its full power",
        "each transmission takes its own worst window of each averaging time, also where all windows cannot "
        "fall together",
        "of transmissions that exclude each other the worst counts, at each place",
        "of an antenna's possible states (feed line with and without choke, other antennas' feeds open and "
        "short) the worst counts, at each place",
        "within three radii of an antenna's conductor the limit is taken to be exceeded",
        "nearer than 5 cm, or three radii, to other metal the field just there counts: touching it is not "
        "assessed",
        "where only a power density is given, the larger of E^2/377 ohm and 377 ohm H^2 is compared with it",
    ]
    brief_above = min(brief_local_above(limits) for limits in site.limits)
    if any(transmission.frequency > brief_above for transmission in site.transmissions):
        found.append(
            "above 400 MHz the local level is compared with peak envelope power, without time averaging: an "
            "upper bound of the document's limits of brief exposure"
        )
    if site.property_corners is not None:
        found.append("the property is judged by the spatial peak, its boundary moved out by 1 % of its reach")
    found += [note for rule in rules for note in rule.notes]
    found += [note for part in scene.parts for note in part.source.model.notes]
    return tuple(dict.fromkeys(found))


def warnings(site: Site, scene: Scene, zones: Zones) -> tuple[str, ...]:
    """Cautions about this site."""
    found = [
        f"antenna '{part.source.model.antenna}': {text}"
        for part in scene.parts
        for text in part.source.warnings
    ]
    if site.place is None:
        found.append(
            "no [place] is stated: boundaries are in local coordinates only, boundaries.geojson is not made"
        )
    for line, reach in zip(zones.lines, zones.reach, strict=True):
        if reach is None:
            found.append(
                f"{line.limits}, {line.population}, {line.transmission}: the boundary was not seen to end"
            )
    without = [limits for limits in site.limits if GENERAL_PUBLIC not in populations(limits)]
    found += [f"{limits} has no levels for the general public" for limits in without]
    if site.ground.kind == "none":
        found.append("free space, no ground: over any real ground fields may be up to several times stronger")
    return tuple(dict.fromkeys(found))


def not_assessed(site: Site, scene: Scene) -> tuple[str, ...]:
    """What this assessment says nothing about, and what the models of its antennas leave out."""
    notes = [note for part in scene.parts for note in part.source.model.notes if "not assessed" in note]
    return tuple(dict.fromkeys((*NOT_ASSESSED, *notes)))
