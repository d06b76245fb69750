"""A station as the searches see it: one function of position, and the rules that turn it into ratios."""

from dataclasses import dataclass, replace

import numpy as np

from exposure.assessment.ratios import Emission, Rule
from exposure.assessment.rules import populations, rule
from exposure.assessment.strengths import FieldStrengths
from exposure.errors import ExposureError
from exposure.site.model import Site, Transmission
from exposure.station.powers import powers
from exposure.station.sources import GeometryError, Model, Piece, Source, SourceError, Sources, reach_of_touch

GENERAL_PUBLIC = "general_public"
PIECE = 0.25  # m, of other metal looked at on its own
LOUD = 0.5  # exposure ratio beside a piece, half of what would make a boundary there


@dataclass(frozen=True)
class Part:
    """One solved antenna at one frequency, the transmissions that use it, and its place in the values."""

    source: Source
    transmissions: tuple[Transmission, ...]
    column: int

    @property
    def columns(self) -> slice:
        """Of the values of the whole scene."""
        return slice(self.column, self.column + 2 * len(self.source.currents))


@dataclass(frozen=True)
class Scene:
    """Parts side by side; unsolved : (name, reason) of transmissions without a solution."""

    site: Site
    parts: tuple[Part, ...]
    unsolved: tuple[tuple[str, str], ...]

    def values(self, points) -> np.ndarray:
        """(n, m) squared strengths per accepted watt of all parts at points (n, 3) [m]."""
        return np.concatenate([part.source.squared_strengths(points) for part in self.parts], axis=1)

    @property
    def strengths(self) -> FieldStrengths:
        """Of all parts."""
        wires = dict.fromkeys(
            axis for part in self.parts for axis in _axes(part.source.model.states[0].conductors)
        )
        shortest = min(part.source.model.wavelength for part in self.parts)
        return FieldStrengths(self.values, _arrays(wires), shortest)

    def loud_strengths(self, rules, factor: float) -> FieldStrengths:
        """The same for boundaries: of other metal only pieces beside which a limit may be reached.

        Around the rest the field is below every limit, so that no boundary is there.
        """
        own = (axis for part in self.parts for axis in _axes(part.source.model.own))
        wires = dict.fromkeys((*own, *self._loud(rules, factor)))
        return replace(self.strengths, conductors=_arrays(wires))

    def places_beside(self) -> np.ndarray:
        """Places as near as touching along all other metal, (k, 3). [m]"""
        found = [places for piece in self._other_metal() for _, places in _beside(piece)]
        return np.concatenate(found) if found else np.zeros((0, 3))

    def _other_metal(self):
        transmitting = {part.source.model.antenna for part in self.parts}
        pieces = dict.fromkeys(piece for part in self.parts for piece in part.source.model.pieces)
        return [piece for piece in pieces if piece.owner not in transmitting]

    def _loud(self, rules, factor: float):
        pairs = [pair for piece in self._other_metal() for pair in _beside(piece)]
        if not pairs:
            return
        values = self.values(np.concatenate([places for _, places in pairs]))
        ratio = np.max([rule.ratio(values) for rule in rules if rule.tests], axis=0)
        for (axis, _), most in zip(pairs, ratio.reshape(len(pairs), -1).max(axis=1), strict=True):
            if factor * most >= LOUD:
                yield axis

    @property
    def emissions(self) -> tuple[Emission, ...]:
        """Of all solved transmissions, in the order of the file."""
        found = {
            transmission.name: _emission(transmission, part, part.column)
            for part in self.parts
            for transmission in part.transmissions
        }
        return tuple(found[t.name] for t in self.site.transmissions if t.name in found)

    def rules(self) -> tuple[Rule, ...]:
        """Of every set and population that somebody here belongs to; the general public always."""
        return tuple(rule(*pair, self.emissions, self.unsolved) for pair in self.pairs())

    def pairs(self):
        """(limits, population) that have levels and matter here, in the order of the file."""
        here = dict.fromkeys([GENERAL_PUBLIC, *(area.population for area in self.site.areas)])
        return [(limits, who) for limits in self.site.limits for who in here if who in populations(limits)]

    def with_source(self, index: int, source: Source) -> "Scene":
        """The same with another solution of one part."""
        parts = list(self.parts)
        parts[index] = replace(parts[index], source=source)
        return replace(self, parts=tuple(parts))


