"""Ground, place, property and structures of a site file."""

from exposure.antennas.materials import material
from exposure.antennas.model import Structure
from exposure.keys.reading import Reading
from exposure.published.soils import SOILS
from exposure.site.model import Ground, Place
from exposure.site.outlines import objection, opened


def ground(reading: Reading) -> Ground | None:
    """The ground that a table states; None where the table has a problem."""
    kind = reading["kind"]
    numbers = [stem for stem in ("relative_permittivity", "conductivity") if reading.has(stem)]
    stated = (reading.has("soil"), bool(numbers), kind in ("perfect", "none"))
    if sum(stated) != 1 and reading.sound:
        reading.wrong(
            "soil" if reading.has("soil") else "kind",
            "the ground is a soil, or relative_permittivity with conductivity_s_per_m, or kind = "
            f'"perfect" or "none"; {"more than one is stated" if any(stated) else "none is stated"}',
        )
    if len(numbers) == 1 and reading.sound:
        reading.wrong(
            numbers[0], "relative_permittivity and conductivity_s_per_m go together; the other is not stated"
        )
    if not reading.sound:
        return None
    if kind in ("perfect", "none"):
        return Ground(kind, {"perfect": "perfectly conducting ground", "none": "free space, no ground"}[kind])
    if reading["soil"]:
        soil = SOILS[reading["soil"]]
        words = f"{reading['soil']} ({soil.source})"
        return Ground("real", words, soil.relative_permittivity, soil.conductivity)
    return Ground("real", "as stated", reading["relative_permittivity"], reading["conductivity"])


def place(reading: Reading | None) -> Place | None:
    """The georeference, where one is stated."""
    if reading is None or not reading.sound:
        return None
    return Place(reading["latitude"], reading["longitude"])


def property_corners(reading: Reading | None):
    """Outline of the property (east, north) [m], where one is stated."""
    if reading is None or reading["corners"] is None:
        return None
    message = objection(reading["corners"])
    if message:
        reading.wrong("corners", message)
    return opened(reading["corners"])


def structure(reading: Reading) -> Structure | None:
    """The structure that a table states; None where the table has a problem."""
    made_of = material(reading)
    if not reading.sound:
        return None
    return Structure(
        reading["name"], reading["points"], reading["wire_radius"], made_of, reading["ground_connection"]
    )
