"""What a page may load while it is drawn: names served from memory, and nothing else.

A record is drawn from foreign text. Whatever a reference in it says, no file and no socket is
opened: only the names on the allow-list are known, and their bytes are already here.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from weasyprint.urls import URLFetcher, URLFetcherResponse


class ForbiddenReference(ValueError):
    """A page asked for something that is not on the allow-list."""


class MemoryFetcher(URLFetcher):  # type: ignore[misc]
    """Serves the given names from memory and refuses every other address."""

    def __init__(self, served: Mapping[str, tuple[bytes, str]]) -> None:
        super().__init__(allowed_protocols=(), allow_redirects=False)
        self._served = dict(served)
        self.refused: list[str] = []

    def fetch(self, url: str, headers: Any = None) -> URLFetcherResponse:
        """The bytes and media type kept under `url`. Raises ForbiddenReference for any other."""
        if url not in self._served:
            self.refused.append(url)
            raise ForbiddenReference(f"The page may not load {url!r}.")
        data, media_type = self._served[url]
        return URLFetcherResponse(url, data, {"Content-Type": media_type})
