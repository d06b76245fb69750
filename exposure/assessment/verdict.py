"""The decision rule, and how verdicts join: exceeds > cannot be decided > within.

Nothing is within limits unless every ingredient was computed, checked and rests on a level that was
read in print.  What exceeds, exceeds, whatever else is unknown.
"""

import math
from dataclasses import dataclass

WITHIN, EXCEEDS, UNDECIDED = "within limits", "exceeds limits", "cannot be decided"
ORDER = (WITHIN, UNDECIDED, EXCEEDS)


@dataclass(frozen=True)
class DecisionRule:
    """What is compared with the limit.

    kind : "upper_bound" (numerical error added), "best_estimate", or "margin" (the best estimate
    against `margin` instead of 1).
    """

    kind: str
    margin: float | None = None

    def raised(self, factor: float) -> float:
        """Factor on an exposure ratio before it is compared with 1; `factor` is the numerical error's."""
        if self.kind == "best_estimate":
            return 1.0
        return 1 / self.margin if self.kind == "margin" else factor

    def words(self) -> str:
        """For the report."""
        return {
            "upper_bound": "the exposure ratio with its numerical error added is compared with 1",
            "best_estimate": "the best estimate of the exposure ratio is compared with 1",
            "margin": f"the best estimate of the exposure ratio is compared with {self.margin}",
        }[self.kind]


@dataclass(frozen=True)
class Ratio:
    """An exposure ratio as found, what the search left open, and the factor of numerical error."""

    found: float
    searched: float
    factor: float

    @property
    def upper(self) -> float:
        """Upper bound, numerical error and open search added."""
        return max(self.found, self.searched) * self.factor


def decide(rule: DecisionRule, ratio: Ratio | None, doubts) -> tuple[str, str]:
    """Verdict and reason from a ratio (None: there is none) and reasons not to call it within limits."""
    doubts = [doubt for doubt in doubts if doubt]
    if ratio is not None:
        exceeds = _exceeds(rule, ratio)
        if exceeds:
            return EXCEEDS, exceeds
        if rule.kind == "upper_bound" and not ratio.upper < 1:
            doubts.append(f"the search for the greatest exposure ratio was left open up to {ratio.upper:.3g}")
    elif not doubts:
        doubts = ["no exposure ratio was found"]
    return (UNDECIDED, "; ".join(doubts)) if doubts else (WITHIN, "")


def _exceeds(rule: DecisionRule, ratio: Ratio) -> str:
    if math.isnan(ratio.found):
        return "the exposure ratio is not a number"
    if math.isinf(ratio.found):
        return "a conductor passes through it, or within three of its radii"
    compared = ratio.found * rule.raised(ratio.factor)
    if ratio.found >= 1:
        return f"exposure ratio {ratio.found:.3g}"
    if compared >= 1 and rule.kind == "upper_bound":
        return f"exposure ratio {ratio.found:.4g}, with numerical error {compared:.4g}"
    if compared >= 1:
        return f"exposure ratio {ratio.found:.3g} is not below the stated margin of {rule.margin:g}"
    return ""


def worst(verdicts) -> str:
    """Of several; nothing to judge cannot be decided."""
    return max(verdicts, key=ORDER.index, default=UNDECIDED)
