"""A sound site file as a Site, in SI units, with the safe side taken where the file is silent."""

import hashlib
import math

import pytest

from exposure.site.site_file import read_site
from tests.exposure.stations import DRAWN, FENCE, STATION, VERTICAL, changed


@pytest.fixture
def site(tmp_path):
    def read(text: str):
        path = tmp_path / "lot.toml"
        path.write_text(text)
        return read_site(path)

    return read


def test_the_demonstration_lot_is_read_in_si_units(site):
    """The numbers are those of STATION; 14.2 MHz is 14.2e6 Hz, 90 degrees pi/2, 1 mm 0.001 m, 2 min 120 s."""
    lot = site(STATION)

    antenna, emission, area = lot.antennas[0], lot.transmissions[0], lot.areas[0]
    assert (lot.name, lot.limits, lot.date.isoformat()) == (
        "Demonstration lot 1",
        ("us_fcc", "icnirp_2020"),
        "2026-12-01",
    )
    assert (lot.ground.kind, lot.ground.relative_permittivity, lot.ground.conductivity) == ("real", 13, 0.005)
    assert antenna.bearing == pytest.approx(math.pi / 2, rel=1e-15)
    assert (antenna.height, antenna.shape.length, antenna.shape.wire_radius) == (9.1, 10.1, 0.001)
    assert antenna.material.conductivity == 58.0e6
    assert (emission.frequency, emission.peak_envelope_power) == (14.2e6, 100)
    assert (emission.transmit_time, emission.receive_time) == (120, 240)
    assert (emission.line.cable, emission.line.length) == ("RG-213", 20)
    assert (area.shape, area.bottom, area.top) == ("polygon", 2.8, 4.8)
    assert lot.property_corners == ((-15, -20), (15, -20), (15, 20), (-15, 20))


def test_the_hash_is_that_of_the_bytes_and_the_text_is_kept(site):
    """sha256 as in FIPS 180-4, taken by the standard library over the bytes as written."""
    lot = site(STATION)

    assert lot.sha256 == hashlib.sha256(STATION.encode()).hexdigest()
    assert lot.text == STATION
    assert lot.file == "lot.toml"


def test_what_is_not_stated_is_taken_on_the_safe_side(site):
    """No loss, no duty factor below one, no pauses, perfect metal, spatial peak, upper bound."""
    bare = STATION.replace('material = "copper"\n', "").replace('mode = "ssb"\n', "")
    bare = bare.replace("transmit_minutes = 2\nreceive_minutes = 4\n", "")
    bare = bare.replace('[transmission.line]\ncable = "RG-213"\nlength_m = 20\n', "")

    lot = site(bare)

    emission = lot.transmissions[0]
    assert emission.duty_factor == 1 and "neither mode nor duty_factor" in emission.duty_source
    assert (emission.line, emission.transmit_time, emission.receive_time) == (None, None, None)
    assert lot.antennas[0].material.conductivity == math.inf
    assert (lot.decision, lot.spatial, lot.margin) == ("upper_bound", "peak", None)


IN_FEET = {
    "height_m = 9.1": "height_ft = 29.855643044619423",
    "length_m = 10.1": "length_ft = 33.136482939632545",
    "position_m = [0, 0]": "position_ft = [0, 0]",
    "wire_radius_mm = 1.0": "wire_diameter_in = 0.07874015748031496",
    "corners_m = [[-15, -20], [15, -20], [15, 20], [-15, 20]]": (
        "corners_ft = [[-49.21259842519685, -65.6167979002625], [49.21259842519685, -65.6167979002625], "
        "[49.21259842519685, 65.6167979002625], [-49.21259842519685, 65.6167979002625]]"
    ),
    "bottom_m = 2.8\ntop_m = 4.8": "bottom_ft = 9.186351706036746\ntop_ft = 15.748031496062993",
    "transmit_minutes = 2\nreceive_minutes = 4": "transmit_seconds = 120\nreceive_seconds = 240",
}


@pytest.mark.parametrize(("metric", "other"), IN_FEET.items())
def test_feet_and_inches_say_the_same_as_metres(site, metric, other):
    """0.3048 m a foot, 0.0254 m an inch, exact by definition; equal to the rounding of a double, 1e-15."""
    text = changed(metric, other)

    one, same = site(STATION), site(text)

    assert _numbers(one) == pytest.approx(_numbers(same), rel=1e-15, abs=1e-15)


