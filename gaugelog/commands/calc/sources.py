"""The name of a formula and the source that its docstring gives, as an answer prints them."""

from __future__ import annotations

import importlib
import inspect
import re
from collections.abc import Callable
from typing import Any

Formula = Callable[..., Any]
"""A public function of `physics/`."""

_PARAGRAPH = re.compile(r"Source:\s*(.+?)(?:\n\s*\n|\Z)", re.DOTALL)
_NAMED = re.compile(r"`([\w.]+)`")


def name_of(formula: Formula) -> str:
    """The formula's name with its module, `leads.three_wire_loss`."""
    return f"{formula.__module__.rsplit('.', 1)[-1]}.{formula.__qualname__}"


def source_of(formula: Formula) -> str:
    """The `Source:` paragraph of the formula's docstring on one line, without a full stop.

    Where it sends the reader to a sibling ("as `desensitisation`"), the sibling's source is told
    in its place; where it names other formulas, their sources follow.
    """
    return _source(formula, frozenset())


def _source(formula: Formula, told: frozenset[Formula]) -> str:
    found = _PARAGRAPH.search(inspect.getdoc(formula) or "")
    if found is None:
        return "see its docstring"
    text = " ".join(found[1].split()).rstrip(".")
    seen = told | {formula}
    others = {name: _formula(name, formula) for name in _NAMED.findall(text)}
    known = {name: other for name, other in others.items() if other and other not in seen}
    sources = {name: _source(other, seen) for name, other in known.items()}
    sibling = re.match(r"as `([\w.]+)`", text)
    if sibling and sibling[1] in sources:
        text = sources.pop(sibling[1]) + text[sibling.end() :]
    parts = "; ".join([text.replace("`", ""), *sources.values()]).split("; ")
    return "; ".join(dict.fromkeys(parts))


def _formula(name: str, near: Formula) -> Formula | None:
    """The function that a docstring names, in its own module or in a sibling's."""
    module, _, own = name.rpartition(".")
    package = near.__module__.rpartition(".")[0]
    try:
        place = importlib.import_module(f"{package}.{module}" if module else near.__module__)
    except ImportError:
        return None
    found = getattr(place, own, None)
    return found if inspect.isfunction(found) else None
