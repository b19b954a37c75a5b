"""Verifying signatures; run as a program, it does so for a process that has many of them.

`python -m gaugelog.journal.verifying` reads batches from its input and answers each with one byte
a signature: 1 for one that does not fit. It imports little, so that it starts in no time.
"""

from __future__ import annotations

import struct
import sys
from collections.abc import Iterator, Sequence
from functools import lru_cache
from typing import BinaryIO, NamedTuple

from cryptography.exceptions import InvalidSignature
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.serialization import load_der_public_key

_ECDSA = ec.ECDSA(SHA256())
_LENGTH = struct.Struct(">I")
_LENGTHS = struct.Struct(">III")


class Signature(NamedTuple):
    """A signature (ECDSA with SHA-256, DER) over `data`, by a public key (DER)."""

    key: bytes
    signature: bytes
    data: bytes


def verdicts(batch: Sequence[Signature]) -> bytes:
    """One byte for each signature: 0 if it fits, 1 if not."""
    return bytes(0 if fits(signature) else 1 for signature in batch)


def fits(signature: Signature) -> bool:
    """Whether a signature was made over these very bytes by the holder of the key."""
    try:
        _loaded(signature.key).verify(signature.signature, signature.data, _ECDSA)
    except (InvalidSignature, ValueError):
        return False
    return True


def packed(batch: Sequence[Signature]) -> bytes:
    """A batch as bytes: its length, then for each signature three lengths and three parts."""
    parts: list[bytes] = []
    for key, signature, data in batch:
        parts += (_LENGTHS.pack(len(key), len(signature), len(data)), key, signature, data)
    whole = b"".join(parts)
    return _LENGTH.pack(len(whole)) + whole


def unpacked(whole: bytes) -> Iterator[Signature]:
    """The signatures of a batch, its length left out."""
    place = 0
    while place < len(whole):
        ends = []
        start = end = place + _LENGTHS.size
        for length in _LENGTHS.unpack_from(whole, place):
            end += length
            ends.append(end)
        first, second, place = ends
        yield Signature(whole[start:first], whole[first:second], whole[second:place])


def serve(incoming: BinaryIO, outgoing: BinaryIO) -> None:
    """Answer batches until there are no more."""
    while len(head := incoming.read(_LENGTH.size)) == _LENGTH.size:
        whole = incoming.read(_LENGTH.unpack(head)[0])
        outgoing.write(verdicts(list(unpacked(whole))))
        outgoing.flush()


@lru_cache(maxsize=256)
def _loaded(key: bytes) -> ec.EllipticCurvePublicKey:
    loaded = load_der_public_key(key)
    if not isinstance(loaded, ec.EllipticCurvePublicKey):
        raise TypeError("key is not on an elliptic curve.")
    return loaded


if __name__ == "__main__":
    serve(sys.stdin.buffer, sys.stdout.buffer)
