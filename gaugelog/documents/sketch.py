"""A small pen for line drawings: shapes with escaped text, put out as one SVG."""

from __future__ import annotations

from dataclasses import dataclass, field

from markupsafe import Markup, escape

from gaugelog.documents.fonts import TEXT, WIDE

INK, GREY, ACCENT, PAPER = "#1d2226", "#7b858c", "#0f5563", "#ffffff"


@dataclass(frozen=True, slots=True)
class Spot:
    """A place on the drawing; x to the right, y down, in drawing units (1/96 inch)."""

    x: float
    y: float

    def towards(self, other: Spot, part: float) -> Spot:
        """The spot `part` of the way to `other`, 0 here and 1 there."""
        return Spot(self.x + (other.x - self.x) * part, self.y + (other.y - self.y) * part)

    def moved(self, right: float = 0.0, down: float = 0.0) -> Spot:
        """The spot moved."""
        return Spot(self.x + right, self.y + down)


@dataclass(slots=True)
class Sketch:
    """A drawing in the making; `width` and `height` in drawing units."""

    width: float
    height: float
    _shapes: list[Markup] = field(default_factory=list)

    def line(self, *spots: Spot, ink: str = INK, weight: float = 1.1, dashes: str = "") -> None:
        """A line through the spots."""
        points = " ".join(f"{spot.x:.2f},{spot.y:.2f}" for spot in spots)
        self._shapes.append(
            Markup(
                '<polyline points="{}" fill="none" stroke="{}" stroke-width="{}"'
                ' stroke-dasharray="{}" stroke-linejoin="round" stroke-linecap="round"/>'
            ).format(points, ink, weight, dashes or "none")
        )

    def box(
        self,
        corner: Spot,
        width: float,
        height: float,
        *,
        ink: str = INK,
        fill: str = "none",
        round_by: float = 0.0,
        dashes: str = "",
        turned: float = 0.0,
    ) -> None:
        """A box from its upper left corner, turned clockwise about its middle by degrees."""
        middle = corner.moved(width / 2, height / 2)
        self._shapes.append(
            Markup(
                '<rect x="{:.2f}" y="{:.2f}" width="{:.2f}" height="{:.2f}" rx="{}" fill="{}"'
                ' stroke="{}" stroke-width="1.1" stroke-dasharray="{}"'
                ' transform="rotate({} {:.2f} {:.2f})"/>'
            ).format(
                *(corner.x, corner.y, width, height, round_by, fill, ink),
                *(dashes or "none", turned, middle.x, middle.y),
            )
        )

    def dot(self, spot: Spot, radius: float = 2.2, *, fill: str = INK, ink: str = INK) -> None:
        """A filled circle."""
        self._shapes.append(
            Markup(
                '<circle cx="{:.2f}" cy="{:.2f}" r="{}" fill="{}" stroke="{}" stroke-width="1.1"/>'
            ).format(spot.x, spot.y, radius, fill, ink)
        )

    def text(
        self,
        spot: Spot,
        words: str,
        *,
        at: str = "start",
        size: float = 9.5,
        ink: str = INK,
        bold: bool = False,
    ) -> None:
        """Words with their baseline at the spot, which is their `start`, `middle` or `end`."""
        self._shapes.append(
            Markup(
                '<text x="{:.2f}" y="{:.2f}" text-anchor="{}" font-size="{}" fill="{}"'
                ' font-weight="{}" font-family="{}, {}">{}</text>'
            ).format(spot.x, spot.y, at, size, ink, 600 if bold else 400, TEXT, WIDE, escape(words))
        )

    def svg(self) -> Markup:
        """The finished drawing."""
        opening = Markup(
            '<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 {w} {h}" width="{w}"'
            ' height="{h}">'
        ).format(w=f"{self.width:g}", h=f"{self.height:g}")
        return opening + Markup("").join(self._shapes) + Markup("</svg>")
