"""Outlines in plan, as they are drawn in a site file."""

from shapely.geometry import Polygon
from shapely.validation import explain_validity


def opened(corners: tuple) -> tuple:
    """The corners without a last one that repeats the first."""
    return corners[:-1] if len(corners) > 1 and corners[0] == corners[-1] else corners


def objection(corners: tuple) -> str | None:
    """Why corners (east, north) [m] are no outline; None where they are one."""
    corners = opened(corners)
    if len(set(corners)) < 3:
        return f"an outline needs at least 3 different corners; found {len(set(corners))}"
    outline = Polygon(corners)
    if not outline.is_valid:
        where = _place(explain_validity(outline))
        return f"the outline crosses or touches itself ({where}): state its corners in order, one way round"
    if outline.area == 0:
        return "the outline has no area: its corners lie on one line"
    return None


def _place(explanation: str) -> str:
    """'near east 1, north 2' out of 'Self-intersection[1 2]'."""
    east, north = explanation.rpartition("[")[2].rstrip("]").split()[:2]
    return f"near east {float(east):.4g} m, north {float(north):.4g} m"
