"""Errors of the solver.

::

    FieldSolverError
    ├── GeometryError   conductors that the model cannot represent
    ├── PointError      points where no field is given: .mask
    └── SolutionError   a problem that cannot be solved, or whose solution makes no sense
"""


class FieldSolverError(Exception):
    """Base of the solver's errors."""


class GeometryError(FieldSolverError):
    """Conductors, feeds or loads that the thin-wire model cannot represent."""


class PointError(FieldSolverError):
    """Points at which no field is given.

    Attributes
    ----------
    mask : (n,) bool
        True where the point is below ground or within three radii of a conductor.
    """

    def __init__(self, message: str, mask):
        super().__init__(message)
        self.mask = mask


class SolutionError(FieldSolverError):
    """A problem without a usable solution, with what to change."""
