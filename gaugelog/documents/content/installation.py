"""What was installed and where: article, point, gauge, grid and circuit as the record has them."""

from __future__ import annotations

from pydantic import Field

from gaugelog.documents.content.base import Shown
from gaugelog.ledger.base import DateText, Id, Quantity, TimeText
from gaugelog.ledger.campaign import Material, ShuntSpec, SurfaceAllowance
from gaugelog.ledger.circuits import ElementKind
from gaugelog.ledger.points import Place
from gaugelog.ledger.stock import GridData


class ArticleShown(Shown):
    """The test article and the zone of the point."""

    label: str
    description: str
    drawing: str
    drawing_revision: str
    material: Material
    zone: str
    zone_description: str = ""
    surface: SurfaceAllowance
    permits: tuple[str, ...] = ()


class PointShown(Shown):
    """What is measured and why, and the planned place."""

    id: Id
    label: str
    quantity: str
    purpose: str
    load: str
    strain_min: Quantity
    strain_max: Quantity
    temperature_min: Quantity
    temperature_max: Quantity
    duration: Quantity | None = None
    cycles: int | None = None
    permitted_error: Quantity
    place: Place
    pattern: str = "single"
    numbering: str = ""
    """Which way grids follow grid 1; empty where it makes no difference."""
    seen_from: str = ""
    """The side that the numbering is seen from."""
    dummy: bool = False
    """Whether it compensates others and feels no strain itself."""


class GridShown(Shown):
    """A grid of the point and the state it was in, with its own figures once a gauge is taken."""

    id: Id
    label: str
    number: int
    state: str
    circuit: str = ""
    """Label of the circuit it is wired into."""
    serves: tuple[str, ...] = ()
    """Labels of every circuit a dummy compensates."""
    gauge_factor: Quantity | None = None
    gauge_factor_tolerance: Quantity | None = None
    transverse_sensitivity: Quantity | None = None
    angle: Quantity | None = None
    """Built angle from grid 1, counter-clockwise for the viewer of the gauge."""


class CertificateShown(Shown):
    """The file of a certificate, which stays with who keeps the logbook."""

    name: str
    sha256: str
    kept_at: TimeText


class GaugeShown(Shown):
    """The physical gauge, its lot and what the lot's certificate says."""

    id: Id
    label: str
    generation: int
    """1 for the first gauge at the place."""
    lot: str
    maker: str
    type: str
    pattern: str
    nominal_resistance: Quantity
    resistance_tolerance: Quantity
    grid_length: Quantity
    grid_width: Quantity
    grids: tuple[GridData, ...]
    expansion_class: Quantity | None = None
    temperature_min: Quantity | None = None
    temperature_max: Quantity | None = None
    strain_limit: Quantity | None = None
    test_voltage_max: Quantity | None = None
    expires: DateText | None = None
    received_on: DateText
    """The day its pack came."""
    certificate: str = ""
    """SHA-256 of the lot's certificate among the evidence, as an earlier program kept it."""
    certificates: tuple[CertificateShown, ...] = ()
    """The certificates of the lot that are kept."""


class ElementShown(Shown):
    """One element in series in an arm."""

    kind: ElementKind
    label: str
    """The grid's label, or the resistor's value."""
    inside_module: bool


class ChannelShown(Shown):
    """The input the circuit is wired to."""

    label: str
    module_type: str
    module_serial: str
    connector: str = ""
    pins: dict[str, str] = Field(default_factory=dict)
    excitation: Quantity
    excitation_kind: str
    range: Quantity
    shunt: ShuntSpec | None = None


class LeadsShown(Shown):
    """The lead wires and the marks on them."""

    wires: int
    length: Quantity
    resistance_per_length: Quantity
    cable: str = ""
    marks: dict[str, str] = Field(default_factory=dict)


class CircuitShown(Shown):
    """A bridge, arms 1 to 4 numbered round it, with its leads and its channel."""

    id: Id
    label: str
    arrangement: str
    layout: str = ""
    """Where arms and wires run: `half three-wire` …; empty where that is not known."""
    arms: tuple[
        tuple[ElementShown, ...],
        tuple[ElementShown, ...],
        tuple[ElementShown, ...],
        tuple[ElementShown, ...],
    ]
    leads: LeadsShown
    channel: ChannelShown
