"""Rules for the use of limits, as data: zones, pulses, sums, cautions."""

from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from typing import Literal

from exposure.limits.tables import Band, Printed, Table, value
from exposure.limits.types import Level

Zone = Literal["reactive", "radiative", "far"]
Quantity = Literal["electric", "magnetic", "power_density"]
Alternatives = tuple[tuple[Quantity, ...], ...]

SPEED_OF_LIGHT = 299792458.0  # m/s, exact
PI = 3.141592653589793

E_AND_H: Alternatives = (("electric", "magnetic"),)
ANY_ONE: Alternatives = (("electric",), ("magnetic",), ("power_density",))
S_OR_BOTH: Alternatives = (("power_density",), ("electric", "magnetic"))
ONLY_S: Alternatives = (("power_density",),)
ALL_PRINTED: Alternatives = (("electric", "magnetic", "power_density"),)
NONE_USABLE: Alternatives = ()


@dataclass(frozen=True)
class ZoneRow:
    """Which quantities show compliance in each zone.

    One of the alternatives must be met, with all of its quantities; without any the document has no
    reference level in that zone.
    """

    band: Band
    reactive: Alternatives
    radiative: Alternatives
    far: Alternatives
    clause: str
    verified: bool = True


@dataclass(frozen=True)
class Pulses:
    """Ceilings of instantaneous exposure as multiples of the averaged levels.

    fields : (band, factor on the field level); densities : (band, factor on the density level).
    A field factor is taken to limit the instantaneous field, sqrt(2) times the rms at the peak of the
    envelope: the stricter of the two readings.
    """

    fields: tuple[tuple[Band, Printed], ...]
    densities: tuple[tuple[Band, float], ...]
    clause: str
    verified: bool = True

    def level(self, level: Level, frequency: float) -> Level | None:
        """The ceiling that goes with an averaged level at a frequency [Hz], judged at peak envelope power."""
        times = _factor(self.fields, frequency)
        density = _factor(self.densities, frequency)
        ceiling = replace(
            level,
            scope="any",
            spatial="peak",
            electric=_times(level.electric, times, 2**-0.5),
            magnetic=_times(level.magnetic, times, 2**-0.5),
            power_density=_times(level.power_density, density, 1.0),
            averaging_time_s=0.0,
            clause=self.clause,
            verified=level.verified and self.verified,
        )
        empty = ceiling.electric is None and ceiling.magnetic is None and ceiling.power_density is None
        return None if empty else ceiling


@dataclass(frozen=True)
class RulesOfUse:
    """What stands beside the tables of a document.

    cautions : one line each; zones : empty where every printed quantity counts everywhere;
    pulses : population -> ceilings; stimulation_sums : population -> table whose levels count, without
    averaging, where two or more transmissions are summed linearly; silent : (from Hz, what the document
    does not limit from there on), so that a pass by it alone decides nothing.
    """

    cautions: tuple[str, ...]
    zones: tuple[ZoneRow, ...] = ()
    pulses: Mapping[str, Pulses] = field(default_factory=dict)
    stimulation_sums: Mapping[str, Table] = field(default_factory=dict)
    silent: tuple[float, str] | None = None


def zone(distance: float, frequency: float, antenna_size: float) -> Zone:
    """Zone of a point by its distance [m] from the nearest conductor.

    Reactive up to lambda/2pi, far beyond 2 D^2/lambda (D [m], the largest extent of the antenna);
    at an edge the nearer zone.  ICNIRP 2020 and OET Bulletin 65 give these as guides (from memory, 0.9).
    """
    wavelength = SPEED_OF_LIGHT / frequency
    if distance <= wavelength / (2 * PI):
        return "reactive"
    return "far" if distance > 2 * antenna_size**2 / wavelength else "radiative"


def _factor(rows, frequency: float) -> float | None:
    found = (value(factor, frequency) for band, factor in rows if band.covers(frequency / 1e6))
    return min(found, default=None)


def _times(level: float | None, factor: float | None, share: float) -> float | None:
    return None if level is None or factor is None else level * factor * share
