"""How an answer is worked out: arguments understood, every slip told at once, then the formulas."""

from __future__ import annotations

import math
import re
import warnings
from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from gaugelog.commands.calc.dimensions import Dimension
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values, Worked
from gaugelog.commands.calc.quantities import NotUnderstood, Understood, understand
from gaugelog.errors import Fault, Faulty, GaugelogError

_NOTHING = "nothing was worked out"
_UNIT_BEHIND = re.compile(r"^[\s\d.eE+−-]*")
_BARE = re.compile(r"\s*[+−-]?[\d.]+(?:[eE][+-]?\d+)?\s*")


def work_out(chosen: Subject | Family, typed: Mapping[str, str], where: str = "") -> Worked:
    """Understand `typed` and compute. Raises Faulty with every fault of the input at once."""
    subject, inputs = _kind(chosen, typed, where)
    own = {name: text for name, text in typed.items() if name not in inputs}
    faults = [*_strangers(subject, own, where)]
    values: dict[str, Any] = dict(inputs)
    for argument in subject.arguments:
        try:
            values[argument.name], shown = _given(argument, own)
        except NotUnderstood as error:
            remedy = "" if own.get(argument.name) else f"It is {argument.help}."
            faults.append(Fault(f"{where}{argument.name}", f"{error}.", remedy))
        else:
            inputs |= {argument.name: shown} if shown else {}
    if faults:
        raise Faulty(faults, _NOTHING)
    return Worked(subject, inputs, values, _computed(subject, values, where))


def _kind(
    chosen: Subject | Family, typed: Mapping[str, str], where: str
) -> tuple[Subject, dict[str, str]]:
    """The subject meant, and for a family the word that chose it."""
    if isinstance(chosen, Subject):
        return chosen, {}
    try:
        word, _ = _given(chosen.chooser, typed)
    except NotUnderstood as error:
        remedy = f"Choose one of {', '.join(chosen.kinds)}."
        raise Faulty([Fault(f"{where}{chosen.by}", f"{error}.", remedy)], _NOTHING) from error
    return chosen.kinds[word], {chosen.by: word}


def _given(argument: Argument, typed: Mapping[str, str]) -> tuple[Any, str]:
    """The value of an argument and how it was understood; None and nothing where left out."""
    text = typed.get(argument.name, "").strip() or argument.default
    if text is None:
        raise NotUnderstood("is missing")
    return understood(argument, text) if text else (None, "")


def _computed(subject: Subject, values: Values, where: str) -> Answer:
    try:
        answer = _without_overflow(subject, values)
    except Faulty as error:
        raise Faulty([_placed(fault, where) for fault in error.faults], _NOTHING) from error
    except GaugelogError as error:
        raise Faulty([_fault_of(error, subject, where)], _NOTHING) from error
    except (ArithmeticError, ValueError, RuntimeWarning) as error:
        raise Faulty([_beyond(subject, where)], _NOTHING) from error
    for figure in answer.figures:
        if isinstance(figure.value, float) and not math.isfinite(figure.value):
            raise Faulty([_beyond(subject, where)], _NOTHING)
    return answer


def _without_overflow(subject: Subject, values: Values) -> Answer:
    """Compute; arrays that overflow raise as plain numbers do, where they would only warn."""
    with warnings.catch_warnings():
        warnings.simplefilter("error", RuntimeWarning)
        return subject.compute(values)


def _placed(fault: Fault, where: str) -> Fault:
    return Fault(f"{where}{fault.where}", fault.what, fault.remedy)


def _fault_of(error: GaugelogError, subject: Subject, where: str) -> Fault:
    """A formula's refusal at the argument it means, by the name that people typed."""
    meant = getattr(error, "argument", "")
    name = subject.renamed.get(meant, meant)
    if name and error.message.startswith(meant):
        what = error.message.removeprefix(meant).strip()
        return Fault(f"{where}{name}", what, error.remedy)
    return Fault(f"{where}{subject.name}", error.message, error.remedy)


def _beyond(subject: Subject, where: str) -> Fault:
    remedy = "Check the size of each value and its unit."
    return Fault(f"{where}{subject.name}", "no figure comes out of values like these.", remedy)


def _strangers(subject: Subject, typed: Mapping[str, str], where: str) -> Iterator[Fault]:
    known = [argument.name for argument in subject.arguments]
    for name, text in typed.items():
        # A column that another kind of row needs stays empty in this one.
        if name not in known and (text.strip() or not where):
            yield Fault(f"{where}{name}", "is no argument here.", f"Known: {', '.join(known)}.")


def understood(argument: Argument, text: str) -> tuple[Any, str]:
    """The value of what was typed for an argument, and how to show it."""
    if argument.read is not None:
        return argument.read(text)
    if argument.dimension is None:
        return _word(argument, text)
    parts = text.split(",") if argument.many else [text]
    found = [_one(part, text, argument.dimension) for part in parts]
    for each in found:
        if argument.bound is not None and not argument.bound.holds(each.value):
            raise NotUnderstood(f"{argument.bound.must}, not {each.shown}")
    shown = ", ".join(each.shown for each in found)
    return (tuple(each.value for each in found) if argument.many else found[0].value), shown


def _one(part: str, text: str, dimension: Dimension) -> Understood:
    # "400, 300, -200 ue": a unit at the end of the list serves every number before it.
    unit = _UNIT_BEHIND.sub("", text.rsplit(",", 1)[-1])
    bare = "," in text and _BARE.fullmatch(part) is not None
    return understand(f"{part.strip()} {unit}" if bare else part, dimension)


def _word(argument: Argument, text: str) -> tuple[str, str]:
    if not argument.choices:
        return text, text
    for choice in argument.choices:
        if choice.casefold() == " ".join(text.split()).casefold():
            return choice, choice
    raise NotUnderstood(f"“{text}” is not one of {', '.join(argument.choices)}")


def parse_pairs(pairs: Sequence[str]) -> dict[str, str]:
    """`name=value` words into a dict. Raises Faulty for each word that is none, or is double."""
    faults, typed = [], {}
    for pair in pairs:
        name, equals, value = pair.partition("=")
        if not equals or not name:
            faults.append(Fault(f"“{pair}”", "is not name=value.", 'Like resistance="350 ohm".'))
        elif name in typed:
            faults.append(Fault(name, "is given twice.", "Give it once."))
        else:
            typed[name] = value
    if faults:
        raise Faulty(faults, _NOTHING)
    return typed
