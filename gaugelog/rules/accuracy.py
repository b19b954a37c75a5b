"""What an instrument leaves uncertain: the range that took the reading, and its accuracy there."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.checks import CHECKS, SIGNED
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRange
from gaugelog.physics.change import Accuracy


@dataclass(frozen=True, slots=True)
class RangeTaken:
    """The range of an instrument that a reading was taken on, with its accuracy in SI units."""

    instrument: str
    range: InstrumentRange
    certificate: str = ""
    """Number and date of its certificate then: calibrated anew, it errs anew."""

    @property
    def accuracy(self) -> Accuracy:
        """Gain as a ratio; offset and resolution in the SI unit of the quantity."""
        return Accuracy(self.range.gain.si(), self.range.offset.si(), self.range.resolution.si())

    def uncertainty(self, value: float) -> float:
        """Standard uncertainty of a reading of `value`, SI unit."""
        return float(self.accuracy.uncertainty(value))


def taken_on(instrument: InstrumentAdded, span: InstrumentRange) -> RangeTaken:
    """A range of an instrument under the certificate it has."""
    certificate = f"{instrument.certificate_number}, {instrument.calibrated_on}"
    return RangeTaken(instrument.id, span, certificate)


def range_for(
    instrument: InstrumentAdded, check: str, value: Quantity | None, qualifier: str
) -> RangeTaken:
    """The range that a reading of `check` was taken on: the finest that reaches its value.

    An overload is on the range that reaches farthest. Raises Faulty when the instrument does not
    measure that, or no range reaches the value.
    """
    quantity = CHECKS[check].quantity
    reached = None if qualifier == "overload" else value
    return range_of(instrument, quantity, reached, signed=check in SIGNED)


def range_of(
    instrument: InstrumentAdded, quantity: str, value: Quantity | None, *, signed: bool = True
) -> RangeTaken:
    """The range that `quantity` was read on: the finest that reaches `value`, or the farthest.

    Raises Faulty when the instrument does not measure that, or no range reaches the value.
    """
    fitting = [item for item in instrument.ranges if item.quantity == quantity]
    if not fitting:
        raise Faulty(
            [Fault(instrument.label, f"does not measure {quantity}.", "Take a meter that does.")]
        )
    fitting.sort(key=lambda item: item.high.si())
    if value is None:
        return taken_on(instrument, fitting[-1])
    size = abs(value.si()) if signed else value.si()
    for item in fitting:
        if item.low.si() <= size <= item.high.si():
            return taken_on(instrument, item)
    spans = "; ".join(f"{item.low} to {item.high}" for item in fitting)
    raise Faulty(
        [Fault(instrument.label, f"has no range that reaches {value}.", f"Its ranges: {spans}.")]
    )
