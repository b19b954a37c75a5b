"""What stands under each command's help: examples to copy, and the exit codes it may give."""

from __future__ import annotations

import typer

from gaugelog.errors import ExitCode

EXAMPLES: dict[str, tuple[str, ...]] = {
    "start": (
        'gaugelog start bridge --name "Footbridge 12" --custodian p.lind '
        '--custodian-name "P. Lind" --initials PL --role planner',
    ),
    "install": ("gaugelog install", "gaugelog install FB-1"),
    "review": ("gaugelog review", "gaugelog review FB-1"),
    "diagnose": (
        "gaugelog diagnose FB-1",
        'gaugelog diagnose FB-1 "supply+ to signal+ = 264 ohm" --meter RM-2',
    ),
    "submit": ("gaugelog submit FB-1 --as t.okoro",),
    "accept": ("gaugelog accept FB-1 --as q.reyes",),
    "return": ('gaugelog return FB-1 --reason "cable unnamed" --redo-from finish --as q.reyes',),
    "amend": ('gaugelog amend FB-1 --reason "cable renamed" --redo-from finish --as t.okoro',),
    "replace": ('gaugelog replace FB-1 --reason "grid torn" --as t.okoro',),
    "withdraw": ('gaugelog withdraw FB-1 --reason "not wanted" --as p.lind',),
    "record": ("gaugelog record", "gaugelog record FB-1", "gaugelog record FB-1 --draft"),
    "calc": (
        "gaugelog calc",
        "gaugelog calc leads",
        'gaugelog calc leads layout="quarter two-wire" length="50 m" area="28 AWG"',
    ),
    "doctor": ("gaugelog doctor",),
    "demo": ("gaugelog demo", "gaugelog demo another-folder"),
    "backup": ("gaugelog backup ../bridge-2026-12-01.zip",),
    "restore": (
        'gaugelog restore bridge-2026-12-01.zip bridge --reason "laptop lost" '
        "--head 137:ABCDEFGHIJKLMNOPQRSTUVWXYZ --as p.lind",
    ),
    "person enrol": (
        'gaugelog person enrol t.okoro --name "T. Okoro" --initials TO --role technician '
        '--qualification "bonding until 2027-05-01" --as p.lind',
    ),
    "person list": ("gaugelog person list",),
    "person revoke": ('gaugelog person revoke t.okoro --reason "left the firm" --as p.lind',),
    "stock receive": ("gaugelog stock receive lots.csv consumables.csv --as p.lind",),
    "stock certificate": ("gaugelog stock certificate L-3504 L-3504.pdf --as p.lind",),
    "stock list": ("gaugelog stock list", "gaugelog stock list --json"),
    "stock quarantine": ('gaugelog stock quarantine K7-03 --reason "recalled" --as t.okoro',),
    "stock free": ('gaugelog stock free K7-03 --reason "maker\'s letter" --as p.lind',),
    "stock scrap": ('gaugelog stock scrap K7-03/4 --reason "creased" --as t.okoro',),
    "instrument add": ("gaugelog instrument add instruments.toml --as p.lind",),
    "instrument certificate": ("gaugelog instrument certificate RM-2 CAL-26-0719.pdf --as p.lind",),
    "instrument check": (
        'gaugelog instrument check RM-2 reference=RB-1 reads="350.02 ohm" --as t.okoro',
    ),
    "instrument checks": ("gaugelog instrument checks", "gaugelog instrument checks RM-2"),
    "instrument list": ("gaugelog instrument list",),
    "plan load": (
        "gaugelog plan load plan/ --as p.lind",
        'gaugelog plan load plan/ --reason "drawing revision C" --as p.lind',
    ),
    "plan check": ("gaugelog plan check", "gaugelog plan check --json"),
    "plan changes": ("gaugelog plan changes",),
    "plan seen": ('gaugelog plan seen FB-1 --remark "moved before bonding" --as q.reyes',),
    "plan show": ("gaugelog plan show",),
    "plan release": ("gaugelog plan release --as p.lind",),
    "wiring show": ("gaugelog wiring show",),
    "wiring export": ("gaugelog wiring export map.pdf", "gaugelog wiring export map.xlsx"),
    "step walk": ("gaugelog step walk FB-1 --as t.okoro",),
    "step next": ("gaugelog step next", "gaugelog step next FB-1"),
    "step do": (
        'gaugelog step do FB-1 gauge=K7-03/1 meter=RM-2 resistance="350.4 ohm" --as t.okoro',
        'gaugelog step do FB-1 tester=IT-5 insulation=">20 GΩ" unplugged=yes --at 14:30',
        'gaugelog step do FB-1 --refuse "lines 2 mm off" --as q.reyes',
    ),
    "step note": ('gaugelog step note FB-1 "rain stopped the work at 11:20" --as t.okoro',),
    "step redo": ('gaugelog step redo FB-1 clean --reason "rust came up" --as t.okoro',),
    "step skip": ('gaugelog step skip FB-1 --reason "engraved at the works" --as p.lind',),
    "photo add": (
        'gaugelog photo add FB-1 bonded.jpg --step bond --note "under the glass" --as t.okoro',
    ),
    "photo list": ("gaugelog photo list",),
    "photo export": ("gaugelog photo export FB-1 ../photos",),
    "journal check": (
        "gaugelog journal check",
        "gaugelog journal check --head 137:ABCDEFGHIJKLMNOPQRSTUVWXYZ",
    ),
    "journal head": ("gaugelog journal head",),
    "journal show": ("gaugelog journal show FB-1", "gaugelog journal show 17"),
    "journal rebuild": ("gaugelog journal rebuild",),
    "journal export": ("gaugelog journal export ../bridge-entries",),
}
"""Command lines for each command, by its words."""

MEANING: dict[ExitCode, str] = {
    ExitCode.OK: "done",
    ExitCode.TROUBLE: "a check found trouble",
    ExitCode.USAGE: "the command line was not understood",
    ExitCode.FAULTS: "input has faults, nothing was stored",
    ExitCode.REFUSED: "a rule forbids it now",
    ExitCode.KEY: "passphrase, key or certificate",
    ExitCode.STORAGE: "logbook missing, damaged, busy, full or read-only",
    ExitCode.MACHINE: "the machine lacks something",
    ExitCode.UNEXPECTED: "a defect of Gaugelog",
    ExitCode.STOPPED: "stopped with Ctrl-C",
}
"""What each exit code says, in short; the README's table says it in full."""

_TYPED_QUANTITIES = {"step do", "step walk", "instrument check", "diagnose", "calc"}
_UNITS = (
    "Units are typed with the figure: ohm or Ω, kohm, Mohm, Gohm or GΩ, mV/V, um/m, degC, %RH, mm."
)


def add_examples(app: typer.Typer) -> None:
    """Put its examples, units and exit codes under the help of every command of `app`."""
    for command in app.registered_commands:
        command.epilog = epilog_for(command.name or "")
    for group in app.registered_groups:
        for command in group.typer_instance.registered_commands if group.typer_instance else ():
            name = command.name or getattr(command.callback, "__name__", "")
            command.epilog = epilog_for(f"{group.name} {name}")


def epilog_for(words: str) -> str:
    """What stands under the help of the command with these words, as Markdown."""
    lines = [f"- `{line}`" for line in EXAMPLES.get(words, ())]
    examples = ["**Examples**", *lines] if lines else []
    units = [_UNITS] if words in _TYPED_QUANTITIES else []
    codes = "; ".join(f"{int(code)} {meaning}" for code, meaning in MEANING.items())
    return "\n\n".join([*examples, *units, f"**Exit codes**: {codes}."])
