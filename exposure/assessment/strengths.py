"""Squared field strengths as a function of position, and where their sources are.

Every search in this package works on three facts: the function itself, the conductors (the only
places where it is singular), and the shortest wavelength.  At a distance D from the conductors a
field is analytic on the scale of the smaller of D and the wavelength, which is what makes a search
with few points honest.
"""

from collections.abc import Callable
from dataclasses import dataclass
from functools import cached_property

import numpy as np

LARGEST_BLOCK = 400_000  # point-segment pairs held at once


@dataclass(frozen=True)
class FieldStrengths:
    """Squared strengths of all transmissions and states side by side.

    Attributes
    ----------
    values : function (n, 3) [m] -> (n, m)
        Squared strengths, positive; inf within three radii of a conductor.
    conductors : tuple of (k, 3) float
        Axes of all conductors as chains of straight pieces. [m]
    wavelength : float
        The shortest one of all transmissions. [m]
    """

    values: Callable
    conductors: tuple
    wavelength: float

    @cached_property
    def segments(self):
        """Start and end of every straight piece, (s, 3) each. [m]"""
        chains = [np.atleast_2d(np.asarray(c, float)) for c in self.conductors]
        starts = [c[:-1] if len(c) > 1 else c for c in chains]
        ends = [c[1:] if len(c) > 1 else c for c in chains]
        return np.concatenate(starts), np.concatenate(ends)

    @cached_property
    def box(self):
        """Lower and upper corner of all conductors, (2, 3). [m]"""
        points = np.concatenate(self.segments)
        return np.array([points.min(axis=0), points.max(axis=0)])

    def distance(self, points):
        """Distance from (n, 3) points to the nearest conductor axis, (n,). [m]"""
        return _distance(np.asarray(points, float), *self.segments)

    def foot(self, points):
        """The nearest place on a conductor axis to each of (n, 3) points, (n, 3). [m]"""
        starts, ends = self.segments
        along = ends - starts
        squared = np.maximum((along**2).sum(axis=1), 1e-30)
        fraction = np.clip(np.einsum("nsd,sd->ns", points[:, None, :] - starts, along) / squared, 0, 1)
        feet = starts + fraction[..., None] * along
        nearest = ((points[:, None, :] - feet) ** 2).sum(axis=2).argmin(axis=1)
        return feet[np.arange(len(points)), nearest]

    def plan_distance(self, points):
        """The same in plan: from the plan of the points to the plan of the conductors. [m]"""
        starts, ends = self.segments
        return _distance(np.asarray(points, float)[:, :2], starts[:, :2], ends[:, :2])


def remembered(function):
    """The same function of position, which evaluates no point twice (equal within a micrometre).

    Neighbouring panels share their edges and a halved panel keeps three of its rows of nodes, so
    that a third of all points is asked for again.
    """
    known = {}

    def values(points):
        keys = [k.tobytes() for k in np.round(np.asarray(points) * 1e6).astype(np.int64)]
        new = {k: i for i, k in enumerate(keys) if k not in known}
        if new:
            known.update(zip(new, function(points[list(new.values())]), strict=True))
        return np.array([known[k] for k in keys])

    return values


def _distance(points, starts, ends):
    along = ends - starts
    squared = np.maximum((along**2).sum(axis=1), 1e-30)
    blocks = np.array_split(points, max(1, len(points) * len(starts) // LARGEST_BLOCK))
    return np.concatenate([_nearest(block, starts, along, squared) for block in blocks])


def _nearest(points, starts, along, squared):
    offset = points[:, None, :] - starts
    fraction = np.clip(np.einsum("nsd,sd->ns", offset, along) / squared, 0, 1)
    return np.sqrt(((offset - fraction[..., None] * along) ** 2).sum(axis=2).min(axis=1))
