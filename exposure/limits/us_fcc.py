"""United States: maximum permissible exposure of the Federal Communications Commission."""

from exposure.limits.tables import Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import ANY_ONE, E_AND_H, ONLY_S, RulesOfUse, ZoneRow

TITLE = "FCC limits for maximum permissible exposure (MPE)"
EDITION = "47 CFR 1.1310(e)(1), as amended 2020"
REFERENCE = (
    "Code of Federal Regulations, Title 47, section 1.1310 (e)(1), Table 1; OET Bulletin 65 (Edition 97-01)"
)
POPULATIONS = ("general_public", "occupational")
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: no limit of brief local exposure
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="OET Bulletin 65, section 2: quotients of S, or of the squares of E and of H apart (from memory)",
)
_NEAR = "OET Bulletin 65, section 2 (from memory, confidence 0.85)"
USE = RulesOfUse(
    cautions=(
        "S below 300 MHz is the equivalent of a plane wave, E^2/377 ohm or 377 ohm H^2, not a power flow",
        "not for portable devices (within 20 cm of the body); specific absorption limits apply to them",
        "occupational limits only for persons who know of the exposure and can control it",
        "general population: only a duty that lies in the emission itself may be credited (from memory)",
        "no limit of limb or contact current, no ceiling of pulses",
    ),
    zones=(
        ZoneRow(Band(0.3, 300.0), E_AND_H, E_AND_H, ANY_ONE, _NEAR),
        ZoneRow(Band(300.0, 100_000.0, without_low=True), ONLY_S, ONLY_S, ONLY_S, _NEAR),
    ),
)

# S in mW/cm2 as printed; f in MHz.  Edges are not assigned by the text: the lower value counts.
TABLE_1_OCCUPATIONAL = (
    #   MHz             E V/m         H A/m        S mW/cm2
    Row(0.3, 3.0, 614.0, 1.63, 100.0),
    Row(3.0, 30.0, (1842.0, -1), (4.89, -1), (900.0, -2)),
    Row(30.0, 300.0, 61.4, 0.163, 1.0),
    Row(300.0, 1500.0, None, None, (1 / 300, 1)),
    Row(1500.0, 100_000.0, None, None, 5.0),
)
TABLE_1_GENERAL = (
    Row(0.3, 1.34, 614.0, 1.63, 100.0),
    Row(1.34, 30.0, (824.0, -1), (2.19, -1), (180.0, -2)),
    Row(30.0, 300.0, 27.5, 0.073, 0.2),
    Row(300.0, 1500.0, None, None, (1 / 1500, 1)),
    Row(1500.0, 100_000.0, None, None, 1.0),
)
TABLES = {
    "occupational": Table(
        "heating", "whole_body", "mean", 360.0, "47 CFR 1.1310(e)(1), Table 1(i)", TABLE_1_OCCUPATIONAL, 10.0
    ),
    "general_public": Table(
        "heating", "whole_body", "mean", 1800.0, "47 CFR 1.1310(e)(1), Table 1(ii)", TABLE_1_GENERAL, 10.0
    ),
}


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The level of Table 1 at a frequency [Hz]."""
    remark = "below 0.3 MHz only specific absorption rates apply"
    return levels_of("us_fcc", (TABLES[population],), frequency, remark)
