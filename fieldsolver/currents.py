"""The solution: currents on the mesh as driven, and the powers that follow from them."""

from dataclasses import dataclass, replace
from functools import cached_property

import numpy as np

from fieldsolver.emitters import emitters, ground_charges, smooth
from fieldsolver.errors import SolutionError
from fieldsolver.far_field import radiated_power
from fieldsolver.ground_loss import ground_loss
from fieldsolver.problem import Problem


@dataclass(frozen=True)
class Currents:
    """Currents of a solved problem.

    Attributes
    ----------
    problem : Problem
        Mesh, ground, loads and basis that were solved.
    ends : (2S,) complex
        Current at both ends of every segment, along the segment. [A rms]
    feed_voltages, feed_currents : (n,) complex
        [V rms], [A rms]
    """

    problem: Problem
    ends: np.ndarray
    feed_voltages: np.ndarray
    feed_currents: np.ndarray

    @property
    def frequency(self) -> float:
        """[Hz]"""
        return self.problem.frequency

    @property
    def unknowns(self) -> int:
        """Number of unknown currents."""
        return self.problem.basis.shape[1]

    @property
    def warnings(self) -> tuple[str, ...]:
        """What the solver noticed about the geometry."""
        return self.problem.mesh.warnings

    @property
    def feed_impedances(self) -> np.ndarray:
        """(n,) V/I at each feed with all drives on. [ohm]"""
        return self.feed_voltages / self.feed_currents

    @cached_property
    def accepted_power(self) -> float:
        """Sum of Re(V I*) over all feeds, as driven. [W]

        Raises
        ------
        SolutionError
            Where it is not positive.
        """
        power = float((self.feed_voltages * self.feed_currents.conj()).real.sum())
        if not power > 0:
            raise SolutionError(f"the feeds together accept {power:.4g} W: there must be more than zero")
        return power

    @cached_property
    def emitters(self):
        """Wires and images, ready for the near field."""
        return emitters(self.problem, self.ends)

    @cached_property
    def ground_charges(self):
        """Charges of ends on real ground, ready for the near field."""
        return ground_charges(self.problem, self.ends)

    @cached_property
    def smooth(self):
        """What the rest of a real ground sees of the currents."""
        return smooth(self.problem, self.ends)

    @cached_property
    def radiated_power(self) -> float:
        """Power through the sphere (over ground: the upper hemisphere) at infinity. [W]"""
        return radiated_power(self.problem, self.ends)

    @cached_property
    def ground_loss(self) -> float:
        """Flux of Re(E x H*) into the ground; stated ground connections count as loads. [W]"""
        return ground_loss(self.problem, self.ends)

    @cached_property
    def conductor_loss(self) -> float:
        """Heat in the wires by skin effect. [W]"""
        x = self.ends
        return float((x.conj() @ (self.problem.skin @ x)).real)

    @cached_property
    def load_loss(self) -> float:
        """Heat in lumped loads, ground connections included. [W]"""
        rows, impedances = self.problem.load_rows, self.problem.load_impedances
        return float((impedances.real * np.abs(rows @ self.ends) ** 2).sum())

    def scaled_to(self, accepted_power: float) -> "Currents":
        """The same currents times one positive number, so that the feeds accept this power [W]."""
        if not accepted_power > 0:
            raise SolutionError(f"an accepted power of {accepted_power} W: it must be positive")
        factor = np.sqrt(accepted_power / self.accepted_power)
        return replace(
            self,
            ends=self.ends * factor,
            feed_voltages=self.feed_voltages * factor,
            feed_currents=self.feed_currents * factor,
        )
