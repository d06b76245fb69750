"""Tables of the station: transmissions, powers step by step, antennas at their feeds, conductors."""

from exposure.assessment.model import Assessment, TransmissionFinding
from exposure.outputs.formats import NOTHING, digits, megahertz, minutes, watts
from exposure.outputs.tables import Table


def transmissions(assessment: Assessment) -> Table:
    """Each transmission: frequency, antenna, powers, feed impedance."""
    rows = [
        (
            finding.name,
            megahertz(finding.frequency_hz),
            finding.antenna,
            watts(finding.peak_power_w),
            f"{digits(finding.line_loss_db)} dB",
            watts(finding.accepted_power_w),
            "\n".join(map(_mean, finding.average_powers)) or NOTHING,
        )
        for finding in assessment.transmissions
    ]
    return Table(
        (
            "transmission",
            "frequency",
            "antenna",
            "peak power",
            "line loss",
            "accepted (peak)",
            "mean accepted",
        ),
        tuple(rows),
        (20, 13, 16, 11, 10, 12, 18),
    )


def power_steps(finding: TransmissionFinding) -> Table:
    """The way from the transmitter to the mean power at the antenna, each step with its source."""
    rows = [
        (step.text, digits(step.factor), watts(step.power_w), step.source)
        for step in dict.fromkeys(finding.power_steps)
    ]
    return Table(("step", "factor", "power after it", "source"), tuple(rows), (33, 9, 13, 45))


def exclusive(assessment: Assessment) -> tuple[str, ...]:
    """Groups of which one transmission runs at a time."""
    groups: dict[str, list[str]] = {}
    for finding in assessment.transmissions:
        if finding.exclusive:
            groups.setdefault(finding.exclusive, []).append(finding.name)
    return tuple(f"{group}: one at a time of {', '.join(names)}" for group, names in groups.items())


def antennas(assessment: Assessment) -> Table:
    """Feed impedances, states of the antenna, and remarks."""
    rows = [
        (
            finding.name,
            "\n".join(_impedance(*z) for z in finding.feed_impedances_ohm) or NOTHING,
            "\n".join(finding.states) or NOTHING,
            "\n".join(finding.notes) or NOTHING,
        )
        for finding in assessment.transmissions
    ]
    return Table(
        ("transmission", "feed impedance", "states solved", "remarks"), tuple(rows), (20, 18, 20, 42)
    )


def conductors(assessment: Assessment) -> Table:
    """What was solved: wires of each owner and role, their thickness, lowest and highest point."""
    groups: dict[tuple[str, str, float], list] = {}
    for wire in assessment.conductors:
        groups.setdefault((wire.owner, wire.role, wire.radius_m), []).append(wire)
    rows = [
        (
            owner,
            role,
            str(len(wires)),
            f"{digits(2000 * radius)} mm",
            f"{digits(min(_heights(wires)))} m",
            f"{digits(max(_heights(wires)))} m",
        )
        for (owner, role, radius), wires in groups.items()
    ]
    return Table(
        ("belongs to", "as", "wires", "wire diameter", "lowest point", "highest point"),
        tuple(rows),
        (36, 16, 9, 13, 13, 13),
    )


def _mean(average) -> str:
    window = f"over {minutes(average.averaging_time_s)}" if average.averaging_time_s else "instantaneous"
    return f"{watts(average.power_w)} {window}"


def _heights(wires) -> list[float]:
    return [point[2] for wire in wires for point in wire.points_m]


def _impedance(real: float, imaginary: float) -> str:
    return f"{real:.1f} {'-' if imaginary < 0 else '+'} j{abs(imaginary):.1f} Ω"
