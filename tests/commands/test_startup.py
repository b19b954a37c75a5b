"""`gaugelog --help` stays light: heavy libraries wait until a command needs them."""

from __future__ import annotations

import json
import subprocess
import sys

HEAVY = [
    "sqlmodel",
    "sqlalchemy",
    "textual",
    "weasyprint",
    "pyhanko",
    "numpy",
    "pint",
    "pydantic",
    "cryptography",
    "uncertainties",
]


def test_the_command_tree_loads_no_heavy_library() -> None:
    code = (
        "import json, sys\n"
        "from gaugelog.commands.application import application\n"
        "application()\n"
        f"print(json.dumps([name for name in {HEAVY!r} if name in sys.modules]))\n"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert json.loads(done.stdout) == []
