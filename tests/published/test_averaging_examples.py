"""The averages that FCC OET Bulletin 65 Supplement B prints, by the program's worst window."""

import pytest

from exposure.station.powers import worst_window
from tests.published.oet65b_averaging import EXAMPLES


@pytest.mark.parametrize("example", EXAMPLES, ids=lambda example: example.name)
@pytest.mark.parametrize("window_s, printed", [(360, "controlled"), (1800, "uncontrolled")])
def test_average_power_in_the_worst_window(example, window_s, printed):
    """Exact but where the source rounds; the tolerance stands beside the example."""
    expected = getattr(example, f"{printed}_w")
    tolerance = getattr(example, f"{printed}_tolerance_w") or 1e-9

    on_air = worst_window(*example.pattern_s, window_s)

    assert example.peak_power_w * example.duty * on_air == pytest.approx(expected, abs=tolerance)
