"""A table of points: CSV (RFC 4180) with a line of heads and a point decimal."""

import csv
import math

from exposure.errors import ExposureError
from exposure.units import FOOT

HEADS = {
    f"{axis}_{unit}": (axis, factor)
    for axis in ("east", "north", "up")
    for unit, factor in (("m", 1.0), ("ft", FOOT))
}
NEEDED = "the first line must name east_m, north_m and up_m (or _ft), separated by commas"


def points_of_table(path: str) -> list[tuple[float, float, float]]:
    """Points (east, north, up) of a CSV file; other columns are left alone. [m]

    Raises
    ------
    ExposureError
        With the line of the first number that is none; a missing column; no points.
    """
    with open(path, newline="", encoding="utf-8-sig") as file:
        try:
            rows = list(csv.DictReader(file))
        except (csv.Error, UnicodeDecodeError) as error:
            raise ExposureError(f"{path} is not a CSV table in UTF-8: {error}") from None
    if not rows:
        raise ExposureError(f"{path} has no points: {NEEDED}, the others hold the points")
    columns = _columns(path, rows[0])
    return [tuple(_number(path, line, row, head) for head in columns) for line, row in enumerate(rows, 2)]


def _columns(path: str, row: dict) -> list[str]:
    found = {HEADS[head][0]: head for head in row if head in HEADS}
    if len(found) < 3 or sum(head in HEADS for head in row) > 3:
        raise ExposureError(f"{path}: {NEEDED}; found {', '.join(str(head) for head in row)}")
    return [found[axis] for axis in ("east", "north", "up")]


def _number(path: str, line: int, row: dict, head: str) -> float:
    try:
        value = float(row[head] or "")
    except (TypeError, ValueError):
        value = math.nan
    if not math.isfinite(value):
        raise ExposureError(
            f"{path}, line {line}, {head}: must be a number with a decimal point; found {row[head]!r}"
        )
    return value * HEADS[head][1]
