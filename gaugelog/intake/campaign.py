"""`campaign.toml`: the client, the articles with their zones, the modules with their channels."""

from __future__ import annotations

from collections.abc import Callable
from typing import Literal, cast, get_args

from gaugelog.intake.fields import Fields, Gathered, distinct, nothing_at
from gaugelog.intake.files import toml_of
from gaugelog.ledger.campaign import (
    Article,
    CampaignPlanned,
    Channel,
    Material,
    Module,
    Paper,
    ShuntSpec,
    SurfaceAllowance,
    Surroundings,
    Zone,
)
from gaugelog.physics.layouts import (
    COMPLETION,
    SENSE_MINUS,
    SENSE_PLUS,
    SIGNAL_MINUS,
    SIGNAL_PLUS,
    SUPPLY_MINUS,
    SUPPLY_PLUS,
)

NewId = Callable[[], str]

PINS = (
    SUPPLY_PLUS,
    SUPPLY_MINUS,
    SIGNAL_PLUS,
    SIGNAL_MINUS,
    SENSE_PLUS,
    SENSE_MINUS,
    COMPLETION,
)
"""The functions a pin of a channel may have."""

WIRES = (*PINS, "shield")
"""The functions a wire of a cable may have."""

_OHMS = ("ohm", "kohm", "Mohm")
_EXCITATION = ("d.c.", "carrier", "pulsed", "constant current")
_SUPPLY = ("common", "switched", "separate")


def read_campaign(name: str, data: bytes, new_id: NewId, faults: Gathered) -> CampaignPlanned:
    """Understand `campaign.toml`; faults are gathered, and then what is given means nothing."""
    top = Fields(name, toml_of(name, data), faults, joint=", ")
    job = top.table("campaign") or nothing_at(name)
    articles = top.tables("article")
    modules = top.tables("module")
    found = CampaignPlanned(
        id=new_id(),
        label=job.label("label"),
        title=job.text("title"),
        client=job.text("client"),
        installer=job.text("installer"),
        contract=job.text("contract", needed=False),
        document=job.text("document", needed=False),
        site=job.text("site", needed=False),
        paper=cast("Paper", job.choice("paper", get_args(Paper), "a4")),
        surroundings=cast("Surroundings", job.choice("surroundings", get_args(Surroundings))),
        articles=tuple(_article(each, new_id) for each in articles),
        modules=tuple(_module(each, new_id) for each in modules),
    )
    distinct(articles, "label", [item.label for item in found.articles])
    distinct(modules, "label", [item.label for item in found.modules])
    job.done()
    top.done()
    return found


def _article(each: Fields, new_id: NewId) -> Article:
    zones = each.tables("zone")
    read = tuple(_zone(zone) for zone in zones)
    distinct(zones, "label", [zone.label for zone in read])
    found = Article(
        id=new_id(),
        label=each.label("label"),
        description=each.text("description"),
        drawing=each.text("drawing"),
        drawing_revision=each.text("drawing_revision"),
        material=_material(each.table("material")),
        zones=read,
        surface=_surface(each.table("surface", needed=False)),
        permits=each.texts("permits"),
    )
    each.done()
    return found


def _zone(each: Fields) -> Zone:
    zone = Zone(label=each.label("label"), description=each.text("description", needed=False))
    each.done()
    return zone


def _material(each: Fields | None) -> Material:
    fields = each or nothing_at("material")
    found = Material(
        name=fields.text("name"),
        modulus=fields.quantity("modulus", ("GPa", "MPa"), positive=True),
        poisson_ratio=fields.quantity("poisson_ratio", ("1",)),
        expansion=fields.quantity("expansion", ("ppm/K",)),
        density=fields.maybe_quantity("density", ("kg/m3",), positive=True),
        heat_sink=fields.text("heat_sink", needed=False),
        heat_sink_limit=fields.maybe_quantity("heat_sink_limit", ("kW/m2", "W/m2"), positive=True),
        conducting=fields.flag("conducting", True),
        source=fields.text("source"),
    )
    if fields.sound("poisson_ratio") and not -1 < found.poisson_ratio.si() <= 0.5:
        fields.fault("poisson_ratio", "lies outside −1 to 0.5, where no solid is.")
    fields.done()
    return found


def _surface(each: Fields | None) -> SurfaceAllowance:
    if each is None:
        return SurfaceAllowance()
    found = SurfaceAllowance(
        largest_process_temperature=each.maybe_quantity("largest_process_temperature", ("degC",)),
        removal_allowed=each.text("removal_allowed", needed=False),
        forbidden_cleaners=each.texts("forbidden_cleaners"),
        agreed_by=each.text("agreed_by", needed=False),
    )
    each.done()
    return found


def _module(each: Fields, new_id: NewId) -> Module:
    channels = each.tables("channel")
    read = tuple(_channel(channel, new_id) for channel in channels)
    distinct(channels, "label", [channel.label for channel in read])
    found = Module(
        id=new_id(),
        label=each.label("label"),
        type=each.text("type"),
        serial=each.text("serial"),
        channels=read,
    )
    each.done()
    return found


def _channel(each: Fields, new_id: NewId) -> Channel:
    found = Channel(
        id=new_id(),
        label=each.label("label"),
        connector=each.text("connector", needed=False),
        pins=each.pairs("pins", WIRES),
        excitation=each.quantity("excitation", ("V", "mA"), positive=True),
        excitation_kind=cast(
            "Literal['d.c.', 'carrier', 'pulsed', 'constant current']",
            each.choice("excitation_kind", _EXCITATION, "d.c."),
        ),
        range=each.quantity("range", ("mV/V",), positive=True),
        balance_range=each.maybe_quantity("balance_range", ("mV/V",), positive=True),
        completion=each.maybe_quantity("completion", _OHMS, positive=True),
        supply=cast(
            "Literal['common', 'switched', 'separate']", each.choice("supply", _SUPPLY, "separate")
        ),
        shunt=_shunt(each.table("shunt", needed=False)),
    )
    _supply_fits(each, found)
    each.done()
    return found


def _supply_fits(each: Fields, found: Channel) -> None:
    by_current = found.excitation_kind == "constant current"
    if each.sound("excitation", "excitation_kind") and by_current != (
        found.excitation.unit == "mA"
    ):
        unit = "mA" if by_current else "V"
        each.fault("excitation", f"of the kind {found.excitation_kind} is given in {unit}.")


def _shunt(each: Fields | None) -> ShuntSpec | None:
    if each is None:
        return None
    between = each.texts("between")
    if len(between) != 2 or len(set(between)) != 2 or not set(between) <= set(PINS):
        each.fault("between", "must name two pins.", f"Two of {', '.join(PINS)}.")
        between = ("", "")
    found = ShuntSpec(
        value=each.quantity("value", _OHMS, positive=True),
        arm=each.whole("arm", 1, 4),
        between=(between[0], between[1]),
    )
    each.done()
    return found
