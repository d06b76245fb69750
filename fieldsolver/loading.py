"""What finite conductivity adds to the impedance of a wire."""

import numpy as np
from scipy import sparse
from scipy.special import ive

from fieldsolver.constants import MU_0
from fieldsolver.segments import Mesh


def internal_impedance(radius, conductivity, relative_permeability, angular_frequency):
    """Internal impedance per metre of a round wire by skin effect. [ohm/m]

    gamma I0(gamma a) / (2 pi a sigma I1(gamma a)), gamma = (1 + j)/delta
    (S. A. Schelkunoff, Bell Syst. Tech. J. 13 (1934) 532).  Zero for a perfect conductor.
    """
    radius, conductivity = np.asarray(radius, float), np.asarray(conductivity, float)
    real = np.isfinite(conductivity)
    sigma = np.where(real, conductivity, 1.0)
    delta = np.sqrt(2 / (angular_frequency * MU_0 * relative_permeability * sigma))
    gamma = (1 + 1j) / delta
    ratio = ive(0, gamma * radius) / ive(1, gamma * radius)
    return np.where(real, gamma * ratio / (2 * np.pi * radius * sigma), 0.0)


def skin_effect(conductors, grid: Mesh, angular_frequency: float) -> sparse.csr_matrix:
    """Integral of z N_a N_b over every segment, (2S, 2S). [ohm]"""
    z = internal_impedance(
        np.array([wire.radius for wire in conductors]),
        np.array([wire.conductivity for wire in conductors]),
        np.array([wire.relative_permeability for wire in conductors]),
        angular_frequency,
    )
    scale = sparse.diags(z[grid.wire] * grid.length)
    return sparse.kron(scale, np.array([[1 / 3, 1 / 6], [1 / 6, 1 / 3]]), format="csr")
