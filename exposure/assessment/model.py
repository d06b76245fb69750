"""The answer: everything an assessment found, complete before anything is drawn.

Field names carry their unit because they are written to ``assessment.json`` as they stand
(docs/result-file.md).  Unknown values are None, with a reason beside them or in ``warnings``.
"""

from dataclasses import dataclass, field
from typing import Literal

Verdict = Literal["within limits", "exceeds limits", "cannot be decided"]
Ring = tuple[tuple[float, float], ...]


@dataclass(frozen=True)
class SiteInfo:
    name: str
    file: str
    sha256: str
    date: str | None = None
    operator: str | None = None
    licence: str | None = None
    place_deg: tuple[float, float] | None = None
    ground: str = ""
    decision: str = "upper_bound"
    margin: float | None = None
    spatial: str = "peak"


@dataclass(frozen=True)
class Software:
    name: str
    version: str


@dataclass(frozen=True)
class LimitInfo:
    id: str
    title: str
    edition: str


@dataclass(frozen=True)
class LevelInfo:
    """One level as used, for the report's table of limits."""

    limits: str
    population: str
    frequency_hz: float
    effect: str
    scope: str
    spatial: str
    electric_v_per_m: float | None
    magnetic_a_per_m: float | None
    power_density_w_per_m2: float | None
    averaging_time_s: float
    clause: str
    verified: bool


@dataclass(frozen=True)
class PowerStep:
    """One line of the way from the transmitter's rating to the averaged power at the antenna."""

    text: str
    factor: float
    power_w: float
    source: str


@dataclass(frozen=True)
class AveragePower:
    averaging_time_s: float
    power_w: float


@dataclass(frozen=True)
class QualityInfo:
    power_balance: float | None
    boundary_residual: float | None
    mesh_change: float | None
    passed: bool
    note: str = ""


@dataclass(frozen=True)
class TransmissionResult:
    limits: str
    population: str
    compliance_distance_m: float | None
    setback_m: float | None
    note: str = ""


@dataclass(frozen=True)
class TransmissionFinding:
    name: str
    antenna: str
    frequency_hz: float
    peak_power_w: float
    line_loss_db: float
    accepted_power_w: float
    average_powers: tuple[AveragePower, ...]
    feed_impedances_ohm: tuple[tuple[float, float], ...]
    unknowns: int
    quality: QualityInfo
    results: tuple[TransmissionResult, ...]
    exclusive: str | None = None
    power_steps: tuple[PowerStep, ...] = ()
    states: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()


@dataclass(frozen=True)
class Governing:
    effect: str
    quantity: str
    transmission: str
    clause: str = ""


@dataclass(frozen=True)
class Share:
    """Part of one transmission in the exposure ratio at the worst point."""

    transmission: str
    exposure_ratio: float


@dataclass(frozen=True)
class AreaResult:
    limits: str
    exposure_ratio: float | None
    body_average_ratio: float | None
    upper_bound_ratio: float | None
    position_m: tuple[float, float, float] | None
    electric_v_per_m: float | None
    magnetic_a_per_m: float | None
    governing: Governing | None
    verdict: Verdict
    reason: str = ""
    shares: tuple[Share, ...] = ()


@dataclass(frozen=True)
class AreaFinding:
    """corners_m is the plan outline that was judged (a path is widened, a point is one corner)."""

    name: str
    population: str
    corners_m: Ring
    bottom_m: float
    top_m: float
    results: tuple[AreaResult, ...]
    informed: str | None = None


@dataclass(frozen=True)
class PropertyFinding:
    corners_m: Ring
    inside: bool | None
    inside_at_all_heights: bool | None
    least_margin_m: float | None
    reason: str = ""


@dataclass(frozen=True)
class Polygon:
    outline: Ring
    holes: tuple[Ring, ...] = ()


@dataclass(frozen=True)
class Boundary:
    """Where the exposure ratio is one, or more, in one plane.

    Horizontal: ``height_m`` is set and coordinates are (east, north).  ``height_m`` None with
    ``section`` None: the union over 0-2 m above ground ("where people stand").
    Vertical: ``section`` is the label of a vertical plane through ``section_origin_m`` (east, north)
    along ``section_bearing_deg``; coordinates are (distance along, up).
    ``level`` is the exposure ratio of the line: 1 for the boundary.
    """

    limits: str
    population: str
    transmission: str
    height_m: float | None
    section: str | None
    polygons: tuple[Polygon, ...]
    level: float = 1.0
    section_origin_m: tuple[float, float] | None = None
    section_bearing_deg: float | None = None


@dataclass(frozen=True)
class Conductor:
    """A conductor as it was solved, for drawings: owner is the antenna's or structure's name."""

    owner: str
    role: Literal["antenna", "structure", "feed line"]
    points_m: tuple[tuple[float, float, float], ...]
    radius_m: float


@dataclass(frozen=True)
class Assessment:
    site: SiteInfo
    software: Software
    limits: tuple[LimitInfo, ...]
    verdict: Verdict
    reasons: tuple[str, ...]
    conditions: tuple[str, ...]
    transmissions: tuple[TransmissionFinding, ...]
    areas: tuple[AreaFinding, ...]
    property: PropertyFinding | None
    boundaries: tuple[Boundary, ...]
    warnings: tuple[str, ...]
    levels: tuple[LevelInfo, ...] = ()
    conductors: tuple[Conductor, ...] = ()
    choices: tuple[str, ...] = ()
    not_assessed: tuple[str, ...] = ()
    left_out: tuple[str, ...] = ()
    site_text: str = ""
    format: str = field(default="exposure-assessment/1")
