"""The header of an entry: what is hashed, chained and signed.

A header tells who, when and where in the chain, and holds the hash of the body, never the fact
itself. So every header can be shown to anyone without giving anything away.
"""

from __future__ import annotations

import json
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

_NAME = "[A-Za-z0-9][A-Za-z0-9._-]{0,63}"
NAME = re.compile(_NAME)
"""Ids of chains, deeds, people and runs of a machine."""

_HEX = "[0-9a-f]{64}"
HEX_256 = re.compile(_HEX)
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


_TIME = r"[0-9]{4}-[0-9]{2}-[0-9]{2}T[0-9]{2}:[0-9]{2}:[0-9]{2}\.[0-9]{6}Z"

# Fifteen digits are well within what JSON keeps exactly; longer numbers are read slowly.
_COUNT = "[1-9][0-9]{0,14}"

_SHAPES: dict[str, str | int] = {
    "actor": _NAME,
    "body": _HEX,
    "boot": _NAME,
    "certificate": _HEX,
    "chain": _NAME,
    "count": 1,
    "deed": _NAME,
    "format": re.escape(FORMAT),
    "index": 1,
    "kind": "[a-z][a-z0-9._-]{0,63}",
    "offset": "[+-][01][0-9]:[0-5][0-9]",
    "previous": _HEX,
    "seq": 1,
    "time": _TIME,
    "uptime_ms": 0,
    "version": 1,
}
"""What each field must look like: text by a pattern, a whole number by its least value."""


def parse_header(data: bytes) -> Header:
    """Read a header from its exact bytes. Raises BadEntry saying what is wrong with them.

    Canonical bytes with just the fields of this format are a regular language, read by one
    pattern at a quarter of the cost; the rest, good or bad, is read field by field.
    """
    match = _WHOLE.fullmatch(data.decode("ascii")) if data.isascii() else None
    header = Header(**_read_slowly(data)) if match is None else _read_whole(match)
    _demand_sense(header)
    return header


def _read_whole(match: re.Match[str]) -> Header:
    # The groups come in the order of the names, as they stand in the bytes.
    (
        actor, body, boot, certificate, chain, count, deed, heads, index, kind, offset, previous,
        seq, time, uptime_ms, version,
    ) = match.groups()  # fmt: skip
    return Header(
        format=FORMAT,
        chain=intern(chain),
        seq=int(seq),
        heads=() if heads == "[]" else tuple(_head(item) for item in json.loads(heads)),
        deed=deed,
        index=int(index),
        count=int(count),
        time=time,
        offset=intern(offset),
        boot=intern(boot),
        uptime_ms=int(uptime_ms),
        actor=intern(actor),
        certificate=intern(certificate),
        kind=intern(kind),
        version=int(version),
        body=body,
        previous=previous,
    )


def _read_slowly(data: bytes) -> dict[str, Any]:
    try:
        value = parse(data, strict=True)
    except NotCanonical as error:
        raise BadEntry(f"Its header can't be read. {error.message}") from None
    if not isinstance(value, dict):
        raise BadEntry("Its header is not a JSON object.")
    for name, shape in _SHAPES.items():
        _demand(value, name, shape)
    fields: dict[str, Any] = {name: value.pop(name) for name in _SHAPES}
    fields["heads"] = tuple(_head(item) for item in _listed(value, "heads"))
    del value["heads"]
    fields["unknown"] = value
    return fields


def _whole_pattern() -> re.Pattern[str]:
    parts = {name: f'"{name}":{_group(shape)}' for name, shape in _SHAPES.items()}
    head = f'\\{{"chain":"{_NAME}","hash":"{_HEX}","seq":{_COUNT}\\}}'
    parts["heads"] = f'"heads":(\\[(?:{head}(?:,{head})*)?\\])'
    parts["format"] = f'"format":"{_SHAPES["format"]}"'
    inside = ",".join(parts[name] for name in sorted(parts))
    return re.compile(f"\\{{{inside}\\}}")


def _group(shape: str | int) -> str:
    if isinstance(shape, str):
        return f'"({shape})"'
    return f"({_COUNT})" if shape else f"(0|{_COUNT})"


_WHOLE = _whole_pattern()


def _demand(fields: Mapping[str, Any], name: str, shape: str | int) -> None:
    value = fields.get(name)
    if isinstance(shape, int):
        if type(value) is not int or value < shape:
            raise BadEntry(f"Its header gives {value!r} as {name}, not a number from {shape} up.")
    elif not isinstance(value, str) or re.fullmatch(shape, value) is None:
        raise BadEntry(f"Its header gives {value!r} as {name}, which is not as the format says.")


def _demand_sense(header: Header) -> None:
    if header.index > header.count:
        raise BadEntry(f"Its header counts {header.index} of {header.count} in its deed.")
    try:
        datetime.fromisoformat(header.time)
    except ValueError:
        raise BadEntry(f"Its header gives {header.time!r}, which no calendar has.") from None


def _listed(fields: Mapping[str, Any], name: str) -> list[Any]:
    value = fields.get(name)
    if not isinstance(value, list):
        raise BadEntry(f"Its header gives no list of {name}.")
    return value


def _head(item: object) -> Head:
    if not isinstance(item, dict) or set(item) != {"chain", "hash", "seq"}:
        raise BadEntry("Its header gives a head of another chain that can't be read.")
    _demand(item, "chain", _NAME)
    _demand(item, "hash", _HEX)
    _demand(item, "seq", 1)
    return Head(item["chain"], item["seq"], bytes.fromhex(item["hash"]))
