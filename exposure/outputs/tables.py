"""Tables of an assessment as rows of words: (heading, rows), every cell a string."""

from dataclasses import dataclass

from exposure.assessment.model import Assessment
from exposure.outputs import words
from exposure.outputs.formats import (
    NOTHING,
    computed,
    digits,
    heights,
    megahertz,
    metres,
    minutes,
    place,
    share,
)

SMALL = 1e-5  # of a check that allows a percent


@dataclass(frozen=True)
class Table:
    """Column names, rows, and each column's share of the width."""

    columns: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    widths: tuple[float, ...]


def feet(assessment: Assessment) -> bool:
    """Whether feet are added: where a limit of the USA is used."""
    return any(limit.id.startswith("us_") for limit in assessment.limits)


def areas_in_short(assessment: Assessment) -> Table:
    """For the first page: each area and set of limits, share and verdict."""
    rows = [
        (str(number), area.name, result.limits, _share(result), _cause(result), result.verdict)
        for number, area in enumerate(assessment.areas, 1)
        for result in area.results
    ]
    return Table(
        ("no.", "area", "limits", "greatest exposure", "mostly from", "verdict"),
        tuple(rows),
        (5, 29, 13, 20, 18, 15),
    )


def areas(assessment: Assessment, limits_id: str) -> Table:
    """Every area by one set of limits: ratios, fields, place, cause."""
    rows = [
        (
            f"{number} {area.name}\n{_where_who(area)}",
            _ratio(result.exposure_ratio),
            _ratio(result.upper_bound_ratio),
            _ratio(result.body_average_ratio),
            computed(result.electric_v_per_m),
            computed(result.magnetic_a_per_m),
            place(result.position_m),
            _governing(result),
            result.verdict,
        )
        for number, area in enumerate(assessment.areas, 1)
        for result in area.results
        if result.limits == limits_id
    ]
    return Table(
        (
            "area\nheights, population",
            "exposure ratio",
            "upper bound",
            "body average",
            "E\n[V/m]",
            "H\n[A/m]",
            "place: east, north, up [m]",
            "governed by",
            "verdict",
        ),
        tuple(rows),
        (22, 9, 9, 9, 7.5, 8.5, 10.5, 14.5, 10),
    )


def area_reasons(assessment: Assessment) -> tuple[str, ...]:
    """Why an area is not simply within limits."""
    return tuple(
        f"{number} {area.name}, {result.limits}: {result.verdict}: {result.reason}"
        for number, area in enumerate(assessment.areas, 1)
        for result in area.results
        if result.reason
    )


def shares(assessment: Assessment) -> Table:
    """Parts of the transmissions at the worst point, where more than one counts."""
    rows = [
        (f"{number} {area.name}", result.limits, part.transmission, _ratio(part.exposure_ratio))
        for number, area in enumerate(assessment.areas, 1)
        for result in area.results
        if len(result.shares) > 1
        for part in result.shares
    ]
    return Table(("area", "limits", "transmission", "exposure ratio"), tuple(rows), (40, 15, 30, 15))


def informed(assessment: Assessment) -> Table:
    """Areas judged by occupational levels, and who was informed."""
    rows = [
        (f"{number} {area.name}", words.POPULATIONS[area.population], area.informed or "not stated")
        for number, area in enumerate(assessment.areas, 1)
        if area.population != "general_public" or area.informed
    ]
    return Table(("area", "population", "informed"), tuple(rows), (40, 20, 40))


def quality(assessment: Assessment) -> Table:
    """How far each solution may be trusted."""
    rows = [
        (
            finding.name,
            str(finding.unknowns),
            _percent(finding.quality.power_balance),
            _percent(finding.quality.mesh_change),
            _percent(finding.quality.boundary_residual),
            ("passed" if finding.quality.passed else "NOT PASSED")
            + (f": {finding.quality.note}" if finding.quality.note else ""),
        )
        for finding in assessment.transmissions
    ]
    return Table(
        ("transmission", "unknowns", "power balance", "mesh change", "boundary residual", "checks"),
        tuple(rows),
        (22, 11, 13, 13, 14, 27),
    )


def distances(assessment: Assessment) -> Table:
    """Compliance distance and setback of each transmission alone."""
    in_feet = feet(assessment)
    rows = [
        (
            finding.name,
            result.limits,
            words.POPULATIONS[result.population],
            metres(result.compliance_distance_m, in_feet),
            metres(result.setback_m, in_feet),
            result.note or NOTHING,
        )
        for finding in assessment.transmissions
        for result in finding.results
    ]
    return Table(
        ("transmission alone", "limits", "population", "compliance distance", "setback", "remark"),
        tuple(rows),
        (18, 13, 14, 14, 14, 27),
    )


def levels(assessment: Assessment) -> Table:
    """Published levels as used."""
    rows = [
        (
            f"{level.limits}\n{words.POPULATIONS[level.population]}",
            megahertz(level.frequency_hz),
            f"{words.EFFECTS[level.effect]}, {words.SCOPES[level.scope]}",
            computed(level.electric_v_per_m),
            computed(level.magnetic_a_per_m),
            _density(level.power_density_w_per_m2, level.limits),
            f"{minutes(level.averaging_time_s)}\nspatial {level.spatial}",
            level.clause + ("" if level.verified else "\nNOT VERIFIED in print"),
        )
        for level in assessment.levels
    ]
    return Table(
        ("limits", "frequency", "effect, scope", "E [V/m]", "H [A/m]", "S [W/m²]", "averaging", "clause"),
        tuple(rows),
        (15, 13, 15, 9, 9, 11, 13, 18),
    )


def limits(assessment: Assessment) -> Table:
    """The documents."""
    rows = [(limit.id, limit.title, limit.edition) for limit in assessment.limits]
    return Table(("limits", "document", "edition"), tuple(rows), (15, 55, 30))


def _where_who(area) -> str:
    return f"{heights(area.bottom_m, area.top_m)}, {words.POPULATIONS[area.population]}"


def _density(density, limits_id) -> str:
    """W/m2, and mW/cm2 where the document prints that."""
    if density is None or not limits_id.startswith("us_"):
        return computed(density)
    return f"{computed(density)}\n({computed(density / 10)} mW/cm²)"


def _share(result) -> str:
    return "no number" if result.exposure_ratio is None else share(result.exposure_ratio)


def _ratio(ratio) -> str:
    return NOTHING if ratio is None else computed(ratio)


def _percent(value) -> str:
    if value is None:
        return "not known"
    return f"{digits(100 * value, 2)} %" if abs(value) >= SMALL or value == 0 else "below 0.001 %"


def _cause(result) -> str:
    return NOTHING if result.governing is None else result.governing.transmission


def _governing(result) -> str:
    if result.governing is None:
        return NOTHING
    g = result.governing
    return f"{g.transmission}: {g.quantity}, {words.EFFECTS.get(g.effect, g.effect)}"
