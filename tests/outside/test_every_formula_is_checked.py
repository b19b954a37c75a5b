"""No formula goes unchecked: each public function of the physics stands in some file's `CHECKS`."""

from __future__ import annotations

import ast
import importlib
import inspect
import pkgutil
from collections.abc import Callable, Iterator, Sequence
from pathlib import Path
from types import ModuleType
from typing import Any

from gaugelog import physics
from tests.outside.cases import identifiers

HERE = Path(__file__).parent


def _modules() -> Iterator[ModuleType]:
    """Every module of the physics that has no leading underscore."""
    for found in pkgutil.iter_modules(physics.__path__):
        if not found.name.startswith("_"):
            yield importlib.import_module(f"{physics.__name__}.{found.name}")


def _public_functions(module: ModuleType) -> Iterator[Callable[..., Any]]:
    for name, member in vars(module).items():
        own = inspect.isfunction(member) and member.__module__ == module.__name__
        if own and not name.startswith("_"):
            yield inspect.unwrap(member)


def _checked() -> set[Callable[..., Any]]:
    """What the outside tests say they hold to the outside."""
    checked: set[Callable[..., Any]] = set()
    for path in sorted(HERE.glob("test_*.py")):
        module = importlib.import_module(f"{__package__}.{path.stem}")
        checked.update(inspect.unwrap(each) for each in getattr(module, "CHECKS", ()))
    return checked


def _reached_by_tests(tree: ast.Module) -> set[str]:
    """Every name that a test of the file uses, by itself or through the file's own helpers."""
    owned = _owned(tree)
    waiting = [name for name in owned if name.startswith("test_")]
    reached: set[str] = set()
    while waiting:
        for name in _names(owned.get(waiting.pop(), [])) - reached:
            reached.add(name)
            waiting.append(name)
    return reached


def _owned(tree: ast.Module) -> dict[str, list[ast.stmt]]:
    """What the file itself defines, by name; `CHECKS` is a list, not a use."""
    owned: dict[str, list[ast.stmt]] = {}
    for node in tree.body:
        if isinstance(node, ast.FunctionDef | ast.ClassDef):
            owned.setdefault(node.name, []).append(node)
        elif isinstance(node, ast.Assign | ast.AnnAssign):
            targets = node.targets if isinstance(node, ast.Assign) else [node.target]
            for name in _names(targets) - {"CHECKS"}:
                owned.setdefault(name, []).append(node)
    return owned


def _names(nodes: Sequence[ast.AST]) -> set[str]:
    found: set[str] = set()
    for node in (each for top in nodes for each in ast.walk(top)):
        if isinstance(node, ast.Name):
            found.add(node.id)
        elif isinstance(node, ast.Attribute):
            found.add(node.attr)
    return found


def test_every_public_function_is_held_to_the_outside() -> None:
    checked = _checked()
    missing = [
        f"{module.__name__}.{function.__name__}"
        for module in _modules()
        for function in _public_functions(module)
        if function not in checked
    ]
    assert [] == missing, "unchecked: " + ", ".join(missing)


def test_every_check_names_a_function_that_its_file_uses() -> None:
    """A test must reach it: in its body, its parameters, or what these call upon in the file."""
    idle = []
    for path in sorted(HERE.glob("test_*.py")):
        reached = _reached_by_tests(ast.parse(path.read_text(encoding="utf-8")))
        module = importlib.import_module(f"{__package__}.{path.stem}")
        idle += [
            f"{path.name}: {function.__name__}"
            for function in getattr(module, "CHECKS", ())
            if function.__name__ not in reached
        ]
    assert [] == idle, "listed but unused: " + ", ".join(idle)


def test_a_function_that_is_only_imported_and_listed_counts_as_idle() -> None:
    written = """
from gaugelog.physics.leads import one, two, three, four
CHECKS = (one, two, three, four)
TABLE = ((three, 1.0),)
def helper(): return four()
def lonely(): return one()
@pytest.mark.parametrize("row", TABLE)
def test_it(row): assert two() == helper()
"""
    reached = _reached_by_tests(ast.parse(written))
    assert {"two", "three", "four"} == reached & {"one", "two", "three", "four"}


def test_every_outside_case_is_used() -> None:
    text = "".join(path.read_text(encoding="utf-8") for path in HERE.glob("test_*.py"))
    unused = [each for each in identifiers() if f'"{each}"' not in text]
    assert [] == unused, "unused: " + ", ".join(unused)
