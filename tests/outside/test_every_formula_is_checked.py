"""No formula goes unchecked: each public function of the physics stands in some file's `CHECKS`."""

from __future__ import annotations

import importlib
import inspect
import pkgutil
import re
from collections.abc import Callable, Iterator
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
    """Once in `CHECKS`, and once at least in a test."""
    idle = []
    for path in sorted(HERE.glob("test_*.py")):
        text = path.read_text(encoding="utf-8")
        module = importlib.import_module(f"{__package__}.{path.stem}")
        for function in getattr(module, "CHECKS", ()):
            if len(re.findall(rf"\b{function.__name__}\b", text)) < 2:
                idle.append(f"{path.name}: {function.__name__}")
    assert [] == idle, "listed but unused: " + ", ".join(idle)


def test_every_outside_case_is_used() -> None:
    text = "".join(path.read_text(encoding="utf-8") for path in HERE.glob("test_*.py"))
    unused = [each for each in identifiers() if f'"{each}"' not in text]
    assert [] == unused, "unused: " + ", ".join(unused)
