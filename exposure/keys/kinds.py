"""The keys of a table: the names of a quantity, its range, its default and a line of help."""

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass

from exposure.keys import values
from exposure.keys.values import ANY, DISTANCE, LENGTH, POSITIVE, WIRE_SIZE, Range
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
        """Its names."""
        return " or ".join(self.names)

    @property
    def need(self) -> str:
        """Whether it must be written, or what holds if it is not; empty where its help says so."""
        if self.required:
            return "required"
        return "" if self.default is None else f"{_words(self.default)} unless stated"


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

    @property
    def need(self) -> str:
        """Whether it must be written."""
        return "required" if self.required else ""

    def title(self, path: tuple) -> str:
        """As it is written in a file, inside the table at a path."""
        dotted = ".".join([*(part for part in path if isinstance(part, str)), self.stem])
        return f"[[{dotted}]]" if self.many else f"[{dotted}]"


def number(stem: str, names=None, allowed: Range = ANY, **more) -> Key:
    """A number; ``names`` as in Key, by default the stem alone (no unit)."""
    return Key(stem, lambda raw, factor: values.number(raw, factor, allowed), **_named(stem, names), **more)


def length(stem: str, allowed: Range = LENGTH, **more) -> Key:
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
    return Key(stem, lambda raw, factor: values.number(raw, factor, WIRE_SIZE), names, bases=bases, **more)


def angle(stem: str, allowed: Range = ANY, **more) -> Key:
    """An angle in degrees; radians inside."""
    return number(stem, {f"{stem}_deg": math.pi / 180}, allowed, **more)


def duration(stem: str, allowed: Range = POSITIVE, **more) -> Key:
    """A time in minutes or seconds."""
    return number(stem, {f"{stem}_minutes": MINUTE, f"{stem}_seconds": 1.0}, allowed, **more)


def integer(stem: str, allowed: Range = ANY, **more) -> Key:
    """A whole number."""
    return Key(stem, lambda raw, _: values.integer(raw, allowed), {stem: 1}, **more)


def text(stem: str, **more) -> Key:
    """Words, not empty."""
    return Key(stem, lambda raw, _: values.text(raw), {stem: 1}, **more)


def choice(stem: str, options, what: str = "", **more) -> Key:
    """One of the known words; ``what`` names them in messages."""
    return Key(stem, lambda raw, _: values.choice(raw, tuple(options), what or stem), {stem: 1}, **more)


def choices(stem: str, options, what: str, **more) -> Key:
    """A list of known words, none twice."""
    return Key(stem, lambda raw, _: values.choices(raw, tuple(options), what), {stem: 1}, **more)


def boolean(stem: str, **more) -> Key:
    """true or false."""
    return Key(stem, lambda raw, _: values.boolean(raw), {stem: 1}, **more)


def date(stem: str, **more) -> Key:
    """A day."""
    return Key(stem, lambda raw, _: values.date(raw), {stem: 1}, **more)


def point(stem: str, axes: str, allowed: Range = DISTANCE, **more) -> Key:
    """A point in metres or feet; ``axes`` are their names, as "east, north, up"; the range is for up."""
    ranges = _ranges(axes, allowed)
    return Key(
        stem, lambda raw, f: values.point(raw, f, axes, ranges), **_named(stem, _lengths(stem)), **more
    )


def points(stem: str, axes: str, at_least: int, allowed: Range = DISTANCE, **more) -> Key:
    """A list of points in metres or feet."""
    ranges = _ranges(axes, allowed)

    def value(raw, factor):
        return values.points(raw, factor, axes, ranges, at_least)

    return Key(stem, value, **_named(stem, _lengths(stem)), **more)


def impedance(stem: str, **more) -> Key:
    """An impedance in ohms, a number or [resistance, reactance]; its resistance is not negative."""
    return Key(stem, lambda raw, _: values.impedance(raw), **_named(stem, {f"{stem}_ohm": 1}), **more)


def _words(default) -> str:
    match default:
        case bool():
            return "true" if default else "false"
        case tuple():
            return f"[{', '.join(f'{part:g}' for part in default)}]"
        case float() | int():
            return f"{default:g}"
    return f'"{default}"'


def _named(stem: str, names) -> dict:
    return {"names": names, "bases": (stem,)} if names else {"names": {stem: 1.0}}


def _lengths(stem: str) -> dict:
    return {f"{stem}_m": 1.0, f"{stem}_ft": FOOT}


def _ranges(axes: str, allowed: Range) -> tuple[Range, ...]:
    return tuple(allowed if axis == "up" else DISTANCE for axis in axes.split(", "))
