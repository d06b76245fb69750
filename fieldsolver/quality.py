"""How far a solution can be trusted, from laws that the solver does not use to find it."""

from dataclasses import dataclass, replace

import numpy as np
from scipy import sparse

from fieldsolver.basis import basis, unknowns
from fieldsolver.ground_ends import ground_ends
from fieldsolver.impedance_matrix import impedance_matrix
from fieldsolver.segments import Mesh


@dataclass(frozen=True)
class Quality:
    """power_balance : (radiated + ground + conductor + load)/accepted - 1, tests kernels and units;
    boundary_residual : what tests by half segments find left over on the wires, per root watt [1]."""

    power_balance: float
    boundary_residual: float


def quality(currents) -> Quality:
    """Power balance and boundary residual of a solution."""
    spent = currents.radiated_power + currents.ground_loss + currents.conductor_loss + currents.load_loss
    return Quality(spent / currents.accepted_power - 1, boundary_residual(currents))


def boundary_residual(currents) -> float:
    """sqrt(r^H D^-1 r) / sqrt(accepted power), r the tested boundary condition on the halved mesh.

    The solution is a function on the halved mesh too; the hats of that mesh were not among the
    tests that it satisfies.  D holds the magnitudes of their self terms.
    """
    problem = currents.problem
    fine = _halved(problem)
    matrix = impedance_matrix(fine)
    middle = (currents.ends[::2] + currents.ends[1::2]) / 2
    ends = np.column_stack([currents.ends[::2], middle, middle, currents.ends[1::2]]).reshape(-1)
    driven = (fine.feed_rows @ fine.basis).T @ currents.feed_voltages
    residual = driven - matrix @ unknowns(fine.basis, ends)
    return float(np.sqrt((np.abs(residual) ** 2 / np.abs(matrix.diagonal())).sum() / currents.accepted_power))


def _halved(problem):
    mesh = _halved_mesh(problem.mesh)
    z = sparse.diags(np.repeat(problem.skin.diagonal()[::2] * 1.5, 2))
    ends = 4 * (np.arange(2 * problem.mesh.count) // 2) + 3 * (np.arange(2 * problem.mesh.count) % 2)
    pick = sparse.csr_matrix(
        (np.ones(len(ends)), (np.arange(len(ends)), ends)), shape=(len(ends), 2 * mesh.count)
    )
    return replace(
        problem,
        mesh=mesh,
        basis=basis(mesh),
        skin=sparse.kron(z, np.array([[1 / 3, 1 / 6], [1 / 6, 1 / 3]]), format="csr"),
        feed_rows=problem.feed_rows @ pick,
        load_rows=problem.load_rows @ pick,
        ground_ends=None if problem.ground_ends is None else _ground_ends(problem, mesh, pick),
    )


def _ground_ends(problem, mesh, pick):
    permittivity = problem.ground.complex_permittivity(problem.angular_frequency)
    return ground_ends(
        mesh,
        problem.load_rows @ pick,
        problem.load_impedances,
        permittivity,
        problem.k,
        problem.angular_frequency,
    )


def _halved_mesh(mesh: Mesh) -> Mesh:
    middle = (mesh.start + mesh.end) / 2
    fresh = len(mesh.grounded) + np.arange(mesh.count)
    both = lambda first, second: np.stack([first, second], axis=1).reshape(2 * mesh.count, *first.shape[1:])  # noqa: E731
    return replace(
        mesh,
        start=both(mesh.start, middle),
        end=both(middle, mesh.end),
        radius=np.repeat(mesh.radius, 2),
        wire=np.repeat(mesh.wire, 2),
        line=np.repeat(mesh.line, 2),
        nodes=both(np.column_stack([mesh.nodes[:, 0], fresh]), np.column_stack([fresh, mesh.nodes[:, 1]])),
        grounded=np.concatenate([mesh.grounded, np.zeros(mesh.count, bool)]),
    )
