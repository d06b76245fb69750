"""Broken site files: each tells its operator line, key, what was found and what is allowed."""

import re
from pathlib import Path

import pytest

from exposure.errors import SiteFileError
from exposure.site.site_file import read_site
from tests.exposure.broken_cases import CASES, expected
from tests.exposure.stations import changed

BROKEN = sorted((Path(__file__).parent / "broken").glob("*.toml"))


def problems(path) -> list:
    with pytest.raises(SiteFileError) as caught:
        read_site(path)
    return caught.value.problems


def check(path):
    wanted = expected(path.read_text())
    found = problems(path)
    assert [(line, key) for line, key, _ in found] == [(line, key) for line, key, _ in wanted], found
    for (_, _, message), (_, _, words) in zip(found, wanted, strict=True):
        assert [word for word in words if word not in message] == [], message


@pytest.mark.parametrize("text", CASES)
def test_a_broken_line_is_told_with_its_line_its_key_and_what_is_allowed(text, tmp_path):
    path = tmp_path / "site.toml"
    path.write_text(text)

    check(path)


@pytest.mark.parametrize("path", BROKEN, ids=lambda path: path.stem)
def test_all_problems_of_a_file_are_told_at_once(path):
    check(path)


def test_there_are_at_least_forty_broken_files():
    """The number is the one promised (issue 2)."""
    assert len(CASES) + len(BROKEN) >= 40


@pytest.mark.parametrize(
    ("text", "line", "word"),
    [
        ('version = 1\nname = "x\n', 2, "not valid TOML"),
        ("version = 1\nversion = 1\n", 2, "not valid TOML"),
        ("version = 1\n[ground\n", 2, "not valid TOML"),
        ("version = 1\nname = unquoted\n", 2, "not valid TOML"),
        ("a = " + "[" * 5000, None, "nested"),
    ],
)
def test_what_is_no_toml_is_one_problem_with_its_line(text, line, word, tmp_path):
    path = tmp_path / "site.toml"
    path.write_text(text)

    ((found, _, message),) = problems(path)

    assert word in message
    assert found == line


def test_a_file_that_is_not_utf_8_is_told_with_its_line(tmp_path):
    path = tmp_path / "site.toml"
    path.write_bytes("version = 1\nname = 'Größe'\n".encode("latin-1"))

    ((line, _, message),) = problems(path)

    assert line == 2 and "UTF-8" in message


@pytest.mark.parametrize("name", ["absent.toml", "."])
def test_a_file_that_cannot_be_read_is_one_problem(name, tmp_path):
    ((line, _, message),) = problems(tmp_path / name)

    assert line is None and "cannot be read" in message


def test_an_empty_file_is_told_everything_that_it_needs(tmp_path):
    path = tmp_path / "site.toml"
    path.write_text("")

    messages = " ".join(message for _, _, message in problems(path))

    for needed in ("version", "name", "limits", "[ground]", "[[antenna]]", "[[transmission]]"):
        assert f"this file needs {needed}" in messages


def test_the_text_of_the_error_lists_every_problem_with_its_place(tmp_path):
    path = tmp_path / "site.toml"
    path.write_text(changed("length_m = 10.1", "lenght_m = 10.1").replace('"ssb"', '"sbb"'))

    with pytest.raises(SiteFileError, match="site.toml has 2 problems:") as caught:
        read_site(path)

    assert re.search(r"line 15, antenna 1\.lenght_m: .*length_m", str(caught.value))
    assert re.search(r"line 23, transmission 1\.mode: .*ssb", str(caught.value))
