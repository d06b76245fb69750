"""Tables of points."""

import pytest

from exposure.errors import ExposureError
from exposure.verbs.point_table import points_of_table


@pytest.fixture
def table(tmp_path):
    def read(text: str):
        path = tmp_path / "points.csv"
        path.write_text(text)
        return points_of_table(str(path))

    return read


def test_points_are_read_by_the_heads_of_their_columns(table):
    """Ten feet are 3.048 m by definition; other columns are left alone."""
    found = table("name,up_m,east_ft,north_m\nwindow,1.5,10,-2\n")

    assert found == [(pytest.approx(3.048, rel=1e-15), -2, 1.5)]


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("", "no points"),
        ("east_m,north_m,up_m\n", "no points"),
        ("east_m,north_m\n1,2\n", "must name east_m, north_m and up_m"),
        ("east_m;north_m;up_m\n1;2;3\n", "separated by commas"),
        ("east_m,east_ft,north_m,up_m\n1,2,3,4\n", "must name east_m, north_m and up_m"),
        ("east_m,north_m,up_m\n1,2,3\n1,zwei,3\n", "line 3, north_m: must be a number"),
        ("east_m,north_m,up_m\n1,2\n", "line 2, up_m: must be a number"),
        ("east_m,north_m,up_m\n1,2,nan\n", "line 2, up_m: must be a number"),
    ],
)
def test_a_table_that_is_none_is_told_with_what_is_needed(table, text, words):
    with pytest.raises(ExposureError, match=words):
        table(text)
