"""How far from the conductors the exposure ratio reaches one: compliance distance and setback.

The search goes from outside inwards, shell by shell of equal distance, so that the outermost place
is met first and no lobe or island beyond it is passed over.  Shells are sampled at a sixth of the
shortest wavelength or half the distance, whichever is less, opened to the angle under which the
conductors and their images are seen; where the samples are far below one they may be wider apart.
Around the best samples small boxes of Chebyshev nodes then find the place itself.
"""

from dataclasses import dataclass

import numpy as np

from exposure.assessment.climbs import Climbs
from exposure.assessment.islands import separate
from exposure.assessment.shells import HEAD, around, aside, axes, ball, beneath
from exposure.assessment.strengths import FieldStrengths

FARTHEST = 1000.0  # m; beyond it a distance is called unbounded
NEAREST = 0.001  # m; shells do not go nearer to an axis
NEAREST_ASIDE = 0.05  # m, in plan
REACH_MARGIN = 1.03  # on the compliance distance where it bounds another search
QUIET = 0.1  # ratio that ends the way outwards
# samples may be wider apart by the second number while the greatest ratio of a shell is below the
# first of the row above: no fringe is that many times higher than all the samples of its shell
COARSE = ((0.25, 1.0), (0.05, 2.0), (0.0, 3.0))
STEP = 0.25  # of the distance from shell to shell
OVERSHOOT = 1.3  # a lobe may be that much higher than its highest sample
LEAST_SEED = 0.5  # ratio; a power of distance is not trusted further than that
BOXES = (0.30, 0.10, 0.03, 0.01)  # half sides of the boxes around the best places, of the distance
PRECISE = (
    0.10,
    0.02,
    0.005,
)  # of the distance, of the boxes before: places nearer in by more stay as they are
BESIDE = 0.5  # m: at other metal, boxes as if the conductors were that far
BALLS = np.array([0.03, 0.06, 0.12, 0.24, 0.48])  # m, radii of places looked at there
SEEDS = 4


@dataclass(frozen=True)
class Distance:
    """The largest distance from the conductors at which a ratio function is one or more.

    Attributes
    ----------
    distance : float or None
        [m]; 0 where the ratio is below one everywhere, None where no bound was found.
    position : (3,) float or None
    islands : tuple of (distance, position)
        Other regions that reach the limit about as far out, as far as they are known to be separate;
        none is farther out than `distance`.
    bounded : bool
        False: the ratio is one or more, or was not seen to fall, as far as `FARTHEST`.
    """

    distance: float | None
    position: tuple[float, float, float] | None
    islands: tuple
    bounded: bool


@dataclass(frozen=True)
class _Lobes:
    """Of one ratio function: the farthest sample that reaches one, places that may reach farther, and
    the power of distance with which the ratio falls there."""

    known: tuple
    seeds: tuple
    slope: float


NOWHERE = np.zeros((0, 3))


def compliance_distances(
    strengths: FieldStrengths, ratios, farthest=FARTHEST, beside=NOWHERE
) -> tuple[Distance, ...]:
    """For each ratio function the largest distance to the nearest conductor axis, over up >= 0.

    beside : (k, 3) places close to other metal, where a field may rise that no shell around the
    antenna's own conductors would see. [m]
    """
    search = _Search(strengths, tuple(ratios), strengths.distance, around, np.inf, NEAREST, axes, beside)
    outer = search.outermost(farthest)
    return search.inwards(outer, farthest)


def setbacks(strengths: FieldStrengths, ratios, compliance, beside=NOWHERE) -> tuple[Distance, ...]:
    """The same in plan, over the heights of people, 0-2 m above ground.

    compliance : the result of :func:`compliance_distances`, which bounds the search.
    """
    beside = beside[beside[:, 2] <= HEAD]
    drop = max(strengths.box[0, 2] - HEAD, 0.0)
    reach = np.array([FARTHEST if c.distance is None else REACH_MARGIN * c.distance for c in compliance])
    outer = np.sqrt(np.maximum(reach**2 - drop**2, 0.0))
    near = [i for i in range(len(ratios)) if outer[i] > 0]
    own = tuple(ratios[i] for i in near)
    search = _Search(strengths, own, strengths.plan_distance, aside, HEAD, NEAREST_ASIDE, beneath, beside)
    found = [Distance(0.0, None, (), True) for _ in ratios]
    for i, place in zip(near, search.inwards(float(outer.max(initial=0.0)), FARTHEST), strict=True):
        found[i] = place if compliance[i].bounded else Distance(None, None, (), False)
    return tuple(found)


