"""Fields of arbitrary thin wires in free space, over perfect and over real ground.

Numbers in, numbers out: conductors and a frequency become currents and fields by the method of
moments.  See docs/theory.md for the equations.
"""

from fieldsolver.errors import FieldSolverError, GeometryError, PointError, SolutionError
from fieldsolver.geometry import Feed, Load, Wire
from fieldsolver.ground import FREE_SPACE, PERFECT_GROUND, LossyGround

__all__ = [
    "FREE_SPACE",
    "PERFECT_GROUND",
    "Feed",
    "FieldSolverError",
    "GeometryError",
    "Load",
    "LossyGround",
    "PointError",
    "SolutionError",
    "Wire",
]
