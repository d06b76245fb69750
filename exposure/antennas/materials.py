"""What a conductor is made of, as a site file says it; perfect (no loss credited) unless stated."""

import math

from exposure.antennas.model import Material
from exposure.keys.kinds import choice, number
from exposure.keys.reading import Reading
from exposure.keys.values import POSITIVE, Range
from exposure.published.metals import METALS

PERFECT = Material("perfect", math.inf)

MATERIAL_KEYS = (
    choice("material", METALS, help="metal of the wires; perfect unless stated (no loss is credited)"),
    number(
        "conductivity",
        {"conductivity_s_per_m": 1.0},
        POSITIVE,
        help="instead of material, for other metals [S/m]",
    ),
    number("relative_permeability", allowed=Range(1), help="with conductivity_s_per_m; 1 unless stated"),
)


def material(reading: Reading, default: Material | None = PERFECT) -> Material | None:
    """The material that a table states, or the default."""
    name, conductivity = reading["material"], reading["conductivity"]
    if reading.has("material") and reading.has("conductivity"):
        reading.wrong("conductivity", "state material or conductivity_s_per_m, not both")
    if reading.has("relative_permeability") and not reading.has("conductivity"):
        reading.wrong("relative_permeability", "belongs to conductivity_s_per_m, which is not stated")
    if conductivity is not None:
        return Material(f"{conductivity:g} S/m", conductivity, reading["relative_permeability"] or 1.0)
    return Material(name, METALS[name]) if name else default
