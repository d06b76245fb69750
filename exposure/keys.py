"""The keys of a table in a site file, and how a table is read by them.

A key is described once: the names under which it may be written (the unit is part of the name), what
its value must be, its range, its default, and a line of help.  Reading a table gives its values in SI
units and every problem in it, in the operator's words.
"""

import datetime
import difflib
import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import NamedTuple

from exposure.units import FOOT, INCH, MINUTE


@dataclass(frozen=True)
class Key:
    """One quantity of a table.

    stem : its name inside the program, and in the file without the unit;
    names : name in the file -> factor to SI; value : (raw value, factor) -> value in SI, or a
    ``Refused``; bases : the names without unit; help : for the reference of keys.
    """

    stem: str
    value: Callable
    names: Mapping[str, float]
    required: bool = False
    default: object = None
    help: str = ""
    bases: tuple[str, ...] = ()

    @property
    def spelling(self) -> str:
        return " or ".join(self.names)


@dataclass(frozen=True)
class SubTable:
    """A table inside a table: ``[antenna.feed_line]``, or many of them: ``[[antenna.feed]]``.

    variant : where keys depend on the table itself, raw table -> (keys, words such as "of kind dipole").
    """

    stem: str
    keys: tuple
    many: bool = False
    required: bool = False
    help: str = ""
    variant: Callable | None = None

    @property
    def names(self):
        return {self.stem: 1.0}

    def title(self, path: tuple) -> str:
        """As it is written in a file, inside the table at a path."""
        dotted = ".".join([*(part for part in path if isinstance(part, str)), self.stem])
        return f"[[{dotted}]]" if self.many else f"[{dotted}]"


class Refused(ValueError):
    """A value that a key does not take; where: indices inside the value."""

    def __init__(self, message: str, where: tuple = ()):
        super().__init__(message)
        self.where = where


# --- kinds of keys -------------------------------------------------------------------------------


@dataclass(frozen=True)
class Range:
    """Allowed values in SI; open ends are left out."""

    low: float = -math.inf
    high: float = math.inf
    low_open: bool = False
    high_open: bool = False

    def holds(self, value: float) -> bool:
        above = value > self.low if self.low_open else value >= self.low
        below = value < self.high if self.high_open else value <= self.high
        return above and below

    def words(self, factor: float) -> str:
        if self.low == self.high:
            return f"{self.low / factor:.6g}"
        low = f"{'more than' if self.low_open else 'at least'} {self.low / factor:.6g}"
        high = f"{'less than' if self.high_open else 'at most'} {self.high / factor:.6g}"
        ends = [low] * math.isfinite(self.low) + [high] * math.isfinite(self.high)
        return " and ".join(ends)


ANY = Range()
POSITIVE = Range(0, low_open=True)
NOT_NEGATIVE = Range(0)
FRACTION = Range(0, 1)


def number(stem: str, names=None, allowed: Range = ANY, **more) -> Key:
    """A number; ``names`` as in Key, by default the stem alone (no unit)."""
    return Key(stem, lambda raw, factor: _number(raw, factor, allowed), **_named(stem, names), **more)


def length(stem: str, allowed: Range = ANY, **more) -> Key:
    """A length in metres or feet."""
    return number(stem, _lengths(stem), allowed, **more)


def wire_size(stem: str = "wire_radius", **more) -> Key:
    """A radius, in millimetres or inches, as a radius or a diameter."""
    thing = stem.removesuffix("_radius")
    names = {
        f"{thing}_radius_mm": 1e-3,
        f"{thing}_diameter_mm": 0.5e-3,
        f"{thing}_radius_in": INCH,
        f"{thing}_diameter_in": INCH / 2,
    }
    bases = (f"{thing}_radius", f"{thing}_diameter")
    return Key(stem, lambda raw, factor: _number(raw, factor, POSITIVE), names, bases=bases, **more)


def angle(stem: str, allowed: Range = ANY, **more) -> Key:
    """An angle in degrees; radians inside."""
    return number(stem, {f"{stem}_deg": math.pi / 180}, allowed, **more)


