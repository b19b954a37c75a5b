"""Drawn and signed samples, each made once for all tests of a run."""

from __future__ import annotations

from functools import cache

from gaugelog.documents.render import Drawing, render_record
from gaugelog.documents.sign import sign_first, sign_second
from tests.documents.sample import sample
from tests.documents.signers import Crew, crew, reviewer_stamp, technician_stamp


@cache
def people() -> Crew:
    """The signers of the samples."""
    return crew()


@cache
def drawing() -> Drawing:
    """The sample record, unsigned."""
    return render_record(sample())


@cache
def draft_drawing() -> Drawing:
    """The sample as a draft."""
    return render_record(sample(state="draft", signing=None))


def draft() -> bytes:
    """The draft's file."""
    return draft_drawing().pdf


@cache
def submitted() -> bytes:
    """The sample with the technician's signature."""
    return sign_first(drawing(), technician_stamp(), people().technician)


@cache
def accepted() -> bytes:
    """The sample with both signatures."""
    return sign_second(submitted(), reviewer_stamp(), people().reviewer)
