"""The values of one table or row, taken one by one; every fault is gathered with its place."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Mapping, Sequence
from datetime import date, datetime
from typing import Any

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.typed import parse_quantity
from gaugelog.ledger.base import Quantity

LONGEST = 500
_LABEL = re.compile(r"[^\s,;/\"'<>|\\]{1,40}")
_NUMBER = re.compile(r"[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?")
_NOTHING = Quantity(value="0", unit="1")
_NO_DAY = "1970-01-01"

Gathered = list[Fault]


class Fields:
    """Values by name at a place. Each taking method gives the value, or a stand-in and a fault.

    Stand-ins only let the reading go on to the next fault: whoever gathered faults raises them
    and builds nothing.
    """

    def __init__(
        self, place: str, values: Mapping[str, Any], faults: Gathered, joint: str = "."
    ) -> None:
        self.place = place
        self.faults = faults
        self._values = values
        self._joint = joint
        self._taken: set[str] = set()

    def where(self, name: str) -> str:
        """The place of one value, as a fault names it."""
        return f"{self.place}{self._joint}{name}"

    def fault(self, name: str, what: str, remedy: str = "") -> None:
        """Note a fault at one value."""
        self.faults.append(Fault(self.where(name), what, remedy))

    def has(self, name: str) -> bool:
        """Whether there is a value that is not empty."""
        value = self._values.get(name)
        return value is not None and value != ""

    def text(self, name: str, *, needed: bool = True, longest: int = LONGEST) -> str:
        """A text, without surrounding space, in Unicode form NFC."""
        value = self._take(name, needed)
        if value is None:
            return ""
        if not isinstance(value, str):
            self.fault(name, f"is {_kind(value)}, not text.", "Put it in quotes.")
            return ""
        if len(value) > longest:
            self.fault(name, f"has {len(value)} characters; {longest} are kept at most.")
            return ""
        try:
            value.encode("utf-8")
        except UnicodeEncodeError:
            self.fault(name, "has half of a character pair.", "Type it again.")
            return ""
        return unicodedata.normalize("NFC", value.strip())

    def label(self, name: str, *, needed: bool = True) -> str:
        """A short name without spaces, commas, slashes or quotes, as it stands on tags."""
        text = self.text(name, needed=needed)
        if text and _LABEL.fullmatch(text) is None:
            remedy = "Use up to 40 letters, digits, dots, hyphens; no space, comma, slash, quote."
            self.fault(name, f"“{text[:60]}” can't be a label.", remedy)
        return text

    def choice(self, name: str, options: Sequence[str], default: str | None = None) -> str:
        """One of `options`."""
        text = self.text(name, needed=default is None)
        if not text:
            return default if default is not None else options[0]
        if text not in options:
            self.fault(name, f"“{text[:60]}” is not one of {', '.join(options)}.")
            return options[0]
        return text

    def quantity(self, name: str, units: Sequence[str]) -> Quantity:
        """A quantity typed with its unit, `"206 GPa"`."""
        found = self.maybe_quantity(name, units)
        if found is None and not self.has(name):
            self.fault(name, "is missing.", f"Units: {', '.join(units)}.")
        return found or _NOTHING

    def maybe_quantity(self, name: str, units: Sequence[str]) -> Quantity | None:
        """A quantity that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        if tuple(units) == ("1",) and isinstance(value, (int, float, str)):
            return self.maybe_number(name, "1")
        if not isinstance(value, str):
            example = f'"{value} {units[0]}"'
            self.fault(name, f"is {_kind(value)}, without a unit.", f"Write it as {example}.")
            return None
        try:
            return parse_quantity(value, units)
        except Faulty as error:
            for fault in error.faults:
                self.fault(name, fault.what, fault.remedy)
            return None

    def number(self, name: str, unit: str) -> Quantity:
        """A plain decimal number in a unit that the column's name says."""
        found = self.maybe_number(name, unit)
        if found is None and not self.has(name):
            self.fault(name, "is missing.")
        return found or Quantity(value="0", unit=unit)

    def positive(self, name: str, unit: str) -> Quantity:
        """A plain decimal number above 0."""
        found = self.maybe_number(name, unit)
        if found is not None and float(found.value) <= 0:
            self.fault(name, f"“{found.value}” must be above 0.")
        if found is None and not self.has(name):
            self.fault(name, "is missing.")
        return found or Quantity(value="1", unit=unit)

    def maybe_number(self, name: str, unit: str) -> Quantity | None:
        """A plain decimal number that may be left out."""
        text = str(self._take(name, False) or "").strip().replace("−", "-")
        if not text:
            return None
        if _NUMBER.fullmatch(text) is None:
            remedy = "Use a decimal point." if "," in text else "Type a number without its unit."
            self.fault(name, f"“{text[:40]}” is no number.", remedy)
            return None
        if abs(float(text)) > 1e30:
            self.fault(name, f"“{text[:40]}” is out of all bounds.")
            return None
        return Quantity(value=text.removeprefix("+"), unit=unit)

    def whole(self, name: str, least: int, most: int, default: int | None = None) -> int:
        """A whole number from `least` to `most`."""
        value = self._take(name, default is None)
        if value is None:
            return default if default is not None else least
        try:
            number = int(str(value).strip())
        except ValueError:
            self.fault(name, f"“{str(value)[:40]}” is no whole number.")
            return least
        if isinstance(value, bool) or not least <= number <= most:
            self.fault(name, f"must be from {least} to {most}.")
            return least
        return number

    def day(self, name: str) -> str:
        """A date, `2026-12-01`."""
        found = self.maybe_day(name)
        if found is None and not self.has(name):
            self.fault(name, "is missing.", "A date like 2026-12-01.")
        return found or _NO_DAY

    def maybe_day(self, name: str) -> str | None:
        """A date that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        if isinstance(value, date) and not isinstance(value, datetime):
            return value.isoformat()
        try:
            return date.fromisoformat(str(value).strip()).isoformat()
        except ValueError:
            self.fault(name, f"“{str(value)[:40]}” is no date.", "Write it like 2026-12-01.")
            return None

    def flag(self, name: str, default: bool) -> bool:
        """True or false."""
        value = self._take(name, False)
        if value is None:
            return default
        if not isinstance(value, bool):
            self.fault(name, f"is {_kind(value)}, not true or false.")
            return default
        return value

    def texts(self, name: str) -> tuple[str, ...]:
        """A list of texts, or nothing."""
        value = self._take(name, False)
        if value is None:
            return ()
        if not isinstance(value, list) or not all(isinstance(item, str) for item in value):
            self.fault(name, "is no list of texts.", 'Write it like ["one", "two"].')
            return ()
        for item in value:
            if len(item) > LONGEST:
                self.fault(name, f"holds a text of {len(item)} characters; {LONGEST} at most.")
        return tuple(unicodedata.normalize("NFC", item.strip()) for item in value)

    def pairs(self, name: str) -> dict[str, str]:
        """A table of texts by name, or nothing."""
        value = self._take(name, False)
        if value is None:
            return {}
        if not isinstance(value, dict) or not all(isinstance(item, str) for item in value.values()):
            self.fault(name, "is no table of texts.", f'Write it like {name} = {{ a = "1" }}.')
            return {}
        return {str(key): item for key, item in value.items()}

    def table(self, name: str, *, needed: bool = True) -> Fields | None:
        """A table within."""
        value = self._take(name, needed)
        if value is None:
            return None
        if not isinstance(value, dict):
            self.fault(name, "is no table.")
            return None
        return Fields(self.where(name), value, self.faults, self._joint)

    def tables(self, name: str, *, needed: bool = True) -> list[Fields]:
        """A list of tables within, numbered from 1 in places."""
        value = self._take(name, needed)
        if value is None:
            return []
        if not isinstance(value, list) or not all(isinstance(item, dict) for item in value):
            self.fault(name, "is no list of tables.", f"Begin each with [[{name}]].")
            return []
        return [
            Fields(f"{self.where(name)}[{number}]", item, self.faults, self._joint)
            for number, item in enumerate(value, start=1)
        ]

    def done(self) -> None:
        """Note a fault for each value that nobody asked for."""
        known = ", ".join(sorted(self._taken))
        for name in self._values:
            if name not in self._taken:
                self.fault(str(name)[:60], "is not known here.", f"Known: {known}.")

    def _take(self, name: str, needed: bool) -> Any:
        self._taken.add(name)
        if not self.has(name):
            if needed:
                self.fault(name, "is missing.")
            return None
        return self._values[name]


def distinct(fields: Sequence[Fields], name: str, labels: Sequence[str]) -> None:
    """Note a fault at each label that stands twice, whatever the case."""
    seen: dict[str, str] = {}
    for each, label in zip(fields, labels, strict=True):
        key = label.casefold()
        if label and key in seen:
            each.fault(name, f"“{label}” stands twice.", f"First at {seen[key]}.")
        seen.setdefault(key, each.place)


def _kind(value: object) -> str:
    names = {bool: "true or false", int: "a number", float: "a number", list: "a list"}
    return names.get(type(value), "a table" if isinstance(value, dict) else "a date or time")
