"""Exposure ratios from squared strengths: scaling, sums, groups, states, means.

Expected values follow from the definitions in design.md section 5 and the sums of limits.md 2.7.
"""

from dataclasses import dataclass, replace

import numpy as np
import pytest

from exposure.assessment.ratios import FREE_SPACE_IMPEDANCE, Emission
from exposure.assessment.rules import rule
from exposure.assessment.sums import of_levels
from exposure.limits.types import Level, Summation

APART = Summation((), "apart")
ADDED = Summation((("heating", "whole_body", 30e6),), "as ICNIRP 2020")
BODY = Level("heating", "whole_body", "mean", 30.0, 0.1, None, 1800.0, "table 5")
LOCAL = Level("heating", "local", "peak", 60.0, 0.2, None, 360.0, "table 6")
NERVE = Level("stimulation", "any", "peak", 83.0, 21.0, None, 0.0, "table 8")
DENSITY = Level("heating", "whole_body", "mean", None, None, 2.0, 1800.0, "table 5")
VALUES = np.array([[900.0, 0.0025], [1.0, 0.01], [400.0, 0.0004]])  # E^2, H^2 per watt at three points


@dataclass(frozen=True)
class Power:
    """peak [W], and its mean over any time."""

    peak: float = 1.0
    mean: float = 1.0

    def averaged(self, time):
        return self.mean if time else self.peak


def emission(name="one", column=0, power=None, group=None, frequency=7e6, states=1):
    return Emission(name, group, frequency, power or Power(), column, states)


def made(levels, *emissions, summation=APART):
    return of_levels("x", "general_public", emissions, {e.name: levels for e in emissions}, summation)


def test_heating_ratio_is_the_larger_squared_quotient():
    """(30/30)^2 against (0.05/0.1)^2; then (0.1/0.1)^2; then (20/30)^2."""
    found = made((BODY,), emission()).ratio(VALUES)

    assert found == pytest.approx([1.0, 1.0, 4 / 9], rel=1e-12)


@pytest.mark.parametrize("level", [BODY, LOCAL, NERVE, DENSITY])
def test_every_ratio_of_one_transmission_is_proportional_to_power(level):
    """Also stimulation: the quotient of fields is squared (design, section 5)."""
    once = made((level,), emission(power=Power(1.0, 1.0))).ratio(VALUES)
    twice = made((level,), emission(power=Power(2.0, 2.0))).ratio(VALUES)

    assert twice == pytest.approx(2 * once, rel=1e-12)


def test_heating_takes_the_mean_power_and_stimulation_the_peak():
    power = Power(peak=100.0, mean=10.0)

    heating = made((BODY,), emission(power=power)).ratio(VALUES)
    stimulation = made((NERVE,), emission(power=power)).ratio(VALUES)

    assert heating[0] == pytest.approx(10 * 900 / 30**2, rel=1e-12)
    assert stimulation[0] == pytest.approx(100 * 900 / 83**2, rel=1e-12)


def test_where_only_power_density_is_given_the_larger_equivalent_density_counts():
    """max(E^2/eta, eta H^2)/S; eta 376.73 ohm."""
    found = made((DENSITY,), emission(frequency=1e9)).ratio(VALUES)

    expected = [
        900 / FREE_SPACE_IMPEDANCE / 2,
        0.01 * FREE_SPACE_IMPEDANCE / 2,
        400 / FREE_SPACE_IMPEDANCE / 2,
    ]
    assert found == pytest.approx(expected, rel=1e-12)


def two(group=(None, None), **more):
    """Two emissions with E^2 and H^2 (0.5, 0.2) and (0.3, 0.6) of their level of BODY."""
    pair = (emission("a", 0, group=group[0], **more), emission("b", 2, group=group[1], **more))
    return pair, np.array([[0.5 * 900, 0.2 * 0.01, 0.3 * 900, 0.6 * 0.01]])


def test_sums_of_electric_and_magnetic_quotients_stand_apart_and_the_larger_counts():
    """limits.md 1.1: 0.5 + 0.3 and 0.2 + 0.6."""
    pair, values = two()

    assert made((BODY,), *pair).ratio(values) == pytest.approx([0.8], rel=1e-12)


def test_a_document_that_adds_both_does_so_up_to_its_frequency_and_takes_the_larger_above():
    """limits.md 2.7: (0.5 + 0.2) + (0.3 + 0.6), and max(0.5, 0.2) + max(0.3, 0.6)."""
    low, values = two(frequency=30e6)
    high, _ = two(frequency=30.1e6)

    assert made((BODY,), *low, summation=ADDED).ratio(values) == pytest.approx([1.6], rel=1e-12)
    assert made((BODY,), *high, summation=ADDED).ratio(values) == pytest.approx([1.1], rel=1e-12)


