"""The header of an entry: what is hashed, chained and signed.

A header tells who, when and where in the chain, and holds the hash of the body, never the fact
itself. So every header can be shown to anyone without giving anything away.
"""

from __future__ import annotations

import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import datetime
from sys import intern
from typing import Any

from gaugelog.errors import StorageTrouble
from gaugelog.journal.canonical import JsonValue, NotCanonical, canonical, parse
from gaugelog.journal.clock import Moment
from gaugelog.journal.head import Head

FORMAT = "gaugelog-journal 1"
"""Names the form of the bytes, within the bytes that are signed."""

NAME = re.compile(r"[A-Za-z0-9][A-Za-z0-9._-]{0,63}")
"""Ids of chains, deeds, people and runs of a machine."""

HEX_256 = re.compile(r"[0-9a-f]{64}")
"""A SHA-256 digest as text."""

_REMEDY = "Run the check of the journal to see what else is wrong, and restore a backup."


class BadEntry(StorageTrouble):
    """The bytes of an entry are not what this format says."""

    def __init__(self, message: str) -> None:
        super().__init__(message, _REMEDY)


@dataclass(frozen=True, slots=True)
class Header:
    """An entry's header, read from its bytes.

    `heads` are the heads of other chains that its writer knew; `index` runs from 1 to `count`
    within the deed; `time` is `2026-12-01T09:00:00.000000Z`, `offset` `+01:00`; `certificate`,
    `body` and `previous` are SHA-256 digests as 64 hexadecimal digits. Fields that a newer
    program wrote are in `unknown`.
    """

    format: str
    chain: str
    seq: int
    heads: tuple[Head, ...]
    deed: str
    index: int
    count: int
    time: str
    offset: str
    boot: str
    uptime_ms: int
    actor: str
    certificate: str
    kind: str
    version: int
    body: str
    previous: str
    unknown: Mapping[str, JsonValue] = field(default_factory=dict)

    @property
    def moment(self) -> Moment:
        """When the entry was written."""
        hours, minutes = int(self.offset[1:3]), int(self.offset[4:6])
        east = hours * 60 + minutes
        return Moment(
            datetime.fromisoformat(self.time),
            -east if self.offset[0] == "-" else east,
            self.boot,
            self.uptime_ms,
        )

    @property
    def is_last(self) -> bool:
        """Whether it ends its deed, and so carries the signature."""
        return self.index == self.count

    def to_bytes(self) -> bytes:
        """The canonical bytes, which are hashed and signed."""
        fields: dict[str, JsonValue] = dict(self.unknown)
        fields.update((name, getattr(self, name)) for name in _SHAPES)
        fields["heads"] = [
            {"chain": head.chain, "hash": head.hash.hex(), "seq": head.seq} for head in self.heads
        ]
        return canonical(fields)


_SHAPES: dict[str, re.Pattern[str] | int] = {
    "format": re.compile(re.escape(FORMAT)),
    "chain": NAME,
    "seq": 1,
    "deed": NAME,
    "index": 1,
    "count": 1,
    "time": re.compile(r"\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d\.\d{6}Z", re.ASCII),
    "offset": re.compile(r"[+-][01][0-9]:[0-5][0-9]"),
    "boot": NAME,
    "uptime_ms": 0,
    "actor": NAME,
    "certificate": HEX_256,
    "kind": re.compile(r"[a-z][a-z0-9._-]{0,63}"),
    "version": 1,
    "body": HEX_256,
    "previous": HEX_256,
}
"""What each field must look like: text by a pattern, a whole number by its least value."""

_SHARED = ("format", "chain", "boot", "actor", "certificate", "kind", "offset")
"""Text that many entries share is held once: a journal of 100 000 entries has it in memory."""


def parse_header(data: bytes) -> Header:
    """Read a header from its exact bytes. Raises BadEntry saying what is wrong with them."""
    try:
        value = parse(data, strict=True)
    except NotCanonical as error:
        raise BadEntry(f"Its header can't be read. {error.message}") from None
    if not isinstance(value, dict):
        raise BadEntry("Its header is not a JSON object.")
    fields: dict[str, Any] = value
    for name, shape in _SHAPES.items():
        _demand(fields, name, shape)
    _demand_sense(fields)
    heads = tuple(_head(item) for item in _listed(fields, "heads"))
    return _header(fields, heads)


def _header(fields: dict[str, Any], heads: tuple[Head, ...]) -> Header:
    for name in _SHARED:
        fields[name] = intern(fields[name])
    known = {name: fields.pop(name) for name in _SHAPES}
    del fields["heads"]
    return Header(heads=heads, unknown=fields, **known)


def _demand(fields: Mapping[str, Any], name: str, shape: re.Pattern[str] | int) -> None:
    value = fields.get(name)
    if isinstance(shape, int):
        if type(value) is not int or value < shape:
            raise BadEntry(f"Its header gives {value!r} as {name}, not a number from {shape} up.")
    elif not isinstance(value, str) or shape.fullmatch(value) is None:
        raise BadEntry(f"Its header gives {value!r} as {name}, which is not as the format says.")


def _demand_sense(fields: Mapping[str, Any]) -> None:
    if fields["index"] > fields["count"]:
        raise BadEntry(f"Its header counts {fields['index']} of {fields['count']} in its deed.")
    try:
        datetime.fromisoformat(fields["time"])
    except ValueError:
        raise BadEntry(f"Its header gives {fields['time']!r}, which no calendar has.") from None


def _listed(fields: Mapping[str, Any], name: str) -> list[Any]:
    value = fields.get(name)
    if not isinstance(value, list):
        raise BadEntry(f"Its header gives no list of {name}.")
    return value


def _head(item: object) -> Head:
    if not isinstance(item, dict) or set(item) != {"chain", "hash", "seq"}:
        raise BadEntry("Its header gives a head of another chain that can't be read.")
    _demand(item, "chain", NAME)
    _demand(item, "hash", HEX_256)
    _demand(item, "seq", 1)
    return Head(item["chain"], item["seq"], bytes.fromhex(item["hash"]))
