"""Japan: Ministry of Internal Affairs and Communications, 10 kHz to 300 GHz."""

from exposure.limits.tables import Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import RulesOfUse

TITLE = "Japanese radio-radiation protection values (general environment) and guideline (managed environment)"
EDITION = "Enforcement rule of the Radio Act as amended 2015; guideline for managed environments"
REFERENCE = (
    "Regulations for Enforcement of the Radio Act, article 21-4 and its annexed table (number of the article "
    "from memory)"
)
POPULATIONS = ("general_public", "occupational")  # general, managed environment
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: no limit of brief local exposure is carried
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="Japanese rule, several frequencies: squares of E and of H apart, S linear, stimulation linear",
)
USE = RulesOfUse(
    cautions=(
        "the managed environment is a guideline, not law (from memory, confidence 0.85)",
        "where exposure is not uniform the body mean meets the table, the maximum of S its own value",
        "mobile and emergency stations and mean powers up to 20 mW are outside the rule",
        "ground reflection has to be included; distances count from the nearest end of element or boom",
    ),
)

# f in MHz; the lower end of a range is exclusive, the upper inclusive
UNIFORM = {
    "general_public": (
        #   MHz                E V/m            H A/m              S W/m2
        Row(0.1, 3.0, 275.0, (2.18, -1), None, without_low=True),
        Row(3.0, 30.0, (824.0, -1), (2.18, -1), None, without_low=True),
        Row(30.0, 300.0, 27.5, 0.0728, 2.0, without_low=True),
        Row(300.0, 1500.0, (1.585, 0.5), (1 / 237.8, 0.5), (1 / 150, 1), without_low=True),
        Row(1500.0, 300_000.0, 61.4, 0.163, 10.0, without_low=True),
    ),
    "occupational": (
        Row(0.1, 3.0, 614.0, (4.9, -1), None, without_low=True),
        Row(3.0, 30.0, (1842.0, -1), (4.9, -1), None, without_low=True),
        Row(30.0, 300.0, 61.4, 0.163, 10.0, without_low=True),
        Row(300.0, 1500.0, (3.54, 0.5), (1 / 106, 0.5), (1 / 30, 1), without_low=True),
        Row(1500.0, 300_000.0, 137.0, 0.365, 50.0, without_low=True),
    ),
}
# spatial maximum where exposure is not uniform; at 1 GHz the lower counts
MAXIMUM = {
    "general_public": (Row(300.0, 1000.0, None, None, 40.0), Row(1000.0, 300_000.0, None, None, 20.0)),
    # five times the general environment, as everywhere in the table: from memory, below 0.8
    "occupational": (Row(300.0, 1000.0, None, None, 200.0), Row(1000.0, 300_000.0, None, None, 100.0)),
}
STIMULATION = {
    "general_public": (Row(0.01, 10.0, 83.0, 21.0, None, without_low=True),),
    # as ICNIRP 2010: from memory, below 0.8
    "occupational": (Row(0.01, 10.0, 170.0, 80.0, None, without_low=True),),
}
NAMES = {
    "general_public": "Enforcement Rule of the Radio Act, article 21-4, annexed table",
    "occupational": "Japanese guideline, managed environment",
}


def tables(population: str) -> tuple[Table, ...]:
    """Stimulation, the table of uniform exposure, the maximum of non-uniform exposure."""
    name, read = NAMES[population], population == "general_public"
    stimulation, maximum = (
        f"{name}, stimulation (10 kHz to 10 MHz)",
        f"{name}, non-uniform exposure (maximum)",
    )
    return (
        Table("stimulation", "any", "peak", 0.0, stimulation, STIMULATION[population], verified=read),
        Table("heating", "whole_body", "mean", 360.0, name, UNIFORM[population]),
        Table("heating", "local", "peak", 360.0, maximum, MAXIMUM[population], verified=read),
    )


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The levels at a frequency [Hz]."""
    return levels_of("jp_mic", tables(population), frequency, "the lower end is exclusive")
