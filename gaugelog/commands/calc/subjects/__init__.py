"""The subjects of `gaugelog calc`, each in its file; every figure comes from `physics/`."""

from __future__ import annotations

from gaugelog.commands.calc.model import Family, Subject
from gaugelog.commands.calc.subjects import (
    bridge,
    conformity,
    leads,
    leakage,
    rosette,
    shunt,
    thermal,
    transverse,
)

SUBJECTS: dict[str, Subject | Family] = {
    subject.name: subject
    for subject in (
        bridge.SUBJECT,
        leads.SUBJECT,
        shunt.SUBJECT,
        leakage.SUBJECT,
        thermal.SUBJECT,
        transverse.SUBJECT,
        rosette.SUBJECT,
        conformity.SUBJECT,
    )
}
"""Every subject by its name, in the order they are listed."""
