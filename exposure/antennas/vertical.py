"""A vertical wire or tube fed at its base: against elevated radials, or against the ground it stands on."""

import math
from dataclasses import dataclass, replace

import fieldsolver as fs
from exposure.antennas.chains import ground_loads, ideal_ground_note, placed, stands_on_ground, wires
from exposure.antennas.feed_line import with_feed_line
from exposure.antennas.model import Antenna, Wiring
from exposure.antennas.resonance import quarter_wave
from exposure.keys.kinds import angle, integer, length, wire_size
from exposure.keys.reading import Reading
from exposure.keys.values import Range

KEYS = (
    length("length", help="of the vertical part; a quarter wave where only one frequency is used"),
    wire_size(required=True, help="size of the vertical part"),
    integer("radials", Range(0, 120), default=0, help="number of elevated radials"),
    length("radial_length", help="of each radial; a quarter wave where only one frequency is used"),
    angle("radial_droop", Range(0, math.radians(85)), default=0.0, help="radials below the horizontal"),
    wire_size("radial_wire_radius", help="size of the radials; as the vertical part unless stated"),
)


@dataclass(frozen=True)
class Vertical:
    """A radiator and its radials.

    length and radial_length [m], None until a frequency settles them; radial_droop below the horizontal
    [rad]; wire_radius, radial_wire_radius [m]; length_note says how lengths were derived.
    """

    length: float | None
    wire_radius: float
    radials: int = 0
    radial_length: float | None = None
    radial_droop: float = 0.0
    radial_wire_radius: float | None = None
    length_note: str = ""


def shape(reading: Reading) -> Vertical | None:
    """A vertical as a table states it; None where the table has a problem."""
    if not reading["radials"] and not (reading.has("radials") and reading["radials"] is None):
        for stem in ("radial_length", "radial_droop", "radial_wire_radius"):
            if reading.has(stem):
                reading.wrong(stem, "there are no radials: state their number, radials")
    if not reading.sound:
        return None
    return Vertical(
        reading["length"],
        reading["wire_radius"],
        reading["radials"],
        reading["radial_length"],
        reading["radial_droop"],
        reading["radial_wire_radius"],
    )


def settled(shape: Vertical, frequency: float) -> Vertical:
    """The same with its lengths, derived from the one frequency in use where they are not stated."""
    derived, note = quarter_wave(frequency)
    notes = [shape.length_note] if shape.length_note else []
    if shape.length is None:
        shape, notes = replace(shape, length=derived), [*notes, f"length {note}"]
    if shape.radials and shape.radial_length is None:
        shape, notes = replace(shape, radial_length=derived), [*notes, f"radials {note}"]
    return replace(shape, length_note="; ".join(notes))


def wirings(antenna: Antenna, frequency: float, ground) -> tuple[Wiring, ...]:
    """Conductors, the feed at the base, and with a feed line each of its states."""
    shape = antenna.shape
    base, name = (0.0, 0.0, 0.0), f"antenna '{antenna.name}'"
    on_ground = ground != fs.FREE_SPACE and stands_on_ground((0, 0, antenna.height), shape.wire_radius)
    _check_counterpoise(shape, on_ground, name)
    mast = wires(placed((base, (0.0, 0.0, shape.length)), antenna), shape.wire_radius, antenna.material)
    tips = placed(_tips(shape), antenna)
    radials = tuple(
        wire
        for tip in tips
        for wire in wires(
            (mast[0].start, tip), shape.radial_wire_radius or shape.wire_radius, antenna.material
        )
    )
    loads = ground_loads(mast, ground, antenna.ground_connection, name)
    for radial in radials:
        ground_loads((radial,), ground, None, f"a radial of {name}")
    wiring = Wiring(mast + radials, (fs.Feed(0, 0.0),), loads, notes=_notes(antenna))
    if antenna.feed_line is None:
        return (wiring,)
    line = placed(antenna.feed_line.points, antenna)
    return with_feed_line(wiring, antenna.feed_line, line, ground, braid_at_joint_only=True)


def _tips(shape: Vertical):
    along = (shape.radial_length or 0.0) * math.cos(shape.radial_droop)
    down = -(shape.radial_length or 0.0) * math.sin(shape.radial_droop)
    angles = [2 * math.pi * index / shape.radials for index in range(shape.radials)]
    return tuple((along * math.sin(a), along * math.cos(a), down) for a in angles)


def _check_counterpoise(shape: Vertical, on_ground: bool, name: str):
    if on_ground and shape.radials:
        raise fs.GeometryError(
            f"{name} has radials on the ground, which are not modelled as wires: leave out radials and state "
            "the impedance of the radial screen as ground_connection_ohm"
        )
    if not on_ground and not shape.radials:
        raise fs.GeometryError(
            f"{name} has nothing to be fed against: give it radials, or let it stand on the ground (height 0)"
        )


def _notes(antenna: Antenna) -> tuple[str, ...]:
    shape = antenna.shape
    notes = (shape.length_note,) if shape.length_note else ()
    if antenna.feed_line is None:
        notes += (
            "a vertical drives current on the outside of its feed line, which the site file does not "
            "describe: fields near the feed line are not assessed",
        )
    return notes + ideal_ground_note(f"antenna '{antenna.name}'", antenna.ground_connection)
