"""Chebyshev panels over rho and zeta of the remainders' ratio to e^{-j k0 R1}/sqrt(R1^2 + 1/|k1|^2).

The remainders stay finite or grow as ln R1 at the image, hence not 1/R1.
The ratio varies slowly: panels double in rho and in zeta from a fraction of 1/|k1| on.  The lateral wave
e^{-j(k1 - k0) rho} asks for no wider panels in rho than a few 1/|k1 - k0| as long as it is alive.
"""

from dataclasses import dataclass

import numpy as np

from fieldsolver.sommerfeld_paths import remainders
from fieldsolver.sommerfeld_spectrum import kappa

ORDER = 8  # nodes along each side of a panel
FIRST = 1 / 64  # first panel, in 1/|k1|; in it the conical terms k1^2 R1 are not followed
WIDEST = 3.0  # widest panel in rho, in 1/|k1 - k0|: 8 nodes follow 3 rad to 3e-6
LATERAL_DECAY = 10.0  # e^{-10} of the lateral wave no longer needs narrow panels
QUANTITIES = 10
IN_ORDER = [0, 1, 2, 9, 3, 4, 5, 6, 7, 8]  # of sommerfeld_paths.remainders, the four potentials first


@dataclass(frozen=True)
class Panels:
    """Panels between edges; coefficients (panel, zeta order, 2 * quantity * rho order), real and
    imaginary part in turn; panels run over zeta first.
    """

    permittivity: complex
    k0: float
    rho: np.ndarray
    zeta: np.ndarray
    coefficients: np.ndarray

    def values(self, rho, zeta) -> np.ndarray:
        """Remainders (quantities, n) at rho, zeta (n,)."""
        i, x = _place(self.rho, rho)
        j, y = _place(self.zeta, zeta)
        panel = i * (len(self.zeta) - 1) + j
        order = np.argsort(panel, kind="stable")
        panel = panel[order]
        x, y = _chebyshev(x[order])[:, :, None], _chebyshev(y[order])
        bounds = np.concatenate([[0], np.flatnonzero(np.diff(panel)) + 1, [len(panel)]])
        quantities = self.coefficients.shape[2] // (2 * ORDER)
        values = np.empty((len(panel), quantities), complex)
        for start, end in zip(bounds[:-1], bounds[1:], strict=True) if len(panel) else ():
            block = (y[start:end] @ self.coefficients[panel[start]]).view(complex)
            block = block.reshape(end - start, quantities, ORDER)
            values[order[start:end]] = (block @ x[start:end])[:, :, 0]
        return values.T * scale(self.permittivity, self.k0, np.hypot(rho, zeta))


