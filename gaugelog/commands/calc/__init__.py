"""`gaugelog calc`: figures at the bench, without a logbook."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.session import Json
from gaugelog.commands.talk import put, put_json, put_table, say
from gaugelog.errors import Fault, Faulty

if TYPE_CHECKING:
    from gaugelog.commands.calc.engine import Subject, Worked


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
    from gaugelog.commands.calc import each as many
    from gaugelog.commands.calc.engine import parse_pairs, work_out
    from gaugelog.commands.calc.subjects import SUBJECTS

    if not subject:
        _list_subjects(SUBJECTS)
        return
    chosen = _chosen(subject, SUBJECTS)
    typed = parse_pairs(pairs or [])
    if each is not None:
        found = many.work_out_each(chosen, each, typed)
        put_json([worked.as_json() for worked in found]) if json else many.write_each(found)
        return
    if not typed:
        _tell_arguments(chosen)
        return
    worked = work_out(chosen, typed)
    put_json(worked.as_json()) if json else _tell(worked)
    if plot is not None:
        _plot(worked, plot)


def _chosen(name: str, subjects: dict[str, Subject]) -> Subject:
    if name not in subjects:
        raise Faulty([Fault(name, "is no subject.", f"Known: {', '.join(subjects)}.")])
    return subjects[name]


def _list_subjects(subjects: dict[str, Subject]) -> None:
    rows = [[item.name, item.title] for item in subjects.values()]
    put_table("gaugelog calc SUBJECT NAME=VALUE…", ["subject", "what"], rows, empty="")


def _tell_arguments(subject: Subject) -> None:
    rows = []
    for item in subject.arguments:
        example = item.dimension.example if item.dimension else ", ".join(item.choices)
        default = "needed" if item.default is None else (item.default or "may be left out")
        rows.append([item.name, item.help, example, default])
    put_table(
        f"{subject.name}: {subject.title}",
        ["argument", "what", "like", "if left out"],
        rows,
        empty="",
    )


def _tell(worked: Worked) -> None:
    from gaugelog.commands.calc.engine import name_of, source_of

    put(f"{worked.subject.title}", "")
    names = [*worked.inputs, *(figure.name for figure in worked.answer.figures)]
    width = max(len(name) for name in names)
    put(*(f"  {name:<{width}}   {shown}" for name, shown in worked.inputs.items()), "")
    put(*(f"  {item.name:<{width}} = {item.shown}" for item in worked.answer.figures), "")
    for formula in worked.answer.formulas:
        put(f"  by {name_of(formula)}: {source_of(formula)}")
    for warning in worked.answer.warnings:
        put(f"  ! {warning}")


def _plot(worked: Worked, file: Path) -> None:
    from gaugelog.commands.calc.mohr import draw

    if worked.subject.name != "rosette":
        raise Faulty([Fault("--plot", "draws only a rosette.", "Leave it out.")])
    file.write_text(draw(worked), encoding="utf-8")
    say(f"Mohr's circle and the directions are drawn in {file}.")
