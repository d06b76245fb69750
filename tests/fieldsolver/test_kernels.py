"""The integrals against brute force."""

import numpy as np
import pytest

from fieldsolver.kernels import (
    coaxial_moments,
    gauss,
    hats,
    line_potential,
    mean_and_slope,
    near_moments,
    phasor,
)

K = 2.0


def test_the_phasor_is_the_complex_exponential():
    """Table and Taylor series: the rest is at most 7.7e-4 rad, its fifth power over 120 below 1e-17."""
    x = np.random.default_rng(1).uniform(-500, 500, 20_000)

    assert np.abs(phasor(x) - np.exp(-1j * x)).max() < 2e-13


def brute_force_coaxial(offset, length, other, radius):
    """Average round the wire by 60 graded points, inner by a sinh, outer condensed at both ends."""
    u, w = gauss(60)
    phi, w = np.pi * u**4, 4 * u**3 * w
    v, wv = gauss(60)
    x, wx = gauss(40)
    outer = np.concatenate([length / 2 * x**3, length - length / 2 * x**3])
    weight = np.tile(length / 2 * 3 * x**2 * wx, 2)
    rho = 2 * radius * np.sin(phi / 2)
    result = np.zeros((2, 2), complex)
    for s, ws in zip(outer, weight, strict=True):
        low, high = np.arcsinh((offset - s) / rho), np.arcsinh((offset + other - s) / rho)
        t = low[:, None] + (high - low)[:, None] * v
        fraction = (s - offset + rho[:, None] * np.sinh(t)) / other
        wave = np.exp(-1j * K * rho[:, None] * np.cosh(t)) * wv
        inner = np.array([((wave * hat).sum(axis=1) * (high - low)) @ w for hat in (1 - fraction, fraction)])
        result += ws * np.outer([1 - s / length, s / length], inner)
    return result


@pytest.mark.parametrize(
    "offset, length, other, radius",
    [
        (0.0, 0.1, 0.1, 0.01),
        (0.1, 0.1, 0.2, 0.01),
        (0.3, 0.1, 0.1, 0.01),
        (-0.1, 0.1, 0.1, 0.05),  # two radii long: Wilton and Champagne
        (0.0, 0.1, 0.1, 0.05),
        (0.0, 0.1, 0.1, 1e-5),
    ],
)
def test_coaxial_moments_are_those_of_the_kernel_averaged_round_the_wire(offset, length, other, radius):
    """Static part in closed form and 16 points round the wire; the dynamic part with R^2 = z^2 + 2a^2.

    2e-5: the third-order term of the dynamic part, (k a)^2 of (k L)^2; the matrix asks for 1e-4.
    """
    found = coaxial_moments(K, *(np.array([value]) for value in (offset, length, other, radius)))[:, :, 0]

    expected = brute_force_coaxial(offset, length, other, radius)
    assert np.abs(found - expected).max() < 2e-5 * np.abs(expected).max()


def test_near_moments_at_a_corner_match_brute_force():
    """A right-angle joint, 300 x 300 points condensed at the corner; 5e-5 of the largest moment."""
    test_vector, source_vector = np.array([[0.1, 0, 0]]), np.array([[0.0, 0.08, 0.06]])
    found = near_moments(K, np.zeros((1, 3)), test_vector, test_vector, source_vector, np.array([1e-6]))[
        :, :, 0
    ]

    u, w = gauss(300)
    s, ws = u**3, 3 * u**2 * w
    p = (1 - s)[:, None] * test_vector
    q = test_vector + s[:, None] * source_vector
    r = np.sqrt(((p[:, None] - q[None]) ** 2).sum(axis=2) + 1e-6)
    expected = np.einsum("ai,bj,ij->ab", hats(1 - s) * ws, hats(s) * ws, np.exp(-1j * K * r) / r) * 0.01
    assert np.abs(found - expected).max() < 5e-5 * np.abs(expected).max()


def test_moments_of_mean_and_slope_are_sums_of_those_of_the_hats():
    moments = np.arange(4.0).reshape(2, 2)

    assert mean_and_slope(moments).tolist() == [[6.0, 2.0], [4.0, 0.0]]


def test_the_potential_of_a_line_seen_from_beside_its_middle():
    """integral of dz/sqrt(z^2 + d^2) = 2 asinh(L/2d) in statics (k = 1e-6)."""
    found = line_potential(
        1e-6, np.array([[0.3, 0, 0.5]]), np.zeros((1, 3)), np.array([[0, 0, 1.0]]), np.array([0.0])
    )

    assert found[0] == pytest.approx(2 * np.arcsinh(0.5 / 0.3), rel=1e-5)
