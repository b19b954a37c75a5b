"""Agreement of a measured value with a known one, by what each leaves uncertain."""

from __future__ import annotations

from gaugelog.physics._maths import Number, magnitude
from gaugelog.physics._maths import sqrt as root
from gaugelog.physics.validity import finite, not_negative, positive


def combined(measured: Number, known: Number) -> Number:
    """Expanded uncertainty of the difference of two independent values: √(U² + Uref²).

    Both expanded by the same factor, in one unit. Source: JCGM 100:2008, 5.1.2.

    >>> combined(3.0, 4.0)
    5.0
    """
    lab = not_negative("measured", measured)
    reference = not_negative("known", known)
    return root(lab**2 + reference**2)


def e_number(difference: Number, measured: Number, known: Number) -> Number:
    """How far a value lies off a known one, by what both leave uncertain: |d|/√(U² + Uref²).

    `measured` and `known` are the expanded uncertainties (k = 2) of the two; 1 or less agrees.
    Source: ISO 13528:2015, 9.7, E_n score (from memory).

    >>> round(float(e_number(0.2, 0.3, 0.4)), 3)
    0.4
    """
    off = magnitude(finite("difference", difference))
    return off / combined(positive("measured", measured), known)
