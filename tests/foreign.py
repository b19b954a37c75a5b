"""Foreign programs that judge our work: skip when missing, fail when CI demands them."""

from __future__ import annotations

import os
import shutil

import pytest


def needs(*programs: str) -> pytest.MarkDecorator:
    """Mark a test that needs foreign `programs` on the PATH.

    Missing programs skip the test with a reason; with GAUGELOG_REQUIRE_FOREIGN set, as CI sets
    it, the test runs all the same and so fails.
    """
    missing = [program for program in programs if shutil.which(program) is None]
    demanded = bool(os.environ.get("GAUGELOG_REQUIRE_FOREIGN"))
    return pytest.mark.skipif(
        bool(missing) and not demanded,
        reason=f"needs {', '.join(missing)}, which is not on this machine",
    )
