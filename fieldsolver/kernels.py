"""The free-space kernel e^{-jkR}/R on segments: the hot loops of the matrix and of the fields.

Every pair of segments needs four moments, psi^{ab} = double integral of N_a(s) N_b(s') e^{-jkR}/R with
the hats N_0 = 1 - s/L, N_1 = s/L.  Three rules say what R is (docs/theory.md):

1. segments on one line: the current is a sheet on the tube, so the kernel is averaged round the
   wire, R^2 = z^2 + 4 a^2 sin^2(phi/2) (D. R. Wilton and N. J. Champagne, IEEE Trans. AP-54
   (2006) 1200, page from memory); far away that average is R^2 = z^2 + 2 a^2;
2. segments that meet at an angle: R^2 = d^2 + (a^2 + b^2) clip(1 - 1.5 sin^2(turn/2), 1/4, 1), the
   second-order average over both circumferences;
3. all others: R^2 = d^2, the distance of the axes.

Near pairs subtract 1/R - k^2 R/2, integrated in closed form along the inner segment (rule 1: along
both), and integrate the smooth rest numerically.
"""

from functools import lru_cache

import numpy as np

_STEPS = 4096
_COSINE = np.cos(2 * np.pi * np.arange(_STEPS) / _STEPS)
_SINE = np.sin(2 * np.pi * np.arange(_STEPS) / _STEPS)


def phasor(phase: np.ndarray) -> np.ndarray:
    """exp(-j phase) of any real phases, to 1e-14.

    A table of 4096 steps a turn times the Taylor series of the rest (at most 7.7e-4 rad): several
    times faster than the complex exponential.
    """
    out = np.empty(phase.shape, dtype=complex)
    out.real, out.imag = cosine_and_minus_sine(phase)
    return out


def cosine_and_minus_sine(phase: np.ndarray) -> tuple[np.ndarray, np.ndarray]:
    """Real and imaginary part of exp(-j phase)."""
    step = np.rint(phase * (_STEPS / (2 * np.pi)))
    rest = step * (-2 * np.pi / _STEPS)
    rest += phase
    index = step.astype(np.int64)
    index &= _STEPS - 1
    cosine, sine = _COSINE[index], _SINE[index]
    square = rest * rest
    even = square * (1 / 24)
    even -= 0.5
    even *= square
    even += 1
    square *= -1 / 6
    square += 1
    square *= rest
    real = cosine * even
    real -= sine * square
    sine *= even
    cosine *= square
    sine += cosine
    return real, np.negative(sine, out=sine)


@lru_cache
def gauss(count: int) -> tuple[np.ndarray, np.ndarray]:
    """Gauss-Legendre nodes and weights on 0..1."""
    x, w = np.polynomial.legendre.leggauss(count)
    return (x + 1) / 2, w / 2


def hats(fraction: np.ndarray) -> np.ndarray:
    """(2, ...) the two hats N_0, N_1 at fractions of a segment."""
    return np.stack([1 - fraction, fraction])


def far_moments(k: float, test, source, length_test, length_source, extra_square) -> np.ndarray:
    """Moments with 1 and N_1 - N_0 in place of the hats, by two Gauss points at both segments.

    test (P, 2, 3), source (Q, 2, 3): points of ``gauss(2)`` [m]; lengths (P,), (Q,) [m];
    extra_square (P, Q) is added to R^2 [m2].  Returns (2, 2, P, Q) [m].

    N_1 - N_0 is -+1/sqrt(3) at the points, so sums and differences of the four values do.
    """
    out = np.empty((2, 2, len(test), len(source)), dtype=complex)
    for i in (0, 1):
        for j in (0, 1):
            _kernel(k, test[:, i], source[:, j], extra_square, out[i, j])
    for i in (0, 1):
        _sum_and_difference(out[i, 0], out[i, 1])
    for j in (0, 1):
        _sum_and_difference(out[0, j], out[1, j])
    scale = 0.25 * length_test[:, None] * length_source[None]
    out[0, 0] *= scale
    scale /= np.sqrt(3)
    out[0, 1] *= scale
    out[1, 0] *= scale
    scale /= np.sqrt(3)
    out[1, 1] *= scale
    return out


def mean_and_slope(moments: np.ndarray) -> np.ndarray:
    """Moments with the hats (2, 2, ...) turned into those with 1 and N_1 - N_0."""
    test = np.stack([moments[0] + moments[1], moments[1] - moments[0]])
    return np.stack([test[:, 0] + test[:, 1], test[:, 1] - test[:, 0]], axis=1)


