"""An entry of the journal: a header, a body apart from it, and at the end of a deed a signature.

The bytes are kept as they were hashed and signed; whatever is read from them is read, never
written again. A body is salted, so that nobody can guess a body that is withheld from its hash.
"""

from __future__ import annotations

import hashlib
import secrets
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cached_property
from typing import Any

from gaugelog.journal.canonical import JsonValue, NotCanonical, canonical, parse
from gaugelog.journal.head import Head, PrintedHead
from gaugelog.journal.header import FORMAT, HEX_256, BadEntry, Header, parse_header

__all__ = [
    "FORMAT",
    "BadEntry",
    "Body",
    "Entry",
    "Fact",
    "Head",
    "Header",
    "PrintedHead",
    "parse_body",
    "parse_header",
    "sha256",
]

_SALT_BYTES = 16


def sha256(data: bytes) -> str:
    """The SHA-256 digest of `data` as 64 hexadecimal digits."""
    return hashlib.sha256(data).hexdigest()


@dataclass(frozen=True, slots=True)
class Fact:
    """What a caller wants kept.

    `kind` and `version` are stable names; `about` are the ids of every subject concerned;
    `evidence` and `sheets` are the SHA-256 digests of the files and of the identity sheets that
    the fact rests on.
    """

    kind: str
    version: int
    about: tuple[str, ...]
    content: Mapping[str, JsonValue]
    evidence: tuple[str, ...] = ()
    sheets: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class Body:
    """An entry's body, read from its bytes. Fields that a newer program wrote are in `unknown`."""

    about: tuple[str, ...]
    evidence: tuple[str, ...]
    fact: Mapping[str, Any]
    salt: str
    sheets: tuple[str, ...] = ()
    unknown: Mapping[str, JsonValue] = field(default_factory=dict)

    @staticmethod
    def of(fact: Fact) -> Body:
        """The body of a new entry, with a fresh random salt."""
        salt = secrets.token_hex(_SALT_BYTES)
        return Body(fact.about, fact.evidence, dict(fact.content), salt, fact.sheets)

    def as_fact(self, kind: str, version: int) -> Fact:
        """What the caller wanted kept, with the kind that the header names."""
        return Fact(kind, version, self.about, self.fact, self.evidence, self.sheets)

    def to_bytes(self) -> bytes:
        """The canonical bytes, which are hashed. Raises NotCanonical when the fact has none."""
        fields: dict[str, JsonValue] = {
            **self.unknown,
            "about": self.about,
            "evidence": self.evidence,
            "fact": self.fact,
            "salt": self.salt,
        }
        if self.sheets:
            fields["sheets"] = self.sheets
        return canonical(fields)


@dataclass(frozen=True)
class Entry:
    """One entry, as the exact bytes that were hashed and signed.

    `body_bytes` is None where the body is withheld, as in a copy for another client;
    `signature` is ECDSA P-256 with SHA-256 over the header bytes (DER), on the last entry of a
    deed only.
    """

    header_bytes: bytes
    body_bytes: bytes | None
    signature: bytes | None = None

    @cached_property
    def header(self) -> Header:
        """The header. Raises BadEntry when its bytes can't be read."""
        return parse_header(self.header_bytes)

    @cached_property
    def body(self) -> Body:
        """The body. Raises BadEntry when it is withheld or its bytes can't be read."""
        if self.body_bytes is None:
            raise BadEntry("Its body is withheld.")
        return parse_body(self.body_bytes)

    @cached_property
    def hash(self) -> bytes:
        """SHA-256 of the header bytes, 32 bytes: the hash of the entry."""
        return hashlib.sha256(self.header_bytes).digest()

    @property
    def head(self) -> Head:
        """Chain, number and hash: the head of the chain while this entry is its last."""
        return Head(self.header.chain, self.header.seq, self.hash)

    @property
    def fact(self) -> Fact:
        """What the caller wanted kept."""
        return self.body.as_fact(self.header.kind, self.header.version)


def parse_body(data: bytes) -> Body:
    """Read a body from its exact bytes. Raises BadEntry saying what is wrong with them."""
    try:
        value = parse(data, strict=True)
    except NotCanonical as error:
        raise BadEntry(f"Its body can't be read. {error.message}") from None
    if not isinstance(value, dict):
        raise BadEntry("Its body is not a JSON object.")
    about = _texts(value, "about")
    evidence = _digests(value, "evidence")
    sheets = _digests(value, "sheets") if "sheets" in value else ()
    fact, salt = value.pop("fact", None), value.pop("salt", None)
    if not isinstance(fact, dict):
        raise BadEntry("Its body holds no fact.")
    if not isinstance(salt, str):
        raise BadEntry("Its body holds no salt.")
    return Body(about, evidence, fact, salt, sheets, value)


def _texts(value: dict[str, Any], name: str) -> tuple[str, ...]:
    items = value.pop(name, None)
    if items == []:
        return ()
    if not isinstance(items, list) or not all(isinstance(item, str) for item in items):
        raise BadEntry(f"Its body gives no list of texts as {name}.")
    return tuple(items)


def _digests(value: dict[str, Any], name: str) -> tuple[str, ...]:
    digests = _texts(value, name)
    if digests and not all(HEX_256.fullmatch(digest) for digest in digests):
        raise BadEntry(f"Its body names {name} by something that is no SHA-256 digest.")
    return digests
