"""Compliance distances of the US regulator's modelled tables, and the same by this program.

US FCC, OET Bulletin 65 Supplement B (Edition 97-01), November 1997, tables 18, 21, 23 and 26: lossless
horizontal half-wave dipoles over ground 13, 0.005 S/m (p. 31); the distance is horizontal, from the
nearest part of the wire, the largest over all directions; unperturbed peak fields, both E and H,
100 % duty; 0 is compliant everywhere at that height.  ``oet65b_modelled_dipoles.csv`` has all 256
printed cells; they sit on a grid of half a foot, converted to metres and rounded to 0.1 m.

``python -m tests.published.oet65b_modelled`` prints the table of docs/accuracy.md.
"""

import csv
from dataclasses import dataclass
from pathlib import Path

import numpy as np

import fieldsolver as fs
from exposure import reference_levels

GROUND = fs.LossyGround(13, 0.005)
RADIUS = 0.001  # m; the bulletin does not say
REACH, STEP = 18.0, 0.1
ROUNDING = 0.2  # m: half a grid step of 0.5 ft plus the rounding of metres, at both ends
TIERS = {"con": "occupational", "unc": "general_public"}


@dataclass(frozen=True)
class Row:
    """One printed row: distances in metres for both tiers."""

    table: str
    frequency: float
    height: float
    power: float
    level: float
    printed: dict


def rows() -> list[Row]:
    """All printed rows."""
    with open(Path(__file__).with_name("oet65b_modelled_dipoles.csv"), newline="") as file:
        return [
            Row(
                line["table"],
                float(line["freq_MHz"]) * 1e6,
                float(line["antenna_height_m"]),
                float(line["power_W"]),
                float(line["exposure_height_m"]),
                {"con": float(line["d_con_m"]), "unc": float(line["d_unc_m"])},
            )
            for line in csv.DictReader(file)
        ]


def dipole(frequency, height) -> fs.Wire:
    quarter = 299_792_458.0 / frequency / 4
    return fs.Wire((-quarter, 0, height), (quarter, 0, height), RADIUS)


def contours(frequency, height, level):
    """Distances (d,) and the points at each of them round a quarter of the wire, (t, d, 3). [m]"""
    quarter = 299_792_458.0 / frequency / 4
    distance = np.arange(0 if level != height else STEP, REACH + STEP / 2, STEP)
    beside = np.linspace(0, quarter, 33)[:, None]
    side = np.stack(np.broadcast_arrays(beside, distance, level), axis=2)
    angle = np.linspace(0, np.pi / 2, 25)[:-1, None]
    round_end = np.stack(
        np.broadcast_arrays(quarter + distance * np.cos(angle), distance * np.sin(angle), level), axis=2
    )
    return distance, np.concatenate([side, round_end])


def squares_per_watt(frequency, height, level, segments_per_wavelength=None):
    """Distances (d,), and the E^2 and H^2 per watt (t, d) at them."""
    currents = fs.solve(
        [dipole(frequency, height)], [fs.Feed(0)], frequency, GROUND, (), segments_per_wavelength
    )
    distance, points = contours(frequency, height, level)
    field = fs.near_field(currents.scaled_to(1.0), points.reshape(-1, 3))
    shape = points.shape[:2]
    return distance, field.electric_strength.reshape(shape) ** 2, field.magnetic_strength.reshape(shape) ** 2


def computed(row: Row, tier: str, fields) -> float:
    """The distance beyond which every point complies, interpolated between steps of 0.1 m. [m]"""
    distance, electric, magnetic = fields
    (limit,) = reference_levels("us_fcc", TIERS[tier], row.frequency)
    ratio = row.power * np.maximum(electric / limit.electric**2, magnetic / limit.magnetic**2).max(axis=0)
    over = np.flatnonzero(ratio >= 1)
    if not len(over):
        return 0.0
    last = over[-1]
    if last + 1 == len(ratio):
        return np.inf
    share = np.log(ratio[last]) / np.log(ratio[last] / ratio[last + 1])
    return float(distance[last] + share * STEP)


def agrees(printed: float, found: float) -> bool:
    """Within the table's rounding, and 5 % for what the bulletin leaves unsaid (wire, exact length)."""
    if printed == 0 or found == 0:
        return printed == found
    return abs(printed - found) <= ROUNDING + 0.05 * printed


def comparison():
    """(row, tier, printed, computed) of every cell."""
    cache = {}
    for row in rows():
        key = row.frequency, row.height, row.level
        if key not in cache:
            cache[key] = squares_per_watt(*key)
        for tier, printed in row.printed.items():
            yield row, tier, printed, computed(row, tier, cache[key])


def main():
    print("| table | MHz | wire at m | at m | power W | printed con, unc m | computed con, unc m | |")
    print("|---|---|---|---|---|---|---|---|")
    cells = list(comparison())
    for (row, _, con, our_con), (_, _, unc, our_unc) in zip(cells[::2], cells[1::2], strict=True):
        mark = "" if agrees(con, our_con) and agrees(unc, our_unc) else "differs"
        print(
            f"| {row.table} | {row.frequency / 1e6:g} | {row.height:g} | {row.level:g} | {row.power:g} "
            f"| {con:g}, {unc:g} | {our_con:.2f}, {our_unc:.2f} | {mark} |"
        )


if __name__ == "__main__":
    main()
