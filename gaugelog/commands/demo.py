"""`gaugelog demo`."""

from __future__ import annotations


def demo() -> None:
    """Play the demo."""
