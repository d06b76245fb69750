"""A window onto metres on a sheet of millimetres: round scale, grid, scale bar, north arrow, key."""

from dataclasses import dataclass
from math import ceil, floor, log10

import numpy as np

from exposure.outputs.drawing_paper import DISC, GREY, INK, PALE, ROW, SIZE, Paper, wrapped

WIDTH = 170.0  # mm: between the margins of A4 and Letter
TALLEST = 218.0  # mm: leaves room for heading and caption on both
MAP_HEIGHT = 150.0  # mm, axes included
LEFT, BELOW, RIGHT = 12.0, 9.0, 1.0  # mm beside and below the window, for its axes
MARGIN = 5.0  # mm inside the window, for labels
BAR = 9.0  # mm below the axes, for the scale bar
SYMBOL = 13.0  # mm before a row of the key
SCALES = (50, 100, 200, 250, 500, *(m * 10**n for n in range(3, 8) for m in (1, 2, 2.5, 5)))


@dataclass(frozen=True)
class Window:
    """What is seen: the metres at the lower left, where that is on the paper [mm], its size [mm], 1:scale."""

    start: tuple[float, float]
    corner: tuple[float, float]
    size: tuple[float, float]
    scale: float

    @property
    def frame(self):
        """Left, bottom, right, top. [mm]"""
        (x, y), (width, height) = self.corner, self.size
        return np.array([x, y, x + width, y + height])

    @property
    def bounds(self):
        """West, south, east, north. [m]"""
        (x, y), (width, height) = self.start, np.array(self.size) * self.scale / 1000
        return (x, y, x + width, y + height)

    def mm(self, points) -> np.ndarray:
        """Points (n, 2) in metres as millimetres on the paper."""
        return (np.asarray(points, float).reshape(-1, 2) - self.start) * (1000 / self.scale) + self.corner


def fitted(extent, tallest: float, lowest: float, bottom: float, below: float = MARGIN) -> Window:
    """The window at the largest round scale that shows an extent (west, south, east, north) [m].

    tallest, lowest : its height [mm]; bottom : its lower edge on the paper [mm];
    below : margin under the extent [mm].
    """
    wide, tall = extent[2] - extent[0], extent[3] - extent[1]
    width = WIDTH - LEFT - RIGHT
    fits = (
        scale
        for scale in SCALES
        if wide * 1000 / scale <= width - 2 * MARGIN and tall * 1000 / scale <= tallest - MARGIN - below
    )
    scale = next(fits, SCALES[-1])
    needed = tall * 1000 / scale + MARGIN + below
    height = max(lowest, needed)
    west = (extent[0] + extent[2]) / 2 - width / 2 * scale / 1000
    south = extent[1] - (below + (height - needed) / 2 * (below == MARGIN)) * scale / 1000
    return Window((west, south), (LEFT, bottom), (width, height), int(scale))


def draw_axes(paper: Paper, window: Window, across: str, up: str):
    """Frame, light grid, and metres along the left and lower edge."""
    left, bottom, right, top = window.frame
    west, south, east, north = window.bounds
    step = round_length(18 * window.scale / 1000)
    for value in _ticks(west, east, step):
        x = window.mm((value, south))[0, 0]
        paper.line([(x, bottom), (x, top)], 0.4, colour=PALE, layer=0.5, avoided=False)
        if left + 3 < x < right - 3:
            paper.write(x, bottom - 3.6, _number(value), 7, align="center")
    for value in _ticks(south, north, step):
        y = window.mm((west, value))[0, 1]
        paper.line([(left, y), (right, y)], 0.4, colour=PALE, layer=0.5, avoided=False)
        if bottom + 2 < y < top - 2:
            paper.write(left - 1.2, y - 0.9, _number(value), 7, align="right")
    paper.line(
        [(left, bottom), (right, bottom), (right, top), (left, top), (left, bottom)], 0.7, avoided=False
    )
    paper.write((left + right) / 2, bottom - 7.4, across, 7, align="center", colour=GREY)
    paper.write(3.0, (bottom + top) / 2, up, 7, align="center", rotation=90, colour=GREY)


def scale_bar(paper: Paper, y: float, scale: float) -> float:
    """Four black and white parts with their lengths in metres; returns its length. [m]"""
    length = round_length(26 * scale / 1000)
    part = length * 1000 / scale / 4
    for n in range(4):
        x = LEFT + n * part
        ring = [(x, y), (x + part, y), (x + part, y + 1.6), (x, y + 1.6)]
        paper.zone([ring], INK if n % 2 == 0 else "white", width=0.6, avoided=False)
    for n in (0, 2, 4):
        paper.write(LEFT + n * part, y + 2.5, f"{length * n / 4:g}", 7, align="center")
    words = f"m     1:{scale} on paper {WIDTH:g} mm wide; the bar stays right in any copy"
    paper.write(LEFT + 4 * part + 3, y, words, 7)
    return length


