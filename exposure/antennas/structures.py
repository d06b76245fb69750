"""Passive metal near an antenna: masts, guys, fences, gutters."""

from exposure.antennas.chains import ground_loads, ideal_ground_note, wires
from exposure.antennas.model import Structure, Wiring


def structure_wiring(structure: Structure, ground) -> Wiring:
    """Conductors of a structure, with its stated connection to real ground.

    Raises
    ------
    fieldsolver.GeometryError
        As ``chains.ground_loads``, and what the thin-wire model cannot represent.
    """
    name = f"structure '{structure.name}'"
    chain = wires(structure.points, structure.wire_radius, structure.material)
    loads = ground_loads(chain, ground, structure.ground_connection, name)
    return Wiring(chain, (), loads, notes=ideal_ground_note(name, structure.ground_connection))
