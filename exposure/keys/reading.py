"""A table as it is read by its keys: values in SI, and every problem in the operator's words."""

from dataclasses import dataclass, field
from typing import NamedTuple

from exposure.keys.kinds import Key, SubTable
from exposure.keys.values import Refused, found, nearest


class Problem(NamedTuple):
    """What is wrong with a table or key.

    path : names, and indices of tables from 0; where : indices inside the value.
    """

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
        """Whether the key was written, rightly or not, misspelt or without its unit."""
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
    _tell_unknown(reading, raw, keys)
    for key in keys:
        written = [name for name in key.names if name in raw]
        if len(written) > 1:
            reading.given[key.stem] = written[1]
            reading.wrong(key.stem, f"{' and '.join(written)} are the same quantity: state one of them")
        elif written:
            reading.given[key.stem] = written[0]
            _read_key(reading, key, raw[written[0]], keys)
        elif key.required and not reading.has(key.stem):
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
    if key.required and not tables:
        reading.wrong(key.stem, f"at least one {title} is needed")
    path = (*reading.path, key.stem)
    inside = []
    for index, table in enumerate(tables):
        keys, words = key.variant(table) if key.variant else (key.keys, "")
        at = (*path, index) if key.many else path
        inside.append(read_table(table, keys, title + words, at, reading.problems, outside))
    return tuple(inside) if key.many else inside[0]


def _tell_unknown(reading: Reading, raw: dict, keys: tuple):
    """Tell of every key that the table does not have, and note which one was probably meant."""
    known = {name: key.stem for key in keys for name in key.names}
    for name in raw:
        if name in known:
            continue
        meant, message = _unknown(name, reading, keys, known)
        if meant:
            reading.given[meant] = name
        reading.problems.append(Problem(reading.path + (name,), message))


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
