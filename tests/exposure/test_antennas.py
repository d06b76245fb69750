"""Antennas as their owners know them become the conductors, feeds and loads that were meant."""

import math
from dataclasses import replace

import numpy as np
import pytest

import fieldsolver as fs
from exposure.antennas.catalogue import settled, structure_wiring, wirings
from exposure.antennas.chains import place_on
from exposure.antennas.conductors import Chain, ChainFeed, ChainLoad, Conductors
from exposure.antennas.dipole import Dipole
from exposure.antennas.materials import PERFECT
from exposure.antennas.model import Antenna, FeedLine, Material, Structure
from exposure.antennas.vertical import Vertical

F = 14.2e6
REAL = fs.LossyGround(13, 0.005)
COPPER = Material("copper", 58e6)
DIPOLE = Antenna("d", "dipole", (3.0, 4.0), 9.0, math.radians(90), Dipole(10.0, 1e-3), COPPER)
VERTICAL = Antenna("v", "vertical", (3.0, 4.0), 3.0, 0.0, Vertical(5.0, 0.01, 4, 4.0), PERFECT)
MONOPOLE = replace(VERTICAL, height=0.0, shape=Vertical(5.0, 0.01))
ONE_WIRE = Chain(((0.0, -5.0, 0.0), (0.0, 5.0, 0.0)), 1e-3)
DRAWN = replace(DIPOLE, kind="conductors", shape=Conductors((ONE_WIRE,), (ChainFeed(0, 0.5),)))
DOWN = FeedLine(((0.0, 0.0, 0.0), (0.0, 0.0, -8.0)), 5e-3)

only = pytest.approx  # coordinates: rounding of sines and cosines of a double


def one(antenna, ground=fs.FREE_SPACE):
    (wiring,) = wirings(antenna, F, ground)
    return wiring


def impedances(wiring, ground=fs.FREE_SPACE):
    return fs.solve(wiring.conductors, wiring.feeds, F, ground, loads=wiring.loads).feed_impedances


def place_of(wiring, part):
    return wiring.conductors[part.wire].point(part.position)


@pytest.mark.parametrize(
    ("bearing", "east", "north"), [(0, 0, 5), (90, 5, 0), (30, 2.5, 5 * math.sqrt(0.75))]
)
def test_a_dipole_lies_along_its_bearing_about_its_position(bearing, east, north):
    """Clockwise from north (design, section 7): 90 degrees is east.  Rounding, 1e-12 m."""
    (wire,) = one(replace(DIPOLE, bearing=math.radians(bearing))).conductors

    assert wire.start == only((3 - east, 4 - north, 9), abs=1e-12)
    assert wire.end == only((3 + east, 4 + north, 9), abs=1e-12)
    assert (wire.radius, wire.conductivity) == (1e-3, 58e6)


@pytest.mark.parametrize(
    "shape", [Dipole(10.0, 1e-3, droop=math.radians(30)), Dipole(10.0, 1e-3, end_height=6.5)]
)
def test_the_arms_of_an_inverted_v_keep_their_length_and_go_down(shape):
    """An arm of 5 m falls by 2.5 m at 30 degrees (sine one half), so its end is at 6.5 m.  1e-12 m."""
    wiring = one(replace(DIPOLE, shape=shape))

    assert [wire.length for wire in wiring.conductors] == only([5, 5], abs=1e-12)
    assert [wire.start[2] for wire in wiring.conductors] == only([6.5, 9], abs=1e-12)
    assert wiring.conductors[1].end[2] == only(6.5, abs=1e-12)
    assert place_of(wiring, wiring.feeds[0]) == only((3, 4, 9), abs=1e-12)


@pytest.mark.parametrize("droop", [0.0, 0.5])
def test_a_wire_fed_off_its_middle_is_fed_at_that_fraction_of_its_length(droop):
    shape = Dipole(10.0, 1e-3, droop=droop, feed_position=0.3)
    wiring = one(replace(DIPOLE, shape=shape))
    feed = wiring.feeds[0]

    assert math.dist(place_of(wiring, feed), wiring.conductors[0].start) == only(3.0, abs=1e-9)
    assert any("outside of its feed line" in note for note in wiring.notes)


def test_a_length_left_open_is_settled_by_the_frequency_once():
    """142.65 m MHz, common practice; a second frequency changes nothing any more."""
    cut = settled(replace(DIPOLE, shape=Dipole(None, 1e-3)), F)

    assert cut.shape.length == only(142.65 / 14.2, rel=1e-12)
    assert settled(cut, 7e6) == cut


def test_radials_leave_the_base_evenly_and_droop():
    """Four radials of 4 m, 30 degrees down: 2 m down, 4 cos 30 m out, to north, east, south and west."""
    shape = replace(VERTICAL.shape, radial_droop=math.radians(30))
    mast, *radials = one(replace(VERTICAL, shape=shape)).conductors
    out = 4 * math.sqrt(0.75)

    assert (mast.start, mast.end) == ((3, 4, 3), (3, 4, 8))
    assert [wire.start for wire in radials] == [mast.start] * 4
    tips = [(3, 4 + out, 1), (3 + out, 4, 1), (3, 4 - out, 1), (3 - out, 4, 1)]
    assert np.array([wire.end for wire in radials]) == only(np.array(tips), abs=1e-12)


