"""Electrical constants of the ground.

Average ground: FCC OET Bulletin 65, Supplement B (Edition 97-01), November 1997, p. 31 (read).
The others: ITU-R Recommendation P.527-3, figure 1, flat part below 30 MHz (from memory, high confidence).
"""

from dataclasses import dataclass


@dataclass(frozen=True)
class Soil:
    """relative_permittivity [1], conductivity [S/m], and where it is printed."""

    relative_permittivity: float
    conductivity: float
    source: str


_FCC = "FCC OET Bulletin 65 Supplement B, 1997, p. 31"
_ITU = "ITU-R P.527-3, figure 1, from memory"

SOILS = {
    #                     eps_r  sigma [S/m]
    "average": Soil(13, 0.005, _FCC),
    "wet": Soil(30, 0.01, _ITU),
    "medium_dry": Soil(15, 0.001, _ITU),
    "very_dry": Soil(3, 0.0001, _ITU),
    "fresh_water": Soil(80, 0.003, _ITU),
    "sea_water": Soil(70, 5, _ITU),
}
