"""Fields of arbitrary thin wires in free space, over perfect and over real ground.

Numbers in, numbers out: conductors and a frequency become currents and fields by the method of
moments.  See docs/theory.md for the equations.
"""

from fieldsolver.currents import Currents
from fieldsolver.errors import FieldSolverError, GeometryError, PointError, SolutionError
from fieldsolver.far_field import FarField, far_field
from fieldsolver.geometry import Feed, Load, Wire
from fieldsolver.ground import FREE_SPACE, PERFECT_GROUND, LossyGround
from fieldsolver.near_field import Field, near_field
from fieldsolver.quality import Quality, quality
from fieldsolver.solver import solve

__all__ = [
    "FREE_SPACE",
    "PERFECT_GROUND",
    "Currents",
    "FarField",
    "Feed",
    "Field",
    "FieldSolverError",
    "GeometryError",
    "Load",
    "LossyGround",
    "PointError",
    "Quality",
    "SolutionError",
    "Wire",
    "far_field",
    "near_field",
    "quality",
    "solve",
]
