"""Where one can go. A screen is loaded when it is first wanted: the sign-on is there at once."""

from __future__ import annotations

from collections.abc import Callable

from gaugelog.screens.room import Room

HOME = "worklist"
"""The screen that the others lie above."""


def made(place: str, point: str = "") -> Room:
    """The screen at a place, about a point (empty: none in particular)."""
    room = _MAKERS[place](point)
    room.place = "" if place == "review" and point else place
    return room


def warm() -> None:
    """Load what the first screens need, before anyone asks for them."""
    for maker in (_worklist, _step):
        maker("")


def _worklist(_point: str) -> Room:
    from gaugelog.screens.worklist import WorklistScreen

    return WorklistScreen()


def _step(point: str) -> Room:
    from gaugelog.screens.step import StepScreen

    return StepScreen(point)


def _review(point: str) -> Room:
    from gaugelog.screens.evidence import EvidenceScreen
    from gaugelog.screens.review import ReviewScreen

    return EvidenceScreen(point) if point else ReviewScreen()


def _wiring(_point: str) -> Room:
    from gaugelog.screens.wiring import WiringScreen

    return WiringScreen()


def _stock(_point: str) -> Room:
    from gaugelog.screens.stock import StockScreen

    return StockScreen()


def _plan(_point: str) -> Room:
    from gaugelog.screens.plan import PlanScreen

    return PlanScreen()


_MAKERS: dict[str, Callable[[str], Room]] = {
    HOME: _worklist,
    "step": _step,
    "review": _review,
    "wiring": _wiring,
    "stock": _stock,
    "plan": _plan,
}
