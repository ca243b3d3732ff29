"""Reads ``material``: strengths, toughness, growth law, and the bounding values of both."""

from typing import Any

from assessment.document.case import Bounding, Material, Missing
from assessment.document.crack import TABLE_POINTS
from assessment.document.fields import Fields, as_number
from assessment.document.refusal import CaseRefused
from assessment.document.tensile import read_tensile
from assessment.growth import Forman, FormanMettu, GrowthLaw, Paris, TwoStage, Walker
from assessment.toughness import (
    CORRELATIONS,
    ByTemperature,
    Charpy,
    EnergyRelease,
    Fixed,
    MasterCurve,
    ToughnessModel,
    named,
)

_KEYS = (
    "yield_mpa",
    "ultimate_mpa",
    "elastic_modulus_mpa",
    "poisson",
    "yielding",
    "toughness",
    "growth",
    "bounding",
    "typical",
    "zone",
    "tensile_curve",
)
ZONES = ("weld", "heat-affected", "parent")
_TOUGHNESS_KEYS = {
    "fixed": ("k_mat_mpa_sqrt_m",),
    "by-temperature": ("points",),
    "energy-release": ("g_c_kj_per_m2", "plane"),
    "charpy": ("energy_j", "temperature_c", "correlation"),
    "master-curve": ("t0_c", "probability"),
}
_GROWTH_KEYS = {
    "paris": ("c", "m"),
    "two-stage": ("c1", "m1", "c2", "m2"),
    "walker": ("c", "m", "gamma"),
    "forman": ("c", "m", "k_c_mpa_sqrt_m"),
    "forman-mettu": (
        "c",
        "n",
        "p",
        "q",
        "k_c_mpa_sqrt_m",
        "constraint_factor",
        "peak_over_flow_stress",
    ),
}
# Exponents of metals lie between about 2 and 10; far above, the decimal has slipped. Common
# practice, no source.
LARGEST_EXPONENT = 20.0
# Of a bounding toughness by the Master Curve. Common practice, no source.
LARGEST_PROBABILITY = 0.05
_THRESHOLD = "threshold_mpa_sqrt_m"
_BY_RATIO = "threshold_by_ratio"


def read_material(value: Any, missing: list[Missing]) -> Material:
    """The material section; bounding values that are not there go to ``missing``."""
    material = Fields("material", value, _KEYS)
    strength = material.number("yield_mpa", above=0.0)
    ultimate = material.number("ultimate_mpa", above=0.0)
    if strength > ultimate:
        why = f"yield {strength:g} MPa is above ultimate {ultimate:g} MPa."
        raise material.refuse("yield_mpa", why)
    typical = material.flag("typical", False)
    if typical:
        why = "the values are typical ones from a handbook, which are not for acceptance."
        missing.append(Missing("material.typical", why))
    yielding = None
    if "yielding" in material:
        yielding = material.choice("yielding", ("continuous", "discontinuous"))
    return Material(
        yield_strength=strength,
        ultimate_strength=ultimate,
        elastic_modulus=material.number("elastic_modulus_mpa", above=0.0),
        poisson=material.number("poisson", least=0.0, below=0.5),
        yielding=yielding,
        toughness=read_toughness(material.path("toughness"), material.raw("toughness")),
        growth=read_growth(material.path("growth"), material.raw("growth")),
        bounding=_bounding(material, missing),
        typical=typical,
        tensile=read_tensile(material, strength, ultimate),
        zone=material.choice("zone", ZONES) if "zone" in material else None,
    )


def _bounding(material: Fields, missing: list[Missing]) -> Bounding:
    keys = ("toughness", "growth", "stands_for")
    where = material.path("bounding")
    fields = Fields(where, material.values.get("bounding") or {}, keys)
    if "stands_for" not in fields:
        why = "what the bounding values stand for is missing."
        missing.append(Missing(fields.path("stands_for"), why))
    toughness: ToughnessModel | None = None
    growth: GrowthLaw | None = None
    try:
        toughness = _for_bounding(
            fields.path("toughness"),
            read_toughness(fields.path("toughness"), fields.raw("toughness")),
            missing,
        )
    except CaseRefused as refused:
        _keep(refused, fields, "toughness", missing)
    try:
        growth = read_growth(fields.path("growth"), fields.raw("growth"))
    except CaseRefused as refused:
        _keep(refused, fields, "growth", missing)
    return Bounding(toughness, growth, fields.text_or_none("stands_for"))


def _for_bounding(
    where: str, model: ToughnessModel, missing: list[Missing]
) -> ToughnessModel | None:
    """A model that may stand for the low end; a fit through the middle may not."""
    if isinstance(model, Charpy) and not CORRELATIONS[model.correlation].lower_bound:
        bounds = ", ".join(n for n, one in CORRELATIONS.items() if one.lower_bound)
        why = (
            f"{model.correlation} is a fit through the middle of its data and gives no bounding "
            f"value. Use a lower bound ({bounds}) or a measured value."
        )
        missing.append(Missing(f"{where}.correlation", why))
        return None
    if isinstance(model, MasterCurve) and model.probability > LARGEST_PROBABILITY:
        why = (
            f"a bounding value is one that few pieces fall below: give a probability of "
            f"{LARGEST_PROBABILITY:g} or less (common practice)."
        )
        missing.append(Missing(f"{where}.probability", why))
        return None
    return model


