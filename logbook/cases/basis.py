"""What a basis holds, and whether the computation could ask with it.

A basis body is a mapping:

kind        the crack kind, as in the case document
body        its dimensions
material, loading, criteria, owner, uncertainty   as in the case document
sizing      method to sizing error ({depth_sd_mm, length_sd_mm, depth_bias_mm, length_bias_mm,
            source}) or to the text "none: why"
detection   method to detection curve, as in the case document, with its source
depth_ratio {value, source}: depth taken as a part of the length where only that is measured
separation  {least_mm, source}: the least metal between two cracks at this place
could_miss  {depth_mm, length_mm, source}: what a look that found nothing could have missed
sources     path to the text that says where a value comes from
"""

from decimal import Decimal
from typing import Any

import assessment
from logbook.cases import text
from logbook.errors import invalid

KEYS = frozenset(
    {
        "kind", "body", "material", "loading", "criteria", "owner", "uncertainty", "sizing",
        "detection", "depth_ratio", "could_miss", "separation", "sources", "material_ref",
    }
)  # fmt: skip
# A crack small enough for any part: the probe asks about the basis, not about the crack.
PROBE = {"depth_mm": Decimal("0.1"), "length_mm": Decimal("0.4")}


def asked_by(kind: str) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """The body keys and the loads that a kind of crack asks for; none for a kind not known."""
    known = assessment.KINDS.get(kind)
    if known is None:
        return (), ()
    return (*known.body_keys, *known.optional_body_keys), known.load_keys


def check_basis_body(body: dict[str, Any]) -> None:
    """Refuse a body with which no question can be asked; name the field and the reason.

    Values that only the decision needs may be missing: the verdict is then refer, and says so.
    """
    unknown = sorted(set(body) - KEYS)
    if unknown:
        raise invalid(
            f"A basis has no part called {unknown[0]!r}.", {unknown[0]: ["Leave it out."]}
        )
    kind = assessment.KINDS.get(str(body.get("kind", "")))
    if kind is None:
        raise invalid(
            "This kind of crack is not computed here.",
            {"kind": [f"Choose one of: {', '.join(assessment.KINDS)}."]},
        )
    crack: dict[str, Any] = {"kind": kind.name, "found": True}
    crack |= {size: PROBE[size] for size in kind.sizes}
    case: dict[str, Any] = {
        "case": 1,
        "crack": crack,
        "usage": {"unit": "count", "per_day": 1, "at": 0, "on": "2000-01-01"},
        **{
            name: body[name]
            for name in ("body", "material", "loading", "criteria", "owner", "uncertainty")
            if name in body
        },
    }
    try:
        assessment.read_case(text.exact(case))
    except assessment.CaseRefused as refused:
        raise invalid(
            "The computation could not ask with this.", {refused.where: [refused.why]}
        ) from None
    _check_pairs(body)


def check_material(body: dict[str, Any]) -> None:
    """Refuse a material that no case could carry; name the value and the reason."""
    case = {
        "case": 1,
        "crack": {"kind": "plate-through-centre", "found": True, "length_mm": 1},
        "body": {"width_mm": 100, "thickness_mm": 10},
        "material": body,
        "loading": {"peak": {"membrane_mpa": 1}},
    }
    try:
        assessment.read_case(text.exact(case))
    except assessment.CaseRefused as refused:
        where = refused.where.removeprefix("material.")
        raise invalid("The computation could not read this.", {where: [refused.why]}) from None


def kinds() -> list[tuple[str, str]]:
    """Name and words of every kind of crack that is computed."""
    return [(kind.name, kind.words) for kind in assessment.KINDS.values()]


def _check_pairs(body: dict[str, Any]) -> None:
    for name, keys in (
        ("depth_ratio", {"value", "source"}),
        ("could_miss", {"source"}),
        ("separation", {"least_mm", "source"}),
    ):
        part = body.get(name)
        if part is None:
            continue
        if not isinstance(part, dict) or not keys <= set(part) or not str(part["source"]).strip():
            raise invalid(
                "Some of this has no source.",
                {name: [f"Give {', '.join(sorted(keys))}; the source says where it comes from."]},
            )
    ratio = body.get("depth_ratio")
    if ratio is not None and not _is_ratio(ratio["value"]):
        raise invalid(
            "A depth cannot be reckoned with this.", {"depth_ratio": ["Give a number above 0."]}
        )
    apart = body.get("separation")
    if apart is not None and not _is_ratio(apart["least_mm"]) and apart["least_mm"] != 0:
        raise invalid(
            "This is no distance.", {"separation.least_mm": ["Give a number in mm, 0 or more."]}
        )
    for name, texts in (("sizing", True), ("detection", False)):
        by_method = body.get(name, {})
        if not isinstance(by_method, dict):
            raise invalid("Give these by method.", {name: ["One entry a method."]})
        for method, said in by_method.items():
            if not isinstance(said, dict) and not (texts and isinstance(said, str)):
                raise invalid(
                    "Give these by method.", {f"{name}.{method}": ["Give its named values."]}
                )


def _is_ratio(value: Any) -> bool:
    number = isinstance(value, int | Decimal) and not isinstance(value, bool)
    return number and Decimal(value).is_finite() and value > 0
