"""From places near the farthest one to the place itself, by small boxes of Chebyshev nodes.

All places, of all ratio functions, take their steps together, so that a step is one call.
"""

import numpy as np

from exposure.assessment.panels import sampled, strengths_of

CLIMBS = 6
ORDER = 3  # nodes a side
LOOKS = 13  # places a side where the interpolated ratio is looked at
LEAST_BOX = 1e-4  # m, half side


class Climbs:
    """ratios : ratio functions; distance : what is to be greatest; top : greatest height of a place."""

    def __init__(self, values, ratios, distance, top):
        self.values, self.ratios, self.distance, self.top = values, ratios, distance, top

    def farthest(self, which, centres, halves):
        """Boxes of one size each, until the farthest place that reaches one is within the box.

        which (n,) ratio functions, centres (n, 3), halves (n,) [m] -> places (n, 3), distances (n,):
        0 where the ratio is below one all over the box.
        """
        which, halves = np.asarray(which, int), np.maximum(np.asarray(halves, float), LEAST_BOX)
        centres = np.array(centres, float).reshape(-1, 3)
        distances = np.zeros(len(centres))
        active = np.arange(len(centres))
        for _ in range(CLIMBS):
            if not len(active):
                break
            places, distances[active] = self._boxes(which[active], centres[active], halves[active])
            moved = np.abs(places - centres[active]).max(axis=1)
            centres[active] = places
            active = active[moved >= 0.99 * halves[active]]
        return centres, distances

    def _boxes(self, which, centres, halves):
        lower, upper = centres - halves[:, None], centres + halves[:, None]
        lower[:, 2] = np.clip(lower[:, 2], 0.0, np.maximum(self.top - halves, 0.0))
        upper[:, 2] = np.minimum(np.maximum(upper[:, 2], halves), self.top)
        panels = sampled(self.values, lower, upper, (ORDER,) * 3)
        strengths = strengths_of(panels.grid((LOOKS,) * 3))
        found = [
            self._box(self.ratios[i], *box)
            for i, *box in zip(which, lower, upper, halves, strengths, strict=True)
        ]
        return np.array([place for place, _ in found]), np.array([distance for _, distance in found])

    def _box(self, ratio, lower, upper, half, strengths):
        """The farthest place around a box where the interpolated ratio is one, and its distance.

        From every place looked at that reaches one, the line of one is sought outwards along the
        slope of the ratio, at most one look farther.  Where the ratio is below one everywhere: the
        place where it is greatest, and 0.
        """
        axes = [np.linspace(a, b, LOOKS) for a, b in zip(lower, upper, strict=True)]
        points = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1)
        ratios = ratio(strengths.reshape(-1, strengths.shape[-1]))
        logs = np.log(np.clip(ratios, 1e-9, 1e9)).reshape(points.shape[:3])
        distances = self.distance(points.reshape(-1, 3)).reshape(logs.shape)
        outwards = np.stack(np.gradient(distances, *axes), axis=-1)
        falling = -(outwards * np.stack(np.gradient(logs, *axes), axis=-1)).sum(axis=-1)
        look = 2 * half / (LOOKS - 1)
        further = np.clip(logs / np.maximum(falling, logs.clip(1e-12) / look), 0.0, look)
        reached = np.where(logs >= 0, distances + further, 0.0)
        top = np.unravel_index(np.argmax(reached if reached.any() else logs), logs.shape)
        place = points[top] + (further[top] if reached.any() else 0.0) * outwards[top]
        return np.array([*place[:2], np.clip(place[2], 0.0, self.top)]), float(reached[top])
