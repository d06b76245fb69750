"""Whether conductors can be modelled, found without solving: for messages about a site file."""

from itertools import combinations

import fieldsolver as fs
from exposure.antennas.catalogue import structure_wiring, wirings
from exposure.antennas.model import Antenna, Structure, Wiring
from fieldsolver.constants import SPEED_OF_LIGHT
from fieldsolver.problem import problem

ModelError = fs.FieldSolverError  # for rows that do not know the solver

LARGEST = 20_000  # unknowns: the matrix would take 6 GB

_COUNTING = " (wires are counted from 0, along the conductors in the order of the file)"


def objection(owner: Antenna | Structure, frequency: float, ground) -> str | None:
    """Why something cannot be modelled at a frequency [Hz] over the solver's ground; None where it can."""
    try:
        for wiring in _states(owner, frequency, ground):
            _try(wiring.conductors, wiring.feeds, wiring.loads, frequency, ground)
    except fs.GeometryError as error:
        message = str(error)
        return message + _COUNTING if message.startswith("conductor") else message
    return None


def meeting(owners, frequency: float, ground) -> tuple[tuple[str, str], ...]:
    """Names of antennas and structures, each good by itself, that touch or cross without being joined."""
    parts = {owner.name: _states(owner, frequency, ground)[0] for owner in owners}
    if _agree(parts.values(), frequency, ground):
        return ()
    pairs = combinations(parts, 2)
    return tuple(pair for pair in pairs if not _agree([parts[name] for name in pair], frequency, ground))


def _states(owner, frequency: float, ground) -> tuple[Wiring, ...]:
    if isinstance(owner, Structure):
        return (structure_wiring(owner, ground),)
    return wirings(owner, frequency, ground)


def _agree(parts, frequency: float, ground) -> bool:
    try:
        _try(sum((part.conductors for part in parts), ()), (), (), frequency, ground)
    except fs.GeometryError:
        return False
    return True


def _try(conductors, feeds, loads, frequency: float, ground):
    """Mesh, joints and clearances are those over perfect ground; stated connections were checked before."""
    _check_size(conductors, frequency)
    stand_in = ground if ground == fs.FREE_SPACE else fs.PERFECT_GROUND
    problem(conductors, feeds, frequency, stand_in, loads, None)


def _check_size(conductors, frequency: float):
    """At least 40 segments a wavelength and 10 a wire (design, section 6)."""
    wavelength = SPEED_OF_LIGHT / frequency
    total = sum(wire.length for wire in conductors)
    unknowns = max(40 * total / wavelength, 10 * len(conductors))
    if unknowns > LARGEST:
        raise fs.GeometryError(
            f"{total:.4g} m of wire at {frequency / 1e6:g} MHz, {total / wavelength:.4g} wavelengths, would "
            f"need about {unknowns:.2g} unknowns; at most {LARGEST} can be solved"
        )
