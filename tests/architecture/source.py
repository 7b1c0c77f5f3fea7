"""The source files of the package, and what each imports, read with ast."""

import ast
from collections.abc import Iterator
from pathlib import Path

import braidsearch

PACKAGE = Path(braidsearch.__file__).parent
FILES = sorted(PACKAGE.rglob("*.py"))


def module_name(file: Path) -> str:
    """The dotted name under which the file is imported."""
    parts = ["braidsearch", *file.relative_to(PACKAGE).with_suffix("").parts]
    return ".".join(parts[:-1] if parts[-1] == "__init__" else parts)


MODULES = {module_name(file): file for file in FILES}


def parse(file: Path) -> ast.Module:
    """The syntax tree of a file."""
    return ast.parse(file.read_text(encoding="utf-8"), str(file))


def iter_imports(tree: ast.AST, everywhere: bool = True) -> Iterator[str]:
    """The modules that are imported; without ``everywhere`` only those loaded with the file."""
    for node in ast.walk(tree) if everywhere else iter_loaded(tree):
        if isinstance(node, ast.Import):
            yield from (alias.name for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, "a relative import: expected the full name"
            yield from (resolve(node.module or "", alias.name) for alias in node.names)


def iter_loaded(tree: ast.AST) -> Iterator[ast.AST]:
    """The nodes outside functions and outside ``if TYPE_CHECKING``."""
    for node in ast.iter_child_nodes(tree):
        if isinstance(node, (ast.FunctionDef, ast.AsyncFunctionDef, ast.Lambda)):
            continue
        if isinstance(node, ast.If) and "TYPE_CHECKING" in ast.unparse(node.test):
            continue
        yield node
        yield from iter_loaded(node)


def resolve(module: str, name: str) -> str:
    """``from module import name`` imports the submodule of that name, where there is one."""
    return f"{module}.{name}" if f"{module}.{name}" in MODULES else module


def folder(module: str) -> str:
    """The folder of the package in which a module lies; the file's own name beside the folders."""
    parts = module.split(".")
    return parts[1] if len(parts) > 1 else "braidsearch"
