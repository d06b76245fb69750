"""The words in which a published limit is given back."""

from dataclasses import dataclass
from typing import Literal

Effect = Literal["heating", "stimulation"]
Scope = Literal["whole_body", "local", "any"]
Spatial = Literal["mean", "peak"]


@dataclass(frozen=True)
class Level:
    """One row of a document's table at one frequency, with where it is printed.

    electric [V/m rms], magnetic [A/m rms], power_density [W/m2] (None: the document gives no value);
    averaging_time_s [s], 0 for instantaneous (judged at peak envelope power).
    verified : False where the value is from memory with a confidence below 0.8.
    """

    effect: Effect
    scope: Scope
    spatial: Spatial
    electric: float | None
    magnetic: float | None
    power_density: float | None
    averaging_time_s: float
    clause: str
    verified: bool = True


@dataclass(frozen=True)
class Summation:
    """How a document adds two or more transmissions.

    electric_and_magnetic_add : ((effect, scope, frequency in Hz), ...), the tests in which it adds
    (E/E_L)^2 + (H/H_L)^2 up to that frequency.  Everywhere else the quotients of E, of H and of S
    are summed apart and the largest sum counts; stimulation is summed linearly in field.
    """

    electric_and_magnetic_add: tuple[tuple[Effect, Scope, float], ...]
    clause: str
    verified: bool = True
