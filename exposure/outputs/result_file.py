"""The assessment as a JSON file, and back: nothing is lost but digits beyond the ninth."""

import json
import math
import types
import typing
from dataclasses import MISSING, fields, is_dataclass

from exposure.assessment.model import Assessment
from exposure.errors import ExposureError
from exposure.outputs.geojson import boundaries_geojson
from exposure.outputs.whole_files import write_whole

FORMAT = "exposure-assessment/1"
DIGITS = 9


def write_result(assessment: Assessment, path):
    """Write ``assessment.json``, whole or not at all."""
    write_whole(path, dumps(assessment).encode())


def write_geojson(assessment: Assessment, path):
    """Write the horizontal boundaries as GeoJSON, whole or not at all.

    Raises
    ------
    ExposureError
        The site has no [place], or a boundary reaches farther than 1 km from it.
    """
    write_whole(path, json.dumps(boundaries_geojson(assessment), indent=1, ensure_ascii=False).encode())


def dumps(assessment: Assessment) -> str:
    """The JSON text: SI units, numbers finite (others null), nine significant digits."""
    return json.dumps(_plain(assessment), indent=1, ensure_ascii=False, allow_nan=False) + "\n"


def read_result(path) -> Assessment:
    """The assessment of a result file.

    Raises
    ------
    ExposureError
        The file cannot be read or is not such a file; the place in it is named.
    """
    try:
        with open(path, encoding="utf-8") as file:
            found = json.load(file)
    except OSError as error:
        raise ExposureError(f"{path} cannot be read: {error.strerror}") from None
    except ValueError as error:
        raise ExposureError(f"{path} is not a result file: {error}") from None
    form = found.get("format") if isinstance(found, dict) else None
    if form != FORMAT:
        raise ExposureError(f"{path} is not a result file: its format is {form!r}, {FORMAT!r} is needed")
    try:
        return _typed(found, Assessment, "assessment")
    except _Misfit as error:
        raise ExposureError(f"{path} is not a result file: {error}") from None


class _Misfit(Exception):
    """A value that does not fit its place."""


def _plain(value):
    if is_dataclass(value):
        return {field.name: _plain(getattr(value, field.name)) for field in fields(value)}
    if isinstance(value, tuple | list):
        return [_plain(item) for item in value]
    if value is None or isinstance(value, bool | str | int):
        return value
    number = float(value)
    return float(f"{number:.{DIGITS}g}") if math.isfinite(number) else None


def _typed(value, kind, place: str):
    """A plain value as the type it was written from."""
    origin, inner = typing.get_origin(kind), typing.get_args(kind)
    if is_dataclass(kind):
        return _dataclass(value, kind, place)
    if origin is typing.Literal:
        return _expect(value in inner, value, place, f"one of {', '.join(map(str, inner))}")
    if origin in (types.UnionType, typing.Union):
        return None if value is None else _typed(value, inner[0], place)
    if origin is tuple:
        return _tuple(value, inner, place)
    if kind is float:
        number = isinstance(value, int | float) and not isinstance(value, bool)
        return float(_expect(number, value, place, "a number"))
    return _expect(type(value) is kind, value, place, kind.__name__)


def _tuple(value, inner, place):
    _expect(isinstance(value, list), value, place, "a list")
    kinds = inner[:1] * len(value) if inner[-1] is Ellipsis else inner
    _expect(len(kinds) == len(value), value, place, f"a list of {len(kinds)}")
    return tuple(
        _typed(item, kind, f"{place}[{i}]") for i, (item, kind) in enumerate(zip(value, kinds, strict=True))
    )


def _dataclass(value, kind, place):
    _expect(isinstance(value, dict), value, place, "a table")
    hints = typing.get_type_hints(kind)
    known = {}
    for field in fields(kind):
        if field.name in value:
            known[field.name] = _typed(value[field.name], hints[field.name], f"{place}.{field.name}")
        elif field.default is MISSING and field.default_factory is MISSING:
            raise _Misfit(f"{place}.{field.name} is missing")
    return kind(**known)


def _expect(condition, value, place, wanted):
    if not condition:
        raise _Misfit(f"{place} is {value!r:.60}, not {wanted}")
    return value
