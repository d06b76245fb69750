"""A transmission as a source of fields: squared strengths at points, per accepted watt, for every state.

An antenna has states (feed line with and without choke, other antennas' feeds open and short); each is
solved with everything that is near, once per frequency and ground, and scaled to an accepted power of
1 W.  Power, line loss and duty never enter here.
"""

from dataclasses import dataclass, field, replace

import numpy as np

import fieldsolver as fs
from exposure.antennas.catalogue import wirings
from exposure.antennas.chains import half_space
from exposure.antennas.model import Wiring
from exposure.site.model import Site, Transmission
from exposure.station.surroundings import Surroundings, surroundings
from fieldsolver.constants import SPEED_OF_LIGHT

SourceError = fs.FieldSolverError  # for rows that do not know the solver
GeometryError = fs.GeometryError
POINTS_AT_ONCE = 20_000
BESIDE_RADII, BESIDE = 3.01, 0.05  # radii, and m, from the axis of other metal: nearer is touching it


@dataclass(frozen=True)
class State:
    """One state of an antenna among its surroundings, as the solver is given it."""

    words: str
    conductors: tuple
    feeds: tuple
    loads: tuple


@dataclass(frozen=True)
class Piece:
    """A conductor for drawings: its owner's name, its axis and radius [m].

    role : "antenna", "structure" or "feed line".
    """

    owner: str
    role: str
    points: tuple
    radius: float


@dataclass(frozen=True)
class Model:
    """What is solved for one antenna at one frequency, before it is solved.

    own : conductors of the antenna itself, feed line included, of its first state;
    pieces : all conductors, for drawings.
    """

    antenna: str
    frequency: float
    ground: object
    states: tuple[State, ...]
    own: tuple
    pieces: tuple[Piece, ...]
    notes: tuple[str, ...]
    left_out: tuple[str, ...]

    @property
    def wavelength(self) -> float:
        """In air. [m]"""
        return SPEED_OF_LIGHT / self.frequency


@dataclass(frozen=True)
class Source:
    """Solved states of one antenna at one frequency, each scaled to 1 W accepted.

    segments_per_wavelength : of the mesh; None is the solver's own choice.
    """

    model: Model
    currents: tuple
    segments_per_wavelength: float | None = None

    @property
    def states(self) -> tuple[str, ...]:
        """Words for the states."""
        return tuple(state.words for state in self.model.states)

    @property
    def feed_impedances(self) -> tuple[complex, ...]:
        """With all drives on, of all feeds of the first state. [ohm]"""
        return tuple(complex(z) for z in self.currents[0].feed_impedances)

    @property
    def unknowns(self) -> int:
        """Of the largest state."""
        return max(currents.unknowns for currents in self.currents)

    @property
    def warnings(self) -> tuple[str, ...]:
        """What the solver noticed, each once."""
        return tuple(dict.fromkeys(text for currents in self.currents for text in currents.warnings))

    def squared_strengths(self, points) -> np.ndarray:
        """E^2 and H^2 of each state side by side, (n, 2 * states), per accepted watt.

        points (n, 3) [m].  Rms, [V^2/m^2] and [A^2/m^2] per watt; inf within three radii of the
        antenna's conductors, and below ground.  Nearer to other metal than `reach_of_touch` the field
        is that just there.
        """
        points = self._beside(np.asarray(points, dtype=float).reshape(-1, 3))
        return np.concatenate([squared_strengths(currents, points) for currents in self.currents], axis=1)

    def _beside(self, points) -> np.ndarray:
        """Points with those that touch other metal moved straight out of reach."""
        for piece in self.model.pieces:
            if piece.owner != self.model.antenna:
                points = moved_out(points, *np.asarray(piece.points), reach_of_touch(piece.radius))
        return points

    def qualities(self) -> tuple:
        """Power balance and boundary residual of every state."""
        return tuple(fs.quality(currents) for currents in self.currents)

    def of_state(self, index: int) -> "Source":
        """The same with one state only."""
        model = replace(self.model, states=(self.model.states[index],))
        return Source(model, (self.currents[index],), self.segments_per_wavelength)


@dataclass(frozen=True)
class Sources:
    """Models and solutions of a site, each made once; the memory is that of this value."""

    site: Site
    _models: dict = field(default_factory=dict)
    _solved: dict = field(default_factory=dict)

    def model(self, transmission: Transmission) -> Model:
        """What is solved for a transmission."""
        key = (transmission.antenna, transmission.frequency)
        if key not in self._models:
            self._models[key] = model(transmission, self.site)
        return self._models[key]

    def source(self, transmission: Transmission, segments_per_wavelength: float | None = None) -> Source:
        """Its solution with a mesh.

        Raises
        ------
        GeometryError, SolutionError
            Of the solver.
        """
        key = (transmission.antenna, transmission.frequency, segments_per_wavelength)
        if key not in self._solved:
            self._solved[key] = solved(self.model(transmission), segments_per_wavelength)
        return self._solved[key]


def source(transmission: Transmission, site: Site) -> Source:
    """The source of a transmission, on its own."""
    return Sources(site).source(transmission)


