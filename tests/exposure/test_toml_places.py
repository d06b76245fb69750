"""Lines of keys, tables and elements; the expected numbers are counted by eye in the texts below."""

import pytest

from exposure.toml_places import line_of, lines

TEXT = '''\
a = 1
"b c" = "x = [ # no comment"
[t]
k.l = """
two = 2
"""
after = 'it''
[[u]]
v = 1
[u.w]
x = 2
[t.z]
n = { p = 1, q = [
  1, { r = 2 },
] }
[[u]]
v = [
  [1, 2], # comment ]
  [3,
   4],
]
[[u.s]]
y = 1979-05-27 07:32:00
[[u.s]]
y = +1.5e-3
'''.replace("'it''", "'it\"'")


@pytest.mark.parametrize(
    ("path", "line"),
    [
        (("a",), 1),
        (("b c",), 2),
        (("t",), 3),
        (("t", "k", "l"), 4),
        (("t", "after"), 7),
        (("u", 0), 8),
        (("u", 0, "w", "x"), 11),
        (("t", "z", "n"), 13),
        (("t", "z", "n", "q", 1, "r"), 14),
        (("u", 1), 16),
        (("u", 1, "v", 1), 19),
        (("u", 1, "v", 1, 1), 20),
        (("u", 1, "s", 0, "y"), 23),
        (("u", 1, "s", 1), 24),
        (("u", 1, "s", 1, "y"), 25),
    ],
)
def test_every_key_table_and_element_has_its_line(path, line):
    assert lines(TEXT)[path] == line


def test_what_is_not_written_has_the_line_of_the_table_around_it():
    assert line_of(lines(TEXT), ("u", 1, "s", 1, "absent", 3)) == 24


def test_what_stands_in_no_table_has_no_line():
    assert line_of(lines(TEXT), ("absent",)) is None
