"""The subjects of `gaugelog calc`, each in its file; every figure comes from `physics/`."""

from __future__ import annotations

from gaugelog.commands.calc.model import Family, Subject
from gaugelog.commands.calc.subjects import (
    bridge,
    budget,
    conformity,
    cure,
    dewpoint,
    excitation,
    holedrill,
    leads,
    leakage,
    load,
    pins,
    placement,
    rosette,
    shunt,
    thermal,
    transverse,
    wave,
)

SUBJECTS: dict[str, Subject | Family] = {
    each.SUBJECT.name: each.SUBJECT
    for each in (
        bridge,
        leads,
        shunt,
        leakage,
        thermal,
        transverse,
        rosette,
        placement,
        excitation,
        wave,
        load,
        holedrill,
        dewpoint,
        cure,
        budget,
        conformity,
        pins,
    )
}
"""Every subject by its name, in the order they are listed."""