def solved(model: Model, segments_per_wavelength: float | None = None) -> Source:
    """Every state of a model, solved and scaled to 1 W."""
    currents = tuple(
        fs.solve(
            state.conductors,
            state.feeds,
            model.frequency,
            model.ground,
            state.loads,
            segments_per_wavelength,
        ).scaled_to(1.0)
        for state in model.states
    )
    return Source(model, currents, segments_per_wavelength)


def model(transmission: Transmission, site: Site) -> Model:
    """Conductors, feeds and loads of all states of a transmission's antenna among its surroundings."""
    antenna = next(a for a in site.antennas if a.name == transmission.antenna)
    place = site.ground
    ground = half_space(place.kind, place.relative_permittivity, place.conductivity)
    frequency = transmission.frequency
    own = wirings(antenna, frequency, ground)
    near = surroundings(site, antenna.name, own[0].conductors, frequency, SPEED_OF_LIGHT / frequency, ground)
    states = tuple(
        _state(wiring.state + words, (wiring, *others)) for wiring in own for words, others in near.states()
    )
    return Model(
        antenna.name,
        frequency,
        ground,
        states,
        own[0].conductors,
        _pieces(antenna.name, own[0], near),
        _notes(own, near),
        near.left_out,
    )


def squared_strengths(currents, points) -> np.ndarray:
    """(n, 2) E^2 [V^2/m^2] and H^2 [A^2/m^2] of currents at points (n, 3) [m]; inf where none is given."""
    points = np.asarray(points, dtype=float).reshape(-1, 3)
    parts = [
        _strengths(currents, points[i : i + POINTS_AT_ONCE]) for i in range(0, len(points), POINTS_AT_ONCE)
    ]
    return np.concatenate(parts) if parts else np.zeros((0, 2))


def _strengths(currents, points) -> np.ndarray:
    result = np.full((len(points), 2), np.inf)
    given = np.ones(len(points), bool)
    try:
        fields = fs.near_field(currents, points)
    except fs.PointError as error:
        given = ~error.mask
        if not given.any():
            return result
        fields = fs.near_field(currents, points[given])
    result[given] = np.column_stack([_square(fields.electric), _square(fields.magnetic)])
    return result


def _square(vectors) -> np.ndarray:
    return (vectors.real**2 + vectors.imag**2).sum(axis=1)


def reach_of_touch(radius: float) -> float:
    """How near to the axis of passive metal a place counts as touching it. [m]

    Levels of the undisturbed field do not speak of the last centimetres beside a wire that carries
    induced current: the field there rises as one over the distance, and what a hand feels is contact
    current.  Measuring practice keeps 20 cm away from such metal (IEEE C95.3, from memory).
    """
    return max(BESIDE_RADII * radius, BESIDE)


def moved_out(points, start, end, distance: float) -> np.ndarray:
    """Points (n, 3), those nearer than a distance to the axis from start to end moved out to it. [m]"""
    along = end - start
    offset = points - start
    fraction = np.clip(offset @ along / (along @ along), 0, 1)
    aside = offset - fraction[:, None] * along
    away = np.linalg.norm(aside, axis=1)
    close = away < distance
    if not close.any():
        return points
    level = np.array([along[1], -along[0], 0.0]) if np.hypot(*along[:2]) > 0 else np.array([1.0, 0.0, 0.0])
    aside[away < 1e-9] = level
    unit = aside[close] / np.linalg.norm(aside[close], axis=1)[:, None]
    moved = points.copy()
    moved[close] = start + fraction[close, None] * along + distance * unit
    moved[:, 2] = np.where(points[:, 2] >= 0, np.maximum(moved[:, 2], 0.0), moved[:, 2])
    return moved


def _state(words: str, wirings_: tuple[Wiring, ...]) -> State:
    conductors, feeds, loads = (), (), ()
    for wiring in wirings_:
        first = len(conductors)
        feeds += tuple(replace(feed, wire=first + feed.wire) for feed in wiring.feeds)
        loads += tuple(replace(load, wire=first + load.wire) for load in wiring.loads)
        conductors += wiring.conductors
    return State(words, conductors, feeds, loads)


def _pieces(antenna: str, own: Wiring, near: Surroundings) -> tuple[Piece, ...]:
    parts = (("antenna", antenna, own), *((role, name, wiring) for name, role, wiring in near.parts))
    return tuple(
        Piece(name, "feed line" if i in wiring.feed_line else role, (wire.start, wire.end), wire.radius)
        for role, name, wiring in parts
        for i, wire in enumerate(wiring.conductors)
    )


def _notes(own: tuple[Wiring, ...], near: Surroundings) -> tuple[str, ...]:
    notes = [note for wiring in own for note in wiring.notes]
    notes += [note for *_, wiring in near.parts for note in wiring.notes]
    others = [f"'{name}'" for name, role, _ in near.parts if role == "antenna"]
    if others:
        notes.append(
            f"other antennas in the solve: {', '.join(others)}; their feeds once open and once short, the "
            "worse counts, their feed lines as in their first state"
        )
    structures = [f"'{name}'" for name, role, _ in near.parts if role == "structure"]
    if structures:
        notes.append(f"structures in the solve: {', '.join(structures)}")
    return tuple(dict.fromkeys(notes))
