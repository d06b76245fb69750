"""The closed-form part of what a ground adds: images with constant coefficients.

Over a perfect ground they are all of it.  Over a real ground they are the quasi-static limit of the
reflected potentials near the image, kappa = (ec - 1)/(ec + 1); what they leave over is smooth and
comes from the Sommerfeld tables (docs/theory.md).
"""

from dataclasses import dataclass

import numpy as np

from fieldsolver.ground import LossyGround, PerfectGround

MIRROR = np.array([1.0, 1.0, -1.0])


@dataclass(frozen=True)
class Image:
    """Coefficients of e^{-jkR1}/R1, R1 the distance from the image.

    horizontal and vertical : of the vector potential of a current along the same axis;
    charge : of the scalar potential; vertical_magnetic : of the part of a vertical current's
    vector potential that its magnetic field is the curl of.
    """

    horizontal: complex
    vertical: complex
    charge: complex
    vertical_magnetic: complex

    @property
    def tensor(self) -> np.ndarray:
        return np.array([self.horizontal, self.horizontal, self.vertical])

    @property
    def magnetic_tensor(self) -> np.ndarray:
        return np.array([self.horizontal, self.horizontal, self.vertical_magnetic])


def image(ground, angular_frequency: float) -> Image | None:
    """The image of a ground, None in free space."""
    if isinstance(ground, PerfectGround):
        return Image(-1.0, 1.0, -1.0, 1.0)
    if isinstance(ground, LossyGround):
        permittivity = ground.complex_permittivity(angular_frequency)
        kappa = (permittivity - 1) / (permittivity + 1)
        return Image(0.0, 2 * kappa, -kappa, kappa)
    return None
