"""The shipped fonts: which there are, and which characters they can draw.

Pages are drawn with these fonts only, so they look the same on every machine. A character that
none of them has is shown by its code point, and the page says so; a missing glyph would make the
file invalid as PDF/A.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cache

from gaugelog.documents.shipped import templates
from gaugelog.visible import visible


@dataclass(frozen=True, slots=True)
class Font:
    """A shipped font file and the CSS face it is."""

    file: str
    family: str
    weight: int = 400
    style: str = "normal"

    @property
    def address(self) -> str:
        """The name under which the stylesheet asks for it."""
        return f"gaugelog:fonts/{self.file}"

    def css(self) -> str:
        """The `@font-face` rule."""
        return (
            f'@font-face {{ font-family: "{self.family}"; font-weight: {self.weight}; '
            f'font-style: {self.style}; src: url("{self.address}") format("truetype"); }}'
        )


TEXT, WIDE = "Record Text", "Record Wide"
"""Names of our own, so that a font of the machine with the same name is never taken."""

FONTS = (
    Font("FiraSans-Regular.ttf", TEXT),
    Font("FiraSans-Italic.ttf", TEXT, style="italic"),
    Font("FiraSans-Medium.ttf", TEXT, weight=500),
    Font("FiraSans-SemiBold.ttf", TEXT, weight=600),
    Font("DejaVuSans.ttf", WIDE),
)


def font_faces() -> str:
    """The CSS that makes the shipped fonts known."""
    return "\n".join(font.css() for font in FONTS)


@cache
def drawable() -> frozenset[int]:
    """Code points that a page can draw in every weight and style.

    What a face of the text family lacks is taken from the wide family, which has one face.
    """
    faces = {font: _points(font) for font in FONTS}
    text = [points for font, points in faces.items() if font.family == TEXT]
    wide = [points for font, points in faces.items() if font.family == WIDE]
    return frozenset.intersection(*text).union(*wide)


def _points(font: Font) -> frozenset[int]:
    from fontTools.ttLib import TTFont  # type: ignore[import-untyped]

    with TTFont(templates() / "fonts" / font.file, lazy=True) as face:
        return frozenset(face.getBestCmap())


@dataclass(slots=True)
class Lettering:
    """Turns text into what the fonts can draw, and remembers what they could not."""

    missing: set[str] = field(default_factory=set)

    def __call__(self, text: str) -> str:
        """The text with unseen and undrawable characters shown as `‹U+4E00›`."""
        shown = visible(text, keep_newlines=True)
        if shown.isascii():
            return shown
        return "".join(self._letter(char) for char in shown)

    def _letter(self, char: str) -> str:
        if char == "\n" or ord(char) in drawable():
            return char
        self.missing.add(char)
        return f"‹U+{ord(char):04X}›"
