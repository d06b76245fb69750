"""The outside of a coaxial feed line as a wire of the antenna.

At the feed the braid is joined to one side of the gap.  Which half of a dipole carries it is not
known, so each is a state of its own; a choke may be worse than stated, so with a stated choke both
'with' and 'without' are states.  The worst state counts.
"""

import math
from dataclasses import replace

import fieldsolver as fs
from exposure.antennas.chains import ground_loads, wires
from exposure.antennas.materials import PERFECT
from exposure.antennas.model import FeedLine, Wiring

AT_THE_FEED = 0.05  # [m] a feed line drawn to begin this near to the feed begins at the feed


def with_feed_line(
    wiring: Wiring, line: FeedLine, points, ground, braid_at_joint_only=False
) -> tuple[Wiring, ...]:
    """The states of an antenna with its feed line; ``points`` of the line in absolute coordinates [m].

    Raises
    ------
    GeometryError
        Several feeds, a feed on the ground, or a line that does not begin at the feed.
    """
    if len(wiring.feeds) != 1:
        raise fs.GeometryError(f"a feed line needs one feed; this antenna has {len(wiring.feeds)}")
    feed = wiring.feeds[0]
    at = tuple(wiring.conductors[feed.wire].point(feed.position))
    if math.dist(at, points[0]) > AT_THE_FEED:
        raise fs.GeometryError(
            "the feed line begins at ({:.3f}, {:.3f}, {:.3f}) m on the site, but the feed is at "
            "({:.3f}, {:.3f}, {:.3f}) m: its first point must be the feed".format(*points[0], *at)
        )
    if abs(at[2]) < AT_THE_FEED and ground != fs.FREE_SPACE:
        raise fs.GeometryError(
            "the feed line of an antenna that is fed on the ground is not modelled; leave it out"
        )
    sides = _both_sides(_split_at_feed(wiring))
    sides = sides[:1] if braid_at_joint_only else sides
    chain = wires((at, *points[1:]), line.outer_radius, PERFECT)
    grounded = ground_loads(chain, ground, line.ground_connection, "the feed line")
    chokes = {"feed line without choke": (), "feed line with choke": _choke(line)}
    return tuple(
        _joined(side, chain, (*grounded, *choke), f"{state}{where}")
        for state, choke in chokes.items()
        if choke or state.endswith("without choke")
        for side, where in zip(sides, ("",) if len(sides) == 1 else _BRAID, strict=True)
    )


_BRAID = (", braid on the first half", ", braid on the second half")


def _choke(line: FeedLine) -> tuple[fs.Load, ...]:
    return () if line.choke is None else (fs.Load(0, 0.0, impedance=line.choke),)


def _joined(wiring: Wiring, chain, loads, state: str) -> Wiring:
    first = len(wiring.conductors)
    moved = tuple(replace(load, wire=first + load.wire) for load in loads)
    return replace(
        wiring,
        conductors=wiring.conductors + chain,
        loads=wiring.loads + moved,
        state=state,
        feed_line=tuple(range(first, first + len(chain))),
    )


def _split_at_feed(wiring: Wiring) -> Wiring:
    """The same antenna with its feed at the start of a wire that ends at the feed point."""
    feed = wiring.feeds[0]
    i, p = feed.wire, feed.position
    if p in (0.0, 1.0):
        return wiring
    wire = wiring.conductors[i]
    middle = tuple(wire.point(p))
    halves = (replace(wire, end=middle), replace(wire, start=middle))
    return replace(
        wiring,
        conductors=wiring.conductors[:i] + halves + wiring.conductors[i + 1 :],
        feeds=(replace(feed, wire=i + 1, position=0.0),),
        loads=tuple(_load_after_split(load, i, p) for load in wiring.loads),
    )


def _load_after_split(load: fs.Load, i: int, p: float) -> fs.Load:
    if load.wire < i or (load.wire == i and load.position < p):
        position = load.position / p if load.wire == i else load.position
        return replace(load, position=position)
    position = (load.position - p) / (1 - p) if load.wire == i else load.position
    return replace(load, wire=load.wire + 1, position=position)


def _both_sides(wiring: Wiring) -> tuple[Wiring, ...]:
    """Feed gap beyond the joint, and before it: what is joined there goes to the first or the second half.

    The second only where one other end is in the joint; more of them stay together on the braid's side.
    """
    feed = wiring.feeds[0]
    at = wiring.conductors[feed.wire].point(feed.position)
    others = [
        (index, position)
        for index, wire in enumerate(wiring.conductors)
        for position in (0.0, 1.0)
        if (index, position) != (feed.wire, feed.position) and _at_end(wire, position, at)
    ]
    if len(others) != 1:
        return (wiring,)
    wire, position = others[0]
    return wiring, replace(wiring, feeds=(replace(feed, wire=wire, position=position),))


def _at_end(wire: fs.Wire, position: float, at) -> bool:
    return math.dist(wire.point(position), at) < 0.1 * wire.radius
