"""The certificate an instrument had when something was read with it."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.ledger.instruments import CalibrationRow, InstrumentAdded
from gaugelog.ledger.view import View


def certificate_at(view: View, instrument: str, seq: int) -> InstrumentAdded:
    """The instrument under the certificate in force at entry `seq` of the journal.

    A certificate that was entered later says nothing of what was read before. Raises Refused when
    the instrument was not known by then.
    """
    earlier = [row for row in view.all(CalibrationRow, instrument=instrument) if row.seq < seq]
    if not earlier:
        raise Refused("The instrument of an earlier reading is not known.", "Check the journal.")
    return InstrumentAdded.model_validate_json(earlier[-1].data)
