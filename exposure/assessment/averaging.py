"""Exposure of a standing body: where the squares of the field are averaged over 0-2 m above a floor.

Only tests whose level is a mean over the body are averaged; tests of a spatial peak stay what they are
at the worst point.  The larger of the two is the body's exposure ratio.
"""

from dataclasses import dataclass

import numpy as np

from exposure.assessment.areas import Extreme, greatest, greatest_body_average
from exposure.assessment.prisms import Prism
from exposure.assessment.ratios import Rule
from exposure.assessment.strengths import FieldStrengths


@dataclass(frozen=True)
class Exposure:
    """Of one area by one rule.

    peak : the worst point by all tests; body_average and its search bound: None where the document
    has no level that is a mean over the body.
    """

    peak: Extreme
    body_average: float | None
    body_searched: float | None


def exposures(
    strengths: FieldStrengths, rules: tuple[Rule, ...], prism: Prism, loud: FieldStrengths, beside
) -> tuple[Exposure, ...]:
    """The worst point and the body average of an area by every rule, from shared points.

    strengths : with all conductors; loud : the same with those of other metal left out beside which no
    limit may be reached; beside (k, 3) : places at that metal, looked at one by one instead. [m]
    """
    peaks = [rule.of_peak() for rule in rules]
    means = [rule.of_mean() for rule in rules]
    ratios = [*(r.ratio for r in rules), *(r.ratio for r in peaks)]
    found = _with_places(loud, ratios, greatest(loud, ratios, prism), beside[prism.contains(beside)])
    averaged = [i for i, mean in enumerate(means) if mean.tests]
    bodies = dict(zip(averaged, _bodies(strengths, [means[i] for i in averaged], prism), strict=True))
    return tuple(
        Exposure(found[i], *_larger(bodies.get(i), found[len(rules) + i])) for i in range(len(rules))
    )


def _with_places(strengths, ratios, found, places):
    """Extremes, or those of places [m] where these are greater."""
    if not len(places):
        return found
    values = strengths.values(places)
    return tuple(
        _greater(extreme, places, values, ratio(values)) for extreme, ratio in zip(found, ratios, strict=True)
    )


def _greater(extreme: Extreme, places, values, ratios) -> Extreme:
    top = int(np.argmax(ratios))
    if not ratios[top] > extreme.ratio:
        return extreme
    ratio = float(ratios[top])
    return Extreme(tuple(float(x) for x in places[top]), ratio, max(ratio, extreme.upper), values[top])


def _bodies(strengths, means, prism):
    if not means:
        return ()
    return greatest_body_average(strengths, [mean.ratio for mean in means], prism)


def _larger(body: Extreme | None, peak: Extreme):
    if body is None:
        return None, None
    return max(body.ratio, peak.ratio), max(body.upper, peak.upper)
