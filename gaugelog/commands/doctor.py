"""`gaugelog doctor`: whether this machine, and the logbook here, are fit for work."""

from __future__ import annotations

import ctypes.util
import os
import platform
import sys
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

import typer

from gaugelog import __version__
from gaugelog.commands.session import Json, keys_home, open_logbook
from gaugelog.commands.talk import put_json, put_prose
from gaugelog.errors import ExitCode, GaugelogError


@dataclass(frozen=True)
class Finding:
    """One thing looked at: `ok`, `note` (good to know) or `trouble`."""

    level: str
    subject: str
    what: str
    remedy: str = ""


_SIGNS = {"ok": "✓", "note": "·", "trouble": "✗"}


def doctor(ctx: typer.Context, json: Json = False) -> None:
    """Say what this machine has or lacks, and whether the logbook here is fit for work.

    Exit code 1 when something must be put right.
    """
    findings = [*_machine(), *_keys(), *_logbook(ctx)]
    if json:
        put_json([vars(finding) for finding in findings])
    else:
        for finding in findings:
            put_prose(f"{_SIGNS[finding.level]} {finding.subject}: {finding.what}")
            if finding.remedy:
                put_prose(f"    → {finding.remedy}")
    if any(finding.level == "trouble" for finding in findings):
        raise typer.Exit(int(ExitCode.TROUBLE))


def _machine() -> Iterator[Finding]:
    version = platform.python_version()
    yield Finding("ok", "Gaugelog", f"{__version__} on Python {version}, {platform.system()}")
    yield _library(
        "Pango",
        ("pango-1.0", "pango-1.0-0", "libpango-1.0-0"),
        "trouble",
        "draws the record's pages; without it nothing can be submitted",
        "Debian: apt install libpango-1.0-0 libpangoft2-1.0-0; others: see the README.",
    )
    yield _library(
        "HarfBuzz subset",
        ("harfbuzz-subset", "harfbuzz-subset-0"),
        "note",
        "makes pages faster to draw",
        "Debian: apt install libharfbuzz-subset0",
    )
    encoding = (sys.stdout.encoding or "").lower().replace("-", "")
    if encoding != "utf8":
        yield Finding(
            "note",
            "Terminal",
            f"speaks {encoding or 'no'} encoding; Ω and µ need UTF-8",
            "Set PYTHONUTF8=1 or a UTF-8 locale.",
        )


def _library(
    subject: str, names: tuple[str, ...], missing: str, purpose: str, remedy: str
) -> Finding:
    if any(ctypes.util.find_library(name) for name in names):
        return Finding("ok", subject, f"found; it {purpose}")
    return Finding(missing, subject, f"not found; it {purpose}", remedy)


def _keys() -> Iterator[Finding]:
    home = keys_home()
    if not home.exists():
        yield Finding("note", "Keys", f"none yet; they will be kept in {home}")
        return
    if not os.access(home, os.W_OK):
        yield Finding("trouble", "Keys", f"{home} can't be written", "Mend its permissions.")
        return
    open_files = [file for file in home.rglob("*.p12") if file.stat().st_mode & 0o077]
    if os.name == "posix" and open_files:
        what = f"{open_files[0]} can be read by others"
        yield Finding("trouble", "Keys", what, f"Run: chmod -R go= {home}")
        return
    yield Finding("ok", "Keys", f"kept in {home}")


def _logbook(ctx: typer.Context) -> Iterator[Finding]:
    from gaugelog.work.inspect import inspect

    try:
        folder: Path = ctx.obj.find()
    except GaugelogError as error:
        yield Finding("note", "Logbook", error.message, error.remedy)
        return
    try:
        logbook = open_logbook(ctx)
        yield Finding("ok", "Logbook", f"“{logbook.name}” in {folder}")
        for level, subject, what, remedy in inspect(logbook):
            yield Finding(level, subject, what, remedy)
    except GaugelogError as error:
        yield Finding("trouble", "Logbook", error.message, error.remedy)
