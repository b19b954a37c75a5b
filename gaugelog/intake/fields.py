"""The values of one table or row, taken one by one; every fault is gathered with its place."""

from __future__ import annotations

import re
from collections.abc import Collection, Mapping, Sequence
from datetime import date, datetime
from typing import Any

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.texts import LONGEST, Untidy, listed, tidied
from gaugelog.intake.typed import number_of, parse_quantity, pointed
from gaugelog.ledger.base import Quantity
from gaugelog.visible import visible

_LABEL = re.compile(r"[^\s,;/\"'<>|\\]{1,40}")
LONGEST_LABEL = 40
_WHOLE = re.compile(r"[+-]?\d{1,18}", re.ASCII)
_NO_DAY = "1970-01-01"

Gathered = list[Fault]


class Fields:
    """Values by name at a place. Each taking method gives the value, or a stand-in and a fault.

    Stand-ins only let the reading go on to the next fault: whoever gathered faults raises them
    and builds nothing. A name in `absent` is missing without a fault of its own, because its
    whole column is. `sound` says whether values had no fault, for what compares them.
    """

    def __init__(
        self,
        place: str,
        values: Mapping[str, Any],
        faults: Gathered,
        joint: str = ".",
        absent: Collection[str] = (),
    ) -> None:
        self.place = place
        self._values = values
        self._faults = faults
        self._joint = joint
        self._absent = absent
        self._taken: set[str] = set()
        self._unsound: set[str] = set(absent)

    def following(self, names: Collection[str]) -> Fields:
        """The same values as a row that follows another of its kind: it may leave `names` empty."""
        empty = [name for name in names if not self.has(name)]
        absent = {*self._absent, *empty}
        return Fields(self.place, self._values, self._faults, self._joint, absent)

    def where(self, name: str) -> str:
        """The place of one value, as a fault names it."""
        return f"{self.place}{self._joint}{name}"

    def fault(self, name: str, what: str, remedy: str = "") -> None:
        """Note a fault at one value."""
        self._unsound.add(name)
        self._faults.append(Fault(self.where(name), what, remedy))

    def pass_on(self, name: str, fault: Fault) -> None:
        """Note a fault of something that a value names, which has a place of its own."""
        self._unsound.add(name)
        self._faults.append(fault)

    def sound(self, *names: str) -> bool:
        """Whether none of these values had a fault so far."""
        return self._unsound.isdisjoint(names)

    def has(self, name: str) -> bool:
        """Whether there is a value that is not empty."""
        value = self._values.get(name)
        if isinstance(value, str):
            return value.strip() != ""
        return value is not None and value != []

    def text(self, name: str, *, needed: bool = True, longest: int = LONGEST) -> str:
        """A text, without surrounding space, in Unicode form NFC."""
        value = self._take(name, needed)
        if value is None:
            return ""
        if not isinstance(value, str):
            in_sheet = "; in a spreadsheet format the cell as text"
            more = in_sheet if isinstance(value, date) else ""
            self.fault(name, f"is {_kind(value)}, not text.", f"Put it in quotes{more}.")
            return ""
        return self._tidied(name, value, longest)

    def label(self, name: str, *, needed: bool = True) -> str:
        """A short name without spaces, commas, slashes or quotes, as it stands on tags."""
        text = self.text(name, needed=needed)
        if text and (_LABEL.fullmatch(text) is None or visible(text) != text):
            remedy = "Use up to 40 letters, digits, dots, hyphens; no space, comma, slash, quote."
            self.fault(name, f"“{text[:60]}” can't be a label.", remedy)
        return text[:LONGEST_LABEL]

    def choice(
        self, name: str, options: Sequence[str], default: str | None = None, *, trailing: str = ""
    ) -> str:
        """One of `options`, whatever the letter case; “gage” is read as “gauge”.

        A `trailing` word that people may add is passed over.
        """
        text = self.text(name, needed=default is None)
        if not text:
            return default if default is not None else options[0]
        meant = text.casefold().replace("gage", "gauge").removesuffix(trailing)
        for option in options:
            if option.casefold() == meant:
                return option
        known = ", ".join(option for option in options if option)
        self.fault(name, f"“{text[:60]}” is not one of {known}.")
        return options[0]

    def quantity(self, name: str, units: Sequence[str], *, positive: bool = False) -> Quantity:
        """A quantity typed with its unit, `"206 GPa"`."""
        found = self.maybe_quantity(name, units, positive=positive)
        if found is None and not self.has(name):
            self._missing(name, f"Units: {', '.join(units)}.")
        return found or Quantity(value="1", unit=units[0])

    def maybe_quantity(
        self, name: str, units: Sequence[str], *, positive: bool = False
    ) -> Quantity | None:
        """A quantity that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        if tuple(units) == ("1",):
            return self.maybe_number(name, "1", positive=positive)
        if not isinstance(value, str):
            example = f'"{_short(value)} {units[0]}"'
            self.fault(name, f"is {_kind(value)}, without a unit.", f"Write it as {example}.")
            return None
        try:
            found = parse_quantity(value, units)
        except Faulty as error:
            for fault in error.faults:
                self.fault(name, fault.what, fault.remedy)
            return None
        return self._above_nothing(name, found) if positive else found

    def number(self, name: str, unit: str, *, positive: bool = False) -> Quantity:
        """A plain decimal number in a unit that the column's name says."""
        found = self.maybe_number(name, unit, positive=positive)
        if found is None and not self.has(name):
            self._missing(name)
        return found or Quantity(value="1", unit=unit)

    def maybe_number(self, name: str, unit: str, *, positive: bool = False) -> Quantity | None:
        """A plain decimal number that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        if isinstance(value, bool) or not isinstance(value, (int, float, str)):
            self.fault(name, f"is {_kind(value)}, not a number.")
            return None
        text = _short(value)
        number = number_of(text)
        if number is None:
            self._no_number(name, text)
            return None
        found = Quantity(value=number, unit=unit)
        return self._above_nothing(name, found) if positive else found

    def numbers(self, name: str, unit: str, *, positive: bool = False) -> list[Quantity]:
        """Plain decimal numbers with semicolons between; one at least, a stand-in with a fault."""
        value = self._take(name, True)
        if value is None:
            return [Quantity(value="1", unit=unit)]
        parts = value.split(";") if isinstance(value, str) else [value]
        each = [Fields(self.place, {name: part}, self._faults, self._joint) for part in parts]
        found = [one.number(name, unit, positive=positive) for one in each]
        if not all(one.sound(name) for one in each):
            self._unsound.add(name)
        return found

    def whole(self, name: str, least: int, most: int) -> int:
        """A whole number from `least` to `most`."""
        found = self.maybe_whole(name, least, most)
        if found is None and not self.has(name):
            self._missing(name)
        return least if found is None else found

    def maybe_whole(self, name: str, least: int, most: int) -> int | None:
        """A whole number that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        text = _short(value)
        if isinstance(value, bool) or _WHOLE.fullmatch(text) is None:
            comma = "It has a decimal comma." if pointed(text) else ""
            self.fault(name, f"“{text[:40]}” is no whole number.", comma)
            return None
        if not least <= int(text) <= most:
            self.fault(name, f"“{text}” must be from {least} to {most}.")
            return None
        return int(text)

    def day(self, name: str) -> str:
        """A date, `2026-12-01`."""
        found = self.maybe_day(name)
        if found is None and not self.has(name):
            self._missing(name, "A date like 2026-12-01.")
        return found or _NO_DAY

    def maybe_day(self, name: str) -> str | None:
        """A date that may be left out."""
        value = self._take(name, False)
        if value is None:
            return None
        if isinstance(value, date) and not isinstance(value, datetime):
            return value.isoformat()
        text = _short(value)
        try:
            # Only the form with hyphens: 20261201 and 2026-W49-2 read like slips.
            return datetime.strptime(text, "%Y-%m-%d").date().isoformat()
        except ValueError:
            self.fault(name, f"“{text[:40]}” is no date.", "Write it like 2026-12-01.")
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
        return tuple(text for item in value if (text := self._tidied(name, item, LONGEST)))

    def pairs(self, name: str, known: Sequence[str]) -> dict[str, str]:
        """A table of texts by name, each name one of `known`, or nothing."""
        value = self._take(name, False)
        if value is None:
            return {}
        if not isinstance(value, dict) or not all(isinstance(item, str) for item in value.values()):
            self.fault(name, "is no table of texts.", f'Write it like {name} = {{ a = "1" }}.')
            return {}
        for key in value:
            if key not in known:
                self.fault(name, f"“{key[:40]}” is not one of {', '.join(known)}.")
        return {key: self._tidied(name, item, LONGEST) for key, item in value.items()}

    def table(self, name: str, *, needed: bool = True) -> Fields | None:
        """A table within."""
        value = self._take(name, needed)
        if value is None:
            return None
        if not isinstance(value, dict):
            self.fault(name, "is no table.")
            return None
        return Fields(self.where(name), value, self._faults)

    def tables(self, name: str, *, needed: bool = True) -> list[Fields]:
        """A list of tables within, numbered from 1 in places."""
        value = self._take(name, needed)
        if value is None:
            return []
        if not isinstance(value, list) or not all(isinstance(item, dict) for item in value):
            self.fault(name, "is no list of tables.", f"Begin each with [[{name}]].")
            return []
        return [
            Fields(f"{self.where(name)}[{number}]", item, self._faults)
            for number, item in enumerate(value, start=1)
        ]

    def done(self) -> None:
        """Note a fault for each value that nobody asked for."""
        known = listed(sorted(self._taken), most=30)
        for name in self._values:
            if name not in self._taken:
                self.fault(str(name)[:60], "is not known here.", f"Known: {known}.")

    def _take(self, name: str, needed: bool) -> Any:
        self._taken.add(name)
        if not self.has(name):
            if needed:
                self._missing(name)
            return None
        return self._values[name]

    def _no_number(self, name: str, text: str) -> None:
        point = pointed(text)
        if point is not None:
            self.fault(name, f"“{text[:40]}” has a decimal comma.", f"Write {point[:40]}.")
            return
        what = f"“{text[:40]}” is no number of this trade."
        self.fault(name, what, "Type a number like 12.5, without a unit.")

    def _missing(self, name: str, remedy: str = "") -> None:
        if name not in self._absent:
            self.fault(name, "is missing.", remedy)

    def _tidied(self, name: str, text: str, longest: int) -> str:
        try:
            return tidied(text, longest)
        except Untidy as error:
            self.fault(name, error.what, error.remedy)
            return ""

    def _above_nothing(self, name: str, found: Quantity) -> Quantity:
        if found.si() <= 0:
            self.fault(name, f"“{found}” must be above 0.")
        return found


