"""Fields of current elements and charges: the hot loop of the near field.

With g = e^{-jkR}/R, G = (1 + jkR) g / R^2 and the vector R from element to point, elements of moment
M = I dl and slope c = dI/ds dl give (docs/theory.md; C. A. Balanis, Antenna Theory, ch. 3)

    E = -(j k eta / 4 pi) [ sum M g - k^-2 sum c R G ],    H = -(1 / 4 pi) sum G R x M.
"""

from dataclasses import dataclass

import numpy as np

from fieldsolver.constants import FREE_SPACE_IMPEDANCE
from fieldsolver.kernels import cosine_and_minus_sine

CELLS = 1 << 13  # pairs of one block: about 0.5 MB of work space, fastest measured


@dataclass(frozen=True)
class Elements:
    """Current elements: points (m, 3) [m]; electric, magnetic (m, 3) moments that E and H see [A m];
    slopes (m,) [A].  The two moments differ for the image in a real ground only."""

    points: np.ndarray
    electric: np.ndarray
    magnetic: np.ndarray
    slopes: np.ndarray

    def __getitem__(self, index) -> "Elements":
        return Elements(self.points[index], self.electric[index], self.magnetic[index], self.slopes[index])


def fields_of_elements(k: float, points: np.ndarray, elements: Elements, hidden=None):
    """E (n, 3) [V/m] and H (n, 3) [A/m] of elements at points (n, 3).

    hidden : (n, m) bool, optional
        Pairs that do not count.
    """
    if not len(elements.points):
        return np.zeros((len(points), 3), complex), np.zeros((len(points), 3), complex)
    origin = points.mean(axis=0)
    at, source = points - origin, elements.points - origin
    weights = _weights(source, elements)
    rows = max(1, CELLS // min(len(source), 1024))
    vector = np.zeros((len(at), 3), complex)
    moment = np.zeros((len(at), 10), complex)
    for j in range(0, len(source), 1024):
        for i in range(0, len(at), rows):
            part = (slice(i, i + rows), slice(j, j + 1024))
            cover = None if hidden is None else hidden[part]
            first, second = _block(k, at[part[0]], source[part[1]], [w[part[1]] for w in weights], cover)
            vector[part[0]] += first
            moment[part[0]] += second
    charge = at * moment[:, :1] - moment[:, 1:4]
    electric = (-1j * k * FREE_SPACE_IMPEDANCE / (4 * np.pi)) * (vector - charge / k**2)
    magnetic = (np.cross(at, moment[:, 4:7]) - moment[:, 7:]) / (-4 * np.pi)
    return electric, magnetic


def _weights(source, elements) -> tuple[np.ndarray, np.ndarray]:
    """Real matrices (m, 6) and (m, 20): what g and G are summed with, real parts first."""
    second = np.column_stack(
        [
            elements.slopes,
            elements.slopes[:, None] * source,
            elements.magnetic,
            np.cross(source, elements.magnetic),
        ]
    )
    return tuple(np.ascontiguousarray(np.hstack([w.real, w.imag])) for w in (elements.electric, second))


def _block(k, at, source, weights, hidden):
    """Sums of M g (n, 3) and of (c, c r', M, r' x M) G (n, 10), r' from the common origin."""
    square = (
        np.hstack([-2 * at, np.ones((len(at), 1)), (at**2).sum(axis=1)[:, None]])
        @ np.hstack([source, (source**2).sum(axis=1)[:, None], np.ones((len(source), 1))]).T
    )
    np.maximum(square, 1e-30, out=square)
    phase = np.sqrt(square)
    inverse = 1 / phase
    if hidden is not None:
        inverse[hidden] = 0.0
    phase *= k
    real, imaginary = cosine_and_minus_sine(phase)
    real *= inverse
    imaginary *= inverse
    first = _complex(real @ weights[0], imaginary @ weights[0])
    inverse *= inverse
    swing = phase * imaginary
    phase *= real
    real -= swing
    imaginary += phase
    real *= inverse
    imaginary *= inverse
    return first, _complex(real @ weights[1], imaginary @ weights[1])


def _complex(real_part, imaginary_part):
    """(a + jb)(u + jv) from a [u v] and b [u v]."""
    half = real_part.shape[1] // 2
    return (real_part[:, :half] - imaginary_part[:, half:]) + 1j * (
        real_part[:, half:] + imaginary_part[:, :half]
    )
