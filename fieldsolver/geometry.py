"""Conductors, feeds and loads as the solver is given them, with the rules of the thin-wire model."""

import cmath
import math
from dataclasses import dataclass, field
from typing import Literal

import numpy as np

from fieldsolver.errors import GeometryError

Vector = tuple[float, float, float]


@dataclass(frozen=True)
class Wire:
    """A straight round wire.

    Parameters
    ----------
    start, end : (3,) float
        Ends of its axis, east, north, up. [m]
    radius : float
        [m]
    conductivity : float
        Infinite for a perfect conductor. [S/m]
    relative_permeability : float
        [1]
    coating : None
        Bare wire; insulation is not modelled.

    Raises
    ------
    GeometryError
        A coating, numbers that are not finite, no length, a radius that is not positive, or a wire shorter
        than two radii (D. R. Wilton and N. J. Champagne, IEEE Trans. AP-54 (2006) 1200, from memory: the
        integrals hold for segments of two radii; shorter ones are not thin wires).
    """

    start: Vector
    end: Vector
    radius: float
    conductivity: float = math.inf
    relative_permeability: float = 1.0
    coating: None = None

    def __post_init__(self):
        if self.coating is not None:
            raise GeometryError("an insulated wire: coatings are not modelled, leave coating at None")
        object.__setattr__(self, "start", _vector(self.start, "start"))
        object.__setattr__(self, "end", _vector(self.end, "end"))
        if not (self.radius > 0 and math.isfinite(self.radius)):
            raise GeometryError(f"a wire radius of {self.radius} m: it must be positive and finite")
        if not (self.conductivity > 0 and self.relative_permeability > 0):
            raise GeometryError(
                f"a wire of conductivity {self.conductivity} S/m and relative permeability "
                f"{self.relative_permeability}: both must be positive"
            )
        if self.length < 2 * self.radius:
            raise GeometryError(
                f"a wire {self.length:.4g} m long with a radius of {self.radius:.4g} m is too short: the "
                f"thin-wire model needs at least two radii ({2 * self.radius:.4g} m)"
            )

    @property
    def length(self) -> float:
        """Length of the axis. [m]"""
        return math.dist(self.start, self.end)

    def point(self, fraction) -> np.ndarray:
        """Points of the axis at fractions (...) of its length, shape (..., 3). [m]"""
        start, end = np.array(self.start), np.array(self.end)
        return start + np.asarray(fraction, dtype=float)[..., None] * (end - start)


@dataclass(frozen=True)
class Feed:
    """A source in a gap one node wide, driving current from the start of its wire towards the end.

    Parameters
    ----------
    wire : int
        Index into the conductors, from 0.
    position : float
        Fraction of the wire's length; 0 or 1 only where that end is joined to something.
    voltage : complex
        Across the gap. [V rms]
    current : complex, optional
        Drives this current instead; ``voltage`` is then not used. [A rms]
    """

    wire: int
    position: float = 0.5
    voltage: complex = 1.0
    current: complex | None = None

    def __post_init__(self):
        _check_position("feed", self.position)
        driven = self.voltage if self.current is None else self.current
        if not cmath.isfinite(driven):
            raise GeometryError(f"a feed driven with {driven}: it must be finite")


@dataclass(frozen=True)
class Load:
    """A lumped impedance in series with a wire.

    Either ``impedance`` [ohm], or ``resistance`` [ohm], ``inductance`` [H] and ``capacitance`` [F]
    (None: not there) joined to each other in series or in parallel.
    """

    wire: int
    position: float
    impedance: complex | None = None
    resistance: float = 0.0
    inductance: float = 0.0
    capacitance: float | None = None
    connection: Literal["series", "parallel"] = field(default="series")

    def __post_init__(self):
        _check_position("load", self.position)
        if self.impedance is not None:
            if not cmath.isfinite(self.impedance) or complex(self.impedance).real < 0:
                raise GeometryError(
                    f"a load of {self.impedance} ohm: it must be finite, its resistance not negative"
                )
            if (self.resistance, self.inductance, self.capacitance) != (0.0, 0.0, None):
                raise GeometryError(
                    "a load has either an impedance or resistance, inductance and capacitance"
                )
        if self.connection not in ("series", "parallel"):
            raise GeometryError(f"a load joined in {self.connection!r}: allowed are 'series' and 'parallel'")
        if not (
            self.resistance >= 0
            and self.inductance >= 0
            and (self.capacitance is None or self.capacitance > 0)
        ):
            raise GeometryError(
                f"a load of {self.resistance} ohm, {self.inductance} H, {self.capacitance} F: resistance and "
                "inductance must not be negative, capacitance must be positive"
            )

    def at(self, angular_frequency: float) -> complex:
        """Its impedance. [ohm]"""
        if self.impedance is not None:
            return complex(self.impedance)
        inductor = 1j * angular_frequency * self.inductance
        capacitor = None if self.capacitance is None else 1 / (1j * angular_frequency * self.capacitance)
        if self.connection == "series":
            return self.resistance + inductor + (capacitor or 0)
        parts = [part for part in (self.resistance, inductor, capacitor) if part]
        admittance = sum(1 / part for part in parts)
        if not parts or abs(admittance) < 1e-12 * max(abs(1 / part) for part in parts):
            raise GeometryError("a load whose parts in parallel have no finite impedance")
        return 1 / admittance


def _vector(value, name: str) -> Vector:
    array = np.asarray(value, dtype=float)
    if array.shape != (3,) or not np.isfinite(array).all():
        raise GeometryError(f"the {name} of a wire is {value!r}: three finite numbers in metres are needed")
    return tuple(float(x) for x in array)


def _check_position(what: str, position: float):
    if not 0 <= position <= 1:
        raise GeometryError(f"a {what} at the fraction {position} of its wire: allowed is 0 to 1")
