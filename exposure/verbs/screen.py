"""How answers are put on a screen."""

import json
import sys


def print_json(value):
    """A value as JSON; only finite numbers."""
    print(json.dumps(value, indent=2, ensure_ascii=False, allow_nan=False))


def print_table(heads, rows):
    """Columns as wide as their widest entry; no line ends in blanks."""
    lines = [tuple(heads), *(tuple(row) for row in rows)]
    widths = [max(len(line[column]) for line in lines) for column in range(len(heads))]
    for line in lines:
        print("  ".join(entry.ljust(width) for entry, width in zip(line, widths, strict=True)).rstrip())


def figures(value: float | None, digits: int = 3) -> str:
    """A number to some significant digits, a dash where there is none."""
    return "-" if value is None else f"{value:.{digits}g}"


def progress(text: str):
    """A step of a long job, on stderr and only where a person looks on."""
    if sys.stderr.isatty():
        print(text, file=sys.stderr, flush=True)
