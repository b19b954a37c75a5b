"""The routes that a plan's points name: each read once, kept with its file."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from pathlib import Path

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.fields import Fields
from gaugelog.intake.route import read_route, route_file
from gaugelog.ledger.routes import RouteAdopted


class Routes:
    """Routes by the name that points give them. `taken` are file names no route may have."""

    def __init__(self, folder: Path, new_id: Callable[[], str], taken: Sequence[str]) -> None:
        self.files: dict[str, bytes] = {}
        """Bytes of each route's file by its name."""
        self._folder = folder
        self._new_id = new_id
        self._taken = taken
        self._by_file: dict[str, RouteAdopted] = {}
        self._by_name: dict[str, RouteAdopted | None] = {}

    @property
    def all(self) -> tuple[RouteAdopted, ...]:
        """Every route that was understood."""
        return tuple(self._by_file.values())

    def named(self, row: Fields, name: str) -> RouteAdopted | None:
        """The route that a row names, or None and a fault at the row.

        The faults of a route's file are said once, at the first row that names it.
        """
        if not row.has("route") or not row.sound("route"):
            return None
        if name not in self._by_name:
            self._by_name[name] = self._first(row, name)
        elif self._by_name[name] is None:
            row.fault("route", f"“{name}” can't be used, as said above.")
        return self._by_name[name]

    def _first(self, row: Fields, name: str) -> RouteAdopted | None:
        try:
            file, data = route_file(name, self._folder)
            if file in self._taken:
                raise Faulty([Fault("route", f"“{name}” is no route, but a file of the plan.")])
            if file not in self._by_file:
                self._keep(read_route(file, data, self._new_id), file, data)
            return self._by_file[file]
        except Faulty as error:
            for fault in error.faults:
                if fault.where == "route":
                    row.fault("route", fault.what, fault.remedy)
                else:
                    row.pass_on("route", fault)
            return None

    def _keep(self, route: RouteAdopted, file: str, data: bytes) -> None:
        for other, known in self._by_file.items():
            if known.label.casefold() == route.label.casefold():
                what = f"has the label {route.label}, as {other} has."
                raise Faulty([Fault(file, what, "Give a changed copy a label of its own.")])
        self._by_file[file] = route
        self.files[file] = data
