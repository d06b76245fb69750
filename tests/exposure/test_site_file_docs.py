"""docs/site-file.md names every key, and its example is a sound site file."""

import re
from pathlib import Path

import pytest

from exposure.antennas.catalogue import KINDS, keys_of
from exposure.keys.kinds import SubTable
from exposure.published.cables import CABLES
from exposure.published.metals import METALS
from exposure.published.modes import MODES
from exposure.published.soils import SOILS
from exposure.site.schema import TOP_KEYS
from exposure.site.site_file import read_site

TEXT = (Path(__file__).parents[2] / "docs" / "site-file.md").read_text()


def names(keys):
    for key in keys:
        yield next(iter(key.names))
        if isinstance(key, SubTable):
            yield from names(key.keys)


EVERY = sorted({*names(TOP_KEYS), *(name for kind in KINDS for name in names(keys_of(kind)))})


@pytest.mark.parametrize("name", EVERY)
def test_every_key_is_described(name):
    assert re.search(rf"[`\[.]{re.escape(name)}[`\]]", TEXT)


@pytest.mark.parametrize("word", [*KINDS, *SOILS, *METALS, *MODES, *CABLES])
def test_every_word_of_a_list_is_described(word):
    assert f"`{word}`" in TEXT or f'`"{word}"`' in TEXT


def test_the_full_example_is_a_sound_site_file(tmp_path):
    path = tmp_path / "example.toml"
    path.write_text(TEXT.partition("```toml\n")[2].partition("```")[0])

    site = read_site(path)

    assert len(site.antennas) == 3 and len(site.transmissions) == 3 and len(site.areas) == 3
