"""Broken site files, each line of which carries its own expectation.

``#! key: word | word`` marks a problem: exactly the problems so marked are to be found, on those lines,
with that key, and every word in the message.  The words are the project's own.
"""

import pytest

from tests.exposure.stations import DRAWN, FENCE, STATION, VERTICAL, changed


def case(name: str, old: str, new: str, extra: str = ""):
    return pytest.param(changed(old, new, STATION + extra), id=name)


TOP = "version = 1\n"
AREA = "corners_m = [[18, -4], [26, -4], [26, 4], [18, 4]]\nbottom_m = 2.8\ntop_m = 4.8\n"
LENGTH = "length_m = 10.1"
LAST = "top_m = 4.8\n"

CASES = [
    # the whole file
    case("version of the future", "version = 1", "version = 2 #! version: must be 1 | found 2"),
    case("version as text", "version = 1", 'version = "1" #! version: whole number | the text "1"'),
    case("empty name", '"Demonstration lot 1"', '" " #! name: must not be empty'),
    case("limit set misspelt", '"us_fcc",', '"us_fc", #! limits: "us_fc" | did you mean us_fcc\n'),
    case("limit set twice", '"icnirp_2020"', '"us_fcc" #! limits: stands twice\n'),
    case("no limit set", '["us_fcc", "icnirp_2020"]', "[] #! limits: at least one limit set"),
    case("limits not a list", '["us_fcc", "icnirp_2020"]', '"us_fcc" #! limits: must be a list | the text'),
    case("date in words", "2026-12-01", '"yesterday" #! date: 2026-12-01 | without quotes | yesterday'),
    case("date with time", "2026-12-01", "2026-12-01T10:00:00 #! date: must be a day"),
    case("decision unknown", TOP, TOP + 'decision = "hopeful" #! decision: "hopeful" | upper_bound\n'),
    case("margin without number", TOP, TOP + 'decision = "margin" #! decision: needs margin\n'),
    case("margin unused", TOP, TOP + 'margin = 0.5 #! margin: belongs to decision = "margin"\n'),
    case("spatial unknown", TOP, TOP + 'spatial = "mean" #! spatial: "mean" | body_average\n'),
    case("table misspelt", "[property]", "[propertys] #! propertys: did you mean property"),
    case("key unlike any", TOP, TOP + "xyzzy = 1 #! xyzzy: no such key | limits | antenna\n"),
    case("one bracket too few", "[[area]]", "[area] #! area: written [[area]]"),
    # place, ground, property
    case(
        "latitude",
        LAST,
        LAST + "[place]\nlatitude_deg = 91 #! place.latitude_deg: at most 90\nlongitude_deg = 0\n",
    ),
    case("half a place", LAST, LAST + "[place] #! place: needs longitude_deg\nlatitude_deg = 1\n"),
    case("soil unknown", '"average"', '"avrage" #! ground.soil: did you mean average | very_dry'),
    case(
        "soil and numbers",
        'soil = "average"',
        'soil = "wet" #! ground.soil: more than one is stated\nrelative_permittivity = 9\n'
        "conductivity_s_per_m = 0.1",
    ),
    case(
        "half the numbers",
        'soil = "average"',
        "relative_permittivity = 9 #! ground.relative_permittivity: go together",
    ),
    case("no ground stated", '[ground]\nsoil = "average"', "[ground] #! ground: none is stated"),
    case("ground kind", 'soil = "average"', 'kind = "metal" #! ground.kind: "metal" | perfect | none'),
    case(
        "permittivity below one",
        'soil = "average"',
        "relative_permittivity = 0.5 #! ground.relative_permittivity: at least 1\nconductivity_s_per_m = 0.1",
    ),
    case(
        "conductivity without unit",
        'soil = "average"',
        "relative_permittivity = 9\nconductivity = 0.1 #! ground.conductivity: unit | conductivity_s_per_m",
    ),
    case(
        "two corners",
        "[-15, -20], [15, -20], [15, 20], [-15, 20]",
        "[-15, -20], [15, -20] #! property.corners_m: at least 3 points | a list of 2\n",
    ),
    case("corner of three numbers", "[15, 20],", "[15, 20, 1], #! property.corners_m: point 3 | 2 numbers\n"),
    case(
        "property crosses itself",
        "[15, 20], [-15, 20]",
        "[-15, 20], [15, 20] #! property.corners_m: crosses\n",
    ),
    case("corners the same", "[15, 20], [-15, 20]", "[15, -20] #! property.corners_m: 3 different corners\n"),
    # antenna
    case("key misspelt", LENGTH, "lenght_m = 10.1 #! antenna 1.lenght_m: did you mean length_m"),
    case("kind misspelt", '"dipole"', '"dipol" #! antenna 1.kind: did you mean dipole | vertical'),
    case(
        "kind left out",
        '[[antenna]]\nname = "garden dipole"\nkind = "dipole"',
        '[[antenna]] #! antenna 1: needs kind\nname = "garden dipole"',
    ),
    case("height without unit", "height_m = 9.1", "height = 9.1 #! antenna 1.height: height_m or height_ft"),
    case(
        "height in centimetres",
        "height_m = 9.1",
        "height_cm = 910 #! antenna 1.height_cm: height_m or height_ft",
    ),
    case(
        "height twice",
        "height_m = 9.1",
        "height_m = 9.1\nheight_ft = 30 #! antenna 1.height_ft: same quantity",
    ),
    case(
        "height missing",
        '[[antenna]]\nname = "garden dipole"\nkind = "dipole"\nposition_m = [0, 0]\nheight_m = 9.1',
        '[[antenna]] #! antenna 1: needs height_m or height_ft\nname = "garden dipole"\n'
        'kind = "dipole"\nposition_m = [0, 0]',
    ),
    case(
        "height as text", "height_m = 9.1", 'height_m = "9.1" #! antenna 1.height_m: write 9.1 without quotes'
    ),
    case("height as truth", "height_m = 9.1", "height_m = true #! antenna 1.height_m: a number | found true"),
    case("height not a number", "height_m = 9.1", "height_m = nan #! antenna 1.height_m: finite | nan"),
    case("height infinite", "height_m = 9.1", "height_m = inf #! antenna 1.height_m: finite | inf"),
    case(
        "dipole below ground",
        'kind = "dipole"\nposition_m = [0, 0]\nheight_m = 9.1',
        'kind = "dipole" #! antenna 1.kind: 1 m below the ground\nposition_m = [0, 0]\nheight_m = -1',
    ),
    case("length negative", LENGTH, "length_m = -10 #! antenna 1.length_m: more than 0 | found -10"),
    case(
        "length in negative feet", LENGTH, "length_ft = -33 #! antenna 1.length_ft: more than 0 | found -33"
    ),
    case(
        "radius beyond length",
        'kind = "dipole"\nposition_m = [0, 0]\nheight_m = 9.1\nbearing_deg = 90\nlength_m = 10.1',
        'kind = "dipole" #! antenna 1.kind: too short | two radii\nposition_m = [0, 0]\n'
        "height_m = 9.1\nbearing_deg = 90\nlength_m = 0.0015",
    ),
    case(
        "radius without unit",
        "wire_radius_mm",
        "wire_radius = 1.0 #! antenna 1.wire_radius: wire_diameter_mm\n# =",
    ),
    case(
        "radius and diameter",
        "wire_radius_mm = 1.0",
        "wire_radius_mm = 1.0\nwire_diameter_mm = 2 #! antenna 1.wire_diameter_mm: same quantity",
    ),
    case("metal misspelt", '"copper"', '"coper" #! antenna 1.material: did you mean copper'),
    case(
        "metal and number",
        'material = "copper"',
        'material = "copper"\nconductivity_s_per_m = 1e7 #! antenna 1.conductivity_s_per_m: not both',
    ),
    case(
        "permeability alone",
        'material = "copper"',
        "relative_permeability = 2 #! antenna 1.relative_permeability: conductivity_s_per_m",
    ),
    case(
        "position of three",
        "position_m = [0, 0]",
        "position_m = [0, 0, 9] #! antenna 1.position_m: 2 numbers | east, north",
    ),
    case("feed at the end", LENGTH, LENGTH + "\nfeed_position = 1 #! antenna 1.feed_position: less than 1"),
    case(
        "feed beyond the wire",
        LENGTH,
        LENGTH + "\nfeed_position = 1.5 #! antenna 1.feed_position: less than 1",
    ),
    case(
        "droop and end height",
        LENGTH,
        LENGTH + "\ndroop_deg = 30\nend_height_m = 5 #! antenna 1.end_height_m: not both",
    ),
    case(
        "ends above the middle",
        LENGTH,
        LENGTH + "\nend_height_m = 12 #! antenna 1.end_height_m: not be above",
    ),
    case(
        "ends out of reach",
        'kind = "dipole"',
        'kind = "dipole" #! antenna 1.kind: only 5.05 m long\nend_height_m = 1',
    ),
    case(
        "connection of a hanging wire",
        'kind = "dipole"',
        'kind = "dipole" #! antenna 1.kind: ground_connection_ohm | none of its ends\n'
        "ground_connection_ohm = 10",
    ),
    case(
        "key after a table",
        "[[transmission]]",
        "[antenna.feed_line]\npoints_m = [[0, 0, 0], [0, 0, -8]]\nouter_radius_mm = 5\n"
        "droop_deg = 20 #! antenna 1.feed_line.droop_deg: belongs to [[antenna]] | above "
        "[antenna.feed_line]\n[[transmission]]",
    ),
    case(
        "feed line elsewhere",
        'kind = "dipole"',
        'kind = "dipole" #! antenna 1.kind: begins at | the feed is at\n'
        "feed_line = { points_m = [[0, 3, 0], [0, 3, -8]], outer_radius_mm = 5 }",
    ),
    case(
        "negative choke",
        LENGTH,
        LENGTH + "\nfeed_line = { points_m = [[0, 0, 0], [0, 0, -8]], outer_radius_mm = 5,\n"
        "choke_ohm = -5 } #! antenna 1.feed_line.choke_ohm: at least 0 | found -5",
    ),
    # vertical
    case(
        "radials on the ground",
        LAST,
        LAST
        + changed("height_m = 3", "height_m = 0", VERTICAL).replace(
            'kind = "vertical"',
            'kind = "vertical" #! antenna 2.kind: radials on the ground | ground_connection_ohm',
        ),
    ),
    case(
        "nothing to feed against",
        LAST,
        LAST
        + VERTICAL.replace("radials = 4\nradial_length_m = 4\n", "").replace(
            'kind = "vertical"', 'kind = "vertical" #! antenna 2.kind: nothing to be fed against'
        ),
    ),
    case(
        "on real ground unstated",
        LAST,
        LAST
        + VERTICAL.replace("radials = 4\nradial_length_m = 4\n", "")
        .replace("height_m = 3", "height_m = 0")
        .replace(
            'kind = "vertical"', 'kind = "vertical" #! antenna 2.kind: ground_connection_ohm | real ground'
        ),
    ),
    case(
        "radial length alone",
        LAST,
        LAST
        + changed("radials = 4\n", "", VERTICAL).replace(
            "radial_length_m = 4", "radial_length_m = 4 #! antenna 2.radial_length_m: no radials"
        ),
    ),
    case(
        "radials in part",
        LAST,
        LAST + changed("radials = 4", "radials = 4.5 #! antenna 2.radials: whole number", VERTICAL),
    ),
    case(
        "radials into the ground",
        LAST,
        LAST
        + VERTICAL.replace("radials = 4\n", "radials = 4\nradial_droop_deg = 80\n").replace(
            'kind = "vertical"', 'kind = "vertical" #! antenna 2.kind: a radial | below the ground'
        ),
    ),
    # conductors
    case(
        "no such conductor",
        LAST,
        LAST
        + changed(
            "conductor = 1\nposition = 0.25",
            "conductor = 3 #! antenna 2.feed 1.conductor: no conductor 3 | has 1\nposition = 0.25",
            DRAWN,
        ),
    ),
    case(
        "conductor zero",
        LAST,
        LAST
        + changed(
            "conductor = 1\nposition = 0.9",
            "conductor = 0 #! antenna 2.load 1.conductor: at least 1\nposition = 0.9",
            DRAWN,
        ),
    ),
    case(
        "load of nothing",
        LAST,
        LAST
        + changed(
            "[[antenna.load]]", "[[antenna.load]] #! antenna 2.load 1: needs resistance_ohm", DRAWN
        ).replace("resistance_ohm = 10\n", ""),
    ),
    case(
        "negative resistance",
        LAST,
        LAST
        + changed(
            "resistance_ohm = 10",
            "resistance_ohm = -10 #! antenna 2.load 1.resistance_ohm: at least 0",
            DRAWN,
        ),
    ),
    case(
        "no capacitance",
        LAST,
        LAST
        + changed(
            "resistance_ohm = 10", "capacitance_pf = 0 #! antenna 2.load 1.capacitance_pf: more than 0", DRAWN
        ),
    ),
    case(
        "voltage and current",
        LAST,
        LAST
        + changed(
            "position = 0.25",
            "position = 0.25\nrelative_voltage = 1\n"
            "relative_current = 1 #! antenna 2.feed 1.relative_current: not both",
            DRAWN,
        ),
    ),
    case(
        "no feed",
        LAST,
        LAST
        + changed("[[antenna.feed]]\nconductor = 1\nposition = 0.25\n", "", DRAWN).replace(
            "[[antenna]]", "[[antenna]] #! antenna 2: needs [[antenna.feed]]"
        ),
    ),
    case(
        "feed at an open end",
        LAST,
        LAST
        + changed("position = 0.25", "position = 0", DRAWN).replace(
            'kind = "conductors"', 'kind = "conductors" #! antenna 2.kind: free end'
        ),
    ),
    case(
        "no conductor",
        LAST,
        LAST
        + changed(
            "[[antenna.conductor]]\npoints_m = [[0, 0, 5], [0, 3, 8], [0, 6, 5]]\nwire_radius_mm = 1.5\n",
            "conductor = [] #! antenna 2.conductor: at least one [[antenna.conductor]]\n",
            DRAWN,
        ),
    ),
    case(
        "farther than a station reaches",
        "position_m = [0, 0]",
        "position_m = [0, 1e6] #! antenna 1.position_m: north must be at least -100000 and at most 100000",
    ),
    case(
        "more wavelengths than can be solved",
        'kind = "dipole"\nposition_m = [0, 0]\nheight_m = 9.1\nbearing_deg = 90\nlength_m = 10.1',
        'kind = "dipole" #! antenna 1.kind: wavelengths | at most 20000\n'
        "position_m = [0, 0]\nheight_m = 9.1\nbearing_deg = 90\nlength_m = 50000",
    ),
    case(
        "a whole number beyond counting",
        "14.2",
        "1" + "0" * 400 + " #! transmission 1.frequency_mhz: smaller",
    ),
    case(
        "one point",
        LAST,
        LAST
        + changed(
            "[[0, 0, 5], [0, 3, 8], [0, 6, 5]]",
            "[[0, 0, 5]] #! antenna 2.conductor 1.points_m: at least 2 points",
            DRAWN,
        ),
    ),
    # structures
    case(
        "fence through the antenna",
        LAST,
        LAST
        + changed("[[-15, 20, 1.2], [15, 20, 1.2]]", "[[1, -5, 9.1], [1, 5, 9.1]]", FENCE).replace(
            '"fence"', "\"fence\" #! structure 1.name: 'garden dipole' | touches or crosses"
        ),
    ),
    case(
        "name of an antenna",
        LAST,
        LAST + FENCE.replace('"fence"', '"garden dipole" #! structure 1.name: already the name of antenna 1'),
    ),
    case(
        "post on real ground",
        LAST,
        LAST
        + FENCE.replace(
            "[[-15, 20, 1.2], [15, 20, 1.2]]",
            "[[3, 9, 0], [3, 9, 2]] #! structure 1.points_m: ground_connection_ohm",
        ),
    ),
    # transmission
    case(
        "antenna unknown",
        'antenna = "garden dipole"',
        'antenna = "garden dipol" #! transmission 1.antenna: did you mean garden dipole',
    ),
    case("frequency zero", "14.2", "0 #! transmission 1.frequency_mhz: at least 0.001 | found 0"),
    case(
        "frequency without unit",
        "frequency_mhz",
        "frequency = 14.2 #! transmission 1.frequency: frequency_mhz\n# ",
    ),
    case("power negative", "= 100", "= -5 #! transmission 1.transmitter_power_w: more than 0 | found -5"),
    case(
        "power in kilowatts",
        "transmitter_power_w = 100",
        "transmitter_power_kw = 1 #! transmission 1.transmitter_power_kw: transmitter_power_w",
    ),
    case(
        "no power",
        '[[transmission]]\nname = "voice"\nantenna = "garden dipole"\nfrequency_mhz = 14.2\n'
        "transmitter_power_w = 100",
        "[[transmission]] #! transmission 1: transmitter_power_w | carrier_power_w\n"
        'name = "voice"\nantenna = "garden dipole"\nfrequency_mhz = 14.2',
    ),
    case(
        "carrier without depth",
        'transmitter_power_w = 100\nmode = "ssb"',
        'carrier_power_w = 25 #! transmission 1.carrier_power_w: needs modulation_depth\nmode = "am"',
    ),
    case(
        "carrier of a mode without one",
        'transmitter_power_w = 100\nmode = "ssb"',
        'carrier_power_w = 25\nmodulation_depth = 1\nmode = "ssb" #! transmission 1.mode: "am" | found "ssb"',
    ),
    case(
        "depth alone",
        "= 100",
        "= 100\nmodulation_depth = 1 #! transmission 1.modulation_depth: belongs to carrier_power_w",
    ),
    case(
        "depth beyond one",
        'transmitter_power_w = 100\nmode = "ssb"',
        "carrier_power_w = 25\n"
        'modulation_depth = 1.2 #! transmission 1.modulation_depth: at most 1\nmode = "am"',
    ),
    case("mode unknown", '"ssb"', '"sbb" #! transmission 1.mode: did you mean ssb | carrier'),
    case(
        "mode and duty factor",
        'mode = "ssb"',
        'mode = "ssb"\nduty_factor = 0.2 #! transmission 1.duty_factor: not both',
    ),
    case(
        "duty factor in percent",
        'mode = "ssb"',
        "duty_factor = 20 #! transmission 1.duty_factor: at most 1 | found 20",
    ),
    case("no duty", 'mode = "ssb"', "duty_factor = 0 #! transmission 1.duty_factor: more than 0"),
    case(
        "half a pattern",
        "transmit_minutes = 2\nreceive_minutes = 4",
        "transmit_minutes = 2 #! transmission 1.transmit_minutes: receive_minutes",
    ),
    case(
        "group misspelt",
        'mode = "ssb"\n',
        'mode = "ssb"\nexclusive = "main" #! transmission 1.exclusive: did you mean "mains"\n',
        extra="".join(
            f"[[transmission]]\nname = '{f}'\nantenna = 'garden dipole'\nfrequency_mhz = {f}\n"
            "transmitter_power_w = 9\nexclusive = 'mains'\n"
            for f in (7.1, 21.2)
        ),
    ),
    case(
        "length left open on two bands",
        '[[antenna]]\nname = "garden dipole"\nkind = "dipole"\nposition_m = [0, 0]\n'
        "height_m = 9.1\nbearing_deg = 90\nlength_m = 10.1\n",
        "[[antenna]] #! antenna 1: length_m or length_ft | 7.1 MHz, 14.2 MHz\n"
        'name = "garden dipole"\nkind = "dipole"\nposition_m = [0, 0]\nheight_m = 9.1\nbearing_deg = 90\n',
        extra="[[transmission]]\nname = 'b'\nantenna = 'garden dipole'\nfrequency_mhz = 7.1\n"
        "transmitter_power_w = 9\n",
    ),
    case("called all", '"voice"', '"all" #! transmission 1.name: sum of all transmissions'),
    case(
        "loss and cable",
        'cable = "RG-213"',
        'cable = "RG-213"\nloss_db = 1 #! transmission 1.line.loss_db: not both',
    ),
    case(
        "negative loss",
        'cable = "RG-213"\nlength_m = 20',
        "loss_db = -1 #! transmission 1.line.loss_db: at least 0",
    ),
    case("cable unknown", '"RG-213"', '"RG-214" #! transmission 1.line.cable: did you mean RG-213 | RG-58'),
    case(
        "cable without length",
        'cable = "RG-213"\nlength_m = 20',
        'cable = "RG-213" #! transmission 1.line.cable: length_m or length_ft',
    ),
    case(
        "empty line",
        '[transmission.line]\ncable = "RG-213"\nlength_m = 20',
        "[transmission.line] #! transmission 1.line: needs loss_db",
    ),
    # area
    case("population unknown", '"general_public"', '"public" #! area 1.population: "public" | occupational'),
    case("uninformed workers", '"general_public"', '"occupational" #! area 1.population: needs informed'),
    case(
        "no shape",
        '[[area]]\nname = "bedroom"\npopulation = "general_public"\n' + AREA,
        '[[area]] #! area 1: corners_m | point_m | path_m | none is stated\nname = "bedroom"\n'
        'population = "general_public"\n',
    ),
    case(
        "two shapes",
        "bottom_m = 2.8\ntop_m = 4.8",
        "point_m = [0, 0, 1] #! area 1.point_m: corners and point",
    ),
    case(
        "top left out",
        "corners_m = [[18, -4], [26, -4], [26, 4], [18, 4]]\nbottom_m = 2.8\ntop_m = 4.8",
        "corners_m = [[18, -4], [26, -4], [26, 4], [18, 4]] #! area 1.corners_m: needs top_m "
        "or top_ft\nbottom_m = 2.8",
    ),
    case("top below bottom", "top_m = 4.8", "top_m = 1 #! area 1.top_m: below the bottom"),
    case(
        "downhill",
        "bottom_m = 2.8",
        "bottom_m = -2.8 #! area 1.bottom_m: 'bedroom' | below the ground | downhill",
    ),
    case(
        "point below ground",
        AREA,
        "point_m = [3, 3, -1] #! area 1.point_m: up must be at least 0 | found -1\n",
    ),
    case(
        "point with height",
        AREA,
        "point_m = [3, 3, 1]\ntop_m = 2 #! area 1.top_m: has its height in point_m\n",
    ),
    case("path without width", AREA, "path_m = [[3, 3], [9, 3]] #! area 1.path_m: width_m or width_ft\n"),
    case(
        "path in one place", AREA, "path_m = [[3, 3], [3, 3]] #! area 1.path_m: all the same\nwidth_m = 2\n"
    ),
    case(
        "width of corners",
        "bottom_m = 2.8",
        "bottom_m = 2.8\nwidth_m = 2 #! area 1.width_m: only a path_m has a width",
    ),
    case(
        "floor in words",
        "top_m = 4.8",
        'top_m = 4.8\ninsulated_floor = "yes" #! area 1.insulated_floor: true or false',
    ),
    case(
        "area crosses itself",
        "[[18, -4], [26, -4], [26, 4], [18, 4]]",
        "[[18, -4], [26, 4], [26, -4], [18, 4]] #! area 1.corners_m: crosses",
    ),
    case(
        "two areas of one name",
        LAST,
        LAST + "[[area]]\nname = 'bedroom' #! area 2.name: already the name of area 1\n"
        "population = 'general_public'\npoint_m = [1, 1, 1]\n",
    ),
    case("name missing", '[[area]]\nname = "bedroom"', "[[area]] #! area 1: needs name"),
]


def expected(text: str):
    """(line, key, words) of every annotation."""
    found = []
    for number, line in enumerate(text.splitlines(), 1):
        if "#! " in line:
            key, _, words = line.partition("#! ")[2].partition(": ")
            found.append((number, key, [word.strip() for word in words.split(" | ")]))
    return found
