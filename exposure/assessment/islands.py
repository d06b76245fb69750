"""Which places that reach a limit belong to regions of their own.

Along a straight line between two places the ratio is looked at: where it stays at one or more they
are in one region.  A region that reaches a conductor is part of the one around the conductors.  Where
no such line is found the place is listed; a region that hangs together only around a corner would be
named twice, which harms nobody.
"""

import numpy as np

LOOKS = 25  # places on a line
JUST = 0.97  # ratio: a place is on the line of one to a few percent
NEAR = 0.999  # of the way to the conductor
SAME = 0.02  # of the distance: places that near to each other are one


def separate(values, ratio, foot, best, others):
    """Islands (distance, position) among `others` that are known to be apart from `best`.

    values, ratio : the field and the ratio function; foot : the nearest place on a conductor;
    best, others : (distance, place) [m].
    """
    found = [best]
    for distance, place in others:
        if distance <= 0 or any(np.linalg.norm(place - p) < SAME * distance for _, p in found):
            continue
        onto = np.array([place + NEAR * (foot(place[None])[0] - place), *(p for _, p in found)])
        if not _joined(values, ratio, place, onto):
            found.append((distance, place))
    return tuple((float(d), tuple(float(x) for x in p)) for d, p in found[1:])


def _joined(values, ratio, place, onto):
    """Whether the ratio is one or more all along a line to one of the places; or not at the place itself."""
    fraction = np.linspace(0, 1, LOOKS)[:, None]
    lines = place + fraction * (onto[:, None, :] - place)
    ratios = ratio(values(lines.reshape(-1, 3))).reshape(len(onto), LOOKS)
    return bool(ratios[0, 0] < JUST or (ratios >= JUST).all(axis=1).any())
