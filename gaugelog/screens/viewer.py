"""Opening a file in the viewer of this system: a record, a photo."""

from __future__ import annotations

import atexit
import re
import shutil
import subprocess
import sys
import tempfile
from pathlib import Path

from gaugelog.errors import MachineTrouble

_UNFIT = re.compile(r"[^\w.-]+")


class Viewer:
    """Hands copies to the system's viewer; they are taken away when the program ends."""

    def __init__(self) -> None:
        self._folder: Path | None = None

    def open(self, data: bytes, name: str) -> Path:
        """Open a copy of `data` under a name like `name`; slow, so never on the thread that draws.

        Raises MachineTrouble where this machine has no viewer, or no room for the copy.
        """
        try:
            path = self._place() / (_UNFIT.sub("-", name).lstrip("-.") or "file")
            path.write_bytes(data)
        except OSError as error:
            raise MachineTrouble(
                f"The copy to look at can't be written: {error.strerror}.",
                "Make room in the temporary folder.",
            ) from error
        self.show(path)
        return path

    def show(self, path: Path) -> None:
        """Start the viewer, and do not wait for it. Raises MachineTrouble when there is none."""
        if sys.platform == "win32":
            import os

            os.startfile(path)  # noqa: S606 (the user's own viewer is what is wanted)
            return
        opener = shutil.which("open" if sys.platform == "darwin" else "xdg-open")
        if opener is None:
            raise MachineTrouble(
                f"This machine has no viewer to open {path.suffix} files with.",
                "Hand the record out with: gaugelog record POINT",
            )
        # The terminal is ours: what the viewer says must not be drawn over it.
        subprocess.Popen(
            [opener, str(path)],
            stdin=subprocess.DEVNULL,
            stdout=subprocess.DEVNULL,
            stderr=subprocess.DEVNULL,
            start_new_session=True,
        )

    def _place(self) -> Path:
        if self._folder is None:
            self._folder = Path(tempfile.mkdtemp(prefix="gaugelog-look-"))
            atexit.register(shutil.rmtree, self._folder, ignore_errors=True)
        return self._folder
