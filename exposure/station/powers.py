"""From the transmitter's rating to the power that an antenna accepts, at the peak and on average.

Accepted power P = P_pep 10^(-L/10) at peak envelope; averaged over a time T it is P d w(T), with the
duty factor d of the mode and the largest fraction w of any window T that the station transmits.
Mismatch is not credited: a tuner restores what is reflected.  Duty factor and on/off pattern belong
to the source and are credited for everybody (limits.md 1.1, 47 CFR 1.1310).
"""

import math
from dataclasses import dataclass

from exposure.published.cables import attenuation
from exposure.site.model import Line, Transmission


@dataclass(frozen=True)
class LineLoss:
    """Matched loss between transmitter and antenna [dB], and what it rests on."""

    decibel: float
    text: str
    source: str

    @property
    def factor(self) -> float:
        """Power out over power in. [1]"""
        return 10 ** (-self.decibel / 10)


@dataclass(frozen=True)
class Step:
    """One line of the way from rating to averaged power: what, times which factor, gives which power [W]."""

    text: str
    factor: float
    power: float
    source: str


@dataclass(frozen=True)
class Powers:
    """Powers of one transmission."""

    transmission: Transmission
    loss: LineLoss

    @property
    def accepted(self) -> float:
        """Power that the antenna accepts at peak envelope. [W]"""
        return self.transmission.peak_envelope_power * self.loss.factor

    def averaged(self, averaging_time: float) -> float:
        """Accepted power in the worst window of the averaging time [s]; 0 is instantaneous: the peak. [W]"""
        if averaging_time == 0:
            return self.accepted
        on_air = time_on_air(self.transmission, averaging_time)
        return self.accepted * self.transmission.duty_factor * on_air

    def steps(self, averaging_times) -> tuple[Step, ...]:
        """Every credited factor with its source, for the report."""
        who = self.transmission
        peak, accepted = who.peak_envelope_power, self.accepted
        rows = [
            Step("transmitter, peak envelope power", 1.0, peak, who.power_statement),
            Step(self.loss.text, self.loss.factor, accepted, self.loss.source),
            Step("mismatch at the antenna: not credited", 1.0, accepted, "safe side"),
        ]
        for time in sorted(set(averaging_times)):
            rows += self._averaging(time) if time else [_instantaneous(accepted)]
        return tuple(rows)

    def _averaging(self, time: float) -> list[Step]:
        who, on_air = self.transmission, time_on_air(self.transmission, time)
        during = self.accepted * who.duty_factor
        window = f"{time / 60:g} min"
        return [
            Step("duty factor of the mode", who.duty_factor, during, who.duty_source),
            Step(f"on the air in the worst window of {window}", on_air, during * on_air, _pattern(who)),
        ]


def powers(transmission: Transmission) -> Powers:
    """Powers of a transmission of a site."""
    return Powers(transmission, line_loss(transmission.line, transmission.frequency))


def line_loss(line: Line | None, frequency: float) -> LineLoss:
    """Loss of a line at a frequency [Hz]: as stated, or the lowest published attenuation of its cable."""
    if line is None:
        return LineLoss(0.0, "line loss: none stated, none credited", "safe side")
    if line.loss_db is not None:
        return LineLoss(line.loss_db, f"line loss {line.loss_db:g} dB", "stated in the site file")
    found = attenuation(line.cable, frequency)
    decibel = found.per_metre * line.length
    text = f"line loss of {line.length:g} m of {line.cable}, {decibel:.3g} dB, matched"
    return LineLoss(decibel, text, f"lowest published: {found.source}")


def time_on_air(transmission: Transmission, averaging_time: float) -> float:
    """Largest fraction of any window of the averaging time [s] that the transmission is on. [1]"""
    if transmission.transmit_time is None or transmission.receive_time is None:
        return 1.0
    return worst_window(transmission.transmit_time, transmission.receive_time, averaging_time)


def worst_window(on: float, off: float, window: float) -> float:
    """Largest on-time of a repeating on/off pattern in any window, over the window. [1]

    (n t1 + min(r, t1)) / T with n = floor(T / (t1 + t2)) and r = T - n (t1 + t2): the window that
    begins with an on-time holds the most (formulas.md 14; FCC OET 65 Supplement B, pp. 12-14).
    """
    period = on + off
    if period <= 0:
        return 1.0
    n = math.floor(window / period * (1 + 1e-12))
    rest = max(window - n * period, 0.0)
    return min((n * on + min(rest, on)) / window, 1.0)


def _pattern(transmission: Transmission) -> str:
    if transmission.transmit_time is None or transmission.receive_time is None:
        return "no pattern stated: on all the time"
    on, off = transmission.transmit_time / 60, transmission.receive_time / 60
    return f"repeating {on:g} min on, {off:g} min off, from any phase"


def _instantaneous(accepted: float) -> Step:
    return Step(
        "instantaneous tests: at peak envelope, no duty factor",
        1.0,
        accepted,
        "averaging time 0 in the document",
    )
