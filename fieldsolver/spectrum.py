"""Reflected potentials of a half space as integrals over the radial wavenumber.

    K(rho, zeta) = integral over l of F(l) e^{-u0 zeta}/u0 J(l rho) l dl          (docs/theory.md, eqs 3 to 5)

A. Sommerfeld, Ann. Phys. 81 (1926) 1135; factors of formulation C of K. A. Michalski and D. Zheng,
IEEE Trans. AP-38 (1990) 335.  The path runs along the real axis, condensed on both sides of the
branch points k and Re k1, to l_a beyond them.  From there it goes on along the axis where
zeta > rho (e^{-l zeta} decays), else up and down with the two Hankel functions (e^{-t rho} decays).
"""

from dataclasses import dataclass

import numpy as np
from scipy.special import hankel1, hankel2, j0, j1

from fieldsolver.kernels import gauss

POTENTIALS = ("k_xx", "k_phi", "k_zz", "f_rho_over_rho")
FIELDS = (
    "k_xx",
    "k_zz",
    "f_rho_over_rho",
    "laplacian_f",
    "k_phi_rho",
    "k_phi_zeta",
    "tm_rho",
    "k_xx_rho",
    "k_xx_zeta",
)
DECAY = 36.0  # e^{-36} = 2e-16


@dataclass(frozen=True)
class Path:
    """Wavenumbers l (n,) with weights dl, and which Bessel function goes with them."""

    l: np.ndarray
    weight: np.ndarray
    bessel: tuple

    def zeroth_and_first(self, rho):
        """Bessel functions of order 0 and 1 at l rho, (n, len(rho)) each."""
        x = self.l[:, None] * rho
        return self.bessel[0](x), self.bessel[1](x)


def integrals(names, permittivity: complex, k: float, rho, zeta) -> np.ndarray:
    """Potentials and derivatives on a small grid.

    Parameters
    ----------
    names : of POTENTIALS or FIELDS
    permittivity : complex
        Relative, of the ground. [1]
    k : float
        Wavenumber in air. [rad/m]
    rho, zeta : (p,), (q,) positive
        Horizontal distances and sums of heights, each within about an octave. [m]

    Returns
    -------
    (len(names), p, q) complex; K's in 1/m, first derivatives in 1/m2.
    """
    total = np.zeros((len(names), len(rho), len(zeta)), dtype=complex)
    for path in _paths(permittivity, k, rho, zeta):
        u0 = np.sqrt(path.l.astype(complex) ** 2 - k**2)
        decay = np.exp(-u0[:, None] * zeta)
        zeroth, first = path.zeroth_and_first(rho)
        factors = _factors(permittivity, k, path.l, u0)
        for i, name in enumerate(names):
            factor, order = factors[name]
            bessel = first if order else zeroth
            total[i] += (bessel * (factor * path.weight)[:, None]).T @ decay
    if "f_rho_over_rho" in names:
        total[names.index("f_rho_over_rho")] /= rho[:, None]
    return total


def _factors(permittivity, k, l, u0):
    """name: (what stands before e^{-u0 zeta} J dl, order of J)."""
    u1 = np.sqrt(l.astype(complex) ** 2 - permittivity * k**2)
    te = (u0 - u1) / (u0 + u1)
    tm = (permittivity * u0 - u1) / (permittivity * u0 + u1)
    both = 2 * (permittivity - 1) / ((u0 + u1) * (permittivity * u0 + u1))
    phi = te - both * u0**2
    return {
        "k_xx": (te * l / u0, 0),
        "k_phi": (phi * l / u0, 0),
        "k_zz": ((tm + u0**2 * both) * l / u0, 0),
        "f_rho_over_rho": (-both * l**2, 1),
        "laplacian_f": (-both * l**3, 0),
        "k_phi_rho": (-phi * l**2 / u0, 1),
        "k_phi_zeta": (-phi * l, 0),
        "tm_rho": (-tm * l**2 / u0, 1),
        "k_xx_rho": (-te * l**2 / u0, 1),
        "k_xx_zeta": (-te * l, 0),
    }


def _paths(permittivity, k, rho, zeta):
    inner = float(np.sqrt(permittivity).real) * k
    turn = 1.2 * inner + 0.5 * k
    span = float(rho.max() + zeta.max())
    yield Path(*_to_the_turn(permittivity, k, inner, turn, span), (j0, j1))
    if turn * zeta.min() > DECAY:
        return
    if zeta.min() >= rho.min():
        s, w = _tail(turn, DECAY / zeta.min(), span)
        yield Path(turn + s, w, (j0, j1))
    else:
        s, w = _tail(turn, DECAY / rho.min(), span)
        yield Path(turn + 1j * s, 0.5j * w, (_hankel(hankel1, 0), _hankel(hankel1, 1)))
        yield Path(turn - 1j * s, -0.5j * w, (_hankel(hankel2, 0), _hankel(hankel2, 1)))


def _hankel(function, order):
    return lambda x: function(order, x)


def _to_the_turn(permittivity, k, inner, turn, span):
    """Real axis up to the turn; the substitutions are quadratic at both branch points."""
    levels = 3 + int(np.ceil(np.log2(np.sqrt(abs(permittivity)))))
    graded = np.concatenate([[0.0], 0.5 ** np.arange(levels, -1, -1)])
    middle = max((k + inner) / 2, k * 1.01)
    inner = max(inner, k * 1.02)
    parts = []
    for centre, reach in ((k, -k), (k, middle - k), (inner, middle - inner), (inner, turn - inner)):
        for low, high in zip(graded[:-1], graded[1:], strict=True):
            count = 8 + int(0.35 * abs(reach) * (high**2 - low**2) * span)
            s, w = _between(low, high, count)
            parts.append((centre + reach * s**2, 2 * abs(reach) * s * w))
    return tuple(np.concatenate(values) for values in zip(*parts, strict=True))


def _tail(turn, length, span):
    """Nodes and weights on 0..length, in intervals that double from half of ``turn``."""
    doublings = max(5, int(np.ceil(np.log2(length / (0.5 * turn)))))
    edges = length * np.concatenate([[0.0], 0.5 ** np.arange(doublings, -1, -1)])
    parts = [
        _between(low, high, 10 + int(0.35 * (high - low) * span))
        for low, high in zip(edges[:-1], edges[1:], strict=True)
    ]
    return tuple(np.concatenate(values) for values in zip(*parts, strict=True))


def _between(low, high, count):
    x, w = gauss(count)
    return low + (high - low) * x, (high - low) * w
