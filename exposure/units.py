"""Units at the edge of the program; everything inside is SI."""

FOOT = 0.3048  # [m], exact by definition (international foot, 1959)
INCH = 0.0254  # [m]
MINUTE = 60.0  # [s]
HUNDRED_FEET = 100 * FOOT  # [m], the length for which cable loss is printed in the USA
