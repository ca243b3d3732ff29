"""The case document: read strictly, checked once, as frozen dataclasses in SI units.

reading → text to plain values; fields → keys of one object; crack, material, loading, usage,
criteria → one section each; case → the dataclasses; writing → the outcome's one exact text.
"""

from dataclasses import replace
from typing import Any

import numpy as np

from assessment.document.case import Case, Crack, Criteria, Loading, Material, Missing
from assessment.document.crack import read_body, read_crack
from assessment.document.criteria import (
    read_criteria,
    read_detection,
    read_owner,
    read_shortfalls,
    read_uncertainty,
)
from assessment.document.fields import Fields
from assessment.document.loading import read_loading
from assessment.document.material import read_material
from assessment.document.profile import Profiles
from assessment.document.reading import read_json
from assessment.document.refusal import CaseRefused
from assessment.document.usage import read_as_of, read_history, read_previous, read_usage

__all__ = ["Case", "CaseRefused", "read_case", "read_json"]

_KEYS = (
    "case",
    "as_of",
    "crack",
    "body",
    "material",
    "loading",
    "usage",
    "criteria",
    "owner",
    "uncertainty",
    "detection",
    "history",
    "previous",
    "look",
    "population",
    "seed",
)


def read_case(document: str | bytes | dict[str, Any]) -> Case:
    """The case, checked. Raises CaseRefused with the key and the reason in words.

    What only the decision needs is listed in ``Case.missing``, in the order of the document.
    """
    fields = Fields("", read_json(document), _KEYS)
    _check_version(fields)
    missing: list[Missing] = []
    value = fields.values.get
    crack = read_crack(fields.raw("crack"), missing)
    body = read_body(fields.raw("body"), crack.kind)
    material = read_material(fields.raw("material"), missing)
    profiles = Profiles(crack.kind, body)
    loading = read_loading(fields.raw("loading"), profiles, material.yield_strength, missing)
    if profiles.by_name:
        body = {**body, "profiles": profiles.by_name}
    body = crack.kind.placed(crack.depth, crack.length, _named(loading), body)
    _check_possible(crack, body)
    usage = read_usage(value("usage"), missing)
    criteria = read_criteria(value("criteria"), missing)
    material = _drawn(material, criteria)
    detection = read_detection(value("detection"))
    if not crack.found and detection is None:
        missing.append(Missing("detection.a90_95_mm", "what the method finds is missing."))
    as_of_on, as_of_at = read_as_of(value("as_of"), usage)
    return Case(
        as_of_on=as_of_on,
        as_of_at=as_of_at,
        crack=crack,
        body=body,
        material=material,
        loading=loading,
        usage=usage,
        criteria=criteria,
        owner=read_owner(value("owner")),
        detection=detection,
        history=read_history(value("history"), usage),
        previous=read_previous(value("previous")),
        shortfalls=read_shortfalls(value("look")),
        missing=tuple(missing),
        uncertainty=read_uncertainty(value("uncertainty")),
        seed=int(value("seed") or 0),
    )


def _drawn(material: Material, criteria: Criteria) -> Material:
    """The material with the curve that its diagram is drawn from."""
    if criteria.diagram == "option 2":
        if material.tensile is None:
            why = "this is needed for the diagram of option 2 and missing."
            raise CaseRefused("material.tensile_curve", why)
        return replace(material, drawn_from=material.tensile)
    if criteria.fracture == "diagram" and material.yielding is None:
        raise CaseRefused("material.yielding", "this is needed for the diagram and missing.")
    return material


def _named(loading: Loading) -> frozenset[str]:
    """The loads that are not nil, at the peak, in a cycle or as residual stress."""
    named = {name for name, value in (*loading.peak.items(), *loading.residual.items()) if value}
    for block in loading.cycles:
        named |= {name for name, value in block.ranges.items() if value}
        named |= {name for name, value in (block.maxima or {}).items() if value}
    return frozenset(named)


def _check_version(fields: Fields) -> None:
    if fields.number("case") != 1:
        raise fields.refuse("case", "only case documents of version 1 are read.")
    if "population" in fields and not isinstance(fields.values["population"], dict):
        raise fields.refuse("population", "an object is needed here.")
    if "seed" in fields:
        seed = fields.number("seed", least=0.0)
        if seed != int(seed):
            raise fields.refuse("seed", "a whole number is needed here.")


def _check_possible(crack: Crack, body: Any) -> None:
    kind = crack.kind
    x = kind.front(crack.depth, crack.length, body)
    why = kind.impossible(x, body)
    if why is None:
        return
    within = "crack" if crack.found else "crack.assumed"
    keys = [key for key in ("depth_mm", "length_mm") if key in kind.sizes + kind.optional_sizes]
    room = np.atleast_1d(kind.wall(x, body))
    short = [key for key, left in zip(keys, room, strict=False) if not left > 0.0]
    raise CaseRefused(f"{within}.{short[0]}" if short else within, why)
