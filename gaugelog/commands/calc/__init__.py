"""`gaugelog calc`: figures at the bench, without a logbook."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.outputs import write_out
from gaugelog.commands.session import Json
from gaugelog.commands.talk import put, put_json, put_table, say
from gaugelog.errors import Fault, Faulty

if TYPE_CHECKING:
    from collections.abc import Mapping

    from gaugelog.commands.calc.model import Argument, Family, Subject, Worked

    Subjects = Mapping[str, Subject | Family]


def calc(
    subject: Annotated[str, typer.Argument(help="What to work out; left out: list them.")] = "",
    pairs: Annotated[
        list[str] | None,
        typer.Argument(metavar="NAME=VALUE…", help='Arguments with units: resistance="350 ohm".'),
    ] = None,
    each: Annotated[
        Path | None, typer.Option(help="CSV with a column an argument: one answer a row.")
    ] = None,
    plot: Annotated[
        Path | None, typer.Option(help="With rosette: draw Mohr's circle as SVG.")
    ] = None,
    json: Json = False,
) -> None:
    """Work out a figure at the bench: inputs as understood, result, formula, source, warnings.

    `gaugelog calc` lists the subjects; `gaugelog calc SUBJECT` its arguments.
    """
    from gaugelog.commands.calc.engine import parse_pairs, work_out
    from gaugelog.commands.calc.subjects import SUBJECTS

    if not subject:
        _list_subjects(SUBJECTS)
        return
    chosen = _chosen(subject, SUBJECTS)
    typed = parse_pairs(pairs or [])
    _check_plot(subject, plot, each)
    if each is not None:
        _tell_each(chosen, each, typed, json)
    elif _asks_only(chosen, typed):
        _tell_arguments(chosen, typed)
    else:
        worked = work_out(chosen, typed)
        put_json(worked.as_json()) if json else _tell(worked)
        if plot is not None:
            _plot(worked, plot)


def _chosen(name: str, subjects: Subjects) -> Subject | Family:
    if name not in subjects:
        raise Faulty(
            [Fault(name, "is no subject.", f"Known: {', '.join(subjects)}.")],
            "nothing was worked out",
        )
    return subjects[name]


def _list_subjects(subjects: Subjects) -> None:
    rows = [[item.name, item.title] for item in subjects.values()]
    put_table("gaugelog calc SUBJECT NAME=VALUE…", ["subject", "what"], rows, empty="")


def _asks_only(chosen: Subject | Family, typed: Mapping[str, str]) -> bool:
    """Whether nothing is given but the kind, so that what can be given is wanted."""
    by = getattr(chosen, "by", None)
    return not typed or (by is not None and set(typed) == {by} and typed[by] in _kinds(chosen))


def _kinds(chosen: Subject | Family) -> Mapping[str, Subject]:
    return getattr(chosen, "kinds", {})


def _tell_arguments(chosen: Subject | Family, typed: Mapping[str, str]) -> None:
    kinds = _kinds(chosen)
    if kinds and not typed:
        _tell_kinds(chosen, kinds)
        return
    word = next(iter(typed.values()), "")
    kind: Subject | Family = kinds[word] if kinds else chosen
    rows = [_row(item) for item in kind.arguments]
    columns = ["argument", "what", "like", "if left out"]
    title = f"{chosen.name} ({word})" if word else chosen.name
    put_table(f"{title}: {kind.title}", columns, rows, empty="")
    note = getattr(kind, "note", "")
    put(*([note] if note else []))


def _tell_kinds(chosen: Subject | Family, kinds: Mapping[str, Subject]) -> None:
    """The kinds of a family, each with the names of its arguments."""
    chooser = chosen.arguments[0]
    rows = [
        [word, kind.title, ", ".join(argument.name for argument in kind.arguments)]
        for word, kind in kinds.items()
    ]
    title = f"{chosen.name}: {chosen.title}"
    put_table(title, [chooser.name, "which is", "arguments"], rows, empty="")
    example = next(word for word in kinds if word != chooser.default)
    put(f'`gaugelog calc {chosen.name} {chooser.name}="{example}"` lists what one kind takes.')
    if chooser.default:
        put(f"Left out, {chooser.name} is “{chooser.default}”.")


def _row(item: Argument) -> list[str]:
    default = "needed" if item.default is None else (item.default or "may be left out")
    return [item.name, item.help, item.like, default]


def _tell_each(chosen: Subject | Family, file: Path, typed: dict[str, str], json: bool) -> None:
    from gaugelog.commands.calc import each

    found = each.work_out_each(chosen, file, typed)
    put_json([worked.as_json() for worked in found]) if json else each.write_each(found)


def _tell(worked: Worked) -> None:
    from gaugelog.commands.calc.sources import name_of, source_of

    put(f"{worked.subject.title}", "")
    names = [*worked.inputs, *(figure.name for figure in worked.answer.figures)]
    width = max(len(name) for name in names)
    put(*(f"  {name:<{width}}   {shown}" for name, shown in worked.inputs.items()), "")
    put(*(f"  {item.name:<{width}} = {item.shown}" for item in worked.answer.figures), "")
    by_source: dict[str, list[str]] = {}
    for formula in worked.answer.formulas:
        by_source.setdefault(source_of(formula), []).append(name_of(formula))
    put(*(f"  by {', '.join(formulas)}: {source}." for source, formulas in by_source.items()))
    for warning in worked.answer.warnings:
        put(f"  ! {warning}")


def _check_plot(subject: str, plot: Path | None, each: Path | None) -> None:
    if plot is not None and (subject != "rosette" or each is not None):
        raise Faulty(
            [Fault("--plot", "draws one rosette.", "Leave it out.")], "nothing was worked out"
        )


def _plot(worked: Worked, file: Path) -> None:
    from gaugelog.commands.calc.mohr import draw

    write_out(file, draw(worked).encode())
    say(f"Mohr's circle and the directions are drawn in {file}.")