def _keep(refused: CaseRefused, fields: Fields, key: str, missing: list[Missing]) -> None:
    """A bounding value that is missing is a need; a wrong one is refused."""
    if key in fields:
        raise refused
    missing.append(Missing(refused.where, refused.why))


def read_toughness(where: str, value: Any) -> ToughnessModel:
    """A toughness model."""
    name, fields = _model(where, value, "model", _TOUGHNESS_KEYS, ())
    if name == "fixed":
        return Fixed(fields.number("k_mat_mpa_sqrt_m", above=0.0))
    if name == "by-temperature":
        return ByTemperature(_points(fields))
    if name == "energy-release":
        plane = fields.choice("plane", ("stress", "strain"))
        return EnergyRelease(fields.number("g_c_kj_per_m2", above=0.0), plane)
    if name == "master-curve":
        probability = fields.number("probability", above=0.0, below=1.0)
        return MasterCurve(fields.number("t0_c", least=-273.15), probability)
    correlation = named(fields.text("correlation"))
    if correlation is None:
        known = ", ".join(CORRELATIONS)
        raise fields.refuse("correlation", f"no such correlation; known are: {known}.")
    energy = fields.number("energy_j", above=0.0)
    return Charpy(energy, fields.number("temperature_c", least=-273.15), correlation.name)


def read_growth(where: str, value: Any) -> GrowthLaw:
    """A growth law, with one threshold or a table of it by stress ratio."""
    name, fields = _model(where, value, "law", _GROWTH_KEYS, (_THRESHOLD, _BY_RATIO))
    threshold = fields.number_or_none(_THRESHOLD, least=0.0) or 0.0
    by_ratio = _by_ratio(fields)

    def above_nil(key: str) -> float:
        return fields.number(key, above=0.0)

    def exponent(key: str) -> float:
        return fields.number(key, above=0.0, most=LARGEST_EXPONENT)

    if name == "paris":
        return Paris(above_nil("c"), exponent("m"), threshold, by_ratio)
    if name == "two-stage":
        c1, c2 = above_nil("c1"), above_nil("c2")
        m1, m2 = exponent("m1"), exponent("m2")
        if m1 == m2:
            raise fields.refuse("m2", "the two lines are parallel and do not cross.")
        return TwoStage(c1, m1, c2, m2, threshold, by_ratio)
    if name == "walker":
        gamma = fields.number("gamma", least=0.0, most=1.0)
        return Walker(above_nil("c"), exponent("m"), gamma, threshold, by_ratio)
    k_c = fields.number("k_c_mpa_sqrt_m", above=0.0)
    if threshold >= k_c:
        raise fields.refuse(_THRESHOLD, "the threshold is not below k_c_mpa_sqrt_m.")
    if name == "forman":
        return Forman(above_nil("c"), exponent("m"), k_c, threshold, by_ratio)
    if by_ratio is not None:
        raise fields.refuse(_BY_RATIO, "this law takes one threshold, which is part of it.")
    return FormanMettu(
        above_nil("c"),
        exponent("n"),
        fields.number("p", least=0.0, most=LARGEST_EXPONENT),
        fields.number("q", least=0.0, most=LARGEST_EXPONENT),
        k_c,
        fields.number("constraint_factor", least=1.0, most=3.0),
        fields.number("peak_over_flow_stress", least=0.0, most=0.8),
        threshold,
    )


def _by_ratio(fields: Fields) -> tuple[tuple[float, float], ...] | None:
    """[[stress_ratio, threshold_mpa_sqrt_m], …]; in place of the one threshold."""
    if _BY_RATIO not in fields:
        return None
    if _THRESHOLD in fields:
        raise fields.refuse(_BY_RATIO, f"give either this or {_THRESHOLD}, not both.")
    rows: list[tuple[float, float]] = []
    for where, ratio, value in fields.pairs(_BY_RATIO, as_number, TABLE_POINTS):
        if ratio >= 1.0 or (rows and ratio <= rows[-1][0]):
            raise CaseRefused(where, "stress ratios rise from row to row and stay below 1.")
        if value < 0.0:
            raise CaseRefused(where, "a threshold is not below 0.")
        rows.append((ratio, value))
    if not rows:
        raise fields.refuse(_BY_RATIO, "a table needs at least one row.")
    return tuple(rows)


def _model(
    where: str, value: Any, key: str, models: dict[str, tuple[str, ...]], also: tuple[str, ...]
) -> tuple[str, Fields]:
    if not isinstance(value, dict):
        Fields(where, value, (key,))
    name = Fields(where, {key: value.get(key)}, (key,)).choice(key, models)
    return name, Fields(where, value, (key, *models[name], *also))


def _points(fields: Fields) -> tuple[tuple[float, float], ...]:
    points: list[tuple[float, float]] = []
    for where, temperature, toughness in fields.pairs("points", as_number, TABLE_POINTS):
        if toughness <= 0.0:
            raise CaseRefused(where, "a toughness is above 0.")
        if points and temperature <= points[-1][0]:
            raise CaseRefused(where, "temperatures rise from point to point.")
        points.append((temperature, toughness))
    if not points:
        raise fields.refuse("points", "a table needs at least one point.")
    return tuple(points)
