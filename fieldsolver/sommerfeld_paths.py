"""Sommerfeld integrals of the smooth remainders on a tensor of rho and zeta.

    K(rho, zeta) = integral of F(l) e^{-u0 zeta}/u0 J(l rho) l dl,  l = 0 .. infinity

l = k0 sin t below k0 and k0 cosh t above take out 1/u0; panels of Gauss nodes shrink towards k0 (branch
point and Zenneck pole, at about 1/|n| in t) and towards Re k1.  Beyond L > Re k1 the tail goes on along
the real axis where zeta > 2 rho, and else up and down with the two Hankel functions, where it dies as
e^{-s rho}: k1 lies to the left of that path, so no branch point is crossed (K. A. Michalski and
J. R. Mosig, J. Electromagn. Waves Appl. 30 (2016) 281, review such paths [from memory]).
"""

from functools import lru_cache

import numpy as np
from scipy.special import hankel2, j0, j1

from fieldsolver.sommerfeld_spectrum import spectra, vertical_wavenumber

NODES = 16
PHASE = 14.0  # a panel of 16 Gauss nodes integrates cos over 14 rad to 1e-10
CHUNK = 2048  # of nodes: a few tens of megabytes
DECAY = 36.0  # e^{-36} = 2e-16


@lru_cache
def _gauss():
    t, w = np.polynomial.legendre.leggauss(NODES)
    return (t + 1) / 2, w / 2


def remainders(permittivity: complex, k0: float, rho: np.ndarray, zeta: np.ndarray) -> np.ndarray:
    """The ten remainders of ``spectra`` at all pairs of a few rho, within a factor 2, and many zeta.

    rho (r,) > 0, zeta (z,) >= 0 rising [m]; returns (10, z, r) in the order K_xx, K_phi, K_zz, dK_phi/dzeta,
    dK_xx/dzeta, Laplacian of F, dK_phi/drho, dK_xx/drho, dG_TM/drho, (dF/drho)/rho.
    """
    last = 1.5 * k0 * max(np.sqrt(permittivity).real, 1.0)
    l, u0, weight = _head(permittivity, k0, last, rho.max(), zeta.max())
    total = np.zeros((10, len(zeta), len(rho)), complex)
    for part in range(0, len(l), CHUNK):
        some = slice(part, part + CHUNK)
        bessel = (j0(np.outer(l[some], rho)), j1(np.outer(l[some], rho)))
        total += _sum(permittivity, k0, l[some], u0[some], weight[some], bessel, rho, zeta)
    split = int(np.searchsorted(zeta, 2 * rho.min(), side="right"))
    if split:
        total[:, :split] += _vertical_tail(permittivity, k0, last, rho, zeta[:split])
    if split < len(zeta):
        total[:, split:] += _real_tail(permittivity, k0, last, rho, zeta[split:])
    return total


def _sum(permittivity, k0, l, u0, weight, bessel, rho, zeta):
    """Sum over the nodes l (m,) with weights (l/u0) dl; bessel: J0, J1 or halves of Hankel functions."""
    with_j0, with_j1, f = spectra(l, u0, permittivity, k0)
    decay = np.exp(-np.outer(zeta, u0)) * weight
    slope = bessel[1] / np.outer(l, rho)
    groups = ((with_j0, bessel[0]), (with_j1, bessel[1]), (f[None], slope))
    return np.concatenate([_product(factor, decay, function) for factor, function in groups])


def _product(factor, decay, function):
    left = (factor[:, None] * decay).reshape(-1, decay.shape[1])
    if np.isrealobj(function):
        product = left.real @ function + 1j * (left.imag @ function)
    else:
        product = left @ function
    return product.reshape(len(factor), len(decay), -1)


def _head(permittivity, k0, last, rho, zeta):
    """Nodes l, u0 and weights (l/u0) dl on 0 .. last."""
    index = np.sqrt(permittivity)
    fine = min(0.5 / abs(index), 1 / max(k0 * zeta, 2.0))
    turn = float(np.arccosh(max(index.real, 1.0)))
    end = float(np.arccosh(last / k0))
    near = max(abs(index.imag) / 2 / max(np.sinh(turn), 1.0), 1e-7)
    low = _split(_graded(0, np.pi / 2, np.pi / 2, fine), lambda t: k0 * (rho * np.sin(t) - zeta * np.cos(t)))
    above = np.unique(np.concatenate([_graded(0, turn, fine, near), _graded(turn, end, near, end)]))
    high = _split(above, lambda t: k0 * rho * np.cosh(t))
    t, w = _nodes(low)
    s, v = _nodes(high)
    l = k0 * np.concatenate([np.sin(t), np.cosh(s)])
    u0 = k0 * np.concatenate([1j * np.cos(t), np.sinh(s)])
    return l, u0, l * np.concatenate([-1j * w, v])


def _vertical_tail(permittivity, k0, last, rho, zeta):
    step = min(0.5 * last, 4 / rho.max())
    s, w = _nodes(_growing(0, DECAY / rho.min(), step))
    down = last - 1j * s
    halves = tuple(hankel2(order, np.outer(down, rho)) / 2 for order in (0, 1))
    total = 0
    for l, bessel, direction in ((down, halves, -1j), (down.conj(), tuple(h.conj() for h in halves), 1j)):
        u0 = vertical_wavenumber(l, k0)
        total = total + _sum(permittivity, k0, l, u0, direction * w * l / u0, bessel, rho, zeta)
    return total


def _real_tail(permittivity, k0, last, rho, zeta):
    edges = _growing(last, max(DECAY / zeta[0], 2 * last), 0.5 * last)
    l, w = _nodes(_split(edges, lambda l: rho.max() * l))
    u0 = vertical_wavenumber(l, k0)
    bessel = (j0(np.outer(l, rho)), j1(np.outer(l, rho)))
    return _sum(permittivity, k0, l, u0, w * l / u0, bessel, rho, zeta)


def _graded(start, end, fine_start, fine_end):
    """Edges from start to end, doubling away from both ends."""
    half = (end - start) / 2
    from_start = start + _doubling(fine_start, half)
    from_end = end - _doubling(fine_end, half)
    return np.concatenate([from_start, [start + half] if half > 0 else [], from_end[::-1]])


def _doubling(fine, half):
    if fine >= half:
        return np.zeros(1)
    return np.concatenate([[0.0], fine * 2.0 ** np.arange(np.ceil(np.log2(half / fine)))])


def _growing(start, end, step):
    count = int(np.ceil(np.log2((end - start) / step + 1)))
    return np.concatenate([start + step * (2.0 ** np.arange(count) - 1), [end]])


def _split(edges, phase):
    """Edges with as many more as keep each panel within PHASE."""
    pieces = np.maximum(1, np.ceil(np.abs(np.diff(phase(edges))) / PHASE)).astype(int)
    inner = [
        np.linspace(a, b, n, endpoint=False) for a, b, n in zip(edges[:-1], edges[1:], pieces, strict=True)
    ]
    return np.concatenate([*inner, edges[-1:]])


def _nodes(edges):
    t, w = _gauss()
    width = np.diff(edges)
    return (edges[:-1, None] + width[:, None] * t).ravel(), (width[:, None] * w).ravel()
