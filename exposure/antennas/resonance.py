"""Lengths that an owner leaves out: cut for the middle of the one frequency in use."""

HALF_WAVE = 142.65e6  # [m Hz], 468 ft MHz: common practice among amateurs, no printed source
QUARTER_WAVE = HALF_WAVE / 2


def half_wave(frequency: float) -> tuple[float, str]:
    """Length of a half-wave wire [m], and the note for the report."""
    length = HALF_WAVE / frequency
    return length, f"length {length:.2f} m derived: 142.65 m MHz / {frequency / 1e6:g} MHz (common practice)"


def quarter_wave(frequency: float) -> tuple[float, str]:
    """Length of a quarter-wave wire [m], and the note for the report."""
    length = QUARTER_WAVE / frequency
    return length, f"{length:.2f} m derived: 71.32 m MHz / {frequency / 1e6:g} MHz (common practice)"
