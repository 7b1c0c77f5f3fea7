"""Imports run one way, and the verifier stands alone."""

import ast
import graphlib
import re
import sys
import tomllib
from pathlib import Path

import pytest

from tests.architecture.source import FILES, MODULES, PACKAGE, folder, iter_imports, parse

LAYERS: tuple[frozenset[str], ...] = (
    frozenset({"__main__"}),
    frozenset({"command_line"}),
    frozenset({"ledger", "drawing", "explaining"}),
    frozenset({"search"}),
    frozenset({"certificates", "arc_walk", "weaving"}),
    frozenset({"three_braids"}),
    frozenset({"invariants", "moves"}),
    frozenset({"normal_form"}),
    frozenset({"diagrams"}),
    frozenset({"words"}),
    frozenset({"errors", "compiling"}),
)
"""From the surface down: a folder imports from itself and from lower layers only."""

VERIFIER_IS_IMPORTED_BY = {
    "braidsearch",
    "braidsearch.command_line.verify",
    "braidsearch.search.gate",
}
"""The top-level ``verify``, the command, and the gate through which every verdict leaves."""

NOTEBOOK_PICTURES = {
    "braidsearch.words.braid": {"braidsearch.drawing"},
    "braidsearch.certificates.values": {"braidsearch.drawing.notebook"},
    "braidsearch.search.verdict": {"braidsearch.drawing.notebook"},
}
"""The only imports upwards: a value that draws itself in a notebook asks for its picture.

They stand inside methods named _repr_..._, which nothing but a notebook calls, so that nothing is
loaded before.
"""

PROJECT = Path(__file__).parents[2]
LOADED_WHERE_USED = {"networkx", "sympy", "numba", "rich", "distributed"}
USES_EXTRA = {"braidsearch.ledger.executors": "cluster"}
"""Modules that may import what an extra installs, and say what to do where it is missing."""

LARGEST_FILE = 400


def layer(module: str) -> int:
    """The place of the module's folder in LAYERS, counted from the surface."""
    places = [place for place, folders in enumerate(LAYERS) if folder(module) in folders]
    assert places, f"{module}: its folder {folder(module)} has no layer"
    return places[0]


def own_imports(module: str, everywhere: bool = True) -> set[str]:
    """The modules of this package that a module imports."""
    found = iter_imports(parse(MODULES[module]), everywhere)
    return {name for name in found if name.split(".")[0] == "braidsearch"}


INNER = [name for name in MODULES if name != "braidsearch" and folder(name) != "verifier"]


@pytest.mark.parametrize("module", INNER)
def test_imports_run_one_way(module: str) -> None:
    """Every import leads to the same folder or to a lower layer."""
    upwards = NOTEBOOK_PICTURES.get(module, set())
    for imported in own_imports(module) - {"braidsearch", *VERIFIER_IMPORTS} - upwards:
        same_folder = folder(imported) == folder(module)
        assert same_folder or layer(imported) > layer(module), f"{module} imports {imported}"


@pytest.mark.parametrize("module", NOTEBOOK_PICTURES)
def test_pictures_are_fetched_by_notebooks_alone(module: str) -> None:
    """What is imported upwards for a picture is imported in _repr_..._ methods and nowhere else."""
    tree = parse(MODULES[module])
    methods = [
        node
        for node in ast.walk(tree)
        if isinstance(node, ast.FunctionDef) and re.fullmatch(r"_repr_[a-z]+_", node.name)
    ]
    inside = [name for method in methods for name in iter_imports(method)]
    everywhere = list(iter_imports(tree))
    for name in NOTEBOOK_PICTURES[module]:
        assert inside.count(name) == everywhere.count(name) > 0
        assert layer(name) < layer(module)


VERIFIER_IMPORTS = {name for name in MODULES if folder(name) == "verifier"}


def test_the_rule_would_notice_a_wrong_import() -> None:
    """The layers are as the design has them: an import from below upwards has no excuse."""
    assert layer("braidsearch.words.braid") > layer("braidsearch.normal_form")
    assert layer("braidsearch.search.driver") < layer("braidsearch.certificates.values")
    assert layer("braidsearch.command_line.main") < layer("braidsearch.search.driver")
    assert own_imports("braidsearch.normal_form.left_normal_form") >= {"braidsearch.words"}


