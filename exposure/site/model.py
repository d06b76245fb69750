"""A station and the places around it, as plain frozen facts in SI units."""

import datetime
from dataclasses import dataclass
from typing import Literal

from exposure.antennas.model import Antenna, Structure

Population = Literal["general_public", "occupational"]
Point2 = tuple[float, float]
Point3 = tuple[float, float, float]


@dataclass(frozen=True)
class Place:
    """Georeference of the local origin (WGS84). [degrees]"""

    latitude_deg: float
    longitude_deg: float


@dataclass(frozen=True)
class Ground:
    """The ground: kind, its constants [1], [S/m], and the words of the site file."""

    kind: Literal["real", "perfect", "none"]
    name: str
    relative_permittivity: float | None = None
    conductivity: float | None = None


@dataclass(frozen=True)
class Line:
    """A transmission line: loss [dB] where stated, or cable and length [m] to compute it from."""

    loss_db: float | None = None
    cable: str | None = None
    length: float | None = None


@dataclass(frozen=True)
class Transmission:
    """One emission of one antenna.

    peak_envelope_power : at the transmitter's output [W]; duty_factor : mean over peak envelope
    power of the mode while transmitting, with its source text; transmit_time and receive_time :
    repeating on/off pattern [s], None for continuous; exclusive : of the transmissions that share
    this word one runs at a time.
    """

    name: str
    antenna: str
    frequency: float
    peak_envelope_power: float
    power_statement: str
    duty_factor: float
    duty_source: str
    mode: str | None = None
    transmit_time: float | None = None
    receive_time: float | None = None
    exclusive: str | None = None
    line: Line | None = None


@dataclass(frozen=True)
class Area:
    """A place where people are.

    shape : "polygon" (corners in plan), "point" (one corner, bottom = top), or "path"
    (centre line and width [m]); bottom and top above ground [m].
    informed : who was informed and when; required for occupational areas.
    """

    name: str
    population: Population
    shape: Literal["polygon", "point", "path"]
    corners: tuple[Point2, ...]
    bottom: float
    top: float
    width: float | None = None
    insulated_floor: bool = False
    informed: str | None = None


@dataclass(frozen=True)
class Site:
    """Everything the site file says."""

    name: str
    file: str
    sha256: str
    text: str
    limits: tuple[str, ...]
    decision: Literal["upper_bound", "best_estimate", "margin"]
    margin: float | None
    spatial: Literal["peak", "body_average"]
    date: datetime.date | None
    operator: str | None
    licence: str | None
    place: Place | None
    ground: Ground
    property_corners: tuple[Point2, ...] | None
    antennas: tuple[Antenna, ...]
    structures: tuple[Structure, ...]
    transmissions: tuple[Transmission, ...]
    areas: tuple[Area, ...]
