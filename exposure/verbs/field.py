"""``exposure field SITE --point E N U``: field strengths and exposure ratios at points, without searching."""

import numpy as np

from exposure.assessment.ratios import Emission
from exposure.assessment.rules import populations, rule
from exposure.errors import ExposureError
from exposure.site.site_file import read_site
from exposure.station.powers import powers
from exposure.station.sources import SourceError, Sources
from exposure.verbs.point_table import points_of_table
from exposure.verbs.screen import figures, print_json, print_table, progress

TOO_NEAR = "within three radii of a conductor, where no field is given: taken as exceeding every limit"


def run(arguments) -> int:
    """Print the fields; there is nothing to compare them with, so 0."""
    site = read_site(arguments.site)
    points = points_of_table(arguments.points) if arguments.points else [tuple(arguments.point)]
    for point in points:
        if point[2] < 0:
            raise ExposureError(
                f"the point {_words(point)} is below the ground (up = 0), where nothing is answered"
            )
    emissions, values = _values(site, np.array(points))
    found = [
        {"point_m": list(point), **_at_point(site, emissions, row[None])}
        for point, row in zip(points, values, strict=True)
    ]
    if arguments.json:
        print_json(found)
    else:
        for one in found:
            _print(one)
    return 0


def _values(site, points):
    """Emissions, and (n, m) squared strengths of all their states side by side, per accepted watt."""
    sources, emissions, columns = Sources(site), [], []
    for emission in site.transmissions:
        progress(f"solving '{emission.name}'")
        try:
            source = sources.source(emission)
        except SourceError as error:
            raise ExposureError(
                f"{site.file}, transmission '{emission.name}': cannot be modelled: {error}"
            ) from None
        first = sum(part.shape[1] for part in columns)
        columns.append(source.squared_strengths(points))
        states = columns[-1].shape[1] // 2
        emissions.append(
            Emission(emission.name, emission.exclusive, emission.frequency, powers(emission), first, states)
        )
    return emissions, np.concatenate(columns, axis=1)


def _at_point(site, emissions, values) -> dict:
    """Everything about one point, values (1, m); unknown is None, with a reason."""
    near = not np.isfinite(values).all()
    return {
        "fields": [_strengths(emission, values) for emission in emissions],
        "ratios": [
            _ratio(limits, population, emissions, values)
            for limits in site.limits
            for population in populations(limits)
        ],
        "reason": TOO_NEAR if near else None,
    }


def _strengths(emission: Emission, values) -> dict:
    """Of the worst state, rms at peak envelope power."""
    last = emission.column + 2 * emission.states
    pairs = values[0, emission.column : last].reshape(-1, 2).max(axis=0)
    electric, magnetic = (float(np.sqrt(emission.powers.accepted * square)) for square in pairs)
    return {
        "transmission": emission.name,
        "electric_v_per_m": _finite(electric),
        "magnetic_a_per_m": _finite(magnetic),
    }


def _ratio(limits: str, population: str, emissions, values) -> dict:
    """Total exposure ratio under a document; None where the document does not cover every transmission."""
    judged = rule(limits, population, emissions)
    ratio = None if judged.missing else _finite(float(judged.ratio(values)[0]))
    reason = "; ".join(judged.missing) or (None if ratio is not None else TOO_NEAR)
    return {"limits": limits, "population": population, "exposure_ratio": ratio, "reason": reason}


def _finite(value: float) -> float | None:
    return value if np.isfinite(value) else None


def _print(one: dict):
    print(f"point {_words(one['point_m'])}{': ' + one['reason'] if one['reason'] else ''}")
    print_table(
        ("transmission", "E [V/m]", "H [A/m]"),
        [
            (part["transmission"], figures(part["electric_v_per_m"]), figures(part["magnetic_a_per_m"]))
            for part in one["fields"]
        ],
    )
    print("(unperturbed, rms, at peak envelope power, worst state of each antenna)")
    print_table(
        ("limits", "population", "exposure ratio", ""),
        [
            (part["limits"], part["population"], figures(part["exposure_ratio"]), part["reason"] or "")
            for part in one["ratios"]
        ],
    )
    print("(1 is at the limit; averaged and summed as the document says; numerical error is not added)\n")


def _words(point) -> str:
    return "east {:g}, north {:g}, up {:g} m".format(*point)
