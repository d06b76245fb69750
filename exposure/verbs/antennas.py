"""``exposure antennas``: the kinds of antenna and their keys."""

from exposure.antennas.catalogue import KINDS, keys_of
from exposure.keys.kinds import SubTable
from exposure.verbs.screen import print_json


def run(arguments) -> int:
    """Print the catalogue."""
    if arguments.json:
        print_json(
            [
                {"kind": kind.id, "summary": kind.summary, "keys": _listed(keys_of(kind.id))}
                for kind in KINDS.values()
            ]
        )
        return 0
    for kind in KINDS.values():
        print(f'kind = "{kind.id}": {kind.summary}')
        _print(keys_of(kind.id), ("antenna",), "  ")
        print()
    return 0


def _print(keys, path: tuple, indent: str):
    for key in keys:
        if isinstance(key, SubTable):
            print(f"{indent}{key.title(path)}{_need(key)}: {key.help}")
            _print(key.keys, (*path, key.stem), indent + "  ")
        else:
            print(f"{indent}{key.spelling}{_need(key)}: {key.help}")


def _need(key) -> str:
    return f" ({key.need})" if key.need else ""


def _listed(keys) -> list[dict]:
    return [
        {"names": list(key.names), "need": key.need, "help": key.help}
        | ({"keys": _listed(key.keys)} if isinstance(key, SubTable) else {})
        for key in keys
    ]