def duration(stem: str, allowed: Range = POSITIVE, **more) -> Key:
    """A time in minutes or seconds."""
    return number(stem, {f"{stem}_minutes": MINUTE, f"{stem}_seconds": 1.0}, allowed, **more)


def integer(stem: str, allowed: Range = ANY, **more) -> Key:
    """A whole number."""
    return Key(stem, lambda raw, _: _integer(raw, allowed), {stem: 1}, **more)


def text(stem: str, **more) -> Key:
    """Words, not empty."""
    return Key(stem, lambda raw, _: _text(raw), {stem: 1}, **more)


def choice(stem: str, options, what: str = "", **more) -> Key:
    """One of the known words; ``what`` names them in messages."""
    return Key(stem, lambda raw, _: _choice(raw, tuple(options), what or stem), {stem: 1}, **more)


def choices(stem: str, options, what: str, **more) -> Key:
    """A list of known words, none twice."""
    return Key(stem, lambda raw, _: _choices(raw, tuple(options), what), {stem: 1}, **more)


def boolean(stem: str, **more) -> Key:
    """true or false."""
    return Key(stem, lambda raw, _: _boolean(raw), {stem: 1}, **more)


def date(stem: str, **more) -> Key:
    """A day."""
    return Key(stem, lambda raw, _: _date(raw), {stem: 1}, **more)


def point(stem: str, axes: str, allowed: Range = ANY, **more) -> Key:
    """A point in metres or feet; ``axes`` are their names, as "east, north, up"; the range is for up."""
    ranges = _ranges(axes, allowed)
    return Key(stem, lambda raw, f: _point(raw, f, axes, ranges), **_named(stem, _lengths(stem)), **more)


def points(stem: str, axes: str, at_least: int, allowed: Range = ANY, **more) -> Key:
    """A list of points in metres or feet."""
    ranges = _ranges(axes, allowed)

    def value(raw, factor):
        return _points(raw, factor, axes, ranges, at_least)

    return Key(stem, value, **_named(stem, _lengths(stem)), **more)


def impedance(stem: str, **more) -> Key:
    """An impedance in ohms, a number or [resistance, reactance]; its resistance is not negative."""
    return Key(stem, lambda raw, _: _impedance(raw), **_named(stem, {f"{stem}_ohm": 1}), **more)


def _named(stem: str, names) -> dict:
    return {"names": names, "bases": (stem,)} if names else {"names": {stem: 1.0}}


def _lengths(stem: str) -> dict:
    return {f"{stem}_m": 1.0, f"{stem}_ft": FOOT}


def _ranges(axes: str, allowed: Range) -> tuple[Range, ...]:
    return tuple(allowed if axis == "up" else ANY for axis in axes.split(", "))


# --- values --------------------------------------------------------------------------------------


def found(raw) -> str:
    """A value of the file as it is named in a message."""
    match raw:
        case bool():
            return "true" if raw else "false"
        case str():
            return f'the text "{raw}"'
        case dict():
            return "a table"
        case list():
            return f"a list of {len(raw)}"
        case _:
            return str(raw)


def unknown_word(what: str, word: str, known, are_known: str = "known are") -> str:
    """Message for a word that is not one of the known ones, with the nearest and all of them."""
    near = nearest(word, known)
    start = f'there is no {what} "{word}"' + (f"; did you mean {near}? " if near else "; ")
    words = f"{are_known} {', '.join(known)}"
    return start + (words[0].upper() + words[1:] if near else words)


def nearest(word: str, known) -> str | None:
    """The known word most like this one, None where none is."""
    folded = {str(option).lower(): option for option in known}
    close = difflib.get_close_matches(str(word).lower(), folded, 1, 0.6)
    return folded[close[0]] if close else None


def _number(raw, factor: float, allowed: Range) -> float:
    if isinstance(raw, bool) or not isinstance(raw, int | float):
        hint = f"; write {raw.strip()} without quotes" if isinstance(raw, str) and _is_number(raw) else ""
        raise Refused(f"must be a number; found {found(raw)}{hint}")
    if not math.isfinite(raw):
        raise Refused(f"must be a finite number; found {raw}")
    if not allowed.holds(raw * factor):
        raise Refused(f"must be {allowed.words(factor)}; found {raw}")
    return float(raw * factor)