def _beside(piece: Piece):
    """Short pieces of a conductor with places as near as touching, four at its middle and one at each end."""
    start, end = np.asarray(piece.points)
    along = end - start
    count = max(1, int(np.ceil(np.linalg.norm(along) / PIECE)))
    unit = along / np.linalg.norm(along)
    first = np.cross(unit, [0.0, 0.0, 1.0] if abs(unit[2]) < 0.9 else [1.0, 0.0, 0.0])
    first /= np.linalg.norm(first)
    around = reach_of_touch(piece.radius) * np.array(
        [first, -first, np.cross(unit, first), -np.cross(unit, first)]
    )
    for i in range(count):
        low, high = (start + (i + j) / count * along for j in (0, 1))
        places = np.concatenate([0.5 * (low + high) + around, [low + around[0], high + around[1]]])
        places[:, 2] = np.maximum(places[:, 2], 0.0) if min(start[2], end[2]) >= 0 else places[:, 2]
        yield (tuple(low), tuple(high)), places


def own_strengths(part: Part) -> FieldStrengths:
    """Of one part alone, its distances measured from the antenna's own conductors."""
    axes = dict.fromkeys(_axes(part.source.model.own))
    return FieldStrengths(part.source.squared_strengths, _arrays(axes), part.source.model.wavelength)


def beside_other_metal(part: Part) -> np.ndarray:
    """Places as near as touching along all metal that is not the antenna's own, up >= 0, (k, 3). [m]"""
    model = part.source.model
    pieces = (piece for piece in model.pieces if piece.owner != model.antenna)
    found = [places for piece in pieces for _, places in _beside(piece)]
    places = np.concatenate(found) if found else np.zeros((0, 3))
    return places[places[:, 2] >= 0]


def own_rule(pair, part: Part, transmission: Transmission) -> Rule:
    """A set and population for one transmission, on the values of its part alone."""
    return rule(*pair, (_emission(transmission, part, 0),))


def scene(site: Site, sources: Sources, progress) -> Scene:
    """Every transmission solved once for its antenna and frequency.

    Raises
    ------
    ExposureError
        Where conductors cannot be modelled, in the operator's words.
    """
    users, models = {}, {}
    for transmission in site.transmissions:
        users.setdefault((transmission.antenna, transmission.frequency), []).append(transmission)
    parts, unsolved, column = [], [], 0
    for (antenna, frequency), transmissions in users.items():
        progress(f"solving antenna '{antenna}' at {frequency / 1e6:g} MHz")
        try:
            models[antenna] = sources.model(transmissions[0])
            source = sources.source(transmissions[0])
        except GeometryError as error:
            raise ExposureError(_cannot(antenna, frequency, error, models.get(antenna))) from None
        except SourceError as error:
            unsolved += [(t.name, f"no solution was found: {error}") for t in transmissions]
            continue
        parts.append(Part(source, tuple(transmissions), column))
        column += 2 * len(source.currents)
    return Scene(site, tuple(parts), tuple(unsolved))


def _cannot(antenna: str, frequency: float, error, model: Model | None) -> str:
    owners = "" if model is None else f"; conductors are numbered from 0: {_numbered(model)}"
    return f"antenna '{antenna}' at {frequency / 1e6:g} MHz cannot be modelled: {error}{owners}"


def _numbered(model: Model) -> str:
    spans = {}
    for number, piece in enumerate(model.pieces):
        spans.setdefault(piece.owner, []).append(number)
    return ", ".join(
        f"{s[0]}-{s[-1]} '{owner}'" if len(s) > 1 else f"{s[0]} '{owner}'" for owner, s in spans.items()
    )


def _emission(transmission: Transmission, part: Part, column: int) -> Emission:
    return Emission(
        transmission.name,
        transmission.exclusive,
        transmission.frequency,
        powers(transmission),
        column,
        len(part.source.currents),
    )


def _axes(conductors):
    return [(wire.start, wire.end) for wire in conductors]


def _arrays(axes):
    return tuple(np.array(axis) for axis in axes)
