"""A printed table of limits as data, and one row of it at a frequency."""

from dataclasses import dataclass

from exposure.limits.types import Effect, Level, Scope, Spatial

Printed = None | float | tuple[float, float]


@dataclass(frozen=True)
class Row:
    """One printed row.

    low, high [MHz]; electric [V/m], magnetic [A/m], power_density in the table's unit: None, a number,
    or (c, p) for c f^p with f in MHz; without_low, without_high: the document leaves that edge to the
    neighbouring row (else both rows hold there and the lower of each column counts).
    """

    low: float
    high: float
    electric: Printed
    magnetic: Printed
    power_density: Printed
    without_low: bool = False
    without_high: bool = False

    def covers(self, megahertz: float) -> bool:
        above = megahertz > self.low or (megahertz == self.low and not self.without_low)
        below = megahertz < self.high or (megahertz == self.high and not self.without_high)
        return above and below


@dataclass(frozen=True)
class Table:
    """A printed table for one population; density_unit is the printed unit of S in W/m2."""

    effect: Effect
    scope: Scope
    spatial: Spatial
    averaging_time_s: float
    clause: str
    rows: tuple[Row, ...]
    density_unit: float = 1.0
    verified: bool = True

    def level(self, frequency: float) -> Level | None:
        """The level at a frequency [Hz]; None outside the table."""
        megahertz = frequency / 1e6
        rows = [row for row in self.rows if row.covers(megahertz)]
        if not rows:
            return None
        density = _least(rows, "power_density", megahertz)
        return Level(
            self.effect,
            self.scope,
            self.spatial,
            _least(rows, "electric", megahertz),
            _least(rows, "magnetic", megahertz),
            None if density is None else density * self.density_unit,
            self.averaging_time_s,
            self.clause,
            self.verified,
        )


def _least(rows, column: str, megahertz: float) -> float | None:
    values = [_value(getattr(row, column), megahertz) for row in rows]
    return min((value for value in values if value is not None), default=None)


def _value(printed: Printed, megahertz: float) -> float | None:
    if isinstance(printed, tuple):
        coefficient, power = printed
        return coefficient * megahertz**power
    return printed
