"""What a real ground adds beyond its closed-form image."""

from fieldsolver.errors import SolutionError
from fieldsolver.ground import LossyGround


class HalfSpace:
    """The smooth rest of the reflected potentials."""


def half_space(ground, angular_frequency: float) -> HalfSpace | None:
    if isinstance(ground, LossyGround):
        raise SolutionError("real ground is being built: nothing is solved over it yet")
    return None