def _kernel(k, test, source, extra_square, out):
    square = _with_square(test, -2.0) @ _with_square(source).T
    square += extra_square
    np.maximum(square, 1e-30, out=square)
    np.sqrt(square, out=square)
    real, imaginary = cosine_and_minus_sine(k * square)
    np.divide(real, square, out=out.real)
    np.divide(imaginary, square, out=out.imag)


def _sum_and_difference(first, second):
    """first + second and second - first, in place."""
    difference = second - first
    first += second
    second[...] = difference


def _with_square(points: np.ndarray, factor: float | None = None) -> np.ndarray:
    """Rows whose product with each other is the squared distance: (x, |x|^2, 1) and (-2x, 1, |x|^2)."""
    square = np.einsum("nc,nc->n", points, points)[:, None]
    one = np.ones_like(square)
    return np.hstack([points, square, one]) if factor is None else np.hstack([factor * points, one, square])


def coaxial_moments(k: float, offset, length_test, length_source, radius) -> np.ndarray:
    """Moments of pairs on one line with the kernel averaged round the wire (rule 1).

    offset (n,): start of the source segment seen from that of the test segment along the test
    segment, both running the same way [m]; radius (n,) [m].  Returns (2, 2, n) [m].
    """
    u, weight = gauss(16)
    phi, weight = np.pi * u**3, 3 * u**2 * weight
    rho = 2 * radius[:, None] * np.sin(phi / 2)
    static = np.einsum(
        "abnp,p->abn", _double_integral(k, offset[:, None], length_test, length_source, rho), weight
    )
    s, ws = gauss(5)
    z = offset[:, None, None] + s * length_source[:, None, None] - s[:, None] * length_test[:, None, None]
    rest = _smooth_rest(k, z * z + 2 * radius[:, None, None] ** 2)
    shape = hats(s) * ws
    smooth = np.einsum("ai,bj,nij->abn", shape, shape, rest) * length_test * length_source
    return static + smooth


def near_moments(k: float, start_test, vector_test, start_source, vector_source, radius_square) -> np.ndarray:
    """Moments of any near pairs by closed inner and graded outer integration (rules 2 and 3).

    start, vector (n, 3): start and end minus start of the segments [m]; radius_square (n,) is added
    to the squared distance of the axes [m2].  Returns (2, 2, n) [m].
    """
    length_test = np.linalg.norm(vector_test, axis=1)
    length_source = np.linalg.norm(vector_source, axis=1)
    s, ws = _graded(_nearest_fraction(start_test, vector_test, start_source, vector_source))
    point = start_test[:, None] + s[..., None] * vector_test[:, None] - start_source[:, None]
    along = np.einsum("nqc,nc->nq", point, vector_source) / length_source[:, None]
    across = np.maximum(np.einsum("nqc,nqc->nq", point, point) - along**2, 0.0)
    rho = np.sqrt(np.maximum(across + radius_square[:, None], 1e-24))
    inner = _inner_integral(k, along, length_source[:, None], rho)
    static = np.einsum("anq,bnq,nq->abn", hats(s), inner, ws) * length_test
    g, wg = gauss(5)
    test = start_test[:, None] + g[:, None] * vector_test[:, None]
    source = start_source[:, None] + g[:, None] * vector_source[:, None]
    square = ((test[:, :, None] - source[:, None]) ** 2).sum(axis=-1) + radius_square[:, None, None]
    shape = hats(g) * wg
    smooth = np.einsum("ai,bj,nij->abn", shape, shape, _smooth_rest(k, square)) * length_test * length_source
    return static + smooth


def _smooth_rest(k, square):
    """e^{-jkR}/R - 1/R + k^2 R/2, without cancellation at small kR."""
    r = np.sqrt(square)
    x = k * r
    small = x < 0.05
    series = k * (-1j + x**2 * (1j / 6 + x * (1 / 24 - 1j * x / 120)))
    safe = np.where(small, 1.0, r)
    return np.where(small, series, (phasor(k * safe) - 1 + (k * safe) ** 2 / 2) / safe)


