"""An antenna drawn by its owner: chains of straight wires with feeds and loads."""

import cmath
from dataclasses import dataclass, replace

import fieldsolver as fs
from exposure.antennas.chains import (
    ground_loads,
    ideal_ground_note,
    place_on,
    placed,
    stands_on_ground,
    wires,
)
from exposure.antennas.feed_line import with_feed_line
from exposure.antennas.materials import MATERIAL_KEYS, material
from exposure.antennas.model import Antenna, Material, Wiring
from exposure.keys.kinds import SubTable, angle, choice, impedance, integer, number, points, wire_size
from exposure.keys.reading import Reading
from exposure.keys.values import FRACTION, NOT_NEGATIVE, POSITIVE, Range

_WHICH = "number of the conductor, 1 for the first"
_WHERE = "fraction of the whole chain's length from its first point; may fall on a corner"

CONDUCTOR_KEYS = (
    points(
        "points",
        "east, north, up",
        2,
        required=True,
        help="a chain of straight wires, relative to the antenna",
    ),
    wire_size(required=True, help="size of the wires"),
    *MATERIAL_KEYS,
    impedance(
        "ground_connection",
        help="where an end stands on real ground [ohm]: a number or [resistance, reactance]",
    ),
)
FEED_KEYS = (
    integer("conductor", Range(1), required=True, help=_WHICH),
    number("position", allowed=FRACTION, required=True, help=_WHERE),
    number("relative_voltage", allowed=NOT_NEGATIVE, help="of this feed, for arrays; 1 unless stated"),
    number("relative_current", allowed=NOT_NEGATIVE, help="instead of relative_voltage"),
    angle("phase", default=0.0, help="of that voltage or current"),
)
LOAD_KEYS = (
    integer("conductor", Range(1), required=True, help=_WHICH),
    number("position", allowed=FRACTION, required=True, help=_WHERE),
    number("resistance", {"resistance_ohm": 1.0}, NOT_NEGATIVE, help="[ohm]"),
    number("inductance", {"inductance_uh": 1e-6}, NOT_NEGATIVE, help="[microhenry]"),
    number("capacitance", {"capacitance_pf": 1e-12}, POSITIVE, help="[picofarad]"),
    choice(
        "connection",
        ("series", "parallel"),
        default="series",
        help="of these to each other",
    ),
)
KEYS = (
    SubTable("conductor", CONDUCTOR_KEYS, many=True, required=True, help="a chain of straight wires"),
    SubTable("feed", FEED_KEYS, many=True, required=True, help="where power goes in"),
    SubTable("load", LOAD_KEYS, many=True, help="a lumped impedance in series with a wire"),
)


@dataclass(frozen=True)
class Chain:
    """points relative to the antenna, for bearing 0 [m]; wire_radius [m]; None: as the antenna says."""

    points: tuple[tuple[float, float, float], ...]
    wire_radius: float
    material: Material | None = None
    ground_connection: complex | None = None


@dataclass(frozen=True)
class ChainFeed:
    """conductor from 0; position on the whole chain [1]; voltage [V], or current [A]."""

    conductor: int
    position: float
    voltage: complex = 1.0
    current: complex | None = None


@dataclass(frozen=True)
class ChainLoad:
    """conductor from 0; position on the chain [1]; resistance [ohm], inductance [H], capacitance [F]."""

    conductor: int
    position: float
    resistance: float
    inductance: float
    capacitance: float | None
    connection: str


@dataclass(frozen=True)
class Conductors:
    """The drawing."""

    chains: tuple[Chain, ...]
    feeds: tuple[ChainFeed, ...]
    loads: tuple[ChainLoad, ...] = ()


def shape(reading: Reading) -> Conductors | None:
    """The drawing as a table states it; None where the table has a problem."""
    chains, feeds, loads = (reading[stem] or () for stem in ("conductor", "feed", "load"))
    for part in (*feeds, *loads):
        if part["conductor"] is not None and part["conductor"] > len(chains) > 0:
            part.wrong(
                "conductor", f"there is no conductor {part['conductor']}; this antenna has {len(chains)}"
            )
    _check_drives(feeds)
    for load in loads:
        if not any(load.has(stem) for stem in ("resistance", "inductance", "capacitance")):
            load.wrong("resistance", "a load needs resistance_ohm, inductance_uh or capacitance_pf")
    drawn = tuple(_chain(chain) for chain in chains)
    if not reading.sound:
        return None
    return Conductors(drawn, tuple(_feed(feed) for feed in feeds), tuple(_load(load) for load in loads))