class _Search:
    """One search.

    shell : (strengths, distance, spacing) -> places at a distance; innermost : (strengths, nearest) ->
    places at no distance at all; top : greatest height of a place.
    """

    def __init__(self, strengths, ratios, distance, shell, top, nearest, innermost, beside):
        self.strengths, self.ratios, self.distance = strengths, ratios, distance
        self.shell, self.innermost, self.top, self.nearest = shell, innermost, top, nearest
        self.climbs = Climbs(strengths.values, ratios, distance, top)
        self.beside = self._measured(beside)
        box = strengths.box
        height = box[1, 2]
        self.extent = 0.5 * np.linalg.norm([*(box[1] - box[0])[:2], 2 * height])

    def outermost(self, farthest):
        """A distance at which, and at twice which, every ratio is below `QUIET`. [m]"""
        distance = max(0.5 * self.strengths.wavelength, self.extent)
        before = np.inf
        while distance < farthest:
            _, ratios = self._shell(distance, COARSE[1][1])
            most = ratios.max()
            if most <= QUIET and before <= QUIET:
                return distance
            before = most
            distance *= max(2.0 if most <= QUIET else 1.5, min(np.sqrt(most / QUIET), 3.0))
        return farthest

    def inwards(self, outer, farthest):
        """Shells from `outer` until every ratio function has reached one."""
        found = [None] * len(self.ratios)
        seen = []
        distance, coarse = outer, COARSE[-1][1]
        while distance >= self.nearest and any(f is None for f in found):
            points, ratios = self._shell(distance, coarse)
            if len(points):
                seen.append((points, self.distance(points), ratios))
                for i in range(len(self.ratios)):
                    if found[i] is None and ratios[i].max() >= 1:
                        found[i] = self._unbounded() if distance >= farthest else self._lobes(i, seen)
            open_ = [i for i, f in enumerate(found) if f is None]
            most = max((ratios[i].max() for i in open_), default=0.0) if len(points) else 0.0
            coarse = next(wide for least, wide in COARSE if most >= least)
            distance = self._next(distance, coarse)
        if any(f is None for f in found):
            found = self._innermost(found)
        found = self._located(found)
        return tuple(self._with_metal(i, f) for i, f in enumerate(found))

    def _innermost(self, found):
        """Where only places nearer than the last shell reach one, that shell is an upper bound."""
        points, _, ratios = self._measured(self.innermost(self.strengths, self.nearest))
        nothing = Distance(0.0, None, (), True)
        result = list(found)
        for i in (i for i, f in enumerate(found) if f is None):
            top = int(np.argmax(ratios[i])) if len(points) else 0
            reached = len(points) and ratios[i][top] >= 1
            result[i] = Distance(self.nearest, _place(points[top]), (), True) if reached else nothing
        return result

    def _with_metal(self, i, found):
        """The same, or a place beside other metal where that is farther out."""
        points, distances, ratios = self.beside
        least = found.distance - BESIDE if found.bounded else np.inf
        hot = (ratios[i] >= 1) & (distances > least)
        if not hot.any():
            return found
        best = (found.distance, found.position)
        for point, _ in self._apart(points[hot], np.full(hot.sum(), BESIDE), distances[hot]):
            best = max(best, self._around(i, point), key=lambda lobe: lobe[0])
        return Distance(float(best[0]), _place(best[1]), found.islands, True)

    def _around(self, i, point):
        """The farthest place near one that reaches one: seen by true fields, then by boxes."""
        near = np.concatenate([point[None], (point + BALLS[:, None, None] * ball(26)).reshape(-1, 3)])
        near, distances, ratios = self._measured(near[(near[:, 2] >= 0) & (near[:, 2] <= self.top)])
        top = int(np.argmax(np.where(ratios[i] >= 1, distances, 0.0)))
        place, best = near[top], (distances[top], near[top])
        for size in BOXES:
            places, reached = self.climbs.farthest([i], place, [size * BESIDE])
            if reached[0] > 0:
                place, best = places[0], max(best, (reached[0], places[0]), key=lambda lobe: lobe[0])
        return best

    def _measured(self, points):
        """Places with their distances and the ratios there."""
        if not len(points):
            return points, np.zeros(0), np.zeros((len(self.ratios), 0))
        values = self.strengths.values(points)
        return points, self.distance(points), np.array([r(values) for r in self.ratios])

    def _unbounded(self):
        return Distance(None, None, (), False)

    def _spacing(self, distance):
        """Sixth of a wavelength, opened to the angle under which all sources are seen."""
        return self.strengths.wavelength / 6 * max(1.0, distance / self.extent)

    def _next(self, distance, coarse):
        if distance < 0.02 * self.strengths.wavelength:
            return distance / 1.6
        return distance - min(STEP * distance, coarse * self._spacing(distance))

    def _shell(self, distance, coarse):
        spacing = min(0.5 * distance, coarse * self._spacing(distance))
        points = self.shell(self.strengths, distance, spacing)
        if not len(points):
            return points, np.zeros((len(self.ratios), 0))
        values = self.strengths.values(points)
        return points, np.array([r(values) for r in self.ratios])

    def _lobes(self, i, seen):
        """Where ratio function i may reach one farthest out, from the shells seen so far."""
        slope = self._slope(i, seen)
        points = np.concatenate([s[0] for s in seen])
        distances = np.concatenate([s[1] for s in seen])
        ratios = np.concatenate([s[2][i] for s in seen])
        reached = distances * np.clip(ratios, 1e-9, OVERSHOOT**4) ** (1 / slope)
        hopeful = (ratios > LEAST_SEED) & (reached * OVERSHOOT ** (1 / slope) >= reached[ratios >= 1].max())
        known = int(np.argmax(np.where(ratios >= 1, distances, 0.0)))
        if not np.isfinite(ratios[known]):
            return self._contact(points[known], distances[known], seen)
        seeds = self._apart(points[hopeful], distances[hopeful], reached[hopeful])
        return _Lobes((distances[known], points[known]), tuple(seeds), slope)

    def _located(self, found):
        """Distances from lobes; all take their steps together."""
        seeds = [(i, *seed) for i, f in enumerate(found) if isinstance(f, _Lobes) for seed in f.seeds]
        which = np.array([i for i, *_ in seeds], int)
        starts, away = np.array([p for _, p, _ in seeds]).reshape(-1, 3), np.array([d for *_, d in seeds])
        places, distances = self.climbs.farthest(which, starts, BOXES[0] * away)
        seen = distances > 0
        lobes = which[seen], places[seen], distances[seen]
        for size, precise in zip(BOXES[1:], PRECISE, strict=True):
            lobes = self._nearer(*lobes, size, precise)
        which, places, distances = lobes
        _, _, ratios = self._measured(places)
        result = list(found)
        for i, f in ((i, f) for i, f in enumerate(found) if isinstance(f, _Lobes)):
            mine = np.flatnonzero(which == i)
            outwards = np.clip(ratios[i][mine], 0.5, 2.0) ** (1 / f.slope) if len(mine) else 1.0
            ends = [f.known, *zip(distances[mine] * outwards, places[mine], strict=True)]
            best, *others = sorted(ends, key=lambda lobe: -lobe[0])
            islands = separate(self.strengths.values, self.ratios[i], self.strengths.foot, best, others)
            result[i] = Distance(float(best[0]), _place(best[1]), islands, True)
        return result

    def _nearer(self, which, places, distances, size, precise):
        """Places after boxes of one size, around those that may be the farthest of their ratio function.

        A small box beside the line may not see it: then the place from the larger box stands.
        """
        best = np.zeros(len(self.ratios))
        np.maximum.at(best, which, distances)
        active = np.flatnonzero(distances >= (1 - precise) * best[which])
        climbed, reached = self.climbs.farthest(which[active], places[active], size * distances[active])
        seen = reached > 0
        places[active[seen]], distances[active[seen]] = climbed[seen], reached[seen]
        return which, places, distances

    def _contact(self, point, distance, seen):
        """The ratio reaches one only within three radii: the next shell outside is an upper bound."""
        outside = max(seen[-2][1].min(), distance) if len(seen) > 1 else distance
        return Distance(float(outside), _place(point), (), True)

    def _slope(self, i, seen):
        """Power of distance with which ratio i falls between the last two shells, 2 to 6."""
        if len(seen) < 2:
            return 2.0
        (_, d0, r0), (_, d1, r1) = seen[-2], seen[-1]
        with np.errstate(divide="ignore", invalid="ignore"):
            power = np.log(np.minimum(r1[i].max(), 1e9) / r0[i].max()) / np.log(d0.max() / d1.max())
        return float(np.clip(power, 2.0, 6.0)) if np.isfinite(power) else 2.0

    def _apart(self, points, distances, reached):
        """The best few places, no two nearer than their distance from the conductors."""
        chosen = []
        for k in np.argsort(-reached):
            if all(np.linalg.norm(points[k] - p) > 0.7 * distances[k] for p, _ in chosen):
                chosen.append((points[k], distances[k]))
            if len(chosen) == SEEDS:
                break
        return chosen


def _place(point):
    return tuple(float(x) for x in point)