def test_a_vertical_on_perfect_ground_is_half_a_dipole_of_twice_its_length():
    """Image theory: half the impedance, exactly; 1e-6 for the order of sums and the quadrature."""
    monopole = impedances(one(MONOPOLE, fs.PERFECT_GROUND), fs.PERFECT_GROUND)
    dipole = replace(DIPOLE, shape=Dipole(10.0, 0.01), material=PERFECT)

    assert monopole == only(impedances(one(dipole)) / 2, rel=1e-6)


def test_a_vertical_on_real_ground_has_its_stated_connection_at_its_base():
    wiring = one(replace(MONOPOLE, ground_connection=20 + 5j), REAL)

    assert wiring.loads == (fs.Load(0, 0.0, impedance=20 + 5j),)
    assert place_of(wiring, wiring.feeds[0])[2] == 0


@pytest.mark.parametrize("ground", [REAL, fs.PERFECT_GROUND, fs.FREE_SPACE])
def test_a_vertical_without_anything_to_be_fed_against_is_refused(ground):
    with pytest.raises(fs.GeometryError, match="nothing to be fed against"):
        wirings(replace(VERTICAL, shape=Vertical(5.0, 0.01)), F, ground)


@pytest.mark.parametrize(("antenna", "ground"), [(MONOPOLE, REAL), (replace(DRAWN, height=0.0), REAL)])
def test_what_stands_or_lies_on_real_ground_unstated_is_refused(antenna, ground):
    with pytest.raises(fs.GeometryError, match="ground"):
        wirings(antenna, F, ground)


def test_a_drawn_dipole_is_the_dipole_of_the_catalogue():
    drawn, dipole = one(DRAWN), one(DIPOLE)

    assert (drawn.conductors, drawn.feeds, drawn.loads) == (dipole.conductors, dipole.feeds, dipole.loads)


@pytest.mark.parametrize("position", [0.0, 0.1, 0.25, 0.5, 0.6, 0.75, 0.9, 1.0])
def test_a_place_on_a_chain_is_at_that_fraction_of_its_length(position):
    """A chain of 1, 2 and 1 m along a line, so that the distance from its start is the arc length."""
    points = ((0, 0, 0), (0, 0, 1), (0, 0, 3), (0, 0, 4))

    wire, fraction = place_on(points, position)

    lengths, starts = (1, 2, 1), (0, 1, 3)
    assert starts[wire] + fraction * lengths[wire] == only(4 * position, abs=1e-12)


@pytest.mark.parametrize(("position", "wire"), [(0.25, 1), (0.25 + 1e-9, 1), (0.25 - 1e-9, 1), (0.75, 2)])
def test_a_place_on_a_corner_is_the_start_of_the_next_wire(position, wire):
    """Fractions typed with finitely many digits mean the corner: within 1e-6 of the length."""
    points = ((0, 0, 0), (0, 0, 1), (0, 0, 3), (0, 0, 4))

    assert place_on(points, position) == (wire, 0.0)


def test_feeds_of_an_array_keep_their_amplitude_and_phase():
    chains = (ONE_WIRE, replace(ONE_WIRE, points=((3.0, -5.0, 0.0), (3.0, 5.0, 0.0))))
    feeds = (ChainFeed(0, 0.5, current=1.0), ChainFeed(1, 0.5, current=0.5j))

    wiring = one(replace(DRAWN, shape=Conductors(chains, feeds)))

    assert [feed.current for feed in wiring.feeds] == [1.0, 0.5j]
    assert [feed.wire for feed in wiring.feeds] == [0, 1]


STATES = (
    "feed line without choke, braid on the first half",
    "feed line without choke, braid on the second half",
)
CHOKED = ("feed line with choke, braid on the first half", "feed line with choke, braid on the second half")


@pytest.mark.parametrize(("choke", "states"), [(None, STATES), (1000 + 0j, STATES + CHOKED)])
def test_a_feed_line_gives_a_state_for_each_half_with_and_without_its_choke(choke, states):
    found = wirings(replace(DIPOLE, feed_line=replace(DOWN, choke=choke)), F, fs.FREE_SPACE)

    assert tuple(wiring.state for wiring in found) == states
    assert all(wiring.conductors[wiring.feed_line[0]].start == (3, 4, 9) for wiring in found)


@pytest.mark.parametrize("droop", [0.0, 0.5])
def test_the_braid_on_either_half_of_a_symmetric_dipole_is_a_mirror_image(droop):
    """The plane through the feed line mirrors one state into the other: same impedance, 1e-9."""
    shape = Dipole(10.0, 1e-3, droop=droop)
    states = wirings(replace(DIPOLE, shape=shape, feed_line=DOWN), F, fs.FREE_SPACE)

    first, second = (impedances(wiring) for wiring in states)

    assert first == only(second, rel=1e-9)