def test_a_transmission_alone_is_judged_without_addition():
    """limits.md trap 6."""
    pair, values = two()

    both = made((BODY,), *pair, summation=ADDED)

    assert both.alone("a").ratio(values) == pytest.approx([0.5], rel=1e-12)
    assert both.alone("b").ratio(values) == pytest.approx([0.6], rel=1e-12)


def test_a_way_to_sum_that_was_not_verified_gives_the_largest_sum_there_is():
    pair, values = two()

    found = made((BODY,), *pair, summation=replace(APART, verified=False))

    assert found.ratio(values) == pytest.approx([1.6], rel=1e-12)
    assert any("not verified" in note for note in found.notes)


def test_of_transmissions_that_exclude_each_other_the_worst_counts():
    """max(0.5, 0.3) and max(0.2, 0.6): no sum, and no document's addition either."""
    pair, values = two(group=("radio", "radio"))

    assert made((BODY,), *pair, summation=ADDED).ratio(values) == pytest.approx([0.6], rel=1e-12)


def test_a_group_and_a_transmission_outside_it_add():
    """max(0.5, 0.3) + 0.1 by E, max(0.2, 0.6) + 0.1 by H."""
    pair, values = two(group=("radio", "radio"))
    values = np.column_stack([values, [[0.1 * 900, 0.1 * 0.01]]])

    found = made((BODY,), *pair, emission("c", 4)).ratio(values)

    assert found == pytest.approx([0.7], rel=1e-12)


def test_equal_words_of_one_group_and_none_are_not_one_group():
    """Two without a group are two groups."""
    pair, values = two(group=("radio", None))

    assert made((BODY,), *pair).ratio(values) == pytest.approx([0.8], rel=1e-12)


def test_stimulation_adds_field_strengths_and_heating_their_squares():
    """limits.md trap 5: five carriers at 44 % of 83 V/m: (5 * 0.44)^2 = 4.84; squares 5 * 0.44^2 = 0.968."""
    five = [emission(str(i), 2 * i) for i in range(5)]
    values = np.tile([(0.44 * 83) ** 2, 0.0], 5)[None, :]
    squared = replace(NERVE, effect="heating")

    assert made((NERVE,), *five).ratio(values) == pytest.approx([4.84], rel=1e-12)
    assert made((squared,), *five).ratio(values) == pytest.approx([0.968], rel=1e-12)


def test_order_of_transmissions_does_not_matter():
    pair, values = two()

    assert made((BODY, NERVE), *pair).ratio(values) == made((BODY, NERVE), *pair[::-1]).ratio(values)


def test_of_the_states_of_an_antenna_the_worst_counts():
    """Columns: E^2, H^2 of one state, then of the other."""
    values = np.array([[0.1 * 900, 0.4 * 0.01, 0.3 * 900, 0.2 * 0.01]])

    assert made((BODY,), emission(states=2)).ratio(values) == pytest.approx([0.4], rel=1e-12)


def test_a_quotient_is_infinite_within_a_conductor_even_at_no_power():
    values = np.array([[np.inf, np.inf]])

    assert made((BODY, NERVE, DENSITY), emission(power=Power(0.0, 0.0))).ratio(values) == [np.inf]


def test_the_worst_of_the_tests_is_the_ratio_and_the_cause_says_which():
    """7 MHz, peak 100 times the mean: stimulation rules (limits.md trap 4)."""
    found = made((BODY, LOCAL, NERVE), emission(power=Power(100.0, 1.0)))
    values = np.array([[400.0, 0.001]])

    cause = found.cause(values)

    assert found.ratio(values) == pytest.approx([100 * 400 / 83**2], rel=1e-12)
    assert (cause.effect, cause.quantity, cause.clause) == ("stimulation", "electric field", "table 8")
    assert cause.electric == pytest.approx(np.sqrt(100 * 400), rel=1e-12)  # at the power of that test


@pytest.mark.parametrize("level", [BODY, NERVE])
def test_shares_are_parts_of_the_ratio(level):
    pair, values = two()
    found = made((level,), *pair)

    shares = found.cause(values).shares

    assert sum(part for _, part in shares) == pytest.approx(found.ratio(values)[0], rel=1e-12)
    assert found.cause(values).transmission == shares[0][0]


