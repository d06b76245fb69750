"""Numbers as people read them.  Unknown values (None) are said to be so."""

import math

from exposure.units import FOOT

NOTHING = "–"


def digits(value: float | None, count: int = 3) -> str:
    """Significant digits, without an exponent where that is readable."""
    if value is None:
        return NOTHING
    if value == 0:
        return "0"
    size = abs(value)
    if size < 1e-4 or size >= 1e6:
        return f"{value:.{count - 1}e}"
    text = f"{float(f'{value:.{count}g}'):.6f}"
    return text.rstrip("0").rstrip(".")


def computed(value: float | None, count: int = 3) -> str:
    """A computed number with all its significant digits, zeros at the end kept."""
    if value is None or value == 0 or not 1e-4 <= abs(value) < 1e6:
        return digits(value, count)
    rounded = float(f"{value:.{count}g}")
    places = count - 1 - math.floor(math.log10(abs(rounded)))
    return f"{rounded:.{max(0, places)}f}"


def share(ratio: float | None) -> str:
    """Exposure ratio as a share of the limit: percent below the limit, a multiple above."""
    if ratio is None:
        return "not known"
    if ratio >= 1:
        return f"{computed(ratio)} times the limit"
    return "below 0.01 % of the limit" if ratio < 1e-4 else f"{computed(100 * ratio)} % of the limit"


def metres(value: float | None, feet: bool = False) -> str:
    """A distance to a centimetre, with feet in brackets where they are customary."""
    if value is None:
        return "not known"
    return f"{value:.2f} m" + (f" ({value / FOOT:.1f} ft)" if feet else "")


def place(position, separator: str = ", ") -> str:
    """East, north, up to a centimetre."""
    return NOTHING if position is None else separator.join(f"{round(x, 2) + 0.0:g}" for x in position)


def megahertz(frequency: float) -> str:
    """A frequency. [Hz]"""
    return f"{digits(frequency / 1e6, 7)} MHz"


def watts(power: float | None) -> str:
    """A power. [W]"""
    return "not known" if power is None else f"{digits(power)} W"


def minutes(time: float) -> str:
    """An averaging time [s]; zero is the instantaneous peak."""
    if time == 0:
        return "none (instantaneous)"
    return f"{digits(time / 60)} min" if time >= 60 else f"{digits(time)} s"


def heights(bottom: float, top: float) -> str:
    """The heights of an area. [m]"""
    return f"{digits(bottom)} m" if bottom == top else f"{digits(bottom)}–{digits(top)} m"


def shortened(text: str, length: int) -> str:
    """A long name with its end left out."""
    return text if len(text) <= length else text[: length - 1].rstrip() + "…"
