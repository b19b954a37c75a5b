"""Random ids: made by the program, never counted up, never reused."""

from __future__ import annotations

import base64
import secrets

ID_BYTES = 16
"""128 random bits: two ids never meet."""


def new_id() -> str:
    """Return 128 random bits as 26 lowercase base32 characters."""
    return base32_128(secrets.token_bytes(ID_BYTES)).lower()


def base32_128(data: bytes) -> str:
    """Return 16 bytes as 26 uppercase base32 characters (RFC 4648), without padding.

    >>> base32_128(bytes(16))
    'AAAAAAAAAAAAAAAAAAAAAAAAAA'
    """
    if len(data) != ID_BYTES:
        raise ValueError(f"data has {len(data)} bytes, not {ID_BYTES}.")
    return base64.b32encode(data).decode("ascii").rstrip("=")
