"""A printed table of limits as data, and one row of it at a frequency."""

from dataclasses import dataclass

from exposure.errors import OutOfScopeError
from exposure.limits.types import Effect, Level, Scope, Spatial

HZ, KHZ, MHZ, GHZ = 1.0, 1e3, 1e6, 1e9
MICROTESLA = 1e-6 / (4e-7 * 3.141592653589793)  # A/m in vacuum, mu0 = 4 pi 1e-7 H/m as the documents take it
MINUTE = 60.0  # s

Printed = None | float | tuple[float, float] | tuple[float, float, float]


@dataclass(frozen=True)
class Band:
    """A range of frequencies [MHz]; without_low, without_high: the end belongs to the neighbour."""

    low: float
    high: float
    without_low: bool = False
    without_high: bool = False

    def covers(self, megahertz: float) -> bool:
        above = megahertz > self.low or (megahertz == self.low and not self.without_low)
        below = megahertz < self.high or (megahertz == self.high and not self.without_high)
        return above and below


@dataclass(frozen=True)
class Row:
    """One printed row.

    low, high [MHz]; electric, magnetic, power_density in the table's units: None, a number,
    (c, p) for c f^p with f in MHz, or (c, p, unit) with f in another unit [Hz]; without_low,
    without_high: the document leaves that edge to the neighbouring row (else both rows hold there and
    the lower of each column counts).
    """

    low: float
    high: float
    electric: Printed
    magnetic: Printed
    power_density: Printed
    without_low: bool = False
    without_high: bool = False

    def covers(self, megahertz: float) -> bool:
        return Band(self.low, self.high, self.without_low, self.without_high).covers(megahertz)


@dataclass(frozen=True)
class Table:
    """A printed table for one population.

    averaging_time_s [s], may depend on frequency as a printed value does; density_unit [W/m2],
    electric_unit [V/m rms], magnetic_unit [A/m rms] : one printed unit in ours; band : the part of the
    table that these words hold for, where a document gives one table several averaging times.
    """

    effect: Effect
    scope: Scope
    spatial: Spatial
    averaging_time_s: float | tuple[float, float, float]
    clause: str
    rows: tuple[Row, ...]
    density_unit: float = 1.0
    verified: bool = True
    electric_unit: float = 1.0
    magnetic_unit: float = 1.0
    band: Band = Band(0.0, float("inf"))

    def level(self, frequency: float) -> Level | None:
        """The level at a frequency [Hz]; None outside the table."""
        megahertz = frequency / MHZ
        rows = [row for row in self.rows if row.covers(megahertz)]
        if not rows or not self.band.covers(megahertz):
            return None
        return Level(
            self.effect,
            self.scope,
            self.spatial,
            _least(rows, "electric", frequency, self.electric_unit),
            _least(rows, "magnetic", frequency, self.magnetic_unit),
            _least(rows, "power_density", frequency, self.density_unit),
            value(self.averaging_time_s, frequency),
            self.clause,
            self.verified,
        )

    @property
    def ends(self) -> tuple[float, float]:
        """Lowest and highest frequency [Hz]."""
        low = max(self.band.low, min(row.low for row in self.rows))
        high = min(self.band.high, max(row.high for row in self.rows))
        return low * MHZ, high * MHZ


def levels_of(document: str, tables, frequency: float, remark: str = "") -> tuple[Level, ...]:
    """The level of each table that covers a frequency [Hz], in order.

    Raises
    ------
    OutOfScopeError
        No table covers it; remark says what the document has there instead.
    """
    levels = tuple(level for table in tables if (level := table.level(frequency)) is not None)
    if not levels:
        low = min(table.ends[0] for table in tables)
        high = max(table.ends[1] for table in tables)
        raise OutOfScopeError(
            f"{document} has levels from {spoken(low)} to {spoken(high)}, not at {spoken(frequency)}"
            + (f": {remark}" if remark else "")
        )
    return levels


def spoken(frequency: float) -> str:
    """A frequency [Hz] as it is said."""
    if frequency >= GHZ:
        return f"{frequency / GHZ:.10g} GHz"
    return f"{frequency / MHZ:.10g} MHz" if frequency >= 0.1 * MHZ else f"{frequency / KHZ:.10g} kHz"


def value(printed: Printed, frequency: float) -> float | None:
    """A printed value at a frequency [Hz]."""
    if not isinstance(printed, tuple):
        return printed
    coefficient, power, unit = (*printed, MHZ)[:3]
    return coefficient * (frequency / unit) ** power


def _least(rows, column: str, frequency: float, unit: float) -> float | None:
    values = (value(getattr(row, column), frequency) for row in rows)
    least = min((v for v in values if v is not None), default=None)
    return None if least is None else least * unit
