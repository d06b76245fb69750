"""Passive metal near an antenna: masts, guys, fences, gutters."""

from exposure.antennas.chains import ground_loads, wires
from exposure.antennas.model import Structure, Wiring


def structure_wiring(structure: Structure, ground) -> Wiring:
    """Conductors of a structure, with its stated connection to real ground.

    Raises
    ------
    fieldsolver.GeometryError
        As ``chains.ground_loads``, and what the thin-wire model cannot represent.
    """
    chain = wires(structure.points, structure.wire_radius, structure.material)
    loads = ground_loads(chain, ground, structure.ground_connection, f"structure '{structure.name}'")
    return Wiring(chain, (), loads)