def test_the_feed_line_of_an_off_centre_antenna_carries_current_on_its_outside():
    """Nothing mirrors one state into the other, so impedances differ: by more than 1 %, beyond rounding."""
    line = replace(DOWN, points=((0.0, -2.0, 0.0), (0.0, -2.0, -5.0)))
    antenna = replace(DIPOLE, shape=Dipole(10.0, 1e-3, feed_position=0.3), feed_line=line)

    first, second = (impedances(wiring) for wiring in wirings(antenna, F, fs.FREE_SPACE))

    assert abs(first - second) > 0.01 * abs(first)


def test_loads_stay_where_they_are_when_the_wire_is_cut_for_a_feed_line():
    loads = tuple(ChainLoad(0, place, 10.0, 0.0, None, "series") for place in (0.2, 0.9))
    antenna = replace(DRAWN, shape=replace(DRAWN.shape, loads=loads))
    plain = one(antenna)

    for wiring in wirings(replace(antenna, feed_line=DOWN), F, fs.FREE_SPACE):
        found = [place_of(wiring, load) for load in wiring.loads]
        assert np.array(found) == only(np.array([place_of(plain, load) for load in plain.loads]), abs=1e-12)


def test_a_cut_dipole_with_its_feed_line_far_away_from_metal_is_the_same_dipole():
    """A very large choke (1e9 ohm) and a line of 2 cm leave the impedance: 1 % for the metal and the cut."""
    line = FeedLine(((0.0, 0.0, 0.0), (0.0, 0.0, -0.02)), 1e-3, 1e9 + 0j)
    choked = wirings(replace(DIPOLE, feed_line=line), F, fs.FREE_SPACE)[2]

    assert impedances(choked) == only(impedances(one(DIPOLE)), rel=0.01)


def test_the_braid_of_a_vertical_is_joined_to_its_radials():
    antenna = replace(
        VERTICAL, feed_line=replace(DOWN, points=((0.0, 0.0, 0.0), (0.0, 0.0, -2.5)), choke=500 + 0j)
    )

    found = wirings(antenna, F, fs.PERFECT_GROUND)

    assert [wiring.state for wiring in found] == ["feed line without choke", "feed line with choke"]
    assert all(wiring.feeds == (fs.Feed(0, 0.0),) for wiring in found)
    assert found[1].loads[-1] == fs.Load(5, 0.0, impedance=500 + 0j)


@pytest.mark.parametrize(
    ("antenna", "word"), [(VERTICAL, "vertical drives"), (DRAWN, "not balanced"), (DIPOLE, "choked")]
)
def test_an_antenna_without_a_described_feed_line_says_what_is_not_assessed(antenna, word):
    assert any(word in note for note in one(antenna).notes)


def test_a_structure_is_a_chain_with_its_connection_to_real_ground():
    post = Structure("post", ((1.0, 2.0, 0.0), (1.0, 2.0, 3.0), (4.0, 2.0, 3.0)), 0.01, COPPER, 100 + 0j)

    wiring = structure_wiring(post, REAL)

    assert [wire.length for wire in wiring.conductors] == [3, 3]
    assert wiring.loads == (fs.Load(0, 0.0, impedance=100 + 0j),) and wiring.feeds == ()


@pytest.mark.parametrize("connection", [0j, 5 + 0j])
def test_a_connection_of_nothing_is_said_to_be_ideal(connection):
    chain = Chain(((0.0, 0.0, 0.0), (0.0, 0.0, 5.0)), 1e-3)
    drawn = replace(DRAWN, height=0.0, shape=Conductors((chain,), (ChainFeed(0, 0.0),)))
    post = Structure("post", ((1.0, 2.0, 0.0), (1.0, 2.0, 3.0)), 0.01, COPPER, connection)

    found = [
        one(replace(drawn, ground_connection=connection), REAL),
        one(replace(MONOPOLE, ground_connection=connection), REAL),
        structure_wiring(post, REAL),
    ]

    assert [any("ideal" in note for note in wiring.notes) for wiring in found] == [connection == 0] * 3


def test_a_structure_on_perfect_ground_needs_no_connection():
    post = Structure("post", ((1.0, 2.0, 0.0), (1.0, 2.0, 3.0)), 0.01, COPPER)

    assert structure_wiring(post, fs.PERFECT_GROUND).loads == ()


@pytest.mark.parametrize(
    ("low", "word"),
    [(-0.1, "below the ground"), (0.005, "less than its radius"), (0.0, "ground_connection_ohm")],
)
def test_metal_too_near_to_real_ground_is_refused_by_name(low, word):
    post = Structure("post", ((1.0, 2.0, low), (1.0, 2.0, 3.0)), 0.01, COPPER)

    with pytest.raises(fs.GeometryError, match=f"structure 'post'.*{word}"):
        structure_wiring(post, REAL)
