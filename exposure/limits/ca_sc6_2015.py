"""Canada: Health Canada's Safety Code 6, 3 kHz to 300 GHz."""

from exposure.limits.tables import MHZ, MINUTE, Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import RulesOfUse

TITLE = "Safety Code 6: limits of human exposure to radiofrequency fields (3 kHz to 300 GHz)"
EDITION = "2015"
REFERENCE = "Health Canada, Safety Code 6 (2015); the numbers of its tables are from memory"
POPULATIONS = ("general_public", "occupational")  # uncontrolled, controlled
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: no limit of brief local exposure is carried
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="Safety Code 6 (2015), several frequencies: linear for nerve stimulation, squares for heating",
)
USE = RulesOfUse(
    cautions=(
        "nerve stimulation and heating both apply from 100 kHz to 10 MHz",
        "nerve stimulation takes the rms at the peak of the envelope, exceeded at no moment",
        "no level of E for heating below 1.10 (controlled: 1.29) MHz",
        "induced and contact currents have tables of their own, which are not carried",
        "binds amateurs through RBR-4, section 12, and CPC-2-0-03, section 7.1",
    ),
)

# f in MHz.  Edges are not assigned by the text: the lower value counts
STIMULATION = {
    "general_public": (Row(0.003, 10.0, 83.0, 90.0, None),),
    "occupational": (Row(0.003, 10.0, 170.0, 180.0, None),),
}
# H above 10 MHz, 87/sqrt(f) and 0.73/f from memory, continuity exact
HEATING = {
    "general_public": (
        #   MHz                  E V/m              H A/m                 S W/m2
        Row(0.1, 10.0, None, (0.73, -1), None),
        Row(1.10, 10.0, (87.0, -0.5), None, None),
        Row(10.0, 20.0, 27.46, 0.0728, 2.0),
        Row(20.0, 48.0, (58.07, -0.25), (0.1540, -0.25), (8.944, -0.5)),
        Row(48.0, 300.0, 22.06, 0.05852, 1.291),
        Row(300.0, 6000.0, (3.142, 0.3417), (0.008335, 0.3417), (0.02619, 0.6834)),
        Row(6000.0, 15_000.0, 61.4, 0.163, 10.0),
        Row(15_000.0, 150_000.0, 61.4, 0.163, 10.0),
        Row(150_000.0, 300_000.0, (0.158, 0.5), (4.21e-4, 0.5), (6.67e-5, 1)),
    ),
    "occupational": (
        Row(0.1, 10.0, None, (1.6, -1), None),
        Row(1.29, 10.0, (193.0, -0.5), None, None),
        Row(10.0, 20.0, 61.4, 0.163, 10.0),
        Row(20.0, 48.0, (129.8, -0.25), (0.3444, -0.25), (44.72, -0.5)),
        Row(48.0, 100.0, 49.33, 0.1309, 6.455),
        Row(100.0, 6000.0, (15.60, 0.25), (0.04138, 0.25), (0.6455, 0.5)),
        Row(6000.0, 15_000.0, 137.0, 0.364, 50.0),
        Row(15_000.0, 150_000.0, 137.0, 0.364, 50.0),
        Row(150_000.0, 300_000.0, (0.354, 0.5), (9.40e-4, 0.5), (3.33e-4, 1)),
    ),
}
# 6 minutes; from 15 GHz 616000/f^1.2 minutes, f in MHz
SIX_MINUTES = Band(0.1, 15_000.0, without_high=True)
SHORTER = Band(15_000.0, 300_000.0)


def tables(population: str) -> tuple[Table, ...]:
    """Nerve stimulation, then heating."""
    code = {"general_public": "Table 5", "occupational": "Table 6"}[population]
    clause = f"Safety Code 6 (2015), Tables 3 and 4 to 10 MHz, {code} above (SAR)"
    rows = HEATING[population]
    short = (616000 * MINUTE, -1.2, MHZ)
    nerve = "Safety Code 6 (2015), Tables 3 and 4 (NS)"
    return (
        Table("stimulation", "any", "peak", 0.0, nerve, STIMULATION[population]),
        Table("heating", "whole_body", "mean", 360.0, clause, rows, band=SIX_MINUTES),
        Table("heating", "whole_body", "mean", short, clause, rows, band=SHORTER),
    )


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The levels at a frequency [Hz]."""
    return levels_of("ca_sc6_2015", tables(population), frequency)
