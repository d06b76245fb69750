"""Tables of the reflected potentials over horizontal distance and sum of heights.

What is tabulated is the rest beyond the closed-form image, over e^{-jkR1}/R1 (derivatives: /R1^2):
smooth enough for 8 x 8 Chebyshev points on panels that double in size from 0.002/|k1| to about
half a wavelength and stay so.  Panels are integrated (``spectrum``) when first asked for.
"""

from dataclasses import dataclass, field
from functools import cached_property

import numpy as np

from fieldsolver.kernels import phasor
from fieldsolver.spectrum import FIELDS, POTENTIALS, integrals

ORDER = 8
SMALLEST = 0.002  # of the skin distance 1/|k1|: nearer the rest is that at this distance
WIDEST = 0.5  # wavelengths
_ANGLES = np.pi * (np.arange(ORDER) + 0.5) / ORDER
_TO_COEFFICIENTS = (
    np.cos(np.outer(np.arange(ORDER), _ANGLES)) * np.where(np.arange(ORDER) == 0, 1, 2)[:, None] / ORDER
)


@dataclass(frozen=True)
class Reflection:
    """Reflected potentials of one ground at one frequency.

    permittivity : complex, of the ground relative to air [1]; k : wavenumber in air [rad/m].
    """

    permittivity: complex
    k: float
    _panels: dict = field(default_factory=dict, compare=False, repr=False)

    @property
    def kappa(self) -> complex:
        """(ec - 1)/(ec + 1), the quasi-static reflection. [1]"""
        return (self.permittivity - 1) / (self.permittivity + 1)

    def potentials(self, rho, zeta) -> dict:
        """POTENTIALS at rho, zeta (n,) [m], the image's share taken out of k_phi and k_zz. [1/m, 1/m2]"""
        return self._look_up(POTENTIALS, rho, zeta)

    def fields(self, rho, zeta) -> dict:
        """FIELDS at rho, zeta (n,) [m], the image's share taken out of k_phi, k_zz and tm. [1/m, 1/m2]"""
        return self._look_up(FIELDS, rho, zeta)

    def _look_up(self, names, rho, zeta):
        grid = self._grid()
        inside = np.maximum(rho, np.where(zeta < grid.smallest, grid.smallest, 0.0))
        row, u = grid.locate(inside)
        column, v = grid.locate(zeta)
        key = row * 65536 + column
        order = np.argsort(key, kind="stable")
        found = np.empty((len(names), len(rho)), dtype=complex)
        edges = np.flatnonzero(np.diff(key[order], prepend=-1, append=-1))
        for low, high in zip(edges[:-1], edges[1:], strict=True):
            points = order[low:high]
            panel = self._panel(names, int(row[points[0]]), int(column[points[0]]))
            found[:, points] = _evaluate(panel, u[points], v[points])
        return self._restored(names, found, inside, rho, zeta)

    def _grid(self) -> "_Grid":
        smallest = SMALLEST / (abs(np.sqrt(self.permittivity)) * self.k)
        doublings = max(1, int(np.log2(WIDEST * 4 * np.pi / self.k / smallest)))
        return _Grid(smallest, doublings)

    def _panel(self, names, row, column):
        key = names, row, column
        if key not in self._panels:
            self._panels[key] = self._integrated(names, row, column)
        return self._panels[key]

    def _integrated(self, names, row, column) -> np.ndarray:
        """Chebyshev coefficients (2 names, ORDER^2) of a panel's normalised rest, real parts first."""
        rho, zeta = (
            low + (high - low) * (1 + np.cos(_ANGLES)) / 2
            for low, high in map(self._grid().edges, (row, column))
        )
        values = integrals(names, self.permittivity, self.k, rho, zeta)
        distance = np.hypot(rho[:, None], zeta)
        turned = distance * np.exp(1j * self.k * distance)
        share = _quasi_static(self.kappa, self.k, rho[:, None], zeta, distance)
        for i, name in enumerate(names):
            values[i] *= turned if name in ("k_xx", "k_phi", "k_zz") else turned * distance
            values[i] -= share.get(name, 0.0)
        coefficients = (_TO_COEFFICIENTS @ values @ _TO_COEFFICIENTS.T).reshape(len(names), -1)
        return np.concatenate([coefficients.real, coefficients.imag])

    def _restored(self, names, found, inside, rho, zeta) -> dict:
        """Undoes the normalisation, and puts F's closed form back, at the true distance."""
        rest, closed = _Wave(self.k, inside, zeta), _Wave(self.k, rho, zeta)
        share = _quasi_static(self.kappa, self.k, rho, zeta, closed.distance)
        result = {}
        for name, values in zip(names, found, strict=True):
            result[name] = values * rest.scale(name)
            if name in ("f_rho_over_rho", "laplacian_f"):
                result[name] += share[name] * closed.scale(name)
        return result


