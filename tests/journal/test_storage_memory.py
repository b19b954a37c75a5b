"""The contract on a storage in memory."""

from __future__ import annotations

import pytest

from gaugelog.journal.storage.memory import MemoryStorage
from tests.journal.storage_contract import StorageContract


class TestMemory(StorageContract):
    """Memory keeps the contract."""

    @pytest.fixture
    def storage(self) -> MemoryStorage:
        return MemoryStorage()
