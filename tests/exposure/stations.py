"""A small sound station, and how the tests of the site file vary it."""

STATION = """\
version = 1
name = "Demonstration lot 1"
limits = ["us_fcc", "icnirp_2020"]
date = 2026-12-01
[ground]
soil = "average"
[property]
corners_m = [[-15, -20], [15, -20], [15, 20], [-15, 20]]
[[antenna]]
name = "garden dipole"
kind = "dipole"
position_m = [0, 0]
height_m = 9.1
bearing_deg = 90
length_m = 10.1
wire_radius_mm = 1.0
material = "copper"
[[transmission]]
name = "voice"
antenna = "garden dipole"
frequency_mhz = 14.2
transmitter_power_w = 100
mode = "ssb"
transmit_minutes = 2
receive_minutes = 4
[transmission.line]
cable = "RG-213"
length_m = 20
[[area]]
name = "bedroom"
population = "general_public"
corners_m = [[18, -4], [26, -4], [26, 4], [18, 4]]
bottom_m = 2.8
top_m = 4.8
"""

VERTICAL = """\
[[antenna]]
name = "vertical"
kind = "vertical"
position_m = [0, 5]
height_m = 3
length_m = 5
wire_radius_mm = 10
radials = 4
radial_length_m = 4
"""

DRAWN = """\
[[antenna]]
name = "drawn"
kind = "conductors"
position_m = [0, -9]
[[antenna.conductor]]
points_m = [[0, 0, 5], [0, 3, 8], [0, 6, 5]]
wire_radius_mm = 1.5
[[antenna.feed]]
conductor = 1
position = 0.25
[[antenna.load]]
conductor = 1
position = 0.9
resistance_ohm = 10
"""

FENCE = """\
[[structure]]
name = "fence"
points_m = [[-15, 20, 1.2], [15, 20, 1.2]]
wire_radius_mm = 2
"""


def changed(old: str, new: str, text: str = STATION) -> str:
    """The text with its only ``old`` replaced."""
    assert text.count(old) == 1, (old, text.count(old))
    return text.replace(old, new)
