"""A transmission of a site file to a Transmission: which power, which duty factor, which line."""

from exposure.keys.reading import Reading
from exposure.published.modes import MODES, duty_factor_of_amplitude_modulation
from exposure.site.model import Line, Transmission

ALL = "all"  # stands for the sum of the transmissions in results


def transmission(reading: Reading) -> Transmission | None:
    """The transmission that a table states; None where the table has a problem."""
    if reading["name"] == ALL:
        reading.wrong("name", f'"{ALL}" means the sum of all transmissions in results: choose another name')
    _check_power(reading)
    _check_duty(reading)
    _check_pattern(reading)
    line = _line(reading["line"])
    if not reading.sound:
        return None
    power, statement = _power(reading)
    duty, source = _duty(reading)
    return Transmission(
        name=reading["name"],
        antenna=reading["antenna"],
        frequency=reading["frequency"],
        peak_envelope_power=power,
        power_statement=statement,
        duty_factor=duty,
        duty_source=source,
        mode=reading["mode"],
        transmit_time=reading["transmit"],
        receive_time=reading["receive"],
        exclusive=reading["exclusive"],
        line=line,
    )


def _check_power(reading: Reading):
    peak, carrier, depth = (
        reading.has(stem) for stem in ("transmitter_power", "carrier_power", "modulation_depth")
    )
    if peak and carrier:
        reading.wrong("carrier_power", "state transmitter_power_w or carrier_power_w, not both")
    if not peak and not carrier:
        reading.wrong(
            "transmitter_power",
            f"{reading.title} needs transmitter_power_w, or carrier_power_w with modulation_depth",
        )
    if carrier and not depth:
        reading.wrong(
            "carrier_power", "needs modulation_depth (0 to 1): the peak envelope power depends on it"
        )
    if depth and not carrier:
        reading.wrong("modulation_depth", "belongs to carrier_power_w, which is not stated")
    if carrier and reading["mode"] not in (None, "am"):
        reading.wrong(
            "mode", f'carrier_power_w goes with mode "am" or a duty_factor; found "{reading["mode"]}"'
        )


def _check_duty(reading: Reading):
    if reading.has("mode") and reading.has("duty_factor"):
        reading.wrong("duty_factor", "state mode or duty_factor, not both")


def _check_pattern(reading: Reading):
    for one, other in (("transmit", "receive"), ("receive", "transmit")):
        if reading.has(one) and not reading.has(other):
            reading.wrong(one, f"needs {other}_minutes or {other}_seconds beside it: the two are one pattern")


def _power(reading: Reading) -> tuple[float, str]:
    """Peak envelope power [W], and how it was stated."""
    if reading["transmitter_power"] is not None:
        power = reading["transmitter_power"]
        return power, f"{power:g} W peak envelope power at the transmitter, as stated"
    carrier, depth = reading["carrier_power"], reading["modulation_depth"]
    power = carrier * (1 + depth) ** 2
    stated = f"{carrier:g} W carrier with modulation depth {depth:g}"
    return power, f"{stated}: {power:g} W peak envelope power, carrier x (1 + m)^2"


def _duty(reading: Reading) -> tuple[float, str]:
    """Mean over peak envelope power while transmitting, and where it is from."""
    if reading["duty_factor"] is not None:
        return reading["duty_factor"], "duty factor stated in the site file"
    if reading["modulation_depth"] is not None and reading["mode"] == "am":
        depth = reading["modulation_depth"]
        return (
            duty_factor_of_amplitude_modulation(depth),
            f"upper bound for amplitude modulation of depth {depth:g}: (1 + m^2)/(1 + m)^2",
        )
    if reading["mode"] is not None:
        mode = MODES[reading["mode"]]
        return mode.duty_factor, f"{mode.text}: {mode.percent:g} % ({mode.source})"
    return 1.0, "neither mode nor duty_factor is stated: full power all the time is assumed"


def _line(reading: Reading | None) -> Line | None:
    if reading is None:
        return None
    loss, cable, length = (reading.has(stem) for stem in ("loss", "cable", "length"))
    if loss and (cable or length):
        reading.wrong("loss", "state loss_db, or cable with length, not both")
    if not (loss or cable or length):
        reading.wrong("loss", f"{reading.title} needs loss_db, or cable with length_m or length_ft")
    if cable and not length and not loss:
        reading.wrong("cable", "needs length_m or length_ft")
    if length and not cable and not loss:
        reading.wrong("length", "needs the cable it is the length of")
    if not reading.sound:
        return None
    return Line(reading["loss"], reading["cable"], reading["length"])