def test_several_rows_for_one_test_are_all_judged_and_never_added():
    """Two rows of one document for the same test: the stricter counts."""
    strict = replace(BODY, electric=15.0)

    assert made((BODY, strict), emission()).ratio(VALUES)[0] == pytest.approx(4.0, rel=1e-12)


def test_tests_of_means_and_of_peaks_part():
    found = made((BODY, LOCAL, NERVE), emission())

    assert [test.scope for test in found.of_mean().tests] == ["whole_body"]
    assert [test.scope for test in found.of_peak().tests] == ["local", "any"]


def test_a_pass_by_a_level_that_was_not_verified_is_named():
    """limits.md, rule: such a value gives no pass."""
    doubtful = replace(BODY, verified=False, clause="from memory")

    assert "from memory" in made((doubtful,), emission()).rests_on_memory(VALUES[:1])
    assert made((BODY,), emission()).rests_on_memory(VALUES[:1]) is None


def test_a_pass_does_not_rest_on_a_doubtful_level_that_a_verified_one_outweighs():
    doubtful = replace(LOCAL, verified=False, clause="from memory")

    assert made((BODY, doubtful), emission()).rests_on_memory(VALUES[:1]) is None


def test_a_doubtful_level_is_the_only_one_of_its_effect():
    doubtful = replace(NERVE, verified=False, clause="from memory")

    assert "from memory" in made((BODY, doubtful), emission()).rests_on_memory(VALUES[:1])


def test_a_frequency_outside_a_document_is_missing_and_not_ignored():
    """47 CFR 1.1310: no MPE below 0.3 MHz."""
    low, high = emission("low", frequency=0.137e6), emission("high", 2, frequency=7e6)

    found = rule("us_fcc", "general_public", (low, high))

    assert any(text.startswith("low:") for text in found.missing)
    assert [term.emission.name for test in found.tests for term in test.terms] == ["high"]


def test_icnirp_2020_stimulation_rules_an_ssb_station_at_3_7_mhz():
    """limits.md trap 4: 83 V/m at PEP against 120 V/m at the mean: 20 % duty, E^2 = 400 per watt, 100 W."""
    found = rule("icnirp_2020", "general_public", (emission(power=Power(100.0, 20.0), frequency=3.7e6),))
    values = np.array([[100.0, 1e-6]])

    assert found.ratio(values) == pytest.approx([100 * 100 / 83**2], rel=1e-12)
    assert found.cause(values).effect == "stimulation"


@pytest.mark.parametrize("frequency, power", [(399e6, 1.0), (430e6, 10.0)])
def test_above_400_mhz_a_burst_counts_with_its_peak_against_the_local_level(frequency, power):
    """ICNIRP 2020, Table 7 (from memory) limits brief exposure there; Table 6 without average bounds it."""
    burst = emission(power=Power(peak=10.0, mean=1.0), frequency=frequency)
    found = rule("icnirp_2020", "general_public", (burst,))

    (local,) = (test for test in found.tests if test.scope == "local")
    assert local.terms[0].power == power


def test_a_short_loud_burst_meets_the_ceiling_of_a_rule_of_pulses():
    """ICNIRP 1998, 0.475 MHz: at 1 % duty the averaged ratio is 0.5, but 615 V/m is over the ceiling.

    Ceiling: level 87 V/m times 10^(0.665 log10(f/0.1 MHz) + log10 1.5) (shared facts, limits 3) over sqrt 2
    for the rms of a carrier at its peak.
    """
    burst = emission(power=Power(peak=1.0, mean=0.01), frequency=0.475e6)
    found = rule("icnirp_1998", "general_public", (burst,)).ratio(np.array([[615.0**2, 1e-12]]))

    assert found[0] > 5


def test_two_transmissions_add_linearly_where_a_document_sums_nerve_stimulation():
    """ICNIRP 1998 to 10 MHz: sum of E/87 at peak envelope power; 2 x 60 V/m are over it, one is not."""
    pair = [
        emission("one", column=0, power=Power(1.0, 0.2), frequency=1.85e6),
        emission("two", column=2, power=Power(1.0, 0.2), frequency=3.65e6),
    ]
    values = np.array([[3600.0, 1e-12, 3600.0, 1e-12]])

    assert rule("icnirp_1998", "general_public", tuple(pair)).ratio(values)[0] > 1
    assert rule("icnirp_1998", "general_public", (pair[0],)).ratio(values)[0] < 1


def test_a_set_that_limits_only_stimulation_decides_nothing_alone():
    found = rule("icnirp_2010", "general_public", (emission(frequency=3.6e6),))

    assert any("another set has to judge it" in reason for reason in found.missing)