def panels(permittivity: complex, k0: float, rho_max: float, zeta_max: float, zeta_min: float):
    """Filled panels over 0 <= rho <= rho_max, zeta_min <= zeta <= zeta_max. [m]

    Returns those of K_xx, K_phi, K_zz, (dF/drho)/rho, and those of these four followed by dK_phi/dzeta,
    dK_xx/dzeta, transverse Laplacian of F, dK_phi/drho, dK_xx/drho, dG_TM/drho.
    """
    k1 = k0 * np.sqrt(permittivity)
    first = FIRST / abs(k1)
    widest = WIDEST / max(abs(k1 - k0), 1e-3 * k0)
    alive = LATERAL_DECAY / max(-k1.imag, 1e-9 * k0)
    rho_edges = _edges(0.0, rho_max, first, widest, alive)
    zeta_edges = _edges(zeta_min, zeta_max, max(first, zeta_min), np.inf, 0.0)
    zeta = _grid(zeta_edges)
    rows = [_fill(permittivity, k0, group, zeta) for group in _groups(_grid(rho_edges))]
    nodes = np.concatenate(rows, axis=2).reshape(QUANTITIES, len(zeta) // ORDER, ORDER, -1, ORDER)
    transform = _transform()
    coefficients = np.einsum("az,qjzir,br->ijaqb", transform, nodes[IN_ORDER], transform, optimize=True)
    coefficients = coefficients.reshape(-1, ORDER, QUANTITIES, ORDER)
    parts = (coefficients[:, :, :4], coefficients)
    return tuple(Panels(permittivity, k0, rho_edges, zeta_edges, _as_real(part)) for part in parts)


def scale(permittivity: complex, k0: float, r1):
    """What the remainders are divided by, (...). [1/m]"""
    return np.exp(-1j * k0 * r1) / np.sqrt(r1**2 + 1 / abs(permittivity * k0**2))


def _as_real(coefficients):
    real = np.ascontiguousarray(coefficients).view(float)
    return real.reshape(len(real), ORDER, -1)


def cross_static(permittivity: complex, k0: float, r1, zeta):
    """Closed-form part of (dF/drho)/rho as a multiple of e^{-j k0 R1}/R1, (...). [1/m]

    -kappa/(R1 + zeta) (1 + j x/(1 + x^2)), x = k0 R1: exact to the second order in x, bounded far away.
    """
    x = k0 * r1
    return -kappa(permittivity) / (r1 + zeta) * (1 + 1j * x / (1 + x**2))


def _fill(permittivity, k0, rho, zeta):
    """Ratios at all zeta and a few rho, (10, z, r)."""
    r1 = np.hypot(rho, zeta[:, None])
    values = remainders(permittivity, k0, rho, zeta)
    # the limit taken off (dF/drho)/rho was -kappa (e^{-jk zeta} - zeta/R1 e^{-jk R1})/rho^2
    gap = r1 + zeta[:, None]
    exact = -kappa(permittivity) / gap * (1 + 1j * k0 * r1 * _unit_exponential(k0 * rho**2 / gap))
    limit = exact - cross_static(permittivity, k0, r1, zeta[:, None])
    values[9] += limit * np.exp(-1j * k0 * r1) / r1
    return values / scale(permittivity, k0, r1)


def _unit_exponential(x):
    """(e^{jx} - 1)/(jx)."""
    return np.exp(0.5j * x) * np.sinc(x / (2 * np.pi))


def _edges(start, end, first, widest, alive):
    end = max(end, start + first)
    edges = [start]
    while edges[-1] < end:
        width = max(first, edges[-1])
        if edges[-1] < alive:
            width = min(width, widest)
        edges.append(edges[-1] + width)
    edges[-1] = end
    return np.array(edges)


def _grid(edges):
    """Chebyshev nodes of all panels, rising."""
    x = np.cos(np.pi * (np.arange(ORDER)[::-1] + 0.5) / ORDER)
    return (edges[:-1, None] + np.diff(edges)[:, None] * (x + 1) / 2).ravel()


def _groups(rho):
    """Runs of rho within a factor 2."""
    start = 0
    while start < len(rho):
        end = int(np.searchsorted(rho, 2 * rho[start], side="right"))
        yield rho[start:end]
        start = end


def _transform():
    """Matrix from values at the nodes of a panel to Chebyshev coefficients."""
    x = np.cos(np.pi * (np.arange(ORDER)[::-1] + 0.5) / ORDER)
    matrix = 2 / ORDER * np.polynomial.chebyshev.chebvander(x, ORDER - 1).T
    matrix[0] /= 2
    return matrix


def _place(edges, values):
    """Panel of each value and its place in it, -1 .. 1."""
    index = np.clip(np.searchsorted(edges, values, side="right") - 1, 0, len(edges) - 2)
    low = edges[index]
    return index, 2 * (values - low) / (edges[index + 1] - low) - 1


def _chebyshev(x):
    """T_0 .. T_{ORDER - 1} at x, (n, ORDER)."""
    t = np.empty((len(x), ORDER))
    t[:, 0], t[:, 1] = 1, x
    for n in range(2, ORDER):
        t[:, n] = 2 * x * t[:, n - 1] - t[:, n - 2]
    return t