def test_verifier_imports_the_standard_library_alone() -> None:
    """verify.py imports nothing of the project and no installed library."""
    for name in VERIFIER_IMPORTS - {"braidsearch.verifier"}:
        for imported in iter_imports(parse(MODULES[name])):
            assert imported.split(".")[0] in sys.stdlib_module_names, imported
    assert own_imports("braidsearch.verifier") == {"braidsearch.verifier.verify"}


def test_verifier_is_imported_by_its_users_alone() -> None:
    """Exactly three places: no part of the search can lean on the verifier's code."""
    users = {
        name
        for name in MODULES
        if folder(name) != "verifier" and own_imports(name) & VERIFIER_IMPORTS
    }
    assert users == VERIFIER_IS_IMPORTED_BY


def test_verifier_checks_without_assert() -> None:
    """``python -O`` takes every assert away, so none may carry a check."""
    tree = parse(PACKAGE / "verifier" / "verify.py")
    assert not [node.lineno for node in ast.walk(tree) if isinstance(node, ast.Assert)]


def test_no_module_waits_for_itself() -> None:
    """What is loaded with a file never leads back to it: the graph of modules has no cycle."""
    graph = {
        name: own_imports(name, everywhere=False) - {name}
        for name in MODULES
        if name != "braidsearch"
    }
    order = list(graphlib.TopologicalSorter(graph).static_order())
    assert len(order) >= len(graph)


def test_the_package_is_not_imported_through_its_front_door() -> None:
    """``braidsearch`` itself gathers names for users; of the inside only --version asks it."""
    users = {name for name in INNER if "braidsearch" in own_imports(name)}
    assert users == {"braidsearch.command_line.main"}


def declared_libraries(module: str) -> set[str]:
    """The libraries that pyproject.toml names for the module, its extra among them."""
    project = tomllib.loads((PROJECT / "pyproject.toml").read_text(encoding="utf-8"))["project"]
    lines = list(project["dependencies"])
    if module in USES_EXTRA:
        lines += project["optional-dependencies"][USES_EXTRA[module]]
    return {re.split(r"[^a-z0-9_-]", line)[0] for line in lines}


@pytest.mark.parametrize("module", MODULES)
def test_libraries_are_the_declared_ones(module: str) -> None:
    """No file imports a library that pyproject.toml does not name."""
    allowed = {"braidsearch", *declared_libraries(module), *sys.stdlib_module_names}
    assert {name.split(".")[0] for name in iter_imports(parse(MODULES[module]))} <= allowed


def loaded_with(module: str) -> set[str]:
    """Everything that is loaded when the module is, the packages around each module included."""
    loaded: set[str] = set()
    waiting = [module]
    while waiting:
        name = waiting.pop()
        if name in loaded:
            continue
        loaded.add(name)
        if name in MODULES:
            waiting += iter_imports(parse(MODULES[name]), everywhere=False)
            waiting.append(name.rpartition(".")[0])
    return loaded


@pytest.mark.parametrize(
    "module",
    [
        "braidsearch.search.driver",
        "braidsearch.invariants",
        "braidsearch.certificates",
        *(f"braidsearch.command_line.{name}" for name in ("main", "compare", "verify")),
    ],
)
def test_heavy_libraries_are_loaded_where_they_are_used(module: str) -> None:
    """A query that invariants decide loads none of them, whatever the folders hold."""
    assert "braidsearch" in loaded_with(module)
    assert {name.split(".")[0] for name in loaded_with(module)}.isdisjoint(LOADED_WHERE_USED)


def test_no_star_imports_and_no_endless_files() -> None:
    """Every name has a home that can be read, and no file but the verifier is longer than 400."""
    for file in FILES:
        nodes = ast.walk(parse(file))
        stars = [n for n in nodes if isinstance(n, ast.ImportFrom) and n.names[0].name == "*"]
        length = len(file.read_text(encoding="utf-8").splitlines())
        assert not stars, file
        assert length <= LARGEST_FILE or file.name == "verify.py", f"{file}: {length} lines"
