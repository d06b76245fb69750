"""Paper in millimetres: lines, zones, words and numbers that keep clear of each other.

Everything is dark ink on white and light fills, told apart by line style, hatch and words.
"""

from dataclasses import dataclass
from functools import lru_cache

import numpy as np
from matplotlib.figure import Figure
from matplotlib.font_manager import FontProperties, findfont, get_font
from matplotlib.ft2font import LoadFlags
from matplotlib.lines import Line2D
from matplotlib.patches import PathPatch
from matplotlib.path import Path
from matplotlib.transforms import Affine2D

FAMILY = "DejaVu Sans"  # its files come with matplotlib
INK, GREY, PALE = "#000000", "#5a5a5a", "#d9d9d9"
ZONE_INK, ZONE_FILL = "#16324f", "#dce7f2"
AREA_FILL = "#f3efe6"
SIZE = 7.4  # points
POINT = 25.4 / 72  # mm
ROW = 3.9  # mm from base line to base line
DISC = 2.1  # mm, radius of an area's number

_FONTS = {
    False: findfont(FontProperties(family=FAMILY)),
    True: findfont(FontProperties(family=FAMILY, weight="bold")),
}
_GLYPHS = frozenset(get_font(_FONTS[False]).get_charmap())
_PLAIN = str.maketrans({"–": "-", "−": "-", "′": "'", "…": "..."})


@dataclass(frozen=True)
class Drawing:
    """A finished figure: its size on paper [mm], and the words that belong to it.

    scale : 200 for 1:200, None where the figure is not to scale.
    alt : what the figure shows, in words made from the same numbers.
    """

    name: str
    title: str
    caption: str
    alt: str
    width_mm: float
    height_mm: float
    scale: int | None
    figure: Figure


def drawable(text: str) -> str:
    """The text with a box for every character that the font does not have.

    Own dashes become hyphens: a PDF embeds the font once more for characters beyond the first 256.
    """
    plain = " ".join(text.split()).translate(_PLAIN)
    return "".join(c if ord(c) in _GLYPHS and c.isprintable() else "□" for c in plain)


def text_width(text: str, size: float = SIZE, bold: bool = False) -> float:
    """Width of one line of text. [mm]"""
    return sum(_advance(character, bold) for character in text) * size * POINT


@lru_cache(maxsize=4096)
def _advance(character: str, bold: bool) -> float:
    """Width of a character at size 1, without hinting."""
    font = get_font(_FONTS[bold])
    font.set_size(100, 72)
    return font.load_char(ord(character), flags=LoadFlags.NO_HINTING).linearHoriAdvance / 65536 / 100


def shortened(text: str, width: float, size: float = SIZE, bold: bool = False) -> str:
    """The text, its end left out where it is wider than that. [mm]"""
    text = drawable(text)
    if text_width(text, size, bold) <= width:
        return text
    while text and text_width(text + "...", size, bold) > width:
        text = text[:-1].rstrip()
    return text + "..."


def wrapped(text: str, width: float, size: float = SIZE, bold: bool = False) -> list[str]:
    """Text broken at spaces to a width [mm]; a word that is wider loses its end."""
    lines = [""]
    for word in drawable(text).split():
        longer = f"{lines[-1]} {word}".strip()
        if lines[-1] and text_width(longer, size, bold) > width:
            lines.append(shortened(word, width, size, bold))
        else:
            lines[-1] = shortened(longer, width, size, bold)
    return lines


