"""Where in a plane a ratio function is one or more, as a raster.

The plane is covered by adaptive panels as far as the compliance distance reaches.  A panel is
halved while, at some place in it, the interpolated ratio with its error is neither surely above nor
surely below one nor known well enough; so no island is lost that the tails of the panels can see.
Where the heights of a band are too few for a panel it is done again with more of them.
"""

from dataclasses import dataclass

import numpy as np

from exposure.assessment.panels import Panels, blind, cut, interpolation, nodes, refined, strengths_of
from exposure.assessment.planes import Plane
from exposure.assessment.strengths import FieldStrengths, remembered

ORDER = 5  # nodes a side: 25 in a panel
LOOKS = 9  # places a side where the interpolated ratio is looked at
KNOWN = 0.02  # of the logarithm of the ratio: 1 % of the distance where it falls off as 1/r^2
KNOWN_DISTANCE = 0.02  # m, where that is more; vertices of a boundary are moved onto the line anyway
SURELY = 1.2  # ratio at every node of a panel that a conductor crosses
CELLS_IN_SMALLEST_PANEL = 4
HALF_THE_LAYERS = 0.1  # of the ratio: then all of them are good to about its square
ENOUGH = 1e6  # ratio, stands for inf
MOST_CELLS = 200_000


@dataclass(frozen=True)
class Layered:
    """A plane with so many heights: values, and ratios from them.

    between : matrix from the heights of the values to twice as many.
    """

    values: object
    layers: int
    between: np.ndarray
    ratios: tuple

    def ratio(self, i, logs, errors=None, sign=1):
        """Ratio i, the largest of the band, from logarithms (..., layers * m) with their errors."""
        layers = logs.reshape(-1, self.layers, logs.shape[-1] // self.layers)
        finer = np.einsum("ab,nbm->nam", self.between, layers)
        if errors is not None:
            widest = np.broadcast_to(errors, logs.shape).reshape(layers.shape).max(axis=1, keepdims=True)
            finer = finer + sign * widest
        ratio = self.ratios[i](strengths_of(finer).reshape(-1, layers.shape[2]))
        return ratio.reshape(*logs.shape[:-1], len(self.between)).max(axis=-1)

    def surely(self, i, panels):
        """Panels whose every node is far above the limit, (n,) bool."""
        return (self.ratio(i, panels.logs) >= SURELY).all(axis=(1, 2))

    def unsettled(self, panels: Panels):
        """Panels near the line where every second height of the band would not nearly do, (n,) bool."""
        result = np.zeros(len(panels), bool)
        if self.layers == 1 or not len(panels):
            return result
        logs = panels.logs.reshape(-1, self.layers, panels.logs.shape[-1] // self.layers)
        fewer = np.einsum(
            "ab,nbm->nam", interpolation(self.layers // 2 + 1, nodes(self.layers)), logs[:, ::2]
        )
        for i in range(len(self.ratios)):
            full, half = (np.minimum(self.ratio(i, x.reshape(len(x), -1)), ENOUGH) for x in (logs, fewer))
            near = (np.maximum(full, half) > 0.5) & (np.minimum(full, half) < 2)
            far_off = near & (np.abs(half - full) > HALF_THE_LAYERS * full)
            result |= far_off.reshape(len(panels), -1).any(axis=1)
        return result


class Regions:
    """One plane: panels, and the raster of every ratio function.

    reach : compliance distance of each ratio function [m], None where it has no bound;
    farthest : from the conductors, beyond which nothing is looked at. [m]
    """

    def __init__(self, strengths: FieldStrengths, ratios, plane: Plane, reach, farthest):
        self.strengths, self.ratios, self.plane = strengths, ratios, plane
        self.farthest = farthest
        self.known = [max(KNOWN, 2 * KNOWN_DISTANCE / r) if r else KNOWN for r in reach]
        field = remembered(strengths.values)
        self.layered = [self._with(field, layers) for layers in plane.layers]
        lower, upper = cut(plane.lower, plane.upper, 0.75 * strengths.wavelength)
        self.boxes = lower, upper
        self.step = (upper - lower)[0] / 2 ** np.ceil(np.log2((upper - lower)[0] / self._cell(reach)))

    def _with(self, field, layers):
        places = np.linspace(-1, 1, 2 * (layers - 1) + 1)
        between = interpolation(layers, places) if layers > 1 else np.ones((1, 1))

        def values(places):
            points = self.plane.points(places, layers)
            return field(points.reshape(-1, 3)).reshape(len(places), -1)

        return Layered(values, layers, between, self.ratios)

    def _cell(self, reach):
        area = np.prod(self.plane.upper - self.plane.lower)
        least = min((r for r in reach if r), default=self.farthest)
        return max(np.clip(least / 20, 0.02, 0.25), np.sqrt(area / MOST_CELLS))

    def rasters(self):
        """Logarithm of each ratio function on one raster; far below zero where nothing was asked."""
        counts = np.rint((self.plane.upper - self.plane.lower) / self.step).astype(int)
        fields = np.full((len(self.ratios), *(counts + 1)), -9.0)
        lower, upper = self.boxes
        for layered in self.layered:
            panels = refined(
                layered.values,
                lower,
                upper,
                (ORDER,) * 2,
                lambda p, to=layered: self._across(to, p),
                self._wanted,
            )
            self._fill(fields, layered, panels[self._may_exceed(layered, panels)])
            again = layered.unsettled(panels)
            lower, upper = panels.lower[again], panels.upper[again]
            if not again.any():
                break
        return fields

    def true_ratio(self, i, places):
        """Ratio i of the true fields at places (n, 2), with the most heights a band may have."""
        layered = self.layered[-1]
        return layered.ratio(i, np.log(np.clip(layered.values(places), 1e-300, 1e260)))

    def _distance(self, places):
        return self.plane.distance(self.strengths, places)

    def _wanted(self, lower, upper):
        half = 0.5 * np.linalg.norm(upper - lower, axis=1)
        return self._distance(0.5 * (lower + upper)) - half <= self.farthest

    def _across(self, layered, panels):
        if not len(panels):
            return np.zeros(0, int)
        hidden = blind(panels, self._distance)
        needed = self._open(layered, panels, hidden)
        across = np.where(
            hidden, np.argmax(panels.sides, axis=1), np.argmax(panels.tails.max(axis=2), axis=1)
        )
        small = panels.sides <= CELLS_IN_SMALLEST_PANEL * self.step * (1 + 1e-9)
        across = np.where(small[np.arange(len(panels)), across], 1 - across, across)
        return np.where(needed & ~small.all(axis=1), across, -1)

    def _open(self, layered, panels, hidden):
        """Panels in which it is not known well enough where some ratio is one, (n,) bool."""
        errors = np.where(hidden[:, None], np.inf, panels.errors)[:, None, None, :]
        seen = panels.grid((LOOKS, LOOKS))
        result = np.zeros(len(panels), bool)
        for i in range(len(self.ratios)):
            least, most = layered.ratio(i, seen, errors, -1), layered.ratio(i, seen, errors)
            open_ = (least < 1) & (most > 1) & (most > least * (1 + 2 * self.known[i]))
            result |= open_.any(axis=(1, 2)) & ~(hidden & layered.surely(i, panels))
        return result

    def _may_exceed(self, layered, panels):
        """Panels in which some ratio may be one or more, (n,) bool."""
        errors = np.where(blind(panels, self._distance)[:, None], np.inf, panels.errors)[:, None, None, :]
        seen = panels.grid((LOOKS, LOOKS))
        most = [
            layered.ratio(i, seen, errors).max(axis=(1, 2)) * (1 + 2 * known)
            for i, known in enumerate(self.known)
        ]
        return np.max(most, axis=0) > 1

    def _fill(self, fields, layered, panels):
        """The raster of all panels; finer heights may overwrite it.

        True fields where no polynomial fits: beside conductors, and beside nulls on an axis of symmetry.
        """
        first = np.rint((panels.lower - self.plane.lower) / self.step).astype(int)
        cells = np.rint(panels.sides / self.step).astype(int)
        hidden = blind(panels, self._distance)
        hidden |= self._open(layered, panels, hidden)
        for size in np.unique(cells, axis=0):
            chosen = np.flatnonzero((cells == size).all(axis=1))
            logs = panels[chosen].grid(size + 1)
            logs[hidden[chosen]] = self._direct(layered, panels[chosen[hidden[chosen]]], size)
            for i in range(len(self.ratios)):
                found = np.log(np.clip(layered.ratio(i, logs), 1e-4, 1e4))
                found[hidden[chosen] & layered.surely(i, panels[chosen])] = np.log(SURELY)
                for (x, y), block in zip(first[chosen], found, strict=True):
                    fields[i, x : x + size[0] + 1, y : y + size[1] + 1] = block

    def _direct(self, layered, panels, size):
        """True fields on the raster of panels that no polynomial fits, unless they are surely inside."""
        inside = np.all([layered.surely(i, panels) for i in range(len(self.ratios))], axis=0)
        logs = np.zeros((len(panels), *(size + 1), panels.logs.shape[-1]))
        axes = [np.linspace(0, 1, n + 1) for n in size]
        unit = np.stack(np.meshgrid(*axes, indexing="ij"), axis=-1)
        places = panels.lower[~inside][:, None, None, :] + unit * panels.sides[~inside][:, None, None, :]
        if len(places):
            values = layered.values(places.reshape(-1, 2))
            logs[~inside] = np.log(np.clip(values, 1e-300, 1e260)).reshape(len(places), *(size + 1), -1)
        return logs
