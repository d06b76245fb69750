"""Points on the surface at a given distance from the conductors, above ground.

In space: tubes around the straight pieces and spheres around their ends; in plan: their walls from
the ground up to where people's heads are.  Points nearer to another conductor drop out, and what is
left is thinned to one point a cell of the wanted spacing.
"""

import numpy as np

HEAD = 2.0  # m above ground
SHORT = 0.25  # of the spacing: points that much nearer still count as on the surface
FINEST = 0.25  # m
PIECES = 12  # places along a straight piece, at least


def around(strengths, distance, spacing):
    """Points at a distance in space, (n, 3), up >= 0, ground included. [m]"""
    starts, ends = strengths.segments
    tips = np.unique(np.concatenate([starts, ends]), axis=0)
    parts = [(tips[:, None, :] + distance * ball(_directions(distance, spacing))).reshape(-1, 3)]
    feet = [tips]
    for start, end in zip(starts, ends, strict=True):
        foot = _along(start, end, distance, strengths.wavelength)
        feet.append(foot)
        parts.append((foot[:, None, :] + distance * _circle(end - start, distance, spacing)).reshape(-1, 3))
    parts.append(_on_ground(np.concatenate(feet), distance, spacing))
    points = np.concatenate(parts)
    return _thinned(points[points[:, 2] >= 0], strengths.distance, distance, spacing)


def aside(strengths, distance, spacing):
    """Points at a distance in plan, from the ground to `HEAD`, (n, 3); conductors' own heights too. [m]"""
    starts, ends = strengths.segments
    tips = np.unique(np.concatenate([starts, ends]), axis=0)
    angle = _angles(distance, spacing)
    turn = distance * np.column_stack([np.cos(angle), np.sin(angle), np.zeros(len(angle))])
    parts = [(tips[:, None, :] + turn).reshape(-1, 3)]
    for start, end in zip(starts, ends, strict=True):
        along = (end - start)[:2]
        length = np.linalg.norm(along)
        if length > 1e-9:
            normal = distance * np.array([-along[1], along[0], 0.0]) / length
            foot = _along(start, end, distance, strengths.wavelength)
            parts += [foot + normal, foot - normal]
    places = np.concatenate(parts)
    plan = _thinned(places[:, :2], strengths.plan_distance, distance, spacing)
    heights = _heights(np.unique(np.concatenate([starts, ends])[:, 2]), spacing)
    standing = np.column_stack([np.repeat(plan, len(heights), axis=0), np.tile(heights, len(plan))])
    level = _among_people(places)
    return np.concatenate([standing, _thinned(level, strengths.plan_distance, distance, spacing)])


def beneath(strengths, distance):
    """Points straight above and below the conductors, from the ground to `HEAD`, (n, 3). [m]"""
    feet = axes(strengths, distance)
    heights = _heights(np.zeros(0), FINEST)
    plan = np.unique(feet[:, :2], axis=0)
    standing = np.column_stack([np.repeat(plan, len(heights), axis=0), np.tile(heights, len(plan))])
    return np.concatenate([standing, _among_people(feet)])


def axes(strengths, distance):
    """Points on the axes of the conductors, (n, 3), up >= 0. [m]"""
    pairs = zip(*strengths.segments, strict=True)
    feet = np.concatenate([_along(start, end, distance, strengths.wavelength) for start, end in pairs])
    return feet[feet[:, 2] >= 0]


def _among_people(points):
    return points[(points[:, 2] >= 0) & (points[:, 2] <= HEAD)]


def _heights(tips, spacing):
    """Heights of a body, at most `FINEST` apart, and those of conductors that end among them."""
    even = np.linspace(0, HEAD, 1 + int(np.ceil(HEAD / np.clip(spacing, FINEST, 1.0))))
    return np.union1d(even, tips[(tips >= 0) & (tips <= HEAD)][:: 1 + len(tips) // 8])


def _along(start, end, distance, wavelength):
    """Places along a piece: half the distance apart, or a 24th of a wavelength where that is more.

    Charge and current change along a wire on the scale of the wavelength however near one looks;
    what changes faster is at its ends, and those have their spheres.
    """
    length = np.linalg.norm(end - start)
    step = max(0.5 * distance, min(wavelength / 24, length / PIECES), 1e-9)
    return start + np.linspace(0, 1, 1 + int(np.ceil(length / step)))[:, None] * (end - start)


def _angles(distance, spacing):
    count = max(8, int(np.ceil(2 * np.pi * distance / spacing)))
    return 2 * np.pi * np.arange(count) / count


def _circle(axis, distance, spacing):
    """Unit directions across an axis, (k, 3); straight down and up among them for a level one."""
    length = np.linalg.norm(axis)
    if length < 1e-12:
        return np.zeros((0, 3))
    axis = axis / length
    level = np.array([axis[1], -axis[0], 0.0]) if abs(axis[2]) < 0.999 else np.array([1.0, 0.0, 0.0])
    level /= np.linalg.norm(level)
    angle = _angles(distance, spacing)
    return np.cos(angle)[:, None] * level + np.sin(angle)[:, None] * np.cross(level, axis)


def _directions(distance, spacing):
    return max(24, int(np.ceil(4 * np.pi * (distance / spacing) ** 2)))


def ball(count):
    """Unit directions all around, (count, 3): the spiral of golden angles, poles included."""
    up = np.linspace(-1, 1, count)
    angle = np.pi * (3 - np.sqrt(5)) * np.arange(count)
    level = np.sqrt(1 - up**2)
    return np.column_stack([level * np.cos(angle), level * np.sin(angle), up])


def _on_ground(feet, distance, spacing):
    low = feet[feet[:, 2] <= distance]
    radius = np.sqrt(distance**2 - low[:, 2] ** 2)
    angle = _angles(distance, spacing)
    turn = np.column_stack([np.cos(angle), np.sin(angle)])
    plan = (low[:, None, :2] + radius[:, None, None] * turn).reshape(-1, 2)
    return np.column_stack([plan, np.zeros(len(plan))])


def _thinned(points, nearest, distance, spacing):
    """One point a cell of those that no other conductor is nearer to."""
    points = _one_a_cell(points, 0.4 * spacing)
    points = points[nearest(points) >= distance - SHORT * min(spacing, 0.5 * distance)]
    return _one_a_cell(points, spacing)


def _one_a_cell(points, spacing):
    if not len(points):
        return points
    cells = np.floor(points / spacing + 0.371).astype(np.int64)
    return points[np.unique(cells, axis=0, return_index=True)[1]]
