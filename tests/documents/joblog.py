"""A small logbook of the sample's job, its facts kept as the deeds would keep them."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from gaugelog.journal.clock import SetClock
from gaugelog.journal.keys import KeyFolder, Signer
from gaugelog.ledger.base import FactBody
from gaugelog.ledger.campaign import CampaignPlanned, CriteriaAgreed, PlanLoaded, PlanReleased
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.ledger.routes import RouteAdopted
from gaugelog.ledger.steps import HoldDecided, StepDone
from gaugelog.ledger.stock import ConsumableReceived, LotReceived
from gaugelog.work import people
from gaugelog.work.logbook import Logbook
from gaugelog.work.people import Newcomer
from gaugelog.work.ports import RecordRequest
from tests.documents import sample
from tests.documents.sample import q
from tests.documents.signers import SUBMITTED

POINT, GRID, CIRCUIT = "point0001", "grid0001", "circuit0001"
PASSPHRASE = "a long phrase of words"


@dataclass(frozen=True)
class Job:
    """The logbook with the signers who work in it."""

    logbook: Logbook
    technician: Signer
    reviewer: Signer

    def request(self) -> RecordRequest:
        """A request for the first record of the point."""
        head = self.logbook.head().printed
        return RecordRequest(POINT, 1, head, self.logbook.clock.now(), "The readings are mine.")

    def keep(self, signer: Signer, *facts: FactBody) -> None:
        """Keep facts in one deed."""
        with self.logbook.deed(signer) as deed:
            for fact in facts:
                deed.keep(fact, [POINT])


def job(folder: Path) -> Job:
    """A released plan with one point, its stock and its people; no step done yet."""
    keys = KeyFolder(folder / "keys", kdf_rounds=1000)
    custodian = Newcomer("c.lund", "Cato Lund", "CL", ("custodian", "planner"))
    logbook = people.start(
        folder / "book",
        keys_of=lambda _: keys,
        name="Footbridge 7",
        custodian=custodian,
        passphrase=PASSPHRASE,
        clock=SetClock(SUBMITTED),
    )
    holder, authority = keys.unlock("c.lund", PASSPHRASE), keys.unlock_authority(PASSPHRASE)
    signers = [
        people.enrol(logbook, holder, authority, keys, newcomer=newcomer, passphrase=PASSPHRASE)
        for newcomer in (
            Newcomer("t.okondo", "Tamsin Okondo-Havlíčková", "TO", ("technician",)),
            Newcomer("w.brandt", "Wiebke Brandt-Ilesanmi", "WB", ("reviewer",)),
        )
    ]
    made = Job(logbook, signers[0], signers[1])
    made.keep(holder, *_stock(), *_plan())
    return made


def work(made: Job) -> None:
    """Every step done; the first insulation failed and was measured again."""
    made.keep(made.technician, _step("receive", GRID, gauge=("l42-a/3", "gauge0003")))
    made.keep(made.technician, _step("received", GRID), *_readings("received"))
    made.keep(made.reviewer, _hold())
    made.keep(made.technician, _step("bond", GRID, adhesive=("ad-19", "cons0001")))
    made.keep(made.technician, *_readings("bonded"), _step("bonded", GRID))
    made.keep(made.technician, _step("wire", CIRCUIT))


def _stock() -> Iterable[FactBody]:
    content = sample.sample()
    assert content.gauge is not None
    gauge = content.gauge.model_dump(mode="json", exclude={"generation", "lot"})
    pieces = [f"gauge{number:04}" for number in range(1, 6)]
    pack = {"id": "pack0001", "label": "L42-A", "pieces": pieces}
    yield LotReceived.model_validate({**gauge, "id": "lot0001", "label": "L42", "packs": [pack]})
    for lot in content.consumables:
        yield ConsumableReceived.model_validate(lot.model_dump(mode="json"))
    cable = {"id": "cons0003", "label": "CB-3", "type": "cable", "name": "Three-wire cable"}
    yield ConsumableReceived.model_validate(
        {**cable, "maker": "Klevby", "received_on": "2026-10-12"}
    )
    for instrument in content.instruments:
        yield InstrumentAdded.model_validate(instrument.model_dump(mode="json"))


def _plan() -> Iterable[FactBody]:
    yield _campaign()
    criteria = sample.sample().criteria.model_dump(mode="json")
    yield CriteriaAgreed.model_validate(
        {**criteria, "id": "crit0001", "campaign": "camp0001", "checks": []}
    )
    yield _route()
    yield _point()
    yield _circuit()
    parts: dict[str, Any] = {"points": [POINT], "circuits": [CIRCUIT], "files": {}}
    yield PlanLoaded.model_validate(
        {"campaign": "camp0001", "revision": 1, "criteria": "crit0001", **parts}
    )
    yield PlanReleased(campaign="camp0001", revision=1, meaning="Released for work.")


def _campaign() -> CampaignPlanned:
    content = sample.sample()
    article = content.article.model_dump(mode="json")
    zone = {"label": article.pop("zone"), "description": article.pop("zone_description")}
    channel = {**sample.circuit()["channel"], "id": "channel0001", "label": "3"}
    module = {"type": channel.pop("module_type"), "serial": channel.pop("module_serial")}
    job_said = content.campaign.model_dump(mode="json", exclude={"plan_revision"})
    return CampaignPlanned.model_validate(
        {
            **job_said,
            "id": "camp0001",
            "articles": [{**article, "id": "article0001", "zones": [zone]}],
            "modules": [{**module, "id": "module0001", "label": "M1", "channels": [channel]}],
        }
    )


def _point() -> PointPlanned:
    content = sample.sample()
    return PointPlanned.model_validate(
        {
            **content.point.model_dump(mode="json"),
            "campaign": "camp0001",
            "article": "article0001",
            "zone": content.article.zone,
            "lot": "lot0001",
            "route": "route0001",
            "grids": [{"id": GRID, "label": "P1-1", "number": 1}],
        }
    )


def _circuit() -> CircuitPlanned:
    resistor = {"kind": "completion", "resistance": q("350", "ohm"), "inside_module": True}
    plan = {**sample.circuit(), "campaign": "camp0001", "channel": "channel0001"}
    plan["arms"] = [[{"kind": "grid", "grid": GRID}], [resistor], [resistor], [resistor]]
    return CircuitPlanned.model_validate({**plan, "grids": [GRID]})


def _route() -> RouteAdopted:
    said = sample.sample().route.model_dump(mode="json")
    caution = "Cyanoacrylate bonds skin at once. Wear eye protection."
    window = {"bound": "within", "duration": q("30", "min"), "after": "layout-hold"}
    steps = [
        {**_card("receive", "grid"), "inputs": [_input("gauge", "gauge", "Gauge")]},
        {**_card("received", "grid"), "stage": "received"},
        {**_card("layout-hold", "place"), "hold": True, "refused_to": "received"},
        {
            **_card("bond", "grid"),
            "inputs": [{**_input("adhesive", "consumable", "Adhesive lot"), "type": "adhesive"}],
            "cautions": [caution],
            "windows": [window],
        },
        {**_card("bonded", "grid"), "stage": "bonded", "cautions": [caution]},
        _card("wire", "circuit"),
    ]
    return RouteAdopted.model_validate({**said, "id": "route0001", "steps": steps})


def _card(step: str, subject: str) -> dict[str, Any]:
    title = step.replace("-", " ").capitalize()
    return {"id": step, "title": title, "subject": subject, "instruction": "Do it."}


def _input(name: str, kind: str, prompt: str) -> dict[str, str]:
    return {"name": name, "kind": kind, "prompt": prompt}


def _step(step: str, subject: str, **inputs: tuple[str, str]) -> StepDone:
    return StepDone.model_validate(
        {
            "point": POINT,
            "subject": subject,
            "step": step,
            "inputs": {
                name: {"typed": typed, "id": known} for name, (typed, known) in inputs.items()
            },
            "observed_at": "2026-12-01T09:24:00Z",
            "done_by": "t.okondo",
        }
    )


def _hold() -> HoldDecided:
    return HoldDecided(
        point=POINT,
        subject=POINT,
        step="layout-hold",
        outcome="released",
        decided_by="w.brandt",
        observed_at="2026-12-01T09:05:00Z",
        meaning="The layout is right.",
    )


def _readings(stage: str) -> Iterable[ReadingTaken]:
    meters = {"OM-1": "instr0001", "IM-2": "instr0002"}
    for reading in sample.readings():
        if reading["stage"] == stage:
            said = {name: each for name, each in reading.items() if not name.startswith("entered")}
            said.pop("latest")
            said |= {"point": POINT, "subject": GRID, "step": stage}
            said["instrument"] = meters[reading["instrument"]]
            if reading["attempt"] > 1:
                said["repeats"] = "r3"
            yield ReadingTaken.model_validate(said)
