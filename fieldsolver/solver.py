"""From conductors and feeds to currents."""

import numpy as np
from scipy.linalg import lapack

from fieldsolver.currents import Currents
from fieldsolver.errors import GeometryError, SolutionError
from fieldsolver.ground import FREE_SPACE
from fieldsolver.impedance_matrix import impedance_matrix
from fieldsolver.problem import problem


def solve(
    conductors, feeds, frequency, ground=FREE_SPACE, loads=(), segments_per_wavelength=None
) -> Currents:
    """Currents on conductors driven by feeds.

    Parameters
    ----------
    conductors : sequence of Wire
    feeds : sequence of Feed
    frequency : float
        [Hz]
    ground : FREE_SPACE, PERFECT_GROUND or LossyGround
    loads : sequence of Load
    segments_per_wavelength : float, optional
        Default 40 and at least 10 a wire; another number changes both in proportion.

    Raises
    ------
    GeometryError
        Conductors, feeds or loads that the thin-wire model cannot represent.
    SolutionError
        A singular problem.
    """
    conductors, feeds, loads = tuple(conductors), tuple(feeds), tuple(loads)
    if not feeds:
        raise GeometryError("there is no feed")
    case = problem(conductors, feeds, frequency, ground, loads, segments_per_wavelength)
    unit_ends = _unit_voltage_solutions(case)
    admittance = case.feed_rows @ unit_ends
    voltages = _voltages(feeds, admittance)
    return Currents(case, unit_ends @ voltages, voltages, admittance @ voltages)


def _unit_voltage_solutions(case) -> np.ndarray:
    """(2S, F) end currents for one volt at each feed, the others shorted. [A]"""
    matrix = impedance_matrix(case)
    right = (case.feed_rows @ case.basis).T.toarray().astype(complex)
    _, _, solution, info = lapack.zsysv(matrix.T, right, lower=1, overwrite_a=1)
    if info > 0 or not np.isfinite(solution).all():
        raise SolutionError("the impedance matrix is singular: two conductors may coincide")
    return case.basis @ solution


def _voltages(feeds, admittance) -> np.ndarray:
    """(F,) feed voltages, where some feeds drive a stated current instead. [V]"""
    voltages = np.array([feed.voltage for feed in feeds], dtype=complex)
    driven = np.array([feed.current is not None for feed in feeds])
    if driven.any():
        wanted = np.array([feed.current for feed in feeds if feed.current is not None], dtype=complex)
        rest = wanted - admittance[np.ix_(driven, ~driven)] @ voltages[~driven]
        voltages[driven] = np.linalg.solve(admittance[np.ix_(driven, driven)], rest)
    return voltages
