"""A transmission as a source: what is in its solve, its states, and its strengths per accepted watt."""

from dataclasses import replace

import numpy as np
import pytest

import fieldsolver as fs
from exposure.site.site_file import read_site
from exposure.station.sources import Sources, model, source
from exposure.station.surroundings import nearest
from tests.exposure.stations import DRAWN, FENCE, STATION, changed

FREE = changed('soil = "average"', 'kind = "none"')


@pytest.fixture
def site(tmp_path):
    def read(text):
        path = tmp_path / "site.toml"
        path.write_text(text)
        return read_site(path)

    return read


def test_the_source_radiates_one_watt_of_which_the_far_field_is_left(site):
    """E^2 r^2/eta over a sphere is the radiated power; copper loses a little of the accepted watt.

    500 m is 24 wavelengths: the near terms are (1/kr)^2 = 4e-5.  48 by 48 Gauss and equal steps are
    exact for a dipole of half a wavelength to 1e-9 (its pattern is a polynomial of low order).
    """
    found = source(*_first(site(FREE)))
    cosines, weights = np.polynomial.legendre.leggauss(48)
    turn = 2 * np.pi * np.arange(48) / 48
    u, a = np.meshgrid(cosines, turn, indexing="ij")
    sphere = 500 * np.stack([np.sqrt(1 - u**2) * np.cos(a), np.sqrt(1 - u**2) * np.sin(a), u], axis=-1)

    squared = found.squared_strengths(sphere.reshape(-1, 3) + [0, 0, 9.1])[:, 0].reshape(48, 48)
    power = (weights[:, None] * squared).sum() * 2 * np.pi / 48 * 500**2 / 376.730313668

    lost = found.currents[0].conductor_loss
    assert found.currents[0].accepted_power == pytest.approx(1.0, rel=1e-12)
    assert 0 < lost < 0.05
    assert power == pytest.approx(1.0 - lost, rel=1e-4)


def test_within_three_radii_and_below_ground_the_strength_is_infinite(site):
    """Design, section 6: such points count as at the limit or beyond."""
    found = source(*_first(site(STATION)))

    inside, below, outside = found.squared_strengths([[1.0, 0, 9.1], [1.0, 0, -0.1], [1.0, 0, 9.2]])

    assert np.isinf(inside).all()
    assert np.isinf(below).all()
    assert np.isfinite(outside).all()


def test_beside_other_metal_the_field_at_touching_distance_counts(site):
    """5 cm from the axis of the fence; the place on its axis has the same field as one beside it."""
    found = source(*_first(site(STATION + FENCE)))

    on_axis, aside, apart = found.squared_strengths([[2.0, 20, 1.2], [2.0, 19.95, 1.2], [2.0, 19.9, 1.2]])

    assert np.isfinite(on_axis).all()
    assert on_axis == pytest.approx(aside, rel=0.2)  # on the other side of the wire or on this
    assert aside[0] > 1.5 * apart[0]  # rising towards the wire: 1/distance in field


def test_points_are_independent_of_the_points_beside_them(site):
    """Also where one of them is refused."""
    found = source(*_first(site(STATION)))
    points = np.array([[3.0, 4, 1], [1.0, 0, 9.1], [-7.0, 2, 3]])

    together = found.squared_strengths(points)

    alone = np.concatenate([found.squared_strengths(p[None]) for p in points])
    assert together == pytest.approx(alone, rel=1e-3)  # segments are two Gauss points or four by distance


def test_a_site_with_one_antenna_has_one_state(site):
    assert source(*_first(site(STATION))).states == ("as built",)


def test_feeds_of_other_antennas_are_once_open_and_once_short(site):
    made = model(*_first(site(STATION + DRAWN)))

    opened, shorted = made.states
    assert "open" in opened.words and "short" in shorted.words
    assert len(opened.feeds) == len(shorted.feeds) == 1
    assert len(opened.loads) == len(shorted.loads) + 1


def test_an_open_feed_carries_no_current_and_a_short_one_does(site):
    """The other antenna is an inverted V of 8.5 m, 9 m away."""
    found = source(*_first(site(STATION + DRAWN)))

    opened, shorted = (np.abs(c.ends[c.problem.mesh.wire.repeat(2) > 0]).max() for c in found.currents)
    at_gap = np.abs(found.currents[0].problem.load_rows @ found.currents[0].ends).min()

    assert at_gap < 1e-3 * opened
    assert shorted > 1.1 * opened


def test_structures_within_a_wavelength_are_in_the_solve(site):
    """A fence of a wavelength and a half, 20 m away, which is less than a wavelength (21 m)."""
    with_fence = model(*_first(site(STATION + FENCE)))

    assert [piece.role for piece in with_fence.pieces] == ["antenna", "structure"]
    assert with_fence.left_out == ()


def test_metal_farther_than_a_wavelength_from_antenna_and_areas_is_left_out_and_listed(site):
    far = FENCE.replace("20, 1.2", "48, 1.2")

    made = model(*_first(site(STATION + far)))

    assert [piece.role for piece in made.pieces] == ["antenna"]
    assert len(made.left_out) == 1 and "'fence'" in made.left_out[0]


def test_metal_far_from_the_antenna_but_near_an_area_stays(site):
    far = FENCE.replace("20, 1.2", "48, 1.2")
    area = '[[area]]\nname = "far"\npopulation = "general_public"\npoint_m = [0, 40, 1]\n'

    made = model(*_first(site(STATION + far + area)))

    assert made.left_out == ()


def test_distance_to_areas_and_wires_is_never_overstated():
    """From (0, 0, 5)-(4, 0, 5) to a parallel wire 3 m above it, and no area."""
    one = fs.Wire((0, 0, 5), (4, 0, 5), 0.001)
    other = fs.Wire((1, 0, 8), (9, 0, 8), 0.001)

    assert 3 - 4 / 128 <= nearest((one,), (other,), ()) <= 3


def test_transmissions_on_one_antenna_and_frequency_share_one_solution(site):
    known = site(STATION)
    sources = Sources(known)
    first = known.transmissions[0]

    again = replace(first, name="other", peak_envelope_power=5.0, line=None)

    assert sources.source(first) is sources.source(again)


def test_power_line_and_duty_never_enter_a_solve(site):
    """Design, section 4."""
    quiet = changed("transmitter_power_w = 100", "transmitter_power_w = 1")
    points = np.array([[3.0, 4, 1]])

    one, other = (source(*_first(site(text))).squared_strengths(points) for text in (STATION, quiet))

    assert (one == other).all()


def _first(site):
    return site.transmissions[0], site
