"""IEEE Std C95.1-2019: exposure reference levels, 3.35 kHz to 300 GHz."""

from dataclasses import replace

from exposure.limits.tables import GHZ, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import RulesOfUse

TITLE = "IEEE standard for safety levels with respect to human exposure (0 Hz to 300 GHz)"
EDITION = "C95.1-2019"
REFERENCE = (
    "IEEE Std C95.1-2019, Tables 7 and 8 (second-hand, 0.9; fields to 300 MHz read in the 1991 edition)"
)
POPULATIONS = ("general_public", "occupational")  # unrestricted, restricted
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: its rules of brief and pulsed exposure are not carried
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="IEEE C95.1-2019, several frequencies (from memory, confidence 0.7)",
    verified=False,
)
USE = RulesOfUse(
    cautions=(
        "second-hand and from memory in parts: get the standard before relying on it",
        "local levels to 6 GHz (whole-body fields times sqrt(5), densities times 5) are from memory, 0.7",
        "stimulation: E below 100 kHz and the restricted H are from memory",
        "S is that of the electric field (S_E), the lower of the two printed",
        "touch current 16.7 (50) mA, current of each foot 45 (100) mA, to 110 MHz, are other tests",
        "peaks of pulses are not carried",
    ),
)

# f in MHz.  Edges are not assigned by the text as seen: the lower value counts.  S is S_E of "S_E, S_H"
TABLE_7_UNRESTRICTED = (
    #   MHz              E V/m          H A/m             S W/m2
    Row(0.1, 1.34, 614.0, (16.3, -1), 1000.0),
    Row(1.34, 30.0, (823.8, -1), (16.3, -1), (1800.0, -2)),
    Row(30.0, 100.0, 27.5, (158.3, -1.668), 2.0),
    Row(100.0, 400.0, 27.5, 0.0729, 2.0),
    Row(400.0, 2000.0, None, None, (1 / 200, 1)),
    Row(2000.0, 300_000.0, None, None, 10.0),
)
TABLE_8_RESTRICTED = (
    Row(0.1, 1.0, 1842.0, (16.3, -1), 9000.0),
    Row(1.0, 30.0, (1842.0, -1), (16.3, -1), (9000.0, -2)),
    Row(30.0, 100.0, 61.4, (16.3, -1), 10.0),
    Row(100.0, 400.0, 61.4, 0.163, 10.0),
    Row(400.0, 2000.0, None, None, (1 / 40, 1)),
    Row(2000.0, 300_000.0, None, None, 50.0),
)
WHOLE_BODY = {"general_public": TABLE_7_UNRESTRICTED, "occupational": TABLE_8_RESTRICTED}
CLAUSES = {
    "general_public": "IEEE C95.1-2019, Table 7 (unrestricted)",
    "occupational": "IEEE C95.1-2019, Table 8 (restricted)",
}
LOCAL_FROM_400_MHZ = {
    "general_public": (Row(400.0, 2000.0, None, None, (0.058, 0.86)), Row(2000.0, 6000.0, None, None, 40.0)),
    "occupational": (Row(400.0, 2000.0, None, None, (0.29, 0.86)), Row(2000.0, 6000.0, None, None, 200.0)),
}
LOCAL_ABOVE_6_GHZ = {
    "general_public": (Row(6000.0, 300_000.0, None, None, (55.0, -0.177, GHZ)),),
    "occupational": (Row(6000.0, 300_000.0, None, None, (274.8, -0.177, GHZ)),),
}
STIMULATION = {
    "general_public": (163.0, 614.0),
    "occupational": (490.0, 1842.0),
}  # H A/m, E V/m below 100 kHz


def tables(population: str) -> tuple[Table, ...]:
    """Stimulation, whole-body and local levels of a population."""
    magnetic, electric = STIMULATION[population]
    memory = " (from memory)"
    return (
        Table(
            "stimulation",
            "any",
            "peak",
            0.0,
            "IEEE C95.1-2019, electrostimulation" + memory,
            (Row(0.00335, 0.1, electric, magnetic, None),),
            verified=False,
        ),
        Table(
            "stimulation",
            "any",
            "peak",
            0.0,
            "IEEE C95.1-2019, electrostimulation, magnetic field",
            (Row(0.1, 5.0, None, magnetic, None, without_low=True),),
            verified=population == "general_public",
        ),
        Table("heating", "whole_body", "mean", 1800.0, CLAUSES[population], WHOLE_BODY[population]),
        Table(
            "heating",
            "local",
            "peak",
            360.0,
            "IEEE C95.1-2019, local exposure to 6 GHz" + memory,
            (*_local(WHOLE_BODY[population][:4]), *LOCAL_FROM_400_MHZ[population]),
            verified=False,
        ),
        Table(
            "heating",
            "local",
            "peak",
            360.0,
            "IEEE C95.1-2019, local exposure above 6 GHz (second-hand)",
            LOCAL_ABOVE_6_GHZ[population],
        ),
    )


def _local(rows) -> tuple[Row, ...]:
    """Fields times sqrt(5), densities times 5."""
    return tuple(
        replace(
            row,
            electric=_times(row.electric, 5**0.5),
            magnetic=_times(row.magnetic, 5**0.5),
            power_density=_times(row.power_density, 5.0),
        )
        for row in rows
    )


def _times(printed, factor: float):
    return (printed[0] * factor, *printed[1:]) if isinstance(printed, tuple) else printed * factor


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The levels at a frequency [Hz]."""
    return levels_of("ieee_c95_1_2019", tables(population), frequency)
