"""Chains of straight wires: how antennas and structures are drawn, and how they meet the ground."""

import math
from itertools import pairwise

import fieldsolver as fs
from exposure.antennas.model import Antenna, Material

TOUCHES = 0.1  # of the radius: an end nearer to up = 0 stands on the ground (docs/site-file.md)
NEAR_CORNER = 1e-6  # of the chain's length: a feed this near to a corner is meant to be on it


def half_space(kind: str, relative_permittivity=None, conductivity=None):
    """The solver's ground for the ground of a site: kind "real", "perfect" or "none"."""
    match kind:
        case "real":
            return fs.LossyGround(relative_permittivity, conductivity)
        case "perfect":
            return fs.PERFECT_GROUND
        case "none":
            return fs.FREE_SPACE
    raise ValueError(kind)


def placed(points, antenna: Antenna) -> tuple[tuple[float, float, float], ...]:
    """Points drawn for bearing 0 about the reference point, turned and moved to the site. [m]

    bearing turns clockwise seen from above, from north towards east.
    """
    c, s = math.cos(antenna.bearing), math.sin(antenna.bearing)
    east, north = antenna.position
    return tuple((east + x * c + y * s, north - x * s + y * c, antenna.height + z) for x, y, z in points)


def wires(points, radius: float, material: Material) -> tuple[fs.Wire, ...]:
    """A chain through the points."""
    return tuple(
        fs.Wire(start, end, radius, material.conductivity, material.relative_permeability)
        for start, end in pairwise(points)
    )


def place_on(points, position: float) -> tuple[int, float]:
    """Wire of a chain, from 0, and fraction of that wire, at a fraction of the whole chain.

    On a corner the start of the next wire.
    """
    lengths = [math.dist(start, end) for start, end in pairwise(points)]
    total = sum(lengths)
    index, left = 0, position * total
    while index < len(lengths) - 1 and left >= lengths[index] - NEAR_CORNER * total:
        left = max(left - lengths[index], 0.0)
        index += 1
    if left < NEAR_CORNER * total:
        return index, 0.0
    return index, 1.0 if left > lengths[index] - NEAR_CORNER * total else left / lengths[index]


def ground_loads(
    chain: tuple[fs.Wire, ...], ground, connection: complex | None, name: str
) -> tuple[fs.Load, ...]:
    """The stated connection to real ground at each end of a chain that stands on it.

    Raises
    ------
    GeometryError
        A wire below the ground, nearer to it than its radius, lying on it, or bent on it; an end
        on real ground without a stated connection; a connection stated where nothing stands on
        real ground.
    """
    if ground != fs.FREE_SPACE:
        for wire in chain:
            _check_clearance(wire, name)
        _check_corners(chain, name)
    ends = [
        (index, position)
        for index, position, point in ((0, 0.0, chain[0].start), (len(chain) - 1, 1.0, chain[-1].end))
        if stands_on_ground(point, chain[index].radius)
    ]
    real = isinstance(ground, fs.LossyGround)
    if ends and real and connection is None:
        raise fs.GeometryError(
            f"{name} stands on real ground (up = 0): how it is joined to the ground must be stated as "
            "ground_connection_ohm (a rod, a screen of radials, a measurement; 0 is taken as ideal). The "
            "bare end of a wire is no connection: let it end at least one radius above the ground instead"
        )
    if connection is not None and not (ends and real):
        why = "none of its ends stands on the ground (up = 0)" if real else "the ground is not real ground"
        raise fs.GeometryError(f"{name} has ground_connection_ohm, but {why}: leave it out")
    return tuple(fs.Load(index, position, impedance=connection) for index, position in ends if real)


def ideal_ground_note(name: str, *connections: complex | None) -> tuple[str, ...]:
    """The note for the report where a connection to real ground is stated as 0 ohm."""
    if any(connection == 0 for connection in connections):
        return (f"the connection of {name} to the ground is stated as 0 ohm: ideal",)
    return ()


def stands_on_ground(point, radius: float) -> bool:
    """Whether an end at this point is on the ground. [m]"""
    return abs(point[2]) < TOUCHES * radius


def _check_clearance(wire: fs.Wire, name: str):
    for point in (wire.start, wire.end):
        up = point[2]
        if up <= -TOUCHES * wire.radius:
            raise fs.GeometryError(
                f"{name} reaches {-up:.3g} m below the ground; buried wires are not modelled"
            )
        if TOUCHES * wire.radius <= up < wire.radius:
            raise fs.GeometryError(
                f"{name} has an end {up:.3g} m above the ground, less than its radius {wire.radius:.3g} m: "
                "let it stand on the ground (up = 0) or end at least one radius above it"
            )
    if stands_on_ground(wire.start, wire.radius) and stands_on_ground(wire.end, wire.radius):
        raise fs.GeometryError(
            f"{name} has a wire lying on the ground: state it as a ground connection instead"
        )


def _check_corners(chain, name: str):
    for wire in chain[:-1]:
        if stands_on_ground(wire.end, wire.radius):
            raise fs.GeometryError(
                f"{name} is bent on the ground: let it end there and begin another conductor"
            )
