"""Reads ``criteria``, ``owner``, ``uncertainty``, ``detection`` and ``look``."""

from typing import Any

from assessment.document.case import (
    Criteria,
    Detection,
    FixedDate,
    Missing,
    Owner,
    Uncertainty,
)
from assessment.document.crack import MM
from assessment.document.fields import Fields, named
from assessment.document.refusal import CaseRefused

_NEEDED = {
    "fracture": "the fracture criterion is missing; the diagram is used where it can be.",
    "load_reserve": "the reserve on load that is demanded is missing.",
    "life_factor": "the factor on life is missing.",
    "size_confidence_sd": "how many standard deviations of sizing error to allow for is missing.",
    "longest_interval_days": "the longest interval is missing.",
    "shortest_interval_days": "the shortest interval that is still practical is missing.",
}
_OPTIONAL = ("failure_probability", "surprise", "diagram")
DIAGRAMS = ("option 1", "option 2")


def read_criteria(value: Any, missing: list[Missing]) -> Criteria:
    """What the owner demands; each key the decision lacks goes to ``missing``."""
    criteria = Fields("criteria", {} if value is None else value, (*_NEEDED, *_OPTIONAL))
    for key, why in _NEEDED.items():
        if key not in criteria:
            missing.append(Missing(criteria.path(key), why))
    longest = criteria.number_or_none("longest_interval_days", above=0.0)
    shortest = criteria.number_or_none("shortest_interval_days", least=0.0)
    if longest is not None and shortest is not None and shortest > longest:
        raise criteria.refuse("shortest_interval_days", "longer than the longest interval.")
    fracture = None
    if "fracture" in criteria:
        fracture = criteria.choice("fracture", ("toughness", "diagram"))
    return Criteria(
        fracture=fracture,
        load_reserve=criteria.number_or_none("load_reserve", least=1.0),
        life_factor=criteria.number_or_none("life_factor", least=1.0),
        size_confidence_sd=criteria.number_or_none("size_confidence_sd", least=0.0),
        longest_interval_days=longest,
        shortest_interval_days=shortest,
        failure_probability=criteria.number_or_none("failure_probability", above=0.0, below=1.0),
        surprise=criteria.number_or_none("surprise", above=0.0, below=1.0),
        diagram=criteria.choice("diagram", DIAGRAMS) if "diagram" in criteria else None,
    )


def read_owner(value: Any) -> Owner:
    """What the owner allows; nothing where the section is left out."""
    keys = ("allows_restriction", "leak_tolerated", "fixed_date")
    owner = Fields("owner", {} if value is None else value, keys)
    fixed = None
    if "fixed_date" in owner:
        fields = Fields(owner.path("fixed_date"), owner.values["fixed_date"], ("on", "source"))
        fixed = FixedDate(fields.date("on"), fields.text("source"))
    return Owner(
        allows_restriction=owner.flag("allows_restriction", False),
        leak_tolerated=owner.flag("leak_tolerated", False),
        fixed_date=fixed,
    )


def read_uncertainty(value: Any) -> Uncertainty | None:
    """What the forecast scatters by; None where the section is left out."""
    if value is None:
        return None
    keys = ("log10_c_sd", "m_sd", "c_m_correlation", "toughness_cov", "stress_cov")
    fields = Fields("uncertainty", value, keys)
    return Uncertainty(
        log10_c_sd=fields.number_or_none("log10_c_sd", least=0.0),
        m_sd=fields.number_or_none("m_sd", least=0.0),
        c_m_correlation=fields.number_or_none("c_m_correlation", least=-1.0, most=1.0),
        toughness_cov=fields.number_or_none("toughness_cov", least=0.0),
        stress_cov=fields.number_or_none("stress_cov", least=0.0),
    )


def read_detection(value: Any) -> Detection | None:
    """What the method finds; None where the section or its a90_95_mm is left out."""
    if value is None:
        return None
    keys = ("method", "dimension", "curve", "mu_ln_mm", "sigma", "a90_95_mm")
    fields = Fields("detection", value, keys)
    if "curve" in fields:
        fields.choice("curve", ("log-odds", "log-normal"))
    fields.number_or_none("mu_ln_mm")
    fields.number_or_none("sigma", above=0.0)
    size = fields.number_or_none("a90_95_mm", above=0.0)
    if size is None:
        return None
    return Detection(
        method=fields.text_or_none("method") or "",
        dimension=fields.choice("dimension", ("length", "depth")),
        a90_95=size * MM,
    )


def read_shortfalls(value: Any) -> tuple[str, ...]:
    """What was wrong with the last look, in words."""
    if value is None:
        return ()
    look = Fields("look", value, ("shortfalls",))
    if "shortfalls" not in look:
        return ()
    found = []
    for index, text in enumerate(look.items("shortfalls", 100)):
        if not isinstance(text, str) or not text.strip():
            where = f"look.shortfalls[{index}]"
            raise CaseRefused(where, f"text is needed here, not {named(text)}.")
        found.append(text.strip())
    return tuple(found)