@dataclass(frozen=True)
class _Wave:
    """e^{-jkR1}/R1 and e^{-jkR1}/R1^2, what tables are over."""

    k: float
    rho: np.ndarray
    zeta: np.ndarray

    @cached_property
    def distance(self):
        return np.hypot(self.rho, self.zeta)

    @cached_property
    def wave(self):
        return phasor(self.k * self.distance) / self.distance

    def scale(self, name):
        return self.wave if name in ("k_xx", "k_phi", "k_zz") else self.wave / self.distance


def _quasi_static(kappa, k, rho, zeta, distance) -> dict:
    """The potentials' limits near the image, normalised like the tables (docs/theory.md, eq 6).

    F tends to -kappa ln(R1 + zeta), hence F'/rho and the horizontal Laplacian.
    """
    slope = (1 + 1j * k * distance) / distance
    return {
        "k_phi": -kappa,
        "k_zz": 2 * kappa,
        "f_rho_over_rho": -kappa * distance / (distance + zeta),
        "laplacian_f": -kappa * zeta / distance,
        "k_phi_rho": kappa * rho * slope,
        "k_phi_zeta": kappa * zeta * slope,
        "tm_rho": -kappa * rho * slope,
    }


def _evaluate(coefficients, u, v):
    """(names, n) Chebyshev sums at u, v (n,) in -1..1; coefficients (2 names, ORDER^2) real, parts apart."""
    out = np.empty((len(coefficients) // 2, len(u)), dtype=complex)
    for low in range(0, len(u), 512):
        part = slice(low, low + 512)
        products = _chebyshev(u[part])[:, None, :] * _chebyshev(v[part])[None, :, :]
        real, imaginary = np.split(coefficients @ products.reshape(ORDER * ORDER, -1), 2)
        out.real[:, part], out.imag[:, part] = real, imaginary
    return out


def _chebyshev(x):
    """(ORDER, n) Chebyshev polynomials T_0, T_1, ... at x (n,)."""
    out = np.empty((ORDER, len(x)))
    out[0], out[1] = 1.0, x
    for i in range(2, ORDER):
        out[i] = 2 * x * out[i - 1] - out[i - 2]
    return out


@dataclass(frozen=True)
class _Grid:
    """Edges of panels in rho or zeta: 0, s, 2 s, 4 s, ... and, after so many doublings, equal steps."""

    smallest: float
    doublings: int

    @property
    def step(self) -> float:
        return self.smallest * 2.0 ** (self.doublings - 1)

    def locate(self, x):
        """Panel number (n,) and place in it (n,), -1..1."""
        ratio = np.maximum(x / self.smallest, 0.5)
        octave = np.floor(np.log2(ratio)).astype(int) + 1
        beyond = np.floor(x / self.step).astype(int) + self.doublings - 1
        index = np.where(octave > self.doublings, beyond, octave)
        low, high = self.edges(index)
        return index, np.clip(2 * (x - low) / (high - low) - 1, -1, 1)

    def edges(self, index):
        index = np.asarray(index)
        octave = np.minimum(index, self.doublings)
        high = self.smallest * 2.0**octave
        low = np.where(octave == 0, 0.0, high / 2)
        after = (index - octave) * self.step
        return np.where(index > self.doublings, high + after - self.step, low), high + after
