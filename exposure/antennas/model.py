"""An antenna as its owner knows it, and the same antenna as conductors and feeds."""

from dataclasses import dataclass

import fieldsolver


@dataclass(frozen=True)
class Material:
    """A conductor's material. conductivity [S/m] (inf: perfect), relative permeability [1]."""

    name: str
    conductivity: float
    relative_permeability: float = 1.0


@dataclass(frozen=True)
class FeedLine:
    """The outside of a coaxial line as metal, from the feed downwards.

    points : ((east, north, up), ...) relative to the antenna's position and height, turned with it [m]
    outer_radius [m]; choke : impedance of a choke at the feed [ohm], None without one;
    ground_connection : where its far end stands on real ground [ohm], None where none is stated.
    """

    points: tuple[tuple[float, float, float], ...]
    outer_radius: float
    choke: complex | None = None
    ground_connection: complex | None = None


@dataclass(frozen=True)
class Antenna:
    """One antenna of a station.

    position : (east, north) of the reference point [m]; height of the reference point [m];
    bearing : clockwise from north [rad]; shape : the kind's own frozen facts (e.g. ``Dipole``);
    ground_connection : impedance of the connection to real ground [ohm], None where none is stated.
    """

    name: str
    kind: str
    position: tuple[float, float]
    height: float
    bearing: float
    shape: object
    material: Material
    feed_line: FeedLine | None = None
    ground_connection: complex | None = None


@dataclass(frozen=True)
class Structure:
    """Passive metal in absolute coordinates: a mast, guy, fence, gutter.

    points : ((east, north, up), ...) a chain of straight wires [m]; wire_radius [m].
    """

    name: str
    points: tuple[tuple[float, float, float], ...]
    wire_radius: float
    material: Material
    ground_connection: complex | None = None


@dataclass(frozen=True)
class Wiring:
    """What the solver is given for one antenna or structure, in absolute coordinates.

    conductors : tuple of fieldsolver conductors; feeds and loads index into them.
    state : which of an antenna's possible states this is ("as built", "feed line choked", ...).
    notes : what was assumed, for the report.
    feed_line : indices of the conductors that are the outside of a feed line.
    """

    conductors: tuple
    feeds: tuple[fieldsolver.Feed, ...] = ()
    loads: tuple[fieldsolver.Load, ...] = ()
    state: str = "as built"
    notes: tuple[str, ...] = ()
    feed_line: tuple[int, ...] = ()
