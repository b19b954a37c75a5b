"""What the record states in words of its own: its decision rule, and what a signature proves."""

from __future__ import annotations

PROVES = (
    "What the signatures prove: this file is, to the byte, what the holders of these two keys "
    "signed, and nothing was changed between or after. The journal's head printed here fixes "
    "every entry up to it: whoever holds this page can show a later alteration. What they do not "
    "prove: who held a key. Certificates are issued by the logbook's own authority unless an "
    "organisation's is named; compare its fingerprint on paper. Nor that a reading was true, or "
    "that the structure is safe."
)


def decision_rule(coverage: str) -> str:
    """The decision rule of the verdicts, agreed with the criteria (ISO/IEC 17025, 7.8.6)."""
    return (
        f"A reading is held to the strictest of its limits. U is the expanded uncertainty of the "
        f"instrument (GUM, k = {coverage}); the guard band is w = U. In the words of "
        f"ILAC-G8:09/2019: pass, inside the limit by w or more; conditional pass, inside by less; "
        f"conditional fail, outside by w at most; fail, outside by more. Undecided: a bound that "
        f"does not reach the limit, or a reading that lacks information. P is the probability "
        f"that the true value conforms (JCGM 106, flat prior); a bound has none."
    )