def _is_number(raw: str) -> bool:
    try:
        return math.isfinite(float(raw))
    except ValueError:
        return False


def _integer(raw, allowed: Range) -> int:
    if isinstance(raw, bool) or not isinstance(raw, int):
        raise Refused(f"must be a whole number; found {found(raw)}")
    return int(_number(raw, 1, allowed))


def _text(raw) -> str:
    if not isinstance(raw, str):
        raise Refused(f"must be a text in quotes; found {found(raw)}")
    if not raw.strip():
        raise Refused("must not be empty")
    return raw


def _choice(raw, options: tuple, what: str) -> str:
    word = _text(raw)
    if word not in options:
        raise Refused(unknown_word(what, word, options))
    return word


def _choices(raw, options: tuple, what: str) -> tuple[str, ...]:
    if not isinstance(raw, list) or not raw:
        raise Refused(
            f'must be a list with at least one {what}, such as ["{options[0]}"]; found {found(raw)}'
        )
    for index, word in enumerate(raw):
        try:
            _choice(word, options, what)
        except Refused as refused:
            raise Refused(str(refused), (index,)) from None
        if word in raw[:index]:
            raise Refused(f'"{word}" stands twice', (index,))
    return tuple(raw)


def _boolean(raw) -> bool:
    if not isinstance(raw, bool):
        raise Refused(f"must be true or false; found {found(raw)}")
    return raw


def _date(raw) -> datetime.date:
    if isinstance(raw, datetime.datetime) or not isinstance(raw, datetime.date):
        raise Refused(f"must be a day written as 2026-12-01, without quotes or time; found {found(raw)}")
    return raw


def _point(raw, factor: float, axes: str, ranges: tuple[Range, ...]) -> tuple[float, ...]:
    if not isinstance(raw, list) or len(raw) != len(ranges):
        raise Refused(f"must be a point of {len(ranges)} numbers, [{axes}]; found {found(raw)}")
    values = []
    for axis, entry, allowed in zip(axes.split(", "), raw, ranges, strict=True):
        try:
            values.append(_number(entry, factor, allowed))
        except Refused as refused:
            raise Refused(f"{axis} {refused}") from None
    return tuple(values)


def _points(raw, factor: float, axes: str, ranges, at_least: int) -> tuple[tuple[float, ...], ...]:
    if not isinstance(raw, list) or len(raw) < at_least:
        raise Refused(f"must be a list of at least {at_least} points [{axes}]; found {found(raw)}")
    values = []
    for index, entry in enumerate(raw):
        try:
            values.append(_point(entry, factor, axes, ranges))
        except Refused as refused:
            raise Refused(f"point {index + 1}: {refused}", (index,)) from None
    return tuple(values)


def _impedance(raw) -> complex:
    parts = raw if isinstance(raw, list) else [raw, 0.0]
    if len(parts) != 2:
        raise Refused(f"must be ohms, a number or [resistance, reactance]; found {found(raw)}")
    try:
        return complex(_number(parts[0], 1, NOT_NEGATIVE), _number(parts[1], 1, ANY))
    except Refused as refused:
        raise Refused(f"ohms as a number or [resistance, reactance]: {refused}") from None


# --- reading a table -----------------------------------------------------------------------------


class Problem(NamedTuple):
    """What is wrong with a table or key; path: names, and indices of tables; where: indices inside the value."""

    path: tuple
    message: str
    where: tuple = ()


