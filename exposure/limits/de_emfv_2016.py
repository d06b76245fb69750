"""Germany, workers: thresholds of the ordinance of 2016, 3 kHz to 300 GHz."""

from exposure.limits.tables import GHZ, HZ, MICROTESLA, MINUTE, Band, Row, Table, levels_of
from exposure.limits.types import Level, Summation
from exposure.limits.use import Pulses, RulesOfUse

TITLE = "Arbeitsschutzverordnung zu elektromagnetischen Feldern (EMFV), Auslöseschwellen"
EDITION = "2016"
REFERENCE = "EMFV of 15 November 2016, Annexes 2 and 3 (it carries 2013/35/EU into German law)"
POPULATIONS = ("occupational",)
BRIEF_LOCAL_ABOVE = float("inf")  # Hz: brief exposure is limited by the rule of pulses
SUMMATION = Summation(
    electric_and_magnetic_add=(),
    clause="EMFV as 2013/35/EU: linear in field for stimulation, squares of E and of H apart for heating",
)
USE = RulesOfUse(
    cautions=(
        "stimulation thresholds are printed as peak values (236 V/m, 140 microtesla); shown here as rms",
        "lower thresholds; the upper ones (862 V/m peak; limbs 420 microtesla peak) need measures",
        "maximum at the worker's position: no average over the body",
        "E and H above 10 GHz are averaged over the shorter time for S, as in 2013/35/EU (from memory)",
        "limb and contact currents are tests of their own",
    ),
    pulses={
        "occupational": Pulses(
            fields=(),
            densities=((Band(10.0, 300_000.0), 1000.0),),
            clause="EMFV, Annex 3 (S over a pulse at most 1000 times the threshold, as 2013/35/EU)",
        )
    },
)

# peak values: E in V/m, B in microtesla; from 3 kHz as carried (lower frequencies are not)
ANNEX_2 = (Row(0.003, 10.0, 236.0, 140.0, None),)
RMS = 2**-0.5
# f in MHz where not said; the lower end belongs to the row, as in the directive
ANNEX_3 = (
    #   MHz          E V/m                 H A/m                  S W/m2
    Row(0.1, 1.0, 614.0, (1.63, -1), None, without_high=True),
    Row(1.0, 10.0, (614.0, -1), (1.63, -1), None, without_high=True),
    Row(10.0, 400.0, 61.4, 0.163, 10.0, without_high=True),
    Row(400.0, 2000.0, (3.07e-3, 0.5, HZ), (8.14e-6, 0.5, HZ), (25e-9, 1, HZ), without_high=True),
    Row(2000.0, 300_000.0, 137.3, 0.364, 50.0),
)
SIX_MINUTES = Band(0.1, 10_000.0)
SHORTER = Band(10_000.0, 300_000.0, without_low=True)
_HEATING = ("heating", "whole_body", "peak")
TABLES = (
    Table(
        "stimulation",
        "any",
        "peak",
        0.0,
        "EMFV, Annex 2",
        ANNEX_2,
        electric_unit=RMS,
        magnetic_unit=RMS * MICROTESLA,
    ),
    Table(*_HEATING, 360.0, "EMFV, Annex 3", ANNEX_3, band=SIX_MINUTES),
    Table(*_HEATING, (68 * MINUTE, -1.05, GHZ), "EMFV, Annex 3", ANNEX_3, band=SHORTER),
)


def reference_levels(population: str, frequency: float) -> tuple[Level, ...]:
    """The thresholds of Annex 2 (to 10 MHz) and Annex 3 (from 100 kHz) at a frequency [Hz]."""
    return levels_of("de_emfv_2016", TABLES, frequency, "lower frequencies are not carried")
