"""The command palette: besides the keys that work now, every point by its label."""

from __future__ import annotations

from functools import partial
from typing import TYPE_CHECKING, cast

from textual.command import DiscoveryHit, Hit, Hits, Provider

from gaugelog.screens.dialog import Dialog

if TYPE_CHECKING:
    from gaugelog.screens.app import FullScreen

_PLACES = (("step", "the step in hand"), ("review", "the evidence"))


class PointCommands(Provider):
    """Opens a point at its step, or at its evidence."""

    @property
    def full(self) -> FullScreen:
        """The program."""
        return cast("FullScreen", self.app)

    @property
    def _works(self) -> bool:
        return self.full.seated and not isinstance(self.screen, Dialog)

    async def discover(self) -> Hits:
        """Nothing before something is typed but how to find a point."""
        if self._works:
            yield DiscoveryHit("Open a point", self._to_worklist, help="or type its label here")

    async def search(self, query: str) -> Hits:
        """Points whose label or zone is like what is typed."""
        if not self._works:
            return
        from gaugelog.work import looking  # loaded when it is wanted: the sign-on comes first

        matcher = self.matcher(query)
        for point, zone in looking.points_called(self.full.desk.logbook):
            for place, what in _PLACES:
                text = f"{point}: {what}"
                score = matcher.match(text)
                if score > 0:
                    open_it = partial(self.full.go, place, point)
                    yield Hit(score, matcher.highlight(text), open_it, help=f"zone {zone}")

    def _to_worklist(self) -> None:
        self.full.go("worklist")
