"""Keys in one place: the authority, who signs, and the folder of sealed keys."""

from __future__ import annotations

from gaugelog.journal.authority import Authority, check_person_id, new_key
from gaugelog.journal.keyfile import LEAST_PASSPHRASE, check_passphrase
from gaugelog.journal.keyfolder import KeyFolder
from gaugelog.journal.signer import Signer, UnlockedKey, common_name

__all__ = [
    "LEAST_PASSPHRASE",
    "Authority",
    "KeyFolder",
    "Signer",
    "UnlockedKey",
    "check_passphrase",
    "check_person_id",
    "common_name",
    "new_key",
]