def nothing_at(place: str) -> Fields:
    """Fields that hold nothing and gather nowhere, where a table is missing and said to be."""
    return Fields(place, {}, [])


def distinct(fields: Sequence[Fields], name: str, labels: Sequence[str]) -> None:
    """Note a fault at each label that stands twice, whatever the case."""
    seen: dict[str, str] = {}
    for each, label in zip(fields, labels, strict=True):
        key = label.casefold()
        if label and key in seen:
            each.fault(name, f"“{label}” stands twice.", f"First at {seen[key]}.")
        seen.setdefault(key, each.place)


def in_order(each: Fields, low: str, high: str, figures: tuple[float, float], what: str) -> None:
    """Note a fault at `high` where both were understood and the second figure is the lower."""
    if each.sound(low, high) and figures[1] < figures[0]:
        each.fault(high, what)


def _short(value: object) -> str:
    """A scalar as text; a whole number too long to print stays too long to be right."""
    if isinstance(value, int) and abs(value) > 10**18:
        return "a number of more than 18 digits"
    return str(value).strip()


def _kind(value: object) -> str:
    names = {
        str: "text",
        bool: "true or false",
        int: "a number",
        float: "a number",
        list: "a list",
        dict: "a table",
    }
    return names.get(type(value), "a date or time")
