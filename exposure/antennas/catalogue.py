"""The kinds of antenna: their keys in a site file, their shape, and how they become conductors."""

from collections.abc import Callable
from dataclasses import dataclass, replace

from exposure.antennas import conductors, dipole, vertical
from exposure.antennas.materials import MATERIAL_KEYS, material
from exposure.antennas.model import Antenna, FeedLine, Wiring
from exposure.antennas.structures import structure_wiring
from exposure.keys.kinds import (
    Key,
    SubTable,
    angle,
    choice,
    impedance,
    length,
    point,
    points,
    text,
    wire_size,
)
from exposure.keys.reading import Reading
from exposure.keys.values import DISTANCE

__all__ = [
    "KINDS",
    "Kind",
    "antenna",
    "keys_of",
    "settled",
    "structure_wiring",
    "variant",
    "wirings",
]


@dataclass(frozen=True)
class Kind:
    """One kind of antenna.

    keys : its own, beside the common ones; needs : stems of common keys that it cannot do without;
    shape : Reading -> frozen facts or None; settled : (shape, frequency [Hz]) -> shape without open
    lengths; wirings : (Antenna, frequency [Hz], fieldsolver ground) -> its states.
    """

    id: str
    summary: str
    keys: tuple[Key | SubTable, ...]
    needs: tuple[str, ...]
    shape: Callable
    settled: Callable
    wirings: Callable


KINDS = {
    kind.id: kind
    for kind in (
        Kind(
            "dipole",
            "a straight wire, or an inverted V, with one feed",
            dipole.KEYS,
            ("position", "height", "bearing"),
            dipole.shape,
            dipole.settled,
            dipole.wirings,
        ),
        Kind(
            "vertical",
            "a vertical wire or tube fed at its base, with elevated radials or standing on the ground",
            vertical.KEYS,
            ("position", "height"),
            vertical.shape,
            vertical.settled,
            vertical.wirings,
        ),
        Kind(
            "conductors",
            "any straight wires, drawn point by point, with feeds and loads",
            conductors.KEYS,
            (),
            conductors.shape,
            conductors.settled,
            conductors.wirings,
        ),
    )
}

FEED_LINE_KEYS = (
    points(
        "points",
        "east, north, up",
        2,
        required=True,
        help="from the feed to the far end, relative to the antenna's position and height and turned with it",
    ),
    wire_size("outer_radius", required=True, help="size of the outside of the cable's braid"),
    impedance("choke", help="of a choke at the feed [ohm]; solved with and without it, the worse counts"),
    impedance("ground_connection", help="where the far end stands on real ground [ohm]"),
)

COMMON_KEYS = (
    text("name", required=True, help="what the antenna is called; no two alike"),
    choice("kind", KINDS, "kind of antenna", required=True, help="one of the kinds of this list"),
    point("position", "east, north", default=(0.0, 0.0), help="of the reference point"),
    length("height", DISTANCE, default=0.0, help="of the reference point above ground"),
    angle("bearing", default=0.0, help="clockwise from true north"),
    *MATERIAL_KEYS,
    impedance(
        "ground_connection",
        help="where a wire stands on real ground [ohm]: a number or [resistance, reactance]",
    ),
    SubTable("feed_line", FEED_LINE_KEYS, help="the outside of the coaxial feed line as metal"),
)


def keys_of(kind) -> tuple[Key | SubTable, ...]:
    """All keys of an antenna of a kind; of every kind, none required, where the kind is not known."""
    if isinstance(kind, str) and kind in KINDS:
        needs = KINDS[kind].needs
        common = tuple(replace(key, required=key.required or key.stem in needs) for key in COMMON_KEYS)
        return common + KINDS[kind].keys
    own = {key.stem: replace(key, required=False) for known in KINDS.values() for key in known.keys}
    return COMMON_KEYS + tuple(own.values())


def variant(raw: dict):
    """Keys of an antenna's table, and the words for them."""
    kind = raw.get("kind")
    known = isinstance(kind, str) and kind in KINDS
    return keys_of(kind), f' of kind "{kind}"' if known else ""


def antenna(reading: Reading) -> Antenna | None:
    """The antenna that a table states; None where the table has a problem."""
    if reading["kind"] is None:
        return None
    made_of = material(reading)
    line = _feed_line(reading["feed_line"])
    shape = KINDS[reading["kind"]].shape(reading)
    if not reading.sound or shape is None:
        return None
    stems = ("name", "kind", "position", "height", "bearing")
    return Antenna(*(reading[stem] for stem in stems), shape, made_of, line, reading["ground_connection"])


def settled(antenna: Antenna, frequency: float) -> Antenna:
    """The antenna with every length that was left open, derived from the one frequency in use [Hz]."""
    return replace(antenna, shape=KINDS[antenna.kind].settled(antenna.shape, frequency))


def wirings(antenna: Antenna, frequency: float, ground) -> tuple[Wiring, ...]:
    """An antenna's possible states as conductors, feeds and loads in absolute coordinates.

    frequency [Hz]; ground: fieldsolver's.  The worst state counts.

    Raises
    ------
    fieldsolver.GeometryError
        What the model cannot represent, in the operator's words.
    """
    return KINDS[antenna.kind].wirings(antenna, frequency, ground)


def _feed_line(reading: Reading | None) -> FeedLine | None:
    if reading is None or not reading.sound:
        return None
    stems = ("points", "outer_radius", "choke", "ground_connection")
    return FeedLine(*(reading[stem] for stem in stems))
