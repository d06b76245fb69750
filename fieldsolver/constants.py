"""Physical constants (2019 SI; CODATA 2018), in SI units."""

import math

SPEED_OF_LIGHT = 299_792_458.0
MU_0 = 4e-7 * math.pi
EPSILON_0 = 1.0 / (MU_0 * SPEED_OF_LIGHT**2)
FREE_SPACE_IMPEDANCE = MU_0 * SPEED_OF_LIGHT
