"""Any value in the place of any other is either taken or told as a problem; nothing else happens."""

import copy
import datetime
import json
from pathlib import Path

import pytest
import tomli

from exposure.errors import SiteFileError
from exposure.site.site_file import read_site

TEXT = (Path(__file__).parents[2] / "docs" / "site-file.md").read_text()
EXAMPLE = tomli.loads(TEXT.partition("```toml\n")[2].partition("```")[0])
ODD = [-1, 1e308, "x", [], [[1.5, 2.5, 3.5]], {}]


def paths(value, path=()):
    """Of every key, table and list of tables."""
    if path and not isinstance(path[-1], int):
        yield path
    if isinstance(value, dict):
        for name, inside in value.items():
            yield from paths(inside, (*path, name))
    elif isinstance(value, list) and value and isinstance(value[0], dict):
        yield from paths(value[0], (*path, 0))


def written(value) -> str:
    """A value as TOML, on one line."""
    match value:
        case dict():
            return "{" + ", ".join(f"{name} = {written(inside)}" for name, inside in value.items()) + "}"
        case list():
            return "[" + ", ".join(map(written, value)) + "]"
        case datetime.date():
            return value.isoformat()
    return json.dumps(value)


@pytest.mark.parametrize("odd", ODD, ids=repr)
@pytest.mark.parametrize("path", list(paths(EXAMPLE)), ids=lambda path: ".".join(map(str, path)))
def test_an_odd_value_is_taken_or_told(path, odd, tmp_path):
    data = copy.deepcopy(EXAMPLE)
    table = data
    for part in path[:-1]:
        table = table[part]
    table[path[-1]] = odd
    file = tmp_path / "site.toml"
    file.write_text("\n".join(f"{name} = {written(value)}" for name, value in data.items()))

    problems = []
    try:
        read_site(file)
    except SiteFileError as error:
        problems = error.problems

    assert all(line is not None or not key for line, key, _ in problems)
