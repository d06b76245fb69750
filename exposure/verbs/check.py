"""``exposure check SITE``: what was understood, or every problem (exit code 2)."""

from exposure.antennas import catalogue
from exposure.antennas.chains import half_space
from exposure.site.site_file import read_site
from exposure.verbs.screen import figures, print_json


def run(arguments) -> int:
    """Read the file; print what it says."""
    site = read_site(arguments.site)
    if arguments.json:
        print_json(_summary(site))
    else:
        print(f"{site.file}: no problem found")
        for line in _lines(_summary(site)):
            print(line)
    return 0


def _summary(site) -> dict:
    return {
        "name": site.name,
        "file": site.file,
        "sha256": site.sha256,
        "limits": list(site.limits),
        "ground": site.ground.name,
        "antennas": [{"name": a.name, "kind": a.kind, "notes": list(_notes(a, site))} for a in site.antennas],
        "structures": [structure.name for structure in site.structures],
        "transmissions": [_transmission(emission) for emission in site.transmissions],
        "areas": [{"name": area.name, "population": area.population} for area in site.areas],
        "property": site.property_corners is not None,
        "cautions": list(_cautions(site)),
    }


def _transmission(emission) -> dict:
    return {
        "name": emission.name,
        "antenna": emission.antenna,
        "frequency_hz": emission.frequency,
        "power": emission.power_statement,
        "duty_factor": emission.duty_factor,
        "duty_source": emission.duty_source,
    }


def _notes(antenna, site) -> tuple[str, ...]:
    frequency = next((e.frequency for e in site.transmissions if e.antenna == antenna.name), 1e6)
    ground = half_space(site.ground.kind, site.ground.relative_permittivity, site.ground.conductivity)
    return catalogue.wirings(antenna, frequency, ground)[0].notes


def _cautions(site):
    if not site.areas and not site.property_corners:
        yield "neither an area nor a property is described: an assessment cannot be decided"
    for antenna in site.antennas:
        if all(emission.antenna != antenna.name for emission in site.transmissions):
            yield f"no transmission uses antenna '{antenna.name}': it counts as metal only"


def _lines(summary: dict):
    yield f"site: {summary['name']}; limits: {', '.join(summary['limits'])}; ground: {summary['ground']}"
    for antenna in summary["antennas"]:
        yield f"antenna '{antenna['name']}': {antenna['kind']}"
        yield from (f"  note: {note}" for note in antenna["notes"])
    yield from (f"structure '{name}'" for name in summary["structures"])
    for emission in summary["transmissions"]:
        yield (
            f"transmission '{emission['name']}': {emission['frequency_hz'] / 1e6:g} MHz on "
            f"'{emission['antenna']}', {emission['power']}; "
            f"duty factor {figures(emission['duty_factor'])} ({emission['duty_source']})"
        )
    yield from (f"area '{area['name']}': {area['population']}" for area in summary["areas"])
    yield from (f"caution: {caution}" for caution in summary["cautions"])
