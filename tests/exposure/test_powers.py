"""Powers of a transmission: line loss, duty factor, worst window.

Cases A10 and A11: FCC OET Bulletin 65, Supplement B (Edition 97-01), November 1997, pp. 12-14, and the
worksheet of its appendix B (read).
"""

import pytest

from exposure.site.model import Line, Transmission
from exposure.station.powers import line_loss, powers, time_on_air, worst_window

MINUTE = 60.0


def transmission(power=100.0, duty=1.0, on=None, off=None, line=None, frequency=14.2e6):
    pattern = (None if t is None else t * MINUTE for t in (on, off))
    return Transmission(
        "t", "a", frequency, power, "as stated", duty, "as stated", None, *pattern, None, line
    )


@pytest.mark.parametrize(
    ("power", "duty", "on", "off", "window", "printed"),
    [
        # case A10 a: 1500 W PEP SSB 20 %, 2 min on, 2 off, 2 on in 6
        (1500, 0.2, 2, 2, 6, 200.0),
        # b: 7 min on, 7 off: the whole 6 min; 16 of 30 min
        (1500, 0.2, 7, 7, 6, 300.0),
        (1500, 0.2, 7, 7, 30, 160.0),
        # c: 500 W, 40 %, 15 s in every 2 min
        (500, 0.4, 0.25, 1.75, 6, 25.0),
        (500, 0.4, 0.25, 1.75, 30, 25.0),
        # d: 250 W, 100 %, 5 on, 5 off
        (250, 1.0, 5, 5, 6, 250 * 5 / 6),
        (250, 1.0, 5, 5, 30, 125.0),
    ],
)
def test_average_power_is_that_of_the_regulators_examples(power, duty, on, off, window, printed):
    """Exact: hand arithmetic in print; b over 30 min is printed 159 W because 16/30 was rounded to 0.53."""
    found = powers(transmission(power, duty, on, off)).averaged(window * MINUTE)

    assert found == pytest.approx(printed, rel=1e-12)


def test_two_minutes_on_and_off_fill_16_of_30_minutes():
    """Seven whole periods and the last 2 min.

    Case A10 a prints 20 of 30 min: there 2 on, 2 off, 2 on repeat every 6 min, which is 4 on, 2 off.
    """
    assert worst_window(4, 2, 30) == pytest.approx(20 / 30, rel=1e-12)
    assert worst_window(2, 2, 30) == pytest.approx(16 / 30, rel=1e-12)


@pytest.mark.parametrize(
    ("on", "off", "window", "share"),
    [(7, 7, 30, 16 / 30), (10, 10, 30, 2 / 3), (10, 10, 6, 1.0), (5, 5, 6, 5 / 6), (3, 0, 30, 1.0)],
)
def test_worst_window_counts_whole_periods_and_the_start_of_the_next(on, off, window, share):
    """(n t1 + min(r, t1))/T; formulas.md 14, derived, agrees with the pages named above."""
    assert worst_window(on, off, window) == pytest.approx(share, rel=1e-12)


@pytest.mark.parametrize(("on", "off", "window"), [(7, 7, 30), (2, 5, 6), (0.3, 1.1, 6), (4, 1, 30)])
def test_no_window_of_the_pattern_holds_more_than_the_worst(on, off, window):
    """Another road: slide the window over the pattern in 400 steps; a step misses at most its own width."""
    period = on + off
    steps = [period * i / 400 for i in range(400)]
    ends = [(start, start + window) for start in steps]
    edges = range(int(window / period) + 3)
    shares = [
        sum(max(0, min(b, k * period + on) - max(a, k * period)) for k in edges) / window for a, b in ends
    ]

    assert max(shares) == pytest.approx(worst_window(on, off, window), abs=2 * period / 400 / window)
    assert max(shares) <= worst_window(on, off, window) * (1 + 1e-12)


def test_instantaneous_tests_take_the_peak_whatever_the_duty_and_pattern():
    """limits.md 2.4: stimulation at the envelope peak, no averaging, no duty factor."""
    found = powers(transmission(400, duty=0.2, on=1, off=9))

    assert found.averaged(0) == 400


def test_without_a_pattern_the_transmission_is_on_all_the_time():
    assert time_on_air(transmission(), 360) == 1.0


def test_stated_loss_is_credited_and_nothing_else():
    """3.0103 dB is half; mismatch is not credited (design, section 5)."""
    found = powers(transmission(100, line=Line(loss_db=3.0103)))

    assert found.accepted == pytest.approx(50, rel=1e-5)  # 10^0.30103 = 2.0000 to six figures


def test_without_a_line_no_loss_is_credited():
    assert powers(transmission(100)).accepted == 100


def test_loss_of_a_cable_is_in_proportion_to_its_length_and_at_most_the_regulators_figure():
    """Case A11: E = C D/100; 0.8 dB/100 ft of RG-213 on 20 m; the lowest published value is credited."""
    hundred_feet = line_loss(Line(cable="RG-213", length=30.48), 14.2e6).decibel
    fifty_feet = line_loss(Line(cable="RG-213", length=15.24), 14.2e6).decibel

    assert fifty_feet == pytest.approx(hundred_feet / 2, rel=1e-12)
    assert 0 < hundred_feet <= 0.8


def test_a_cable_at_a_frequency_without_published_loss_credits_nothing():
    found = line_loss(Line(cable="9913-type", length=30), 0.4e6)

    assert found.decibel == 0
    assert "none is credited" in found.source


def test_steps_lead_from_the_rating_to_each_averaged_power():
    """Each row is the row it follows times its factor; the last row of a time is its averaged power."""
    found = powers(transmission(100, 0.2, 2, 4, Line(loss_db=1.0)))

    rows = found.steps([360.0, 1800.0])

    assert rows[1].power == pytest.approx(rows[0].power * rows[1].factor, rel=1e-12)
    assert [rows[4].power, rows[6].power] == [
        pytest.approx(found.averaged(t), rel=1e-12) for t in (360.0, 1800.0)
    ]
    assert all(row.source for row in rows)
