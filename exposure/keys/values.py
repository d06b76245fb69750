"""Values as they stand in a site file: what they must be, and the words in which they are refused."""

import datetime
import difflib
import math
from dataclasses import dataclass


class Refused(ValueError):
    """A value that a key does not take; where: indices inside the value."""

    def __init__(self, message: str, where: tuple = ()):
        super().__init__(message)
        self.where = where


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
FAR = 1e5  # [m] no place of a station, and no length in it, is farther or longer
DISTANCE = Range(-FAR, FAR)
LENGTH = Range(0, FAR, low_open=True)
HEIGHT = Range(0, FAR)
WIRE_SIZE = Range(1e-6, 10)  # [m] from a micrometre to a tower
POSITIVE = Range(0, low_open=True)
NOT_NEGATIVE = Range(0)
FRACTION = Range(0, 1)


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


def number(raw, factor: float, allowed: Range) -> float:
    """A finite number in its range, times the factor."""
    if isinstance(raw, bool) or not isinstance(raw, int | float):
        hint = f"; write {raw.strip()} without quotes" if isinstance(raw, str) and _is_number(raw) else ""
        raise Refused(f"must be a number; found {found(raw)}{hint}")
    value = _double(raw)
    if not math.isfinite(value):
        raise Refused(f"must be a finite number; found {raw:.6g}")
    if not allowed.holds(value * factor):
        raise Refused(f"must be {allowed.words(factor)}; found {raw}")
    return value * factor


def _double(raw) -> float:
    try:
        return float(raw)
    except OverflowError:  # a whole number of more than 308 digits
        raise Refused("must be a smaller number") from None


def _is_number(raw: str) -> bool:
    try:
        return math.isfinite(float(raw))
    except ValueError:
        return False


def integer(raw, allowed: Range) -> int:
    """A whole number in its range."""
    if isinstance(raw, bool) or not isinstance(raw, int):
        raise Refused(f"must be a whole number; found {found(raw)}")
    return int(number(raw, 1, allowed))


def text(raw) -> str:
    """Words on one line; line breaks and repeated blanks become one blank."""
    if not isinstance(raw, str):
        raise Refused(f"must be a text in quotes; found {found(raw)}")
    if not raw.strip():
        raise Refused("must not be empty")
    words = " ".join(raw.split())
    if not words.isprintable():
        raise Refused("must consist of characters that can be printed")
    return words


def choice(raw, options: tuple, what: str) -> str:
    """One of the options."""
    word = text(raw)
    if word not in options:
        raise Refused(unknown_word(what, word, options))
    return word


def choices(raw, options: tuple, what: str) -> tuple[str, ...]:
    """A list of options, none twice."""
    if not isinstance(raw, list) or not raw:
        raise Refused(
            f'must be a list with at least one {what}, such as ["{options[0]}"]; found {found(raw)}'
        )
    for index, word in enumerate(raw):
        try:
            choice(word, options, what)
        except Refused as refused:
            raise Refused(str(refused), (index,)) from None
        if word in raw[:index]:
            raise Refused(f'"{word}" stands twice', (index,))
    return tuple(raw)


def boolean(raw) -> bool:
    """True or False."""
    if not isinstance(raw, bool):
        raise Refused(f"must be true or false; found {found(raw)}")
    return raw


def date(raw) -> datetime.date:
    """A day."""
    if isinstance(raw, datetime.datetime) or not isinstance(raw, datetime.date):
        raise Refused(f"must be a day written as 2026-12-01, without quotes or time; found {found(raw)}")
    return raw


def point(raw, factor: float, axes: str, ranges: tuple[Range, ...]) -> tuple[float, ...]:
    """A point; each axis in its range."""
    if not isinstance(raw, list) or len(raw) != len(ranges):
        raise Refused(f"must be a point of {len(ranges)} numbers, [{axes}]; found {found(raw)}")
    values = []
    for axis, entry, allowed in zip(axes.split(", "), raw, ranges, strict=True):
        try:
            values.append(number(entry, factor, allowed))
        except Refused as refused:
            raise Refused(f"{axis} {refused}") from None
    return tuple(values)


def points(raw, factor: float, axes: str, ranges, at_least: int) -> tuple[tuple[float, ...], ...]:
    """A list of points."""
    if not isinstance(raw, list) or len(raw) < at_least:
        raise Refused(f"must be a list of at least {at_least} points [{axes}]; found {found(raw)}")
    values = []
    for index, entry in enumerate(raw):
        try:
            values.append(point(entry, factor, axes, ranges))
        except Refused as refused:
            raise Refused(f"point {index + 1}: {refused}", (index,)) from None
    return tuple(values)


def impedance(raw) -> complex:
    """Ohms."""
    parts = raw if isinstance(raw, list) else [raw, 0.0]
    if len(parts) != 2:
        raise Refused(f"must be ohms, a number or [resistance, reactance]; found {found(raw)}")
    try:
        return complex(number(parts[0], 1, NOT_NEGATIVE), number(parts[1], 1, ANY))
    except Refused as refused:
        raise Refused(f"ohms as a number or [resistance, reactance]: {refused}") from None
