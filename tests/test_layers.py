"""The import rule of DEVELOPERS.md, read from the source."""

import ast
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
ROWS = [
    "errors",
    "units",
    "toml_places",
    "keys",
    "published",
    "limits",
    "antennas",
    "site",
    "station",
    "assessment",
    "outputs",
    "verbs",
    "command_line",
]
# who may import what from outside: matplotlib draws, reportlab and pypdf make the report
ONLY_IN = {
    "matplotlib": "exposure/outputs/",
    "reportlab": "exposure/outputs/",
    "pypdf": "exposure/outputs/",
    "tomli": "exposure/site/",
}
SOLVER_ROOMS = ("antennas", "station")
LATE = {"exposure/__init__.py", "exposure/command_line.py"}


def modules():
    return sorted(path for package in ("exposure", "fieldsolver") for path in (ROOT / package).rglob("*.py"))


def imports(path):
    """(line, full module name, whether inside a function) of every import of a file."""
    tree = ast.parse(path.read_text())
    inner = {
        node
        for scope in ast.walk(tree)
        if isinstance(scope, ast.FunctionDef | ast.AsyncFunctionDef)
        for node in ast.walk(scope)
    }
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            yield from ((node.lineno, alias.name, node in inner) for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            yield from ((node.lineno, f"{node.module}.{alias.name}", node in inner) for alias in node.names)


def name_of(path) -> str:
    return path.relative_to(ROOT).as_posix()


def row(module: str) -> int:
    parts = module.split(".")
    return ROWS.index(parts[1]) if len(parts) > 1 and parts[1] in ROWS else -1


@pytest.mark.parametrize("path", modules(), ids=name_of)
def test_a_module_imports_only_from_rows_below_its_own(path):
    """DEVELOPERS.md, rooms; a line that breaks the rule is named."""
    own = ".".join(path.relative_to(ROOT).with_suffix("").parts)
    wrong = [
        f"{name_of(path)}:{line} imports {module}"
        for line, module, _ in imports(path)
        if module.split(".")[0] == "exposure" and own.startswith("exposure.") and row(module) > row(own) >= 0
    ]

    assert not wrong


@pytest.mark.parametrize("path", modules(), ids=name_of)
def test_outside_libraries_and_the_solver_stay_in_their_rooms(path):
    name, wrong = name_of(path), []
    for line, module, _ in imports(path):
        top = module.split(".")[0]
        if top in ONLY_IN and not name.startswith(ONLY_IN[top]):
            wrong.append(f"{name}:{line} imports {module}")
        solver_room = name.startswith("fieldsolver/") or name.split("/")[1] in SOLVER_ROOMS
        if top == "fieldsolver" and not solver_room:
            wrong.append(f"{name}:{line} imports {module}")
        if top == "exposure" and name.startswith("fieldsolver/"):
            wrong.append(f"{name}:{line} imports {module}")

    assert not wrong


@pytest.mark.parametrize("path", modules(), ids=name_of)
def test_imports_stand_at_the_top_but_in_two_places(path):
    late = [f"{name_of(path)}:{line} {module}" for line, module, inside in imports(path) if inside]

    assert not late or name_of(path) in LATE


def test_imports_have_no_cycle():
    """Depth-first over the packages' own imports."""
    graph = {}
    for path in modules():
        own = ".".join(path.relative_to(ROOT).with_suffix("").parts).removesuffix(".__init__")
        targets = {module for _, module, inside in imports(path) if not inside}
        graph[own] = targets | {module.rpartition(".")[0] for module in targets}
    finished, path_now = set(), []

    def visit(module):
        assert module not in path_now, " -> ".join([*path_now, module])
        if module in finished or module not in graph:
            return
        path_now.append(module)
        for target in sorted(graph[module] - {module}):
            visit(target)
        path_now.pop()
        finished.add(module)

    for module in sorted(graph):
        visit(module)
