"""The half space below up = 0."""

from dataclasses import dataclass

from fieldsolver.constants import EPSILON_0
from fieldsolver.errors import GeometryError


@dataclass(frozen=True)
class FreeSpace:
    """No ground at all."""


@dataclass(frozen=True)
class PerfectGround:
    """A perfectly conducting plane at up = 0."""


@dataclass(frozen=True)
class LossyGround:
    """Flat homogeneous earth below up = 0, not magnetic.

    Parameters
    ----------
    relative_permittivity : float
        At least 1. [1]
    conductivity : float
        Zero to 100; a better conductor is a perfect one. [S/m]
    """

    relative_permittivity: float
    conductivity: float

    def __post_init__(self):
        if not self.relative_permittivity >= 1 or not 0 <= self.conductivity <= 100:
            raise GeometryError(
                f"ground with relative permittivity {self.relative_permittivity} and conductivity "
                f"{self.conductivity} S/m: the first must be at least 1, the second 0 to 100"
            )

    def complex_permittivity(self, angular_frequency: float) -> complex:
        """Relative permittivity with loss, er - j sigma / (omega eps0), for exp(+j omega t). [1]"""
        return complex(self.relative_permittivity, -self.conductivity / (angular_frequency * EPSILON_0))


FREE_SPACE = FreeSpace()
PERFECT_GROUND = PerfectGround()
