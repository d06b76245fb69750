"""A straight or drooping wire with one feed: half-wave dipole, inverted V, off-centre-fed wire."""

import math
from dataclasses import dataclass, replace

import fieldsolver as fs
from exposure.antennas.chains import ground_loads, place_on, placed, wires
from exposure.antennas.feed_line import with_feed_line
from exposure.antennas.model import Antenna, Wiring
from exposure.antennas.resonance import half_wave
from exposure.keys.kinds import angle, length, number, wire_size
from exposure.keys.reading import Reading
from exposure.keys.values import HEIGHT, Range

KEYS = (
    length("length", help="of the whole wire; derived from the frequency where only one is used"),
    wire_size(required=True, help="size of the wire"),
    angle(
        "droop",
        Range(0, math.radians(85)),
        default=0.0,
        help="both arms below the horizontal (inverted V)",
    ),
    length("end_height", HEIGHT, help="instead of droop_deg: height of the two ends"),
    number(
        "feed_position",
        allowed=Range(0, 1, low_open=True, high_open=True),
        default=0.5,
        help="fraction of the wire from the end away from the bearing",
    ),
)


@dataclass(frozen=True)
class Dipole:
    """A wire with two equal arms.

    length of the whole wire [m], None until a frequency settles it; droop of the arms below the
    horizontal [rad], or end_height of both ends above ground [m]; feed_position, a fraction of the wire
    from its start, the end away from the bearing; length_note says how a length was derived.
    """

    length: float | None
    wire_radius: float
    droop: float = 0.0
    end_height: float | None = None
    feed_position: float = 0.5
    length_note: str = ""


def shape(reading: Reading) -> Dipole | None:
    """A dipole as a table states it; None where the table has a problem."""
    if reading.has("droop") and reading.has("end_height"):
        reading.wrong("end_height", "state droop_deg or end_height, not both")
    height, end_height = reading["height"], reading["end_height"]
    if None not in (height, end_height) and end_height > height:
        reading.wrong("end_height", "must not be above height: the arms of an inverted V go down")
    if not reading.sound:
        return None
    return Dipole(
        reading["length"],
        reading["wire_radius"],
        reading["droop"],
        end_height,
        reading["feed_position"],
    )


def settled(shape: Dipole, frequency: float) -> Dipole:
    """The same with its length, derived from the one frequency in use where it is not stated."""
    if shape.length is not None:
        return shape
    length, note = half_wave(frequency)
    return replace(shape, length=length, length_note=note)


def wirings(antenna: Antenna, frequency: float, ground) -> tuple[Wiring, ...]:
    """Conductors, the feed, and with a feed line each of its states."""
    shape = antenna.shape
    points = placed(_points(shape, antenna.height), antenna)
    chain = wires(points, shape.wire_radius, antenna.material)
    loads = ground_loads(chain, ground, antenna.ground_connection, f"antenna '{antenna.name}'")
    wire, fraction = place_on(points, shape.feed_position)
    wiring = Wiring(chain, (fs.Feed(wire, fraction),), loads, notes=_notes(antenna))
    if antenna.feed_line is None:
        return (wiring,)
    line = placed(antenna.feed_line.points, antenna)
    return with_feed_line(wiring, antenna.feed_line, line, ground)


def _points(shape: Dipole, height: float):
    """Ends, and the middle where the wire is bent, for bearing 0 about the middle."""
    half, droop = shape.length / 2, shape.droop
    if shape.end_height is not None:
        fall = height - shape.end_height
        if fall >= half:
            raise fs.GeometryError(
                f"the ends are {fall:.3g} m below the middle, but an arm is only {half:.3g} m long"
            )
        droop = math.asin(fall / half)
    along, down = half * math.cos(droop), -half * math.sin(droop)
    middle = ((0.0, 0.0, 0.0),) if droop else ()
    return ((0.0, -along, down), *middle, (0.0, along, down))


def _notes(antenna: Antenna) -> tuple[str, ...]:
    shape = antenna.shape
    notes = (shape.length_note,) if shape.length_note else ()
    if antenna.feed_line is not None:
        return notes
    if shape.feed_position != 0.5:
        return (
            *notes,
            "fed off its middle, the antenna drives current on the outside of its feed line, which the site "
            "file does not describe: fields near the feed line are not assessed",
        )
    return (
        *notes,
        "the outside of the feed line is not modelled: taken as choked and leading away at right angles",
    )