@dataclass
class Reading:
    """A table as it was read: values by stem, and the place where further problems are told.

    title : how the table is named in messages; path : names and indices from the top of the file;
    problems : shared by all tables of a file; given : stem -> name as written;
    outside : names of the keys of the tables around this one -> how those are named.
    """

    title: str
    path: tuple
    problems: list
    values: dict = field(default_factory=dict)
    given: dict = field(default_factory=dict)
    outside: dict = field(default_factory=dict)

    def __getitem__(self, stem: str):
        """Value in SI, its default, or None where it was refused or is missing."""
        return self.values.get(stem)

    def has(self, stem: str) -> bool:
        """Whether the key was written, rightly or not."""
        return stem in self.given

    def wrong(self, stem: str, message: str, where: tuple = ()):
        """Tell a problem of a key, or of the whole table where the key was not written."""
        place = (self.given[stem],) if stem in self.given else ()
        self.problems.append(Problem(self.path + place, message, where))

    @property
    def sound(self) -> bool:
        """No problem was told of this table or of one inside it."""
        return not any(problem.path[: len(self.path)] == self.path for problem in self.problems)


def read_table(raw, keys: tuple, title: str, path: tuple, problems: list, outside=None) -> Reading:
    """Values of one table by its keys; problems are appended, none is raised."""
    reading = Reading(title, path, problems, outside=outside or {})
    explained = _tell_unknown(reading, raw, keys)
    for key in keys:
        written = [name for name in key.names if name in raw]
        if len(written) > 1:
            reading.given[key.stem] = written[1]
            reading.wrong(key.stem, f"{' and '.join(written)} are the same quantity: state one of them")
        elif written:
            reading.given[key.stem] = written[0]
            _read_key(reading, key, raw[written[0]], keys)
        elif key.required and key.stem not in explained:
            what = key.title(path) if isinstance(key, SubTable) else key.spelling
            problems.append(Problem(path, f"{title} needs {what}"))
        elif isinstance(key, SubTable):
            reading.values[key.stem] = () if key.many else None
        else:
            reading.values[key.stem] = key.default
    return reading


def _read_key(reading: Reading, key, raw, keys):
    name = reading.given[key.stem]
    if isinstance(key, SubTable):
        outside = {**reading.outside, **{name: reading.title for key in keys for name in key.names}}
        reading.values[key.stem] = _read_inside(reading, key, raw, outside)
        return
    try:
        reading.values[key.stem] = key.value(raw, key.names[name])
    except Refused as refused:
        reading.wrong(key.stem, str(refused), refused.where)


def _read_inside(reading: Reading, key: SubTable, raw, outside):
    title = key.title(reading.path)
    tables = raw if key.many else [raw]
    if not isinstance(tables, list) or not all(isinstance(table, dict) for table in tables):
        reading.wrong(
            key.stem, f"must be {'tables' if key.many else 'one table'}, written {title}; found {found(raw)}"
        )
        return () if key.many else None
    path = (*reading.path, key.stem)
    inside = []
    for index, table in enumerate(tables):
        keys, words = key.variant(table) if key.variant else (key.keys, "")
        at = (*path, index) if key.many else path
        inside.append(read_table(table, keys, title + words, at, reading.problems, outside))
    return tuple(inside) if key.many else inside[0]


def _tell_unknown(reading: Reading, raw: dict, keys: tuple) -> set[str]:
    """Tell of every key that the table does not have; stems that were probably meant."""
    known = {name: key.stem for key in keys for name in key.names}
    explained = set()
    for name in raw:
        if name in known:
            continue
        key, message = _unknown(name, reading, keys, known)
        explained |= {key} if key else set()
        reading.problems.append(Problem(reading.path + (name,), message))
    return explained


def _unknown(name: str, reading: Reading, keys, known):
    without_unit = [key for key in keys if isinstance(key, Key) and _lacks_unit(name, key)]
    if without_unit:
        key = without_unit[0]
        return key.stem, f"the unit is part of the key: write {key.spelling}"
    if name in reading.outside:
        return None, f"this key belongs to {reading.outside[name]}: write it above {reading.title}"
    near = nearest(name, known)
    if near:
        return known[near], f"{reading.title} has no such key; did you mean {near}?"
    return None, f"{reading.title} has no such key; it has {', '.join(known)}"


def _lacks_unit(name: str, key: Key) -> bool:
    return any(
        name == base or (name.startswith(base + "_") and "_" not in name[len(base) + 1 :])
        for base in key.bases
    )
