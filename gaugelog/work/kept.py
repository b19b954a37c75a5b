"""What people typed, made fit to be kept: text in Unicode normal form C, and text only."""

from __future__ import annotations

from urllib.parse import quote

from gaugelog.errors import Fault, Faulty
from gaugelog.journal.canonical import JsonValue, nfc
from gaugelog.visible import visible


def fit_to_keep(value: JsonValue) -> JsonValue:
    """The value with every text in normal form C, as the journal keeps it.

    Some keyboards and file systems write `ü` as two characters, which look the same. Raises
    Faulty for text that holds bytes of another encoding.
    """
    if isinstance(value, str):
        return value if value.isascii() else text_to_keep(value)
    if isinstance(value, dict):
        return {name: fit_to_keep(member) for name, member in value.items()}
    if isinstance(value, list | tuple):
        return [fit_to_keep(member) for member in value]
    return value


def text_to_keep(text: str) -> str:
    """One text in normal form C. Raises Faulty as `fit_to_keep` does."""
    if text.isascii():
        return text
    try:
        text.encode("utf-8")
    except UnicodeEncodeError:
        what = f"“{visible(text)}” holds bytes that are no UTF-8 text."
        remedy = "Type it again, in a terminal that is set to UTF-8."
        raise Faulty([Fault("what was typed", what, remedy)]) from None
    return nfc(text)


def name_to_keep(text: str) -> str:
    """A name that people chose as a name in an entry, which is ASCII: the rest percent-encoded.

    >>> name_to_keep("rüta.toml")
    'r%C3%BCta.toml'
    """
    return text if text.isascii() else quote(text_to_keep(text), safe=" /")


def demand_reason(reason: str, outcome: str = "") -> None:
    """Raise Faulty unless a reason is given; `outcome` says what was not done for want of it."""
    if not reason.strip():
        fault = Fault("reason", "is empty.", "Say why; it is kept in the journal.")
        raise Faulty([fault], outcome) if outcome else Faulty([fault])


def demand_meaning(meaning: str) -> None:
    """Raise Faulty unless a sign-off says what it means (21 CFR 11.50 asks for it)."""
    if not meaning.strip():
        raise Faulty([Fault("meaning", "is empty.", "Say what the signature means.")])
