"""A site file to a Site, or every problem of the file with its line and key."""

import hashlib
from pathlib import Path

import tomli

from exposure.antennas import catalogue, trial
from exposure.antennas.chains import half_space
from exposure.antennas.model import Antenna
from exposure.errors import SiteFileError
from exposure.keys.reading import Problem, Reading, read_table
from exposure.keys.values import nearest, unknown_word
from exposure.site.areas import area
from exposure.site.emissions import transmission
from exposure.site.model import Ground, Site, Transmission
from exposure.site.schema import TOP_KEYS
from exposure.site.surroundings import ground, place, property_corners, structure
from exposure.toml_places import line_of, lines

_ANY_FREQUENCY = 1e6  # [Hz] to look at shapes that no transmission uses


def read_site(path) -> Site:
    """The site that a file describes.

    Raises
    ------
    SiteFileError
        With every problem found: (line, key, message).
    """
    path = Path(path)
    data = _bytes(path)
    text = _text(path, data)
    raw = _parsed(path, text)
    problems: list[Problem] = []
    reading = read_table(raw, TOP_KEYS, "this file", (), problems)
    facts = _facts(reading)
    if problems:
        raise SiteFileError(path.name, _located(problems, text))
    return Site(file=path.name, sha256=hashlib.sha256(data).hexdigest(), text=text, **facts)


def _facts(reading: Reading) -> dict:
    """Everything but the file itself; parts with a problem are None."""
    _check_decision(reading)
    around = ground(reading["ground"]) if reading["ground"] else None
    structures = [structure(table) for table in reading["structure"] or ()]
    emissions = [transmission(table) for table in reading["transmission"] or ()]
    antennas = [catalogue.antenna(table) for table in reading["antenna"] or ()]
    areas = [area(table) for table in reading["area"] or ()]
    _check_names(reading)
    _check_groups(reading)
    antennas = _settled(reading, antennas, emissions)
    if around:
        _check_models(reading, antennas, structures, emissions, around)
    return {
        **{
            stem: reading[stem]
            for stem in ("name", "limits", "decision", "margin", "spatial", "date", "operator", "licence")
        },
        "place": place(reading["place"]),
        "ground": around,
        "property_corners": property_corners(reading["property"]),
        "antennas": tuple(antennas),
        "structures": tuple(structures),
        "transmissions": tuple(emissions),
        "areas": tuple(areas),
    }


# --- what one table cannot know ------------------------------------------------------------------


def _check_decision(reading: Reading):
    if reading["decision"] == "margin" and not reading.has("margin"):
        reading.wrong("decision", 'decision = "margin" needs margin, an exposure ratio such as 0.5')
    if reading.has("margin") and reading["decision"] in ("upper_bound", "best_estimate"):
        reading.wrong("margin", f'belongs to decision = "margin"; found "{reading["decision"]}"')


def _check_names(reading: Reading):
    for stems in (("antenna", "structure"), ("transmission",), ("area",)):
        seen: dict[str, str] = {}
        for stem in stems:
            for number, table in enumerate(reading[stem] or (), 1):
                name = table["name"]
                if name in seen:
                    table.wrong("name", f'"{name}" is already the name of {seen[name]}; no two may be alike')
                elif name is not None:
                    seen[name] = f"{stem} {number}"
    known = [table["name"] for table in reading["antenna"] or () if table["name"] is not None]
    for table in reading["transmission"] or ():
        wanted = table["antenna"]
        if wanted is not None and wanted not in known:
            table.wrong("antenna", unknown_word("antenna called", wanted, known, "this file has"))


def _check_groups(reading: Reading):
    """A word that only one transmission has, and that is nearly another one's, is a slip of the pen."""
    tables = [table for table in reading["transmission"] or () if table["exclusive"] is not None]
    words = [table["exclusive"] for table in tables]
    for table in tables:
        word = table["exclusive"]
        near = nearest(word, {other for other in words if other != word})
        if words.count(word) == 1 and near and words.count(near) > 1:
            table.wrong("exclusive", f'no other transmission has "{word}"; did you mean "{near}"?')