def north_arrow(paper: Paper, window: Window):
    """True north is up; in the upper right corner of the window."""
    x, y = window.frame[2] - 5, window.frame[3] - 13
    for side, fill in ((-1, INK), (1, "white")):
        paper.zone([[(x, y + 8), (x + side * 2.2, y), (x, y + 2)]], fill, width=0.6, layer=6, avoided=False)
    paper.write(x, y + 8.8, "N", 8, bold=True, align="center")
    paper.keep_free(x - 4, y - 1, x + 4, window.frame[3])


@dataclass(frozen=True)
class Row:
    """A row of a key: symbol is a function of (paper, x, y) that draws 10 mm by 3 mm, or None."""

    symbol: object
    text: str
    bold: bool = False

    def lines(self, width: float) -> list[str]:
        """The text in lines of a key of that width. [mm]"""
        return wrapped(self.text, width - self.indent - 1, SIZE, self.bold)

    def height(self, width: float) -> float:
        """Height in a key of that width. [mm]"""
        return max(2 * DISC + 0.4 if self.symbol else 0, ROW * len(self.lines(width)) + 0.3)

    @property
    def indent(self) -> float:
        """Where the text starts. [mm]"""
        return SYMBOL if self.symbol else 1.0


@dataclass(frozen=True)
class Key:
    """Two columns of rows, and rows of the full width below them."""

    left: tuple[Row, ...]
    right: tuple[Row, ...]
    below: tuple[Row, ...]

    @property
    def blocks(self):
        """Rows with their left edge, their width, and the height above them. [mm]"""
        split = WIDTH * 0.45 if self.right else WIDTH
        columns = max(_height(self.left, split), _height(self.right, WIDTH - split))
        return (
            (self.left, 0.0, split, 0.0),
            (self.right, split, WIDTH - split, 0.0),
            (self.below, 0.0, WIDTH, columns + 1.0),
        )

    @property
    def height(self) -> float:
        """On paper. [mm]"""
        return max(above + _height(rows, width) for rows, _, width, above in self.blocks)

    def write(self, paper: Paper, top: float):
        """Symbols with what they mean, from the top down."""
        for rows, left, width, above in self.blocks:
            y = top - above
            for row in rows:
                if row.symbol:
                    row.symbol(paper, left + 1.0, y - ROW)
                for n, line in enumerate(row.lines(width)):
                    paper.write(left + row.indent, y - ROW * (n + 1) + 0.9, line, SIZE, row.bold)
                y -= row.height(width)


def fitting_key(build, room: float) -> Key:
    """The longest key that fits a height [mm]; build is a function of the most areas and transmissions."""
    keys = (build(areas, powers) for areas, powers in ((16, 8), (12, 6), (9, 4), (6, 3), (3, 2), (1, 1)))
    return next((key for key in keys if key.height <= room), build(0, 0))


def _height(rows, width: float) -> float:
    return sum(row.height(width) for row in rows)


def title_height(title: str, *lines: str) -> float:
    """Height of a title and the lines below it. [mm]"""
    rows = len(wrapped(title, WIDTH - 2, 9, True)) * 4.6
    return rows + sum(len(wrapped(line, WIDTH - 2)) for line in lines) * ROW + 1.5


def write_title(paper: Paper, title: str, *lines: str):
    """A bold title at the top of the sheet, and lines below it."""
    top = paper.height
    for text in wrapped(title, WIDTH - 2, 9, True):
        top -= 4.6
        paper.write(1, top + 1, text, 9, bold=True)
    for line in lines:
        for text in wrapped(line, WIDTH - 2):
            top -= ROW
            paper.write(1, top + 0.8, text)


def number_symbol(number: int):
    """Key symbol of an area."""
    return lambda paper, x, y: paper.disc(x + 5, y + 1.5, number)


def line_symbol(width: float, style, colour=INK):
    """Key symbol of a line."""
    return lambda paper, x, y: paper.line(
        [(x, y + 1.6), (x + 10, y + 1.6)], width, style, colour, avoided=False
    )


def zone_symbol(**looks):
    """Key symbol of a zone."""

    def draw(paper, x, y):
        paper.zone(
            [[(x, y + 0.2), (x + 10, y + 0.2), (x + 10, y + 3.2), (x, y + 3.2)]], **looks, avoided=False
        )

    return draw


def round_length(length: float) -> float:
    """The smallest of 1, 2, 5, 10 .. that is not below a length."""
    power = 10.0 ** floor(log10(length))
    return next(m * power for m in (1, 2, 5, 10) if m * power >= length * (1 - 1e-9))


def _ticks(low, high, step):
    return [round(n * step, 9) + 0.0 for n in range(ceil(low / step), floor(high / step) + 1)]


def _number(value: float) -> str:
    return f"{value:g}".replace("-", "−")
