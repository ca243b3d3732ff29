"""The case as frozen dataclasses: what the rest of the computation reads.

Units inside: m, MPa, MPa√m, m/cycle, °C, days. Text of the document is read in ``sections``.
"""

import datetime
from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Any

from assessment.failure.tensile import TensileCurve
from assessment.growth import CycleBlock, GrowthLaw
from assessment.interaction import Combined
from assessment.kinds.base import Kind
from assessment.toughness import ToughnessModel


@dataclass(frozen=True)
class Missing:
    """Something the decision needs and the document lacks: its key, and a sentence."""

    key: str
    why: str

    def sentence(self) -> str:
        """Key and reason in one sentence."""
        return f"{self.key}: {self.why}"


@dataclass(frozen=True)
class Sizing:
    """Sizing error of the method, in m. Bias is how much too large the method reads on average."""

    depth_sd: float
    length_sd: float
    depth_bias: float
    length_bias: float
    said: str


@dataclass(frozen=True)
class Crack:
    """One crack, or the crack that a look could have missed (``found`` False). Sizes in m.

    combined : how its neighbours count; depth and length are then those of the whole
    """

    kind: Kind
    found: bool
    depth: float | None
    length: float | None
    depth_basis: str = "measured"
    depth_source: str | None = None
    sizing: Sizing | None = None
    why_smaller: str | None = None
    on_record: bool = False
    source: str | None = None
    combined: Combined | None = None


@dataclass(frozen=True)
class Bounding:
    """The characteristic values of the basis; None where missing or not computed yet."""

    toughness: ToughnessModel | None
    growth: GrowthLaw | None
    stands_for: str | None


@dataclass(frozen=True)
class Material:
    """Strengths and modulus in MPa; best-estimate toughness and mean growth law.

    zone : "weld", "heat-affected" or "parent", where the toughness was taken; None: not said
    tensile : the stress-strain curve, where one is given
    drawn_from : the same where the diagram is to be drawn from it (Option 2)
    """

    yield_strength: float
    ultimate_strength: float
    elastic_modulus: float
    poisson: float
    yielding: str | None
    toughness: ToughnessModel
    growth: GrowthLaw
    bounding: Bounding
    typical: bool
    zone: str | None = None
    tensile: TensileCurve | None = None
    drawn_from: TensileCurve | None = None


@dataclass(frozen=True)
class Loading:
    """Peak load by load name in MPa (kN for forces), cycle blocks, and residual stress.

    ``residual`` is by load name in MPa, empty where there is none or none is known;
    ``residual_said`` is why there is none, or where the given one comes from.

    ``rate`` is how fast the peak comes: "static", "intermediate" (within about a second) or
    "impact"; None where nothing is said.

    ``reducible`` is the part of each peak load (0 to 1) that a limiter can take away, and
    ``cycles_fall`` says whether the cycles fall in the same proportion.
    """

    peak: Mapping[str, float]
    cycles: tuple[CycleBlock, ...]
    cycles_said: str | None
    residual_said: str | None
    residual: Mapping[str, float]
    temperature: float | None
    reducible: float | None
    cycles_fall: bool
    rate: str | None = None


@dataclass(frozen=True)
class Usage:
    """The counter: its unit, least rate per day, reading and date of the last look, readings."""

    unit: str | None
    per_day: float | None
    at: float | None
    on: datetime.date | None
    readings: tuple[tuple[datetime.date, float], ...]


@dataclass(frozen=True)
class Criteria:
    """What the owner demands; None where the document does not say."""

    fracture: str | None
    load_reserve: float | None
    life_factor: float | None
    size_confidence_sd: float | None
    longest_interval_days: float | None
    shortest_interval_days: float | None
    failure_probability: float | None
    surprise: float | None
    diagram: str | None = None


@dataclass(frozen=True)
class FixedDate:
    """A date set by an owner or a code."""

    on: datetime.date
    source: str


@dataclass(frozen=True)
class Owner:
    """What the owner allows."""

    allows_restriction: bool = False
    leak_tolerated: bool = False
    fixed_date: FixedDate | None = None


@dataclass(frozen=True)
class Detection:
    """What the method finds: the size found with 90 % probability at 95 % confidence, in m."""

    method: str
    dimension: str
    a90_95: float


@dataclass(frozen=True)
class Uncertainty:
    """For the forecast: sd of log10 C and of m, their correlation, scatter of toughness and stress
    as sd over mean; None where the document does not say."""

    log10_c_sd: float | None
    m_sd: float | None
    c_m_correlation: float | None
    toughness_cov: float | None
    stress_cov: float | None


@dataclass(frozen=True)
class Look:
    """One earlier look. Sizes in m, None where not measured."""

    on: datetime.date
    at: float | None
    depth: float | None
    length: float | None
    sizing: Sizing | None


@dataclass(frozen=True)
class Previous:
    """What is in force."""

    verdict: str | None
    until_on: datetime.date | None
    until_at: float | None
    grew_faster: bool


@dataclass(frozen=True)
class Case:
    """Everything known about one crack or one place, checked. ``missing`` leads to refer."""

    as_of_on: datetime.date | None
    as_of_at: float | None
    crack: Crack
    body: Mapping[str, Any]
    material: Material
    loading: Loading
    usage: Usage
    criteria: Criteria
    owner: Owner
    detection: Detection | None
    history: tuple[Look, ...]
    previous: Previous | None
    shortfalls: tuple[str, ...]
    missing: tuple[Missing, ...] = field(default=())
    uncertainty: Uncertainty | None = None
    seed: int = 0
