"""Lines where a raster of numbers is zero: closed rings with the positive side on their left.

Marching squares; a cell with two opposite positive corners is joined or parted by its mean.
"""

import numpy as np
import shapely

BOTTOM, RIGHT, TOP, LEFT = range(4)
# corners a b c d counter-clockwise from the lower left count 1, 2, 4, 8 where positive
LINES = {
    1: ((BOTTOM, LEFT),),
    2: ((RIGHT, BOTTOM),),
    3: ((RIGHT, LEFT),),
    4: ((TOP, RIGHT),),
    5: ((BOTTOM, LEFT), (TOP, RIGHT)),
    6: ((TOP, BOTTOM),),
    7: ((TOP, LEFT),),
    8: ((LEFT, TOP),),
    9: ((BOTTOM, TOP),),
    10: ((RIGHT, BOTTOM), (LEFT, TOP)),
    11: ((RIGHT, TOP),),
    12: ((LEFT, RIGHT),),
    13: ((BOTTOM, RIGHT),),
    14: ((LEFT, BOTTOM),),
}
JOINED = {5: ((BOTTOM, RIGHT), (TOP, LEFT)), 10: ((LEFT, BOTTOM), (RIGHT, TOP))}


def rings(field):
    """Closed rings, each (k, 2) in raster steps, around the positive part of (nx, ny) numbers.

    Counter-clockwise around islands, clockwise around holes.  Beyond the raster is outside.
    """
    padded = np.pad(np.asarray(field, float), 1, constant_values=-1.0)
    following = dict(_lines(padded))
    found = []
    while following:
        start, edge = following.popitem()
        ring = [start]
        while edge != start:
            ring.append(edge)
            edge = following.pop(edge)
        found.append(_places(padded, np.array(ring)) - 1.0)
    return found


def polygons(found):
    """Shapely polygons from rings of :func:`rings`: each hole in the smallest island around it."""
    parts = [shapely.Polygon(r) for r in found if len(r) > 2]
    parts = [p for p in parts if p.is_valid and p.area > 0]
    islands = sorted((p for p in parts if p.exterior.is_ccw), key=lambda p: p.area)
    holes = [[] for _ in islands]
    for hole in (p for p in parts if not p.exterior.is_ccw):
        place = hole.representative_point()
        around = [i for i, island in enumerate(islands) if island.area > hole.area and island.contains(place)]
        if around:
            holes[around[0]].append(hole.exterior)
    return [shapely.Polygon(p.exterior, inner) for p, inner in zip(islands, holes, strict=True)]


def _lines(field):
    """Pairs (edge where a line enters a cell, edge where it leaves)."""
    inside = field > 0
    code = inside[:-1, :-1] + 2 * inside[1:, :-1] + 4 * inside[1:, 1:] + 8 * inside[:-1, 1:]
    mean = field[:-1, :-1] + field[1:, :-1] + field[1:, 1:] + field[:-1, 1:]
    for number, parted in LINES.items():
        cells = np.argwhere(code == number)
        joined = mean[tuple(cells.T)] > 0 if number in JOINED else np.zeros(len(cells), bool)
        for chosen, lines in ((cells[~joined], parted), (cells[joined], JOINED.get(number, ()))):
            for first, last in lines:
                yield from zip(_edge(field, chosen, first), _edge(field, chosen, last), strict=True)


def _edge(field, cells, side):
    """Numbers of edges: twice the raster number of its first point, and 1 more if it runs along y."""
    i, j = cells.T
    i, j = (i + (side == RIGHT), j + (side == TOP))
    return (2 * (i * field.shape[1] + j) + (side in (RIGHT, LEFT))).tolist()


def _places(field, edges):
    """Where the field is zero on each edge, by linear interpolation, (k, 2)."""
    i, j = np.divmod(edges // 2, field.shape[1])
    along_y = edges % 2
    first, last = field[i, j], field[i + 1 - along_y, j + along_y]
    fraction = np.clip(first / (first - last), 1e-6, 1 - 1e-6)
    return np.column_stack([i + fraction * (1 - along_y), j + fraction * along_y])
