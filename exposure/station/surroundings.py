"""Which other metal of a site belongs into a solve, and which is too far to matter.

A structure or another antenna is left out only if its nearest point is farther than the larger of a
wavelength and 10 m from the transmitting antenna and from every area.  Other antennas carry no power;
their feeds are once open and once short, and the worse counts.
"""

from dataclasses import dataclass, replace

import numpy as np
import shapely

import fieldsolver as fs
from exposure.antennas.catalogue import structure_wiring, wirings
from exposure.antennas.model import Wiring
from exposure.site.model import Area, Site

LEAST_REACH = 10.0  # m
OPEN = 1e7  # ohm: a thousand times the reactance of a picofarad at 14 MHz
SAMPLES = 65  # places along a wire


@dataclass(frozen=True)
class Surroundings:
    """Other conductors of a solve.

    parts : (name, role, Wiring) without feeds; roles "structure" and "antenna";
    states : words for the states of other feeds; left_out : text for the report.
    """

    parts: tuple
    left_out: tuple[str, ...]

    @property
    def others(self) -> bool:
        """Whether other antennas are among them."""
        return any(role == "antenna" for _, role, _ in self.parts)

    def states(self):
        """The parts once with every other feed open, once with every one short: (words, wirings)."""
        if not self.others:
            return (("", tuple(wiring for *_, wiring in self.parts)),)
        return tuple(
            (f", other antennas' feeds {words}", tuple(make(wiring) for *_, wiring in self.parts))
            for words, make in (("open", _opened), ("short", _shorted))
        )


def surroundings(site: Site, antenna: str, own, frequency: float, wavelength: float, ground) -> Surroundings:
    """Everything but the transmitting antenna `antenna` with conductors `own`, near enough to matter."""
    reach = max(wavelength, LEAST_REACH)
    kept, left_out = [], []
    for name, role, wiring in _others(site, antenna, frequency, ground):
        distance = nearest(wiring.conductors, own, site.areas)
        if distance > reach:
            left_out.append(
                f"{role} '{name}' at {frequency / 1e6:g} MHz: {distance:.1f} m or more from antenna "
                f"'{antenna}' and from every area, farther than {reach:.1f} m"
            )
        else:
            kept.append((name, role, wiring))
    return Surroundings(tuple(kept), tuple(left_out))


def _others(site: Site, antenna: str, frequency: float, ground):
    for structure in site.structures:
        yield structure.name, "structure", structure_wiring(structure, ground)
    for other in site.antennas:
        if other.name != antenna:
            yield other.name, "antenna", wirings(other, frequency, ground)[0]


def _opened(wiring: Wiring) -> Wiring:
    gaps = tuple(fs.Load(feed.wire, feed.position, impedance=OPEN) for feed in wiring.feeds)
    return replace(wiring, feeds=(), loads=wiring.loads + gaps)


def _shorted(wiring: Wiring) -> Wiring:
    return replace(wiring, feeds=())


def nearest(conductors, own, areas: tuple[Area, ...]) -> float:
    """A lower bound of the distance from conductors to the antenna's own and to every area. [m]"""
    places = np.linspace(0, 1, SAMPLES)
    points = np.concatenate([wire.point(places) for wire in conductors])
    slack = max(wire.length for wire in conductors) / (2 * (SAMPLES - 1))
    found = [_to_wire(points, wire) for wire in own]
    found += [_to_area(points, area) for area in areas]
    return max(min(found) - slack, 0.0)


def _to_wire(points, wire) -> float:
    start = np.asarray(wire.start)
    along = np.asarray(wire.end) - start
    fraction = np.clip((points - start) @ along / (along @ along), 0, 1)
    return float(np.linalg.norm(points - start - fraction[:, None] * along, axis=1).min())


def _to_area(points, area: Area) -> float:
    plan = shapely.distance(_outline(area), shapely.points(points[:, :2])) - 0.5 * (area.width or 0.0)
    rise = np.maximum(np.maximum(area.bottom - points[:, 2], points[:, 2] - area.top), 0.0)
    return float(np.hypot(np.maximum(plan, 0.0), rise).min())


def _outline(area: Area):
    shapes = {"point": shapely.Point, "path": shapely.LineString, "polygon": shapely.Polygon}
    return shapes[area.shape](area.corners[0] if area.shape == "point" else area.corners)
