"""Time averaging and duty, worked in print: FCC OET Bulletin 65 Supplement B (Edition 97-01), November 1997,
eq. (2) and pp. 12-14 (read).

Averaging time 6 minutes (controlled), 30 minutes (uncontrolled); sum S_exp t_exp = S_lim t_avg (eq. 2).
"""

from dataclasses import dataclass


@dataclass(frozen=True)
class Example:
    """A station's pattern and the average power that is printed.

    peak_power_w; duty: of the mode while transmitting; pattern_s: seconds on, off, repeated;
    controlled_w, uncontrolled_w: averages over 360 s and 1800 s.  tolerance_w: rounding of the source.
    """

    name: str
    peak_power_w: float
    duty: float
    pattern_s: tuple[float, float]
    controlled_w: float
    uncontrolled_w: float
    controlled_tolerance_w: float = 0.0
    uncontrolled_tolerance_w: float = 0.0


EXAMPLES = (
    # 2 on, 2 off, 2 on, repeated every 6 minutes as 20 of 30 printed: 4 of 6 minutes on
    Example("SSB, 2 minutes on, 2 off, 2 on", 1500, 0.20, (240, 120), 200, 200),
    # 6/6; 16/30, the worst window (7 + 7 + 2 minutes), printed as 0.53: 159 W, unrounded 160 W
    Example("SSB, 7 minutes on, 7 off", 1500, 0.20, (420, 420), 300, 160, uncontrolled_tolerance_w=1.0),
    # 45/360 and 225/1800
    Example("CW, 15 seconds every 2 minutes", 500, 0.40, (15, 105), 25, 25),
    # 5/6, printed as 208.3; 15/30
    Example("FM, 5 minutes on, 5 off", 250, 1.00, (300, 300), 208.3, 125, controlled_tolerance_w=0.05),
)

# eq. (2): at twice a limit of 1 mW/cm2 with 6 minutes, 3 minutes of exposure are allowed
TWICE_THE_LIMIT_MINUTES = 3.0
