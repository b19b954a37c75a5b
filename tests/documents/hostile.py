"""References that a hostile text might try, and an ear that hears any file or socket opened."""

from __future__ import annotations

import sys
import threading
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from socketserver import BaseRequestHandler, TCPServer

_heard: list[str] | None = None


def _hear(event: str, arguments: tuple[object, ...]) -> None:
    if _heard is None:
        return
    if event == "open":
        _heard.append(f"open {arguments[0]}")
    elif event in {"socket.connect", "socket.getaddrinfo", "urllib.Request"}:
        _heard.append(f"{event} {arguments}")


sys.addaudithook(_hear)


@contextmanager
def listening() -> Iterator[list[str]]:
    """What was opened or connected to while this lasts."""
    global _heard  # noqa: PLW0603 (an audit hook can't be taken off again)
    heard: list[str] = []
    _heard = heard
    try:
        yield heard
    finally:
        _heard = None


@contextmanager
def server() -> Iterator[tuple[int, list[bytes]]]:
    """A server on this machine: its port, and what it was asked."""
    asked: list[bytes] = []

    class _Ask(BaseRequestHandler):
        def handle(self) -> None:
            asked.append(self.request.recv(200))

    with TCPServer(("127.0.0.1", 0), _Ask) as listener:
        threading.Thread(target=listener.serve_forever, daemon=True).start()
        try:
            yield listener.server_address[1], asked
        finally:
            listener.shutdown()


def references(canary: Path, port: int) -> list[str]:
    """Marks that make a page load something, of every kind that the drawing library knows."""
    addresses = [
        canary.as_uri(),
        f"file://localhost{canary}",
        f"http://127.0.0.1:{port}/x",
        f"ftp://127.0.0.1:{port}/x",
        f"//127.0.0.1:{port}/x",
        str(canary),
        f"gaugelog:../../{canary.name}",
    ]
    return [shape.replace("@", address) for address in addresses for shape in _SHAPES] + _INLINE


_SHAPES = (
    '<img src="@">',
    '<img srcset="@ 2x" src="@">',
    '<object data="@" type="image/png"></object>',
    '<embed src="@">',
    '<link rel="stylesheet" href="@">',
    '<link rel="attachment" href="@">',
    '<a rel="attachment" href="@">x</a>',
    '<style>@import url("@");</style>',
    '<style>@font-face { font-family: X; src: url("@") } b { font-family: X }</style><b>x</b>',
    "<div style=\"background: url('@')\">x</div>",
    "<div style=\"list-style: url('@'); display: list-item\">x</div>",
    "<div style=\"border-image: url('@') 3\">x</div>",
    '<style>p::before { content: url("@") }</style><p>x</p>',
    "<div style=\"mask-image: url('@')\">x</div>",
    '<style>@page { background: url("@") }</style>',
    '<svg><image href="@" width="5" height="5"/></svg>',
    '<svg><use href="@#a"/></svg>',
    '<base href="@"><img src="x.png">',
    '<iframe src="@"></iframe>',
    '<video src="@" poster="@"></video>',
)
_INLINE = [
    "<img src=\"data:image/svg+xml,<svg xmlns='http://www.w3.org/2000/svg'/>\">",
    '<link rel="attachment" href="data:text/plain,x">',
    '<style>@import url("data:text/css,p{color:red}");</style>',
]