def _settled(reading: Reading, antennas, emissions) -> list[Antenna | None]:
    """Antennas with every open length derived, where one frequency tells it."""
    tables = reading["antenna"] or ()
    return [
        antenna and _with_lengths(antenna, table, _frequencies(antenna, emissions))
        for antenna, table in zip(antennas, tables, strict=True)
    ]


def _with_lengths(antenna: Antenna, table: Reading, frequencies: list[float]) -> Antenna | None:
    frequency = frequencies[0] if frequencies else _ANY_FREQUENCY
    settled = catalogue.settled(antenna, frequency)
    if settled == antenna or len(frequencies) == 1:
        return settled
    used = ", ".join(f"{f / 1e6:g} MHz" for f in frequencies)
    why = f"it is used on several frequencies ({used})" if frequencies else "no transmission uses it"
    table.wrong("length", f"its lengths must be stated (length_m or length_ft), for {why}")
    return None


def _check_models(reading: Reading, antennas, structures, emissions, around: Ground):
    """Let every conductor be built once, so that what cannot be modelled is told now and with its line."""
    solver_ground = half_space(around.kind, around.relative_permittivity, around.conductivity)
    tables = (*(reading["antenna"] or ()), *(reading["structure"] or ()))
    built = []
    for table, owner in zip(tables, (*antennas, *structures), strict=True):
        if owner is None or not table.sound:
            continue
        frequency = max(_frequencies(owner, emissions), default=_ANY_FREQUENCY)
        message = trial.objection(owner, frequency, solver_ground)
        if message:
            table.wrong("kind" if table.has("kind") else "points", message)
        else:
            built.append((table, owner))
    _check_meetings(built, solver_ground)


def _check_meetings(built, solver_ground):
    table_of = {owner.name: table for table, owner in built}
    for one, other in trial.meeting([owner for _, owner in built], _ANY_FREQUENCY, solver_ground):
        message = f"touches or crosses '{one}' without being joined to it: move it, or let it end on '{one}'"
        table_of[other].wrong("name", message)


def _frequencies(owner, emissions: list[Transmission | None]) -> list[float]:
    return sorted(
        {emission.frequency for emission in emissions if emission and emission.antenna == owner.name}
    )


# --- the file ------------------------------------------------------------------------------------


def _bytes(path: Path) -> bytes:
    try:
        return path.read_bytes()
    except OSError as error:
        raise SiteFileError(
            path.name, [(None, "", f"cannot be read: {error.strerror or error} ({path})")]
        ) from None


def _text(path: Path, data: bytes) -> str:
    try:
        return data.decode("utf-8-sig").replace("\r\n", "\n")
    except UnicodeDecodeError as error:
        line = data[: error.start].count(b"\n") + 1
        raise SiteFileError(path.name, [(line, "", "is not UTF-8 text: save the file as UTF-8")]) from None


def _parsed(path: Path, text: str) -> dict:
    try:
        return tomli.loads(text)
    except tomli.TOMLDecodeError as error:
        message = f"is not valid TOML: {error.msg} (column {error.colno})"
        raise SiteFileError(path.name, [(error.lineno, "", message)]) from None
    except RecursionError:
        raise SiteFileError(path.name, [(None, "", "is nested too deeply")]) from None


def _located(problems: list[Problem], text: str) -> list[tuple[int | None, str, str]]:
    places = lines(text)
    return [(line_of(places, (*path, *where)), _dotted(path), message) for path, message, where in problems]


def _dotted(path: tuple) -> str:
    """'antenna 1.feed_line.points_m': tables of a list are counted from 1."""
    words: list[str] = []
    for part in path:
        if isinstance(part, int):
            words[-1] += f" {part + 1}"
        else:
            words.append(part)
    return ".".join(words)
