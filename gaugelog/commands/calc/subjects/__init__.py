"""The subjects of `gaugelog calc`, each in its file; every figure comes from `physics/`."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Subject
from gaugelog.commands.calc.subjects import bridge, conformity, leads, leakage, shunt

SUBJECTS: dict[str, Subject] = {
    subject.name: subject
    for subject in (
        bridge.SUBJECT,
        leads.SUBJECT,
        shunt.SUBJECT,
        leakage.SUBJECT,
        conformity.SUBJECT,
    )
}
"""Every subject by its name, in the order they are listed."""
