"""The impedance that a prescribed current has by the solver's own matrix."""

import numpy as np

import fieldsolver as fs
from fieldsolver.basis import unknowns
from fieldsolver.impedance_matrix import impedance_matrix
from fieldsolver.problem import problem


def reaction(wires, ground, frequency, current, loads=(), segments_per_wavelength=None):
    """x^T Z x for the current (function of points (n, 3), A) along each wire, of one ampere at its feed."""
    case = problem(tuple(wires), (), frequency, ground, tuple(loads), segments_per_wavelength)
    points = np.stack([case.mesh.start, case.mesh.end], axis=1).reshape(-1, 3)
    x = unknowns(case.basis, current(points))
    return complex(x @ impedance_matrix(case) @ x)


def reaction_of_a_sine(wire: fs.Wire, ground, frequency, **mesh):
    """That of a sine that is one ampere in the middle of a wire and vanishes at its ends."""
    k = 2 * np.pi * frequency / 299_792_458.0
    middle = (np.array(wire.start) + np.array(wire.end)) / 2

    def current(points):
        distance = np.linalg.norm(points - middle, axis=1)
        return np.sin(k * (wire.length / 2 - distance)) / np.sin(k * wire.length / 2)

    return reaction([wire], ground, frequency, current, **mesh)
