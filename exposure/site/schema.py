"""The keys of every table of a site file, except what belongs to a kind of antenna."""

from exposure.antennas.catalogue import COMMON_KEYS, variant
from exposure.antennas.materials import MATERIAL_KEYS
from exposure.keys.kinds import (
    SubTable,
    boolean,
    choice,
    choices,
    date,
    duration,
    impedance,
    integer,
    length,
    number,
    point,
    points,
    text,
    wire_size,
)
from exposure.keys.values import DISTANCE, FRACTION, HEIGHT, NOT_NEGATIVE, POSITIVE, Range
from exposure.limits import DOCUMENTS
from exposure.published.cables import CABLES
from exposure.published.modes import MODES
from exposure.published.soils import SOILS

VERSION = 1

PLACE_KEYS = (
    number(
        "latitude",
        {"latitude_deg": 1.0},
        Range(-90, 90),
        required=True,
        help="of the local origin, WGS84, north positive",
    ),
    number(
        "longitude",
        {"longitude_deg": 1.0},
        Range(-180, 180),
        required=True,
        help="of the local origin, WGS84, east positive",
    ),
)
GROUND_KEYS = (
    choice("soil", SOILS, "soil", help="a soil of the table below"),
    number("relative_permittivity", allowed=Range(1, 100), help="instead of soil, with conductivity_s_per_m"),
    number(
        "conductivity",
        {"conductivity_s_per_m": 1.0},
        Range(0, 10),
        help="instead of soil, with relative_permittivity",
    ),
    choice(
        "kind",
        ("real", "perfect", "none"),
        "kind of ground",
        help="perfect: a metal plane; none: free space; real unless stated",
    ),
)
PROPERTY_KEYS = (
    points("corners", "east, north", 3, required=True, help="outline of the operator's own land"),
)
STRUCTURE_KEYS = (
    text("name", required=True, help="what the structure is called; no two alike"),
    points(
        "points", "east, north, up", 2, required=True, help="a chain of straight wires, in site coordinates"
    ),
    wire_size(required=True, help="size of the metal"),
    *MATERIAL_KEYS,
    impedance(
        "ground_connection",
        help="where an end stands on real ground [ohm]: a number or [resistance, reactance]",
    ),
)
LINE_KEYS = (
    number(
        "loss",
        {"loss_db": 1.0},
        NOT_NEGATIVE,
        help="from the transmitter to the antenna, as measured or known",
    ),
    choice("cable", CABLES, "cable", help="instead of loss_db: the lowest published attenuation is credited"),
    length("length", help="of the cable"),
)
TRANSMISSION_KEYS = (
    text("name", required=True, help="what the emission is called; no two alike"),
    text("antenna", required=True, help="name of the antenna that radiates it"),
    number(
        "frequency",
        {"frequency_mhz": 1e6},
        Range(1e3, 300e9),
        required=True,
        help="of the carrier",
    ),
    number(
        "transmitter_power",
        {"transmitter_power_w": 1.0},
        POSITIVE,
        help="peak envelope power at the transmitter's output",
    ),
    number(
        "carrier_power",
        {"carrier_power_w": 1.0},
        POSITIVE,
        help="instead, for AM: carrier power, with modulation_depth",
    ),
    number("modulation_depth", allowed=FRACTION, help="peak envelope power = carrier power x (1 + depth)^2"),
    choice("mode", MODES, "mode", help="a mode of the table below; its published duty factor is used"),
    number(
        "duty_factor",
        allowed=Range(0, 1, low_open=True),
        help="instead of mode: mean over peak envelope power while transmitting; 1 if neither is stated",
    ),
    duration("transmit", help="on/off pattern, with receive; continuous unless stated"),
    duration("receive", help="on/off pattern, with transmit"),
    text("exclusive", help="of the transmissions that share this word one runs at a time"),
    SubTable(
        "line", LINE_KEYS, help="the line from transmitter to antenna; no loss is credited unless stated"
    ),
)
AREA_KEYS = (
    text("name", required=True, help="what the area is called; no two alike"),
    choice(
        "population", ("general_public", "occupational"), "population", required=True, help="who is there"
    ),
    text("informed", help="who was informed and when; an occupational area needs it"),
    points("corners", "east, north", 3, help="outline in plan, with bottom and top"),
    point("point", "east, north, up", HEIGHT, help="instead of corners: a single point"),
    points("path", "east, north", 2, help="instead of corners: a centre line, with width"),
    length("width", help="of a path"),
    length("bottom", DISTANCE, help="above ground; of a path 0 unless stated"),
    length("top", DISTANCE, help="above ground; of a path 2 m above its bottom unless stated"),
    boolean("insulated_floor", default=False, help="true where people stand on an insulated floor"),
)
TOP_KEYS = (
    integer("version", Range(VERSION, VERSION), required=True, help="of this format: 1"),
    text("name", required=True, help="of the site, printed on the report"),
    choices(
        "limits",
        DOCUMENTS,
        "limit set",
        required=True,
        help="ids of the limit sets to judge by; all must be met",
    ),
    choice(
        "decision",
        ("upper_bound", "best_estimate", "margin"),
        "decision rule",
        default="upper_bound",
        help="what is compared with the limit",
    ),
    number(
        "margin",
        allowed=Range(0, 1, low_open=True),
        help="with decision = margin: the exposure ratio that must not be exceeded",
    ),
    choice(
        "spatial",
        ("peak", "body_average"),
        "spatial rule",
        default="peak",
        help="peak, or body_average where the document allows it",
    ),
    date("date", help="of the assessment, printed"),
    text("operator", help="printed"),
    text("licence", help="printed"),
    SubTable("place", PLACE_KEYS, help="where the local origin is on the earth"),
    SubTable("ground", GROUND_KEYS, required=True, help="the ground"),
    SubTable("property", PROPERTY_KEYS, help="the operator's own land"),
    SubTable(
        "antenna",
        COMMON_KEYS,
        many=True,
        required=True,
        variant=variant,
        help="an antenna; its keys depend on its kind",
    ),
    SubTable("structure", STRUCTURE_KEYS, many=True, help="passive metal"),
    SubTable("transmission", TRANSMISSION_KEYS, many=True, required=True, help="an emission of an antenna"),
    SubTable("area", AREA_KEYS, many=True, help="a place where people are"),
)