def _antiderivatives(u, rho):
    """First to fourth repeated antiderivatives over u of 1/r and of r, r = sqrt(u^2 + rho^2)."""
    p = rho * rho
    r = np.sqrt(u * u + p)
    a = np.arcsinh(u / rho)
    f2 = u * a - r
    f3 = ((2 * u * u - p) * a - 3 * u * r) / 4
    f4 = (u**3 / 6 - p * u / 4) * a + (p / 9 - 11 * u * u / 36) * r
    r1 = (u * r + p * a) / 2
    r2 = r**3 / 6 + p / 2 * f2
    r3 = u * r**3 / 24 + p / 16 * (u * r + p * a) + p / 2 * f3
    r4 = r**5 / 120 + p * r**3 / 48 + p * p / 16 * f2 + p / 2 * f4
    return (a, f2, f3, f4), (r1, r2, r3, r4)


def _combined(k, u, rho):
    inverse, linear = _antiderivatives(u, rho)
    return [f - k * k / 2 * r for f, r in zip(inverse, linear, strict=True)]


def _inner_integral(k, along, length, rho):
    """(2, ...) integral of N_b(s') (1/R - k^2 R/2) over the source segment seen from ``along``."""
    f1, f2, _, _ = _combined(k, along, rho)
    g1, g2, _, _ = _combined(k, along - length, rho)
    slope = (f2 - g2) / length
    return np.stack([f1 - slope, slope - g1])


def _double_integral(k, offset, length_test, length_source, rho):
    """(2, 2, n, p) double integral of N_a N_b (1/R - k^2 R/2) for parallel segments, in closed form.

    With h the inner integral and H, HH its repeated antiderivatives, the outer one by parts:
    N_1: H(c+L) - (HH(c+L) - HH(c))/L, N_0: (HH(c+L) - HH(c))/L - H(c); x = s - offset - s'.
    """
    length, other = length_test[:, None], length_source[:, None]
    c = -offset

    def outer(low, high, low2, high2):
        mean = (high2 - low2) / length
        return np.stack([mean - low, high - mean])

    corners = {
        key: _combined(k, x, rho)
        for key, x in (("00", c), ("10", c + length), ("01", c - other), ("11", c + length - other))
    }
    near = [
        outer(corners["00"][i], corners["10"][i], corners["00"][i + 1], corners["10"][i + 1]) for i in (1, 2)
    ]
    far = [
        outer(corners["01"][i], corners["11"][i], corners["01"][i + 1], corners["11"][i + 1]) for i in (1, 2)
    ]
    slope = (near[1] - far[1]) / other
    return np.stack([near[0] - slope, slope - far[0]], axis=1)


def _nearest_fraction(start, vector, start_source, vector_source):
    """(n,) fraction of the test segment that is nearest to the source segment."""
    samples = np.linspace(0, 1, 17)
    point = start[:, None] + samples[:, None] * vector[:, None] - start_source[:, None]
    t = (
        np.einsum("nqc,nc->nq", point, vector_source)
        / np.einsum("nc,nc->n", vector_source, vector_source)[:, None]
    )
    gap = point - np.clip(t, 0, 1)[..., None] * vector_source[:, None]
    return samples[np.argmin((gap**2).sum(axis=2), axis=1)]


def _graded(centre):
    """Nodes and weights (n, 28) on 0..1, condensed as a cube towards ``centre`` (n,) from both sides."""
    u, w = gauss(14)
    cube, weight = u**3, 3 * u**2 * w
    left, right = centre[:, None], 1 - centre[:, None]
    nodes = np.concatenate([centre[:, None] - left * cube, centre[:, None] + right * cube], axis=1)
    return nodes, np.concatenate([left * weight, right * weight], axis=1)


def line_potential(k: float, point, start, vector, radius_square) -> np.ndarray:
    """Integral of e^{-jkR}/R along n segments seen from n points.

    point, start, vector (n, 3) [m]; radius_square (n,) is added to R^2 [m2].  Returns (n,) [1].
    """
    length = np.linalg.norm(vector, axis=1)
    offset = point - start
    along = np.einsum("nc,nc->n", offset, vector) / length
    square = np.maximum((offset**2).sum(axis=1) - along**2, 0) + radius_square
    static = _inner_integral(k, along, length, np.sqrt(np.maximum(square, 1e-24))).sum(axis=0)
    s, w = gauss(5)
    rest = _smooth_rest(k, square[:, None] + (along[:, None] - length[:, None] * s) ** 2)
    return static + (rest @ w) * length
