"""Conductivity of metals.

S. Ramo, J. R. Whinnery, T. Van Duzer, Fields and Waves in Communication Electronics, table of
skin-effect properties (from memory, confidence 0.97).  Each value is the highest in use for the
metal (annealed, pure), so that no more loss is credited than the wire has for certain.
"""

import math

METALS = {
    # sigma [S/m]
    "perfect": math.inf,
    "silver": 61.7e6,
    "copper": 58.0e6,
    "aluminium": 37.2e6,
    "brass": 15.7e6,
}