def _numbers(lot) -> list[float]:
    antenna, area, emission = lot.antennas[0], lot.areas[0], lot.transmissions[0]
    corners = [*lot.property_corners, *area.corners]
    return [
        *(number for corner in corners for number in corner),
        *(*antenna.position, antenna.height, antenna.shape.length, antenna.shape.wire_radius),
        *(area.bottom, area.top, emission.transmit_time, emission.receive_time),
    ]


@pytest.mark.parametrize(("depth", "peak", "duty"), [(0, 25, 1.0), (0.5, 56.25, 1.25 / 2.25), (1, 100, 0.5)])
def test_a_carrier_of_depth_m_peaks_at_its_power_times_one_plus_m_squared(site, depth, peak, duty):
    """The envelope peaks at 1 + m (facts/formulas.md 14: PEP = carrier (1 + m)^2; four times at m = 1).

    The mean square of 1 + m x(t), |x| <= 1 without mean, is at most 1 + m^2: no AM signal of depth m has
    a larger share of its peak.  Exact.
    """
    am = changed(
        'transmitter_power_w = 100\nmode = "ssb"',
        f'carrier_power_w = 25\nmodulation_depth = {depth}\nmode = "am"',
    )

    emission = site(am).transmissions[0]

    assert emission.peak_envelope_power == peak
    assert emission.duty_factor == pytest.approx(duty, rel=1e-15)


@pytest.mark.parametrize(
    ("stated", "shape", "corners", "bottom", "top"),
    [
        ("point_m = [1, 2, 3]", "point", ((1, 2),), 3, 3),
        ("path_m = [[1, 2], [3, 4]]\nwidth_m = 2", "path", ((1, 2), (3, 4)), 0, 2),
        ("path_m = [[1, 2], [3, 4]]\nwidth_m = 2\nbottom_m = 3", "path", ((1, 2), (3, 4)), 3, 5),
        (
            "corners_m = [[0, 0], [1, 0], [1, 1], [0, 0]]\nbottom_m = 0\ntop_m = 2",
            "polygon",
            ((0, 0), (1, 0), (1, 1)),
            0,
            2,
        ),
    ],
)
def test_an_area_is_a_polygon_a_point_or_a_path(site, stated, shape, corners, bottom, top):
    """A path reaches from 0 to 2 m unless stated (design, section 7); a repeated first corner is dropped."""
    lot = site(STATION[: STATION.index("corners_m = [[18")] + stated)

    area = lot.areas[0]

    assert (area.shape, area.corners, area.bottom, area.top) == (shape, corners, bottom, top)


@pytest.mark.parametrize("soil", ["average", "wet", "medium_dry", "very_dry", "fresh_water", "sea_water"])
def test_every_soil_of_the_table_is_understood(site, soil):
    lot = site(changed('"average"', f'"{soil}"'))

    assert lot.ground.kind == "real" and lot.ground.name.startswith(soil)


@pytest.mark.parametrize("kind", ["perfect", "none"])
def test_a_station_may_stand_on_metal_or_nowhere(site, kind):
    lot = site(changed('soil = "average"', f'kind = "{kind}"'))

    assert (lot.ground.kind, lot.ground.conductivity) == (kind, None)


def test_a_dipole_of_no_stated_length_is_cut_for_its_one_frequency(site):
    """142.65 m MHz / f, 468 ft MHz / f: common practice, no printed source; 10.05 m at 14.2 MHz."""
    lot = site(changed("length_m = 10.1\n", ""))

    shape = lot.antennas[0].shape
    assert shape.length == pytest.approx(142.65 / 14.2, rel=1e-12)
    assert "derived" in shape.length_note


def test_every_kind_and_structure_together_make_a_station(site):
    lot = site(STATION + VERTICAL + DRAWN + FENCE)

    assert [antenna.kind for antenna in lot.antennas] == ["dipole", "vertical", "conductors"]
    assert [structure.name for structure in lot.structures] == ["fence"]


def test_line_breaks_inside_inline_tables_are_understood(site):
    """TOML 1.1 allows them; people write their wires so."""
    text = STATION + DRAWN.replace(
        "[[antenna.conductor]]\npoints_m = [[0, 0, 5], [0, 3, 8], [0, 6, 5]]\nwire_radius_mm = 1.5\n",
        "conductor = [{\n  points_m = [[0, 0, 5], [0, 3, 8], [0, 6, 5]],\n  wire_radius_mm = 1.5,\n}]\n",
    )

    assert len(site(text).antennas[1].shape.chains) == 1


def test_an_occupational_area_names_who_was_informed(site):
    text = changed('"general_public"', '"occupational"\ninformed = "the household, 1 May 2026"')

    assert site(text).areas[0].informed == "the household, 1 May 2026"
