"""Attenuation of matched cables: the lowest published value, so that no doubtful loss is credited.

Three sources disagree by some 15 %; a table made for other purposes prints upper values.  The credited
figure is the lowest of those that cover the frequency, and none where no source covers it:

- REGULATOR: FCC OET Bulletin 65, Supplement B (Edition 97-01), November 1997, appendix B, worksheet
  instructions, p. 3 (read); less half a unit of its last printed digit, since it may have been rounded up.
  Between two bands the lower one's figure holds.
- LAW: k1 sqrt(f) + k2 f [dB/100 m, f in MHz], nominal (from memory, confidence 0.75).
- POINTS: maxima of MIL-C-17 and a training guide for two-way radio (second-hand); between two points a
  power of frequency, never outside them.
"""

import math
from bisect import bisect_right
from dataclasses import dataclass
from itertools import pairwise

from exposure.units import HUNDRED_FEET

# lower and upper edge of the bands of REGULATOR [MHz], as allotted to amateurs in the USA
BANDS = {
    "160 m": (1.8, 2.0),
    "80/75 m": (3.5, 4.0),
    "40 m": (7.0, 7.3),
    "30 m": (10.1, 10.15),
    "20 m": (14.0, 14.35),
    "17 m": (18.068, 18.168),
    "15 m": (21.0, 21.45),
    "12 m": (24.89, 24.99),
    "10 m": (28.0, 29.7),
    "6 m": (50.0, 54.0),
    "2 m": (144.0, 148.0),
    "1.25 m": (222.0, 225.0),
    "70 cm": (420.0, 450.0),
    "33 cm": (902.0, 928.0),
    "23 cm": (1240.0, 1300.0),
    "13 cm": (2300.0, 2450.0),
}

# dB per 100 ft, as printed; "" where nothing is printed
COLUMNS = ("RG-58", "RG-8X", "RG-213", "RG-8 foam", "9913-type", "half-inch hardline", "450-ohm ladder line")
REGULATOR = {
    "160 m": ("0.5", "0.4", "0.3", "0.2", "0.2", "0", "0"),
    "80/75 m": ("0.7", "0.5", "0.4", "0.3", "0.2", "0.1", "0"),
    "40 m": ("1.1", "0.7", "0.5", "0.4", "0.3", "0.2", "0"),
    "30 m": ("1.4", "0.9", "0.6", "0.5", "0.4", "0.2", "0"),
    "20 m": ("1.7", "1.1", "0.8", "0.6", "0.5", "0.3", "0"),
    "17 m": ("2.0", "1.2", "0.9", "0.7", "0.6", "0.3", "0.1"),
    "15 m": ("2.2", "1.3", "1.0", "0.7", "0.6", "0.3", "0.1"),
    "12 m": ("2.4", "1.4", "1.1", "0.8", "0.6", "0.3", "0.2"),
    "10 m": ("2.5", "1.5", "1.3", "0.9", "0.7", "0.4", "0.2"),
    "6 m": ("3.5", "2.1", "1.7", "1.2", "0.9", "0.5", "0.3"),
    "2 m": ("6.5", "3.6", "3.0", "2.0", "1.6", "1.0", "0.7"),
    "1.25 m": ("8.4", "4.6", "4.0", "2.6", "2.0", "1.3", ""),
    "70 cm": ("12", "6.5", "5.8", "3.6", "2.8", "1.9", ""),
    "33 cm": ("19", "9.6", "9.0", "5.4", "4.0", "3.0", ""),
    "23 cm": ("23", "12", "11", "6.4", "4.6", "3.7", ""),
    "13 cm": ("", "15", "15", "8.8", "6.4", "5.2", ""),
}

LAW = {
    #                      k1     k2
    "RG-58": (1.45, 0.012),
    "RG-213": (0.62, 0.006),
    "half-inch hardline": (0.215, 0.0008),
}
LAW_RANGE = (1.8, 450.0)  # where it was compared with the other two [MHz]

# (f [MHz], dB per 100 ft)
POINTS = {
    "RG-58": (((50, 4.0), (1000, 28)), ((50, 3.3), (150, 6.1), (450, 11.75), (850, 17.75))),
    "RG-213": (((50, 1.2), (1000, 9.0)), ((50, 1.5), (150, 2.7), (450, 4.97), (850, 7.53))),
    "RG-8 foam": (((50, 1.2), (150, 2.2), (450, 3.98), (850, 5.2)),),
}

CABLES = {
    "RG-58": "RG-58",
    "RG-58C/U": "RG-58",
    "RG-8X": "RG-8X",
    "RG-8A": "RG-213",  # one column in the regulator's table
    "RG-213": "RG-213",
    "RG-213/U": "RG-213",
    "RG-8 foam": "RG-8 foam",
    "9913-type": "9913-type",
    "half-inch hardline": "half-inch hardline",
    "450-ohm ladder line": "450-ohm ladder line",
}


@dataclass(frozen=True)
class Attenuation:
    """Matched loss of a cable, per_metre [dB/m], zero where nothing is published; what it rests on."""

    per_metre: float
    source: str


def attenuation(cable: str, frequency: float) -> Attenuation:
    """Lowest published attenuation of a cable of CABLES at a frequency [Hz]; zero outside every table."""
    column, megahertz = CABLES[cable], frequency / 1e6
    found = [
        *_of_regulator(column, megahertz),
        *_of_law(column, megahertz),
        *(value for points in POINTS.get(column, ()) for value in _of_points(points, megahertz)),
    ]
    if not found:
        return Attenuation(
            0.0, f"no attenuation of {cable} is published for {megahertz:g} MHz: none is credited"
        )
    return min(found, key=lambda value: value.per_metre)


def _of_regulator(column: str, megahertz: float):
    lower_edges = [low for low, _ in BANDS.values()]
    index = bisect_right(lower_edges, megahertz) - 1
    if index < 0 or megahertz > max(high for _, high in BANDS.values()):
        return
    band = list(BANDS)[index]
    printed = REGULATOR[band][COLUMNS.index(column)]
    if printed:
        half_unit = 0.05 if "." in printed else 0.5 if float(printed) else 0.0
        text = (
            f"FCC OET Bulletin 65 Supplement B, 1997, appendix B, {band}: {printed} dB/100 ft, less rounding"
        )
        yield Attenuation((float(printed) - half_unit) / HUNDRED_FEET, text)


def _of_law(column: str, megahertz: float):
    if column in LAW and LAW_RANGE[0] <= megahertz <= LAW_RANGE[1]:
        k1, k2 = LAW[column]
        yield Attenuation(
            (k1 * math.sqrt(megahertz) + k2 * megahertz) / 100, "nominal law k1 sqrt(f) + k2 f, from memory"
        )


def _of_points(points, megahertz: float):
    for (f0, a0), (f1, a1) in pairwise(points):
        if f0 <= megahertz <= f1:
            power = math.log(a1 / a0) / math.log(f1 / f0)
            text = "MIL-C-17 maximum or a training guide for two-way radio, second-hand"
            yield Attenuation(a0 * (megahertz / f0) ** power / HUNDRED_FEET, text)
