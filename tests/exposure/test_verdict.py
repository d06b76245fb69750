"""The decision rule and the join of verdicts (design, section 6)."""

import math
from itertools import product

import pytest

from exposure.assessment.verdict import (
    EXCEEDS,
    UNDECIDED,
    WITHIN,
    DecisionRule,
    Ratio,
    decide,
    worst,
)

UPPER, BEST = DecisionRule("upper_bound"), DecisionRule("best_estimate")
HALF = DecisionRule("margin", 0.5)


def ratio(found, factor=1.02, searched=None):
    return Ratio(found, found if searched is None else searched, factor)


@pytest.mark.parametrize(
    ("rule", "found", "verdict"),
    [
        (UPPER, 0.5, WITHIN),
        (UPPER, 0.979, WITHIN),  # 0.979 * 1.02 = 0.9986
        (UPPER, 0.981, EXCEEDS),  # 0.981 * 1.02 = 1.0006
        (UPPER, 1.0, EXCEEDS),
        (BEST, 0.999, WITHIN),
        (BEST, 1.0, EXCEEDS),
        (HALF, 0.49, WITHIN),
        (HALF, 0.51, EXCEEDS),
        (UPPER, math.inf, EXCEEDS),
        (BEST, math.inf, EXCEEDS),
        (UPPER, math.nan, EXCEEDS),
    ],
)
def test_what_is_compared_with_one_follows_the_decision_rule(rule, found, verdict):
    assert decide(rule, ratio(found), [])[0] == verdict


@pytest.mark.parametrize("rule", [UPPER, BEST, HALF])
def test_a_doubt_takes_away_a_pass_and_is_the_reason(rule):
    assert decide(rule, ratio(0.1), ["powers do not balance"]) == (UNDECIDED, "powers do not balance")


@pytest.mark.parametrize("rule", [UPPER, BEST, HALF])
def test_what_exceeds_exceeds_whatever_else_is_doubtful(rule):
    assert decide(rule, ratio(1.5), ["powers do not balance"])[0] == EXCEEDS


def test_without_a_ratio_nothing_is_decided():
    assert decide(UPPER, None, [])[0] == UNDECIDED


def test_a_search_left_open_above_the_limit_is_not_a_pass():
    assert decide(UPPER, ratio(0.9, searched=1.2), [])[0] == UNDECIDED
    assert decide(UPPER, ratio(0.9, searched=math.inf), [])[0] == UNDECIDED


@pytest.mark.parametrize(("one", "other"), list(product((WITHIN, UNDECIDED, EXCEEDS), repeat=2)))
def test_exceeds_outweighs_undecided_outweighs_within(one, other):
    expected = EXCEEDS if EXCEEDS in (one, other) else UNDECIDED if UNDECIDED in (one, other) else WITHIN

    assert worst([one, other]) == expected


def test_nothing_to_judge_cannot_be_decided():
    """Design, section 6: no area and no property."""
    assert worst([]) == UNDECIDED


def test_upper_bound_holds_numerical_error_and_open_search():
    assert Ratio(0.5, 0.6, 1.1).upper == pytest.approx(0.66, rel=1e-12)
