"""What leaves: the signed record and the files that go with it."""

from __future__ import annotations
