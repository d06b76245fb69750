"""Ends of wires on real ground: where their current goes, and what the stated connection replaces.

The current I into the ground leaves the charge I/jw of a point electrode.  It acts in all fields.
In the matrix its static potential on itself is replaced by the stated connection Z, and its static
potential on the wires by that of an electrode as large as Z says: a hemisphere of radius b has the
impedance 1/(2 pi |sigma + jw eps0 (er + 1)| b) (E. D. Sunde, Earth Conduction Effects in Transmission
Systems, 1949, ch. 3; edition from memory), and acts from a depth b.  A wire above a connection of a few
ohms is then not driven by the kilo-ohms of its own bare end.
"""

from dataclasses import dataclass

import numpy as np
from scipy import sparse

from fieldsolver.constants import EPSILON_0
from fieldsolver.kernels import line_potential
from fieldsolver.segments import Mesh


@dataclass(frozen=True)
class GroundEnds:
    """Ends on real ground.

    points (n, 3) [m]; slopes (n, 2S): dI/ds dl there from end currents, minus the current into the
    ground; radius (n,) of the wires [m]; potentials (n, 2S): integral of dI/ds e^{-jkR}/R along all
    wires seen from each end [1/m]; replaced (n, 2S): what the connection changes in it.
    """

    points: np.ndarray
    slopes: sparse.csr_matrix
    radius: np.ndarray
    potentials: np.ndarray
    replaced: np.ndarray


def ground_ends(
    mesh: Mesh, load_rows, load_impedances, permittivity: complex, k: float, omega: float
) -> GroundEnds:
    """The ends of a mesh on real ground, with the loads that are their connections."""
    segment, side = np.nonzero(mesh.grounded[mesh.nodes])
    columns = 2 * segment + side
    sign = np.where(side == 0, 1.0, -1.0)
    slopes = sparse.csr_matrix(
        (sign, (np.arange(len(segment)), columns)), shape=(len(segment), 2 * mesh.count)
    )
    points = np.where(side[:, None] == 0, mesh.start[segment], mesh.end[segment])
    stated = np.abs(load_rows[:, columns].T @ load_impedances)
    admittivity = 2 * np.pi * omega * EPSILON_0 * abs(permittivity + 1)
    radius = mesh.radius[segment]
    size = np.maximum(1 / (admittivity * np.maximum(stated, 1e-9)), radius)
    return GroundEnds(
        points,
        slopes,
        radius,
        _seen(mesh, k, points, radius),
        _seen(mesh, 0.0, points - size[:, None] * [0, 0, 1], 0 * radius) - _seen(mesh, 0.0, points, radius),
    )


def _seen(mesh, k, points, radius):
    """(n, 2S) integral of dI/ds e^{-jkR}/R over every segment seen from points. [1/m]

    A ring charge is as far from the tube that it closes as from a line one radius away.
    """
    count, segments = len(points), mesh.count
    if not count:
        return np.zeros((0, 2 * segments))
    plan = points * [1, 1, 0]
    own = np.array([(mesh.start == p).all(axis=1) | (mesh.end == p).all(axis=1) for p in plan])
    line = line_potential(
        k,
        np.repeat(points, segments, axis=0),
        np.tile(mesh.start, (count, 1)),
        np.tile(mesh.end - mesh.start, (count, 1)),
        (own * radius[:, None] ** 2).reshape(-1),
    ).reshape(count, segments)
    return np.kron(line / mesh.length, np.array([[-1.0, 1.0]]))
