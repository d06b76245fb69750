"""An area of a site file to an Area."""

from exposure.keys.reading import Reading
from exposure.site.model import Area
from exposure.site.outlines import objection, opened

STANDING = 2.0  # [m] height of a standing person with some reach; paths reach so high unless stated
SHAPES = {"corners": "polygon", "point": "point", "path": "path"}


def area(reading: Reading) -> Area | None:
    """The area that a table states; None where the table has a problem."""
    stated = [stem for stem in SHAPES if reading.has(stem)]
    if len(stated) != 1:
        which = "stated are " + " and ".join(stated) if stated else "none is stated"
        reading.wrong(
            stated[1] if stated else "corners", f"an area has one of corners_m, point_m and path_m; {which}"
        )
        return None
    stem = stated[0]
    _check_population(reading)
    _check_belonging(reading, stem)
    bottom, top = _heights(reading, stem)
    corners = _corners(reading, stem)
    if not reading.sound:
        return None
    return Area(
        name=reading["name"],
        population=reading["population"],
        shape=SHAPES[stem],
        corners=corners,
        bottom=bottom,
        top=top,
        width=reading["width"],
        insulated_floor=reading["insulated_floor"],
        informed=reading["informed"],
    )


def _check_population(reading: Reading):
    if reading["population"] == "occupational" and not reading.has("informed"):
        reading.wrong(
            "population",
            'occupational needs informed = "who, when": these levels hold only for people who know of the '
            "exposure and can reduce it",
        )


def _check_belonging(reading: Reading, stem: str):
    if reading.has("width") and stem != "path":
        reading.wrong("width", "only a path_m has a width")
    if stem == "path" and not reading.has("width"):
        reading.wrong("path", "a path needs width_m or width_ft")
    if stem == "point":
        for extra in ("bottom", "top"):
            if reading.has(extra):
                reading.wrong(extra, "a point has its height in point_m: leave it out")
    if stem == "corners":
        for needed in ("bottom", "top"):
            if not reading.has(needed):
                reading.wrong(
                    "corners", f"an area with corners needs {needed}_m or {needed}_ft, above the ground"
                )


def _heights(reading: Reading, stem: str):
    if stem == "point":
        point = reading["point"]
        return (None, None) if point is None else (point[2], point[2])
    bottom, top = reading["bottom"], reading["top"]
    for end, height in (("bottom", bottom), ("top", top)):
        if height is not None and height < 0:
            reading.wrong(
                end,
                f"area '{reading['name'] or '?'}' lies below the ground (up = 0): places below it, such as "
                f"downhill, are not modelled and not guessed; found {height:g} m",
            )
    bottom = 0.0 if bottom is None else bottom
    top = bottom + STANDING if top is None else top
    if top < bottom:
        reading.wrong("top", f"the top ({top:g} m) is below the bottom ({bottom:g} m)")
    return bottom, top


def _corners(reading: Reading, stem: str):
    written = reading[stem]
    if written is None:
        return None
    if stem == "point":
        return (written[:2],)
    if stem == "corners":
        message = objection(written)
        if message:
            reading.wrong(stem, message)
        return opened(written)
    if len(set(written)) < 2:
        reading.wrong(stem, "the points of a path are all the same")
    return written
