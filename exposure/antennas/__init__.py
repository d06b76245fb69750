"""Antennas as their owners know them, and the same antennas as conductors and feeds."""
