"""Units at the edge of the program; everything inside is SI."""

import math

FOOT = 0.3048  # [m], exact by definition (international foot, 1959)
INCH = 0.0254  # [m]
MINUTE = 60.0  # [s]
HUNDRED_FEET = 100 * FOOT  # [m], the length for which cable loss is printed in the USA


def ratio_of_decibels(decibels: float) -> float:
    """Power ratio of a loss or gain, 10^(dB/10). [1]"""
    return 10 ** (decibels / 10)


def decibels_of_ratio(ratio: float) -> float:
    """Loss or gain of a power ratio, 10 log10(ratio). [dB]"""
    return 10 * math.log10(ratio)
