"""Whether this machine can draw pages, and what to install when it can't."""

from __future__ import annotations

from gaugelog.errors import MachineTrouble

REMEDY = (
    "Install Pango. Debian, Ubuntu: apt install libpango-1.0-0 libpangoft2-1.0-0 "
    "libharfbuzz-subset0. Fedora: dnf install pango. macOS: brew install pango. "
    "Windows: pacman -S mingw-w64-x86_64-pango in MSYS2. Everything else works without it."
)


def need_pango() -> None:
    """Raise MachineTrouble when WeasyPrint can't load the libraries that draw text."""
    try:
        import weasyprint  # noqa: F401
    except (ImportError, OSError) as error:
        raise MachineTrouble(
            "Pages can't be drawn on this machine: Pango, or WeasyPrint itself, is missing.",
            REMEDY,
        ) from error
