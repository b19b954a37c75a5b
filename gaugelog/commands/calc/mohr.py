"""Mohr's circle of a rosette, and the grids with the principal directions, as one SVG."""

from __future__ import annotations

from math import cos, degrees, pi, sin

from gaugelog.commands.calc.model import Worked
from gaugelog.commands.calc.subjects.rosettegrids import angles_of, state_of
from gaugelog.documents.sketch import ACCENT, GREY, INK, PAPER, Sketch, Spot
from gaugelog.physics import plane

WIDTH, HEIGHT = 720.0, 372.0
_MIDDLE, _REACH = Spot(196, 200), 104.0
_ROSE, _ARM = Spot(548, 200), 104.0
_RED = "#b3261e"
_PALE = "#d7e6e8"


def draw(worked: Worked) -> str:
    """The drawing of a worked rosette; texts are escaped."""
    state = state_of(worked.values)
    sketch = Sketch(WIDTH, HEIGHT)
    sketch.box(Spot(0.6, 0.6), WIDTH - 1.2, HEIGHT - 1.2, ink=_PALE, fill=PAPER)
    _circle(sketch, state, angles_of(worked.values))
    _directions(sketch, state, angles_of(worked.values))
    return str(sketch.svg()) + "\n"


def _shown(strain: float) -> str:
    return f"{strain * 1e6:.1f}".replace("-", "−")


def _circle(sketch: Sketch, state: plane.PlaneStrain, angles: tuple[float, ...]) -> None:
    """Mohr's circle: strain to the right, half the shear downwards."""
    found = plane.principal_strains(state)
    circle = plane.mohr_circle(state)
    sketch.text(Spot(20, 28), "Mohr's circle of strain", bold=True, size=12)
    sketch.text(Spot(20, 44), "strain in µm/m, half the shear downwards", size=9, ink=GREY)
    _legend(sketch, circle, found)
    if found.angle is None:
        sketch.dot(_MIDDLE, 3.2, fill=_RED, ink=_RED)
        sketch.text(_MIDDLE.moved(8, -7), _shown(circle.centre), ink=_RED, bold=True)
        return
    scale = _REACH / circle.radius
    _axes(sketch, circle.centre * scale)
    sketch.dot(_MIDDLE, _REACH, fill="none", ink=ACCENT)
    for number, angle in enumerate(angles, start=1):
        spot = _on_circle(state, angle, scale)
        sketch.line(_MIDDLE, spot, ink=GREY, weight=0.8, dashes="3 3")
        sketch.dot(spot, 3, fill=PAPER)
        beside = _MIDDLE.towards(spot, 1.13)
        sketch.text(beside.moved(0, 3), str(number), at="middle", bold=True)
    ends = ((found.largest, 1, "start"), (found.smallest, -1, "end"))
    for strain, side, anchor in ends:
        spot = _MIDDLE.moved(side * _REACH)
        sketch.dot(spot, 3.2, fill=_RED, ink=_RED)
        sketch.text(spot.moved(side * 7, -7), _shown(strain), at=anchor, ink=_RED, bold=True)
    sketch.dot(_MIDDLE, 2)


def _axes(sketch: Sketch, middle: float) -> None:
    """The strain axis, and the shear axis where the circle is near enough to no strain."""
    sketch.line(_MIDDLE.moved(-_REACH - 62), _MIDDLE.moved(_REACH + 66), ink=GREY, weight=0.9)
    sketch.text(_MIDDLE.moved(_REACH + 66, 14), "ε", at="end", ink=GREY)
    if abs(middle) < _REACH + 50:
        zero = _MIDDLE.moved(-middle)
        sketch.line(zero.moved(0, -_REACH - 22), zero.moved(0, _REACH + 22), ink=GREY, weight=0.9)
        sketch.text(zero.moved(6, _REACH + 24), "γ/2", ink=GREY)
        sketch.text(zero.moved(-4, 12), "0", at="end", size=8.5, ink=GREY)


def _legend(sketch: Sketch, circle: plane.MohrCircle, found: plane.PrincipalStrains) -> None:
    line = (
        f"centre {_shown(circle.centre)}, radius {_shown(circle.radius)}, "
        f"largest shear {_shown(found.max_shear)}"
    )
    sketch.text(Spot(20, HEIGHT - 18), line, size=9)


def _on_circle(state: plane.PlaneStrain, angle: float, scale: float) -> Spot:
    """The point of a direction: its strain, and half the shear there, downwards."""
    centre = plane.mohr_circle(state).centre
    right = (plane.strain_along(state, angle) - centre) * scale
    return _MIDDLE.moved(right, plane.shear_along(state, angle) / 2 * scale)


def _ray(angle: float, length: float) -> tuple[Spot, Spot]:
    """Both ends of a line through the rose at an angle, counter-clockwise from the right."""
    right, up = cos(angle) * length, sin(angle) * length
    return _ROSE.moved(-right, up), _ROSE.moved(right, -up)


def _directions(sketch: Sketch, state: plane.PlaneStrain, angles: tuple[float, ...]) -> None:
    """The grids as they lie, grid 1 to the right, and the principal directions."""
    sketch.text(Spot(390, 28), "Grids and principal directions", bold=True, size=12)
    sketch.text(Spot(390, 44), "angles counter-clockwise from grid 1", size=9, ink=GREY)
    for angle in angles:
        _grid(sketch, angle)
    sketch.text(Spot(390, HEIGHT - 18), _principal(sketch, state), size=9, ink=_RED)
    for number, angle in enumerate(angles, start=1):
        _label(sketch, angle, f"{number} ({degrees(angle):.4g}°)".replace("-", "−"))


def _principal(sketch: Sketch, state: plane.PlaneStrain) -> str:
    """Draw both principal directions, and tell the first in words."""
    angle = plane.principal_strains(state).angle
    if angle is None:
        return "No direction: alike in every direction."
    for turn, name, dashes in ((0.0, "ε₁", ""), (pi / 2, "ε₂", "6 4")):
        start, end = _ray(angle + turn, _ARM + 20)
        sketch.line(start, end, ink=_RED, weight=1.4, dashes=dashes)
        sketch.text(_ROSE.towards(end, 1.1).moved(0, 3), name, at="middle", ink=_RED, bold=True)
    return f"ε₁ at {degrees(angle):+.1f}° from grid 1".replace("-", "−")


def _grid(sketch: Sketch, angle: float) -> None:
    """A grid as a box along its axis."""
    sketch.line(_ROSE, _ray(angle, 76)[1], ink=GREY, weight=0.8)
    corner = _ray(angle, 52)[1].moved(-24, -7)
    sketch.box(corner, 48, 14, fill=_PALE, ink=INK, turned=-degrees(angle))


def _label(sketch: Sketch, angle: float, words: str) -> None:
    """A grid's number and angle beyond its end, on paper so that a line does not strike it."""
    half = 3.1 * len(words)
    middle = _ray(angle, 86 + half * abs(cos(angle)))[1]
    sketch.box(middle.moved(-half, -7), 2 * half, 14, ink=PAPER, fill=PAPER)
    sketch.text(middle.moved(0, 3.5), words, at="middle", bold=True)
