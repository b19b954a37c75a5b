"""What differs between two bodies of a plan, told in the words of their fields."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any

from gaugelog.ledger.base import FactBody, Part, Quantity

_IDENTITY = frozenset({"id", "campaign"})
_LONGEST = 60


def content(body: Part) -> dict[str, Any]:
    """A body as plain data, without the ids of itself and its campaign."""
    data = body.model_dump(mode="json", exclude_none=True)
    return {name: value for name, value in data.items() if name not in _IDENTITY}


def renamed(body: FactBody, ids: Mapping[str, str]) -> Any:
    """The same body with ids replaced, wherever they stand in it."""
    return type(body).model_validate(_replaced(body.model_dump(mode="json"), ids))


def differences(
    before: Mapping[str, Any], now: Mapping[str, Any], names: Mapping[str, str]
) -> Iterator[str]:
    """A line for each field that differs, `place x: 100 mm → 150 mm`.

    `names` gives the labels of what fields refer to by id.
    """
    for name in dict.fromkeys((*before, *now)):
        if name not in _IDENTITY:
            yield from _different(name.replace("_", " "), before.get(name), now.get(name), names)


def _different(path: str, before: Any, now: Any, names: Mapping[str, str]) -> Iterator[str]:
    if before == now:
        return
    if _is_part(before) and _is_part(now):
        for line in differences(before, now, names):
            yield f"{path} {line}"
    elif isinstance(before, list) and isinstance(now, list) and len(before) == len(now):
        for number, (one, other) in enumerate(zip(before, now, strict=True), start=1):
            yield from _different(f"{path} {number}", one, other, names)
    else:
        yield f"{path}: {_shown(before, names)} → {_shown(now, names)}"


def _is_part(value: Any) -> bool:
    return isinstance(value, dict) and set(value) != {"value", "unit"}


def _shown(value: Any, names: Mapping[str, str]) -> str:
    if value in (None, "", [], {}):
        return "none"
    if isinstance(value, dict):
        if set(value) == {"value", "unit"}:
            return str(Quantity.model_validate(value))
        return _cut(", ".join(f"{name} {_shown(each, names)}" for name, each in value.items()))
    if isinstance(value, list):
        return _cut(", ".join(_shown(each, names) for each in value))
    return _cut(names.get(str(value), str(value)))


def _cut(text: str) -> str:
    return text if len(text) <= _LONGEST else f"{text[: _LONGEST - 1]}…"


def _replaced(value: Any, ids: Mapping[str, str]) -> Any:
    if isinstance(value, str):
        return ids.get(value, value)
    if isinstance(value, dict):
        return {name: _replaced(each, ids) for name, each in value.items()}
    if isinstance(value, list):
        return [_replaced(each, ids) for each in value]
    return value