class Paper:
    """A sheet of width by height [mm], origin at the lower left; knows what is taken.

    taken : boxes (left, bottom, right, top) of words; ink : points on lines, to be avoided if possible.
    """

    def __init__(self, width: float, height: float):
        self.width, self.height = width, height
        self.figure = Figure(figsize=(width / 25.4, height / 25.4), facecolor="white")
        self.transform = Affine2D().scale(1 / 25.4) + self.figure.dpi_scale_trans
        self.taken: list[tuple[float, float, float, float]] = []
        self.ink: list[np.ndarray] = []

    def line(self, points, width=0.8, style="-", colour=INK, layer=4.0, avoided=True):
        """A chain (n, 2) of straight lines [mm]; width in points."""
        points = np.asarray(points, float)
        self.figure.add_artist(
            Line2D(
                *points.T,
                color=colour,
                linewidth=width,
                linestyle=style,
                solid_capstyle="butt",
                transform=self.transform,
                zorder=layer,
            )
        )
        if avoided:
            self.ink.append(_dense(points))

    def dot(self, x, y, size=4.0, marker="o", colour=INK, layer=4.5):
        """A small mark; size in points."""
        self.figure.add_artist(
            Line2D(
                [x], [y], color=colour, marker=marker, markersize=size, transform=self.transform, zorder=layer
            )
        )
        self.ink.append(np.array([[x, y]] * 3))

    def zone(self, rings, fill="none", hatch=None, colour=INK, width=0.8, style="-", layer=2.0, avoided=True):
        """A polygon with holes, filled and hatched, and its outline in a layer above."""
        path = Path.make_compound_path(*(_ring(ring) for ring in rings))
        if fill != "none" or hatch:
            self._patch(path, layer, facecolor=fill, edgecolor=colour, hatch=hatch, linewidth=0)
        if width:
            self._patch(path, layer + 1, facecolor="none", edgecolor=colour, linewidth=width, linestyle=style)
        if width and avoided:
            self.ink += [_dense(_ring(ring).vertices) for ring in rings]

    def _patch(self, path, layer, **looks):
        patch = PathPatch(path, transform=self.transform, zorder=layer, **looks)
        patch.set_hatch_linewidth(0.5)
        self.figure.add_artist(patch)

    def write(self, x, y, text, size=SIZE, bold=False, align="left", rotation=0, colour=INK):
        """One line of text with its base line at y."""
        self.figure.text(
            x,
            y,
            drawable(text),
            transform=self.transform,
            fontsize=size,
            fontweight="bold" if bold else "normal",
            fontfamily=FAMILY,
            color=colour,
            horizontalalignment=align,
            verticalalignment="baseline",
            rotation=rotation,
            rotation_mode="anchor",
            parse_math=False,
            zorder=9,
        )

    def disc(self, x, y, number):
        """The number of an area in a small white circle."""
        circle = Path.circle((x, y), DISC)
        self._patch(circle, 8, facecolor="white", edgecolor=INK, linewidth=0.7)
        self.write(x, y - 0.34 * 7 * POINT, str(number), 7.0, align="center")

    def keep_free(self, left, bottom, right, top):
        """No label goes there."""
        self.taken.append((left, bottom, right, top))

    def place(self, spots, width, height, frame, costs):
        """The centre where a box of that size covers nothing and costs least; None if nowhere.

        spots : (n, 2) mm; costs : (n,), to which the ink that is covered is added;
        frame : (left, bottom, right, top) to stay in.
        """
        spots = np.asarray(spots, float).reshape(-1, 2)
        low, high = spots - (width / 2, height / 2), spots + (width / 2, height / 2)
        free = (low >= frame[:2]).all(1) & (high <= frame[2:]).all(1)
        for box in self.taken:
            free &= ~((low < box[2:]).all(1) & (high > box[:2]).all(1))
        spots, low, high, costs = spots[free], low[free], high[free], np.asarray(costs, float)[free]
        if not len(spots):
            return None
        ink = np.vstack(self.ink) if self.ink else np.empty((0, 2))
        near = ink[((ink > low.min(0)) & (ink < high.max(0))).all(1)]
        covered = [np.count_nonzero(((near > a) & (near < b)).all(1)) for a, b in zip(low, high, strict=True)]
        best = int(np.argmin(np.array(covered) * 3.0 + costs))
        self.taken.append((*low[best], *high[best]))
        return tuple(spots[best])

    def label(self, anchors, text, frame, size=SIZE, bold=False) -> bool:
        """Words beside one of the anchors (n, 2), with a thin leader; False where there is no room."""
        text = drawable(text)
        width, height = text_width(text, size, bold) + 1.4, size * POINT + 1.0
        spots, starts, costs = [], [], []
        for gap in (1.2, 4.0, 8.0, 14.0, 22.0):
            for order, (x, y) in enumerate(anchors):
                for dx, dy in (
                    (1, 0),
                    (-1, 0),
                    (0, 1),
                    (0, -1),
                    (0.7, 0.7),
                    (-0.7, 0.7),
                    (0.7, -0.7),
                    (-0.7, -0.7),
                ):
                    aside = (gap + width / 2) * np.sign(dx) * (1 if dy == 0 else 0.8)
                    spots.append((x + aside, y + (gap + height / 2) * np.sign(dy)))
                    starts.append((x, y))
                    costs.append(gap + 0.4 * order)
        spot = self.place(spots, width, height, frame, costs)
        if spot is None:
            return False
        start = starts[spots.index(spot)]
        left, bottom = spot[0] - width / 2, spot[1] - height / 2
        end = (min(max(start[0], left), left + width), min(max(start[1], bottom), bottom + height))
        if np.hypot(end[0] - start[0], end[1] - start[1]) > 2.0:
            self.line([start, end], 0.5, colour=GREY, layer=7)
        box = [
            (left, bottom),
            (left + width, bottom),
            (left + width, bottom + height),
            (left, bottom + height),
        ]
        self._patch(_ring(box), 7.5, facecolor="white", edgecolor="none", linewidth=0)
        self.write(spot[0], spot[1] - 0.34 * size * POINT, text, size, bold, "center")
        return True


def _ring(points) -> Path:
    points = np.asarray(points, float)
    return Path(np.vstack([points, points[:1]]), closed=True)


def _dense(points, step=1.5):
    """Points along a chain, about a step apart. [mm]"""
    found = [points[-1:]]
    for a, b in zip(points[:-1], points[1:], strict=True):
        count = int(np.hypot(*(b - a)) / step) + 1
        found.append(a + (b - a) * (np.arange(count) / count)[:, None])
    return np.vstack(found)
