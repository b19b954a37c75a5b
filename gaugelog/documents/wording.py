"""How the record words figures, times, people and verdicts; the filters of its templates."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import datetime, timedelta, timezone
from decimal import ROUND_HALF_EVEN, ROUND_UP, Decimal

from gaugelog.documents.content.workdone import InputShown, ReadingShown
from gaugelog.ledger.base import SYMBOLS, Quantity
from gaugelog.ledger.readings import LimitFound, Verdict
from gaugelog.ledger.routes import Window
from gaugelog.rules.digits import probability_text

_MINUS = "−"
_THIN = "\u202f"
_DIGITS = 5
_BRIEF = 3


def number(text: str) -> str:
    """Decimal text with a true minus sign and, from five digits on, groups of three.

    >>> number("-174650")
    '−174\\u202f650'
    """
    if "e" in text.lower():
        text = format(Decimal(text), "f")
    whole, point, fraction = text.lstrip("+-").partition(".")
    if whole.isdigit() and len(whole) > 4:
        whole = f"{int(whole):,}".replace(",", _THIN)
    sign = _MINUS if text.startswith("-") else ""
    return f"{sign}{whole}{point}{fraction}"


def quantity(value: Quantity | None) -> str:
    """A quantity as people write it, `12.5 GΩ`; a dash where there is none."""
    if value is None:
        return "–"
    symbol = SYMBOLS.get(value.unit, value.unit)
    if not symbol:
        return number(value.value)
    space = "" if symbol == "°" else "\u00a0"
    return f"{number(value.value)}{space}{symbol}"


def rounded(text: str, digits: int = 2, *, up: bool = False) -> str:
    """Decimal text rounded to significant digits, an uncertainty upwards; never exponents.

    >>> rounded("0.54849", up=True), rounded("1386", up=True), rounded("0")
    ('0.55', '1400', '0')
    """
    value = Decimal(text)
    if value == 0:
        return "0"
    step = Decimal(1).scaleb(value.adjusted() - digits + 1)
    way = ROUND_UP if up else ROUND_HALF_EVEN
    return format((value / step).quantize(Decimal(1), way) * step, "f")


def tidy(value: Quantity | None) -> Quantity | None:
    """A worked-out quantity with at most five significant digits; typed ones have fewer.

    The attached data keeps every digit that decided.
    """
    if value is None or len(value.value.strip("+-0.").replace(".", "")) <= _DIGITS:
        return value
    return Quantity(value=rounded(value.value, _DIGITS), unit=value.unit)


def brief(value: Quantity) -> str:
    """A worked-out quantity to three significant digits, as a bound is read.

    The attached data keeps every digit that decided.
    """
    if len(value.value.strip("+-0.").replace(".", "")) <= _BRIEF:
        return quantity(value)
    return quantity(Quantity(value=rounded(value.value, _BRIEF), unit=value.unit))


def expanded(reading: ReadingShown) -> str:
    """The expanded uncertainty of what was judged, `± 1.1 GΩ`; empty where there is none."""
    verdict = reading.verdict
    if verdict.standard_uncertainty is None:
        return ""
    spread = Decimal(verdict.standard_uncertainty.value) * Decimal(verdict.coverage)
    unit = verdict.standard_uncertainty.unit
    return f"±\u00a0{quantity(Quantity(value=rounded(format(spread, 'f'), up=True), unit=unit))}"


def judged(reading: ReadingShown) -> str:
    """What was judged: the value with its qualifier, or the result that was worked out of it."""
    if reading.result is not None:
        sign = "" if reading.result.value.startswith("-") else "+"
        return f"{sign}{quantity(tidy(reading.result))}"
    if reading.qualifier == "overload":
        return "overload"
    if reading.value is None:
        return "–"  # a mark, no number: it stands as typed
    sign = "" if reading.qualifier == "=" else f"{reading.qualifier}\u00a0"
    return f"{sign}{quantity(reading.value)}"


def probability(reading: ReadingShown) -> str:
    """The probability of conformance to three decimals; never rounded up to certainty."""
    text = reading.verdict.probability
    return "–" if text is None else probability_text(text).replace(" ", "\u00a0")


def rule(verdict: Verdict) -> str:
    """What judged a reading, for whoever asks years later: the rule by its name and version."""
    name, _, version = verdict.rule.rpartition(" ")
    return f"Judged by this program's rule for {name}, version {version}."


def told_apart(entered: InputShown) -> str:
    """What an answer means beyond what was typed; empty where nothing is left to say.

    A lot typed by its label is not told by its label again.
    """
    typed, means = entered.typed.strip(), entered.means
    if means.startswith(f"{typed}, "):
        return means[len(typed) + 2 :]
    return "" if means == typed else means


def bound(limit: LimitFound) -> str:
    """The limit itself, `≥ 10 GΩ`, `within ±0.3 %` or `348.95 Ω to 351.05 Ω`."""
    low, high = tidy(limit.at_least), tidy(limit.at_most)
    if low is not None and high is not None:
        if low.unit == high.unit and Decimal(low.value) == -Decimal(high.value):
            return f"within ±{quantity(high)}"
        return f"{quantity(low)} to {quantity(high)}"
    if low is not None:
        return f"≥\u00a0{quantity(low)}"
    return f"≤\u00a0{quantity(high)}" if high is not None else "–"


def window(each: Window) -> str:
    """A window as one clause, `not before 60 min after bond`."""
    if each.bound == "within":
        return f"within {quantity(each.duration)} of {each.after}"
    return f"not before {quantity(each.duration)} after {each.after}"


@dataclass(frozen=True, slots=True)
class WallTime:
    """Turns UTC times of the facts into the one local time of the page."""

    offset: str

    @property
    def zone(self) -> timezone:
        """The page's fixed offset from UTC."""
        hours, minutes = int(self.offset[1:3]), int(self.offset[4:6])
        sign = -1 if self.offset.startswith("-") else 1
        return timezone(sign * timedelta(hours=hours, minutes=minutes))

    def when(self, text: str | None) -> str:
        """Date and time to the minute, `2026-12-01 15:42`; a dash where there is none."""
        return "–" if text is None else format(self._local(text), "%Y-%m-%d %H:%M")

    def exactly(self, text: str) -> str:
        """Date, time to the second and offset, `2026-12-01 15:42:10 UTC+01:00`."""
        return f"{self._local(text):%Y-%m-%d %H:%M:%S} UTC{self.offset}"

    def day(self, text: str) -> str:
        """The date."""
        return format(self._local(text), "%Y-%m-%d")

    def hour(self, text: str | None) -> str:
        """The time of day to the minute."""
        return "–" if text is None else format(self._local(text), "%H:%M")

    def _local(self, text: str) -> datetime:
        return datetime.fromisoformat(text).astimezone(self.zone)
