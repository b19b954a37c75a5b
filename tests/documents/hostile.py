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
        canary.as_uri().replace("file:///", "FILE:/"),
        canary.as_uri().replace("file://", "file:\\\\"),
        "jar:" + canary.as_uri() + "!/x",
        f"https://127.0.0.1:{port}/x",
        f"http:127.0.0.1:{port}/x",
        f"gaugelog:%2e%2e/%2e%2e/{canary.name}",
        f"gaugelog:{canary}",
        f"gaugelog://127.0.0.1:{port}/x",
        f"../../../../../../../../{canary}",
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
    '<audio src="@"></audio>',
    '<picture><source srcset="@"><img src="@"></picture>',
    '<input type="image" src="@">',
    '<link rel="icon" href="@">',
    '<link rel="alternate stylesheet" href="@" title="x">',
    '<link rel="preload" as="font" href="@">',
    '<meta http-equiv="refresh" content="0; url=@">',
    '<script src="@"></script>',
    '<frame src="@">',
    '<table background="@"><tr><td background="@">x</td></tr></table>',
    "<style>@import '@' screen;</style>",
    "<style>@media print { @import url(@); }</style>",
    '<style>@color-profile device-cmyk { src: url("@") }</style>',
    '<style>@counter-style x { system: cyclic; symbols: url("@") }</style>',
    "<div style='background-image: url(@)'>x</div>",
    "<div style=\"background: image-set('@' 1x)\">x</div>",
    "<div style=\"cursor: url('@'), auto\">x</div>",
    "<div style=\"filter: url('@#f'); clip-path: url('@#c'); shape-outside: url('@')\">x</div>",
    "<div style=\"content: url('@')\">x</div>",
    '<style>@page { @top-left { content: url("@") } }</style>',
    '<style>@font-face { font-family: Y; src: local("@"), url("@") format("woff2") }'
    "i { font-family: Y }</style><i>x</i>",
    '<svg><image xlink:href="@" width="5" height="5"/></svg>',
    '<svg><use xlink:href="@#a"/></svg>',
    '<svg><style>@import url("@"); rect { fill: url("@#g") }</style>'
    '<rect width="5" height="5"/></svg>',
    '<svg><filter id="f"><feImage href="@"/></filter><rect filter="url(#f)" width="5"/></svg>',
    '<svg><pattern id="p" href="@#q"/><rect fill="url(#p)" width="5" height="5"/></svg>',
    '<svg><text><textPath href="@#t">x</textPath></text></svg>',
    '<svg><foreignObject><img src="@"/></foreignObject></svg>',
    '<?xml-stylesheet href="@"?>',
    '<math><mglyph src="@"/></math>',
)
_INLINE = [
    "<img src=\"data:image/svg+xml,<svg xmlns='http://www.w3.org/2000/svg'/>\">",
    '<link rel="attachment" href="data:text/plain,x">',
    '<style>@import url("data:text/css,p{color:red}");</style>',
    "<img src=\"data:image/svg+xml,<svg xmlns='http://www.w3.org/2000/svg'>"
    "<image href='http://127.0.0.1:9/x'/></svg>\">",
    '<object data="data:text/html,<img src=http://127.0.0.1:9/x>"></object>',
    '<iframe srcdoc="<img src=http://127.0.0.1:9/x>"></iframe>',
]