def settled(shape: Conductors, frequency: float) -> Conductors:
    """Itself: nothing is left open."""
    return shape


def wirings(antenna: Antenna, frequency: float, ground) -> tuple[Wiring, ...]:
    """Conductors, feeds and loads, and with a feed line each of its states."""
    shape, name = antenna.shape, f"antenna '{antenna.name}'"
    drawn = [placed(chain.points, antenna) for chain in shape.chains]
    conductors, loads, first, unused = (), (), [], antenna.ground_connection is not None
    for number_, (chain, chain_points) in enumerate(zip(shape.chains, drawn, strict=True), 1):
        made = wires(chain_points, chain.wire_radius, chain.material or antenna.material)
        connection = chain.ground_connection
        if connection is None and _touches(made, ground):
            connection, unused = antenna.ground_connection, False
        grounded = ground_loads(made, ground, connection, f"conductor {number_} of {name}")
        first.append(len(conductors))
        loads += tuple(replace(load, wire=first[-1] + load.wire) for load in grounded)
        conductors += made
    if unused:
        raise fs.GeometryError(
            f"{name} has ground_connection_ohm, but none of its conductors uses it: leave it out"
        )
    feeds = tuple(
        fs.Feed(*_on_chain(feed, drawn, first), voltage=feed.voltage, current=feed.current)
        for feed in shape.feeds
    )
    loads += tuple(_solver_load(load, drawn, first) for load in shape.loads)
    wiring = Wiring(conductors, feeds, loads, notes=_notes(antenna))
    if antenna.feed_line is None:
        return (wiring,)
    return with_feed_line(wiring, antenna.feed_line, placed(antenna.feed_line.points, antenna), ground)


def _touches(made, ground) -> bool:
    ends = (made[0].start, made[-1].end)
    return isinstance(ground, fs.LossyGround) and any(stands_on_ground(end, made[0].radius) for end in ends)


def _on_chain(part, drawn, first) -> tuple[int, float]:
    wire, fraction = place_on(drawn[part.conductor], part.position)
    return first[part.conductor] + wire, fraction


def _solver_load(load: ChainLoad, drawn, first) -> fs.Load:
    return fs.Load(
        *_on_chain(load, drawn, first),
        resistance=load.resistance,
        inductance=load.inductance,
        capacitance=load.capacitance,
        connection=load.connection,
    )


def _notes(antenna: Antenna) -> tuple[str, ...]:
    connections = (chain.ground_connection for chain in antenna.shape.chains)
    notes = ideal_ground_note(f"antenna '{antenna.name}'", antenna.ground_connection, *connections)
    if antenna.feed_line is not None:
        return notes
    return (
        *notes,
        "the outside of the feed line is not modelled: where the antenna is not balanced about its feed, or "
        "no choke is fitted, fields near the feed line are not assessed",
    )


def _chain(reading: Reading) -> Chain | None:
    own = material(reading, default=None)
    if not reading.sound:
        return None
    return Chain(reading["points"], reading["wire_radius"], own, reading["ground_connection"])


def _check_drives(feeds):
    for feed in feeds:
        if feed.has("relative_voltage") and feed.has("relative_current"):
            feed.wrong("relative_current", "state relative_voltage or relative_current, not both")
    by_current = [feed.has("relative_current") for feed in feeds]
    if any(by_current) and not all(by_current):
        first = feeds[by_current.index(False)]
        first.wrong(
            "relative_voltage",
            "all feeds of an antenna state relative_current, or none: they are relative to each other",
        )
    if feeds and all(_drive(feed) == 0 for feed in feeds):
        feeds[0].wrong("relative_voltage", "no feed of this antenna drives anything: all are 0")


def _drive(feed: Reading) -> float | None:
    stem = "relative_current" if feed.has("relative_current") else "relative_voltage"
    return feed[stem]


def _feed(feed: Reading) -> ChainFeed:
    amount = _drive(feed)
    drive = cmath.rect(1.0 if amount is None else amount, feed["phase"])
    place = feed["conductor"] - 1, feed["position"]
    return (
        ChainFeed(*place, current=drive) if feed.has("relative_current") else ChainFeed(*place, voltage=drive)
    )


def _load(load: Reading) -> ChainLoad:
    return ChainLoad(
        load["conductor"] - 1,
        load["position"],
        load["resistance"] or 0.0,
        load["inductance"] or 0.0,
        load["capacitance"],
        load["connection"],
    )
