"""Everything that is known before the currents are: mesh, basis, ground, feeds and loads as rows."""

from dataclasses import dataclass

import numpy as np
from scipy import sparse

from fieldsolver.basis import basis, ends_at_node
from fieldsolver.constants import SPEED_OF_LIGHT
from fieldsolver.errors import GeometryError
from fieldsolver.ground import LossyGround
from fieldsolver.ground_ends import GroundEnds, ground_ends
from fieldsolver.half_space import HalfSpace, half_space
from fieldsolver.images import Image, image
from fieldsolver.loading import skin_effect
from fieldsolver.segments import Mesh, mesh


@dataclass(frozen=True)
class Problem:
    """What ``solve`` solves.

    mesh, basis B (2S, N); skin (2S, 2S) internal impedance between segment ends [ohm];
    feed_rows (F, 2S) and load_rows (L, 2S) pick the current through a feed or load from the end
    currents; load_impedances (L,) [ohm]; image: closed-form part of the ground, None in free space;
    half_space and ground_ends: the rest of a real ground and what ends on it, None elsewhere.
    """

    frequency: float
    ground: object
    mesh: Mesh
    basis: sparse.csr_matrix
    skin: sparse.csr_matrix
    feed_rows: sparse.csr_matrix
    load_rows: sparse.csr_matrix
    load_impedances: np.ndarray
    image: Image | None
    half_space: HalfSpace | None
    ground_ends: GroundEnds | None

    @property
    def angular_frequency(self) -> float:
        return 2 * np.pi * self.frequency

    @property
    def k(self) -> float:
        """Wavenumber in air. [rad/m]"""
        return self.angular_frequency / SPEED_OF_LIGHT


def problem(conductors, feeds, frequency, ground, loads, segments_per_wavelength) -> Problem:
    """Mesh, basis and rows of a problem.

    Raises
    ------
    GeometryError
        As ``mesh``; a feed or load at a free end or where a third conductor is joined; an end on
        real ground without its ground connection.
    """
    if not (frequency > 0 and np.isfinite(frequency)):
        raise GeometryError(f"a frequency of {frequency} Hz: it must be positive and finite")
    cuts = [(item.wire, item.position) for item in (*feeds, *loads)]
    grid = mesh(conductors, cuts, frequency, ground, segments_per_wavelength)
    omega = 2 * np.pi * frequency
    load_ends = [_end(grid, load, "load") for load in loads]
    if isinstance(ground, LossyGround):
        _check_connections(grid, load_ends)
    load_rows = _rows(grid, load_ends)
    impedances = np.array([load.at(omega) for load in loads], dtype=complex)
    return Problem(
        frequency=frequency,
        ground=ground,
        mesh=grid,
        basis=basis(grid),
        skin=skin_effect(conductors, grid, omega),
        feed_rows=_rows(grid, [_end(grid, feed, "feed") for feed in feeds]),
        load_rows=load_rows,
        load_impedances=impedances,
        image=image(ground, omega),
        half_space=half_space(ground, omega),
        ground_ends=_ground_ends(grid, load_rows, impedances, ground, omega),
    )


def _ground_ends(grid, load_rows, impedances, ground, omega) -> GroundEnds | None:
    if not isinstance(ground, LossyGround):
        return None
    permittivity = ground.complex_permittivity(omega)
    return ground_ends(grid, load_rows, impedances, permittivity, omega / SPEED_OF_LIGHT, omega)


def _end(grid: Mesh, item, what: str) -> tuple[int, int]:
    segment, end = grid.end_at(item.wire, item.position)
    meeting = ends_at_node(grid, segment, end)
    on_ground = grid.grounded[grid.nodes[segment, end]]
    if meeting == 1 and not on_ground:
        raise GeometryError(f"a {what} at the free end of conductor {item.wire}: no current flows there")
    if 0 < item.position < 1 and meeting > 2:
        raise GeometryError(
            f"a {what} at {item.position:.4g} of conductor {item.wire}, where another conductor is joined: "
            "cut the conductor there and put it at the end that is meant"
        )
    return segment, end


def _rows(grid: Mesh, ends) -> sparse.csr_matrix:
    columns = [2 * segment + end for segment, end in ends]
    return sparse.csr_matrix(
        (np.ones(len(ends)), (np.arange(len(ends)), columns)), shape=(len(ends), 2 * grid.count)
    )


def _check_connections(grid: Mesh, load_ends):
    connected = {grid.nodes[segment, end] for segment, end in load_ends}
    for node in np.flatnonzero(grid.grounded):
        segments = np.flatnonzero((grid.nodes == node).any(axis=1))
        if node not in connected:
            raise GeometryError(
                f"conductor {grid.wire[segments[0]]} ends on real ground: state its ground connection as a "
                "load at that end (0 for an ideal one)"
            )
        if len(segments) > 1:
            raise GeometryError(
                f"conductors {sorted(set(grid.wire[segments].tolist()))} meet on real ground: end one there "
                "and join the others above it"
            )
