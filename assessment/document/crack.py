"""Reads ``crack`` and ``body``: which kind, how large, in what part."""

from collections.abc import Mapping
from typing import Any

from assessment.document.case import Crack, Missing, Sizing
from assessment.document.fields import Fields, as_number
from assessment.document.refusal import CaseRefused
from assessment.interaction import Combined, Neighbour, combine
from assessment.kinds import KINDS
from assessment.kinds.base import Kind

MM = 1e-3
TABLE_POINTS = 200

# Kinds that the document knows. Those that the computation does not cover are refused as such,
# so that "not computed yet" and "mistyped" read differently.
DOCUMENT_KINDS = (
    "plate-through-centre",
    "plate-through-edge",
    "plate-through-both-edges",
    "plate-surface",
    "plate-corner",
    "plate-embedded",
    "hole-through-one",
    "hole-through-two",
    "hole-corner-one",
    "hole-corner-two",
    "lug-through",
    "lug-corner",
    "cylinder-axial-inside",
    "cylinder-axial-outside",
    "cylinder-axial-through",
    "cylinder-girth-inside",
    "cylinder-girth-outside",
    "cylinder-girth-through",
    "bar-surface",
    "weld-toe-surface",
    "specimen-compact-tension",
    "specimen-edge-bend",
    "tabulated",
)
_SIZES = ("depth_mm", "length_mm")
_CRACK_KEYS = (
    "kind",
    "found",
    "on_record",
    "assumed",
    *_SIZES,
    "depth_basis",
    "depth_source",
    "sizing",
    "why_smaller",
    "neighbours",
)
SIZING_KEYS = ("method", "depth_sd_mm", "length_sd_mm", "depth_bias_mm", "length_bias_mm")
_DEPTH_BASES = ("measured", "assumed", "at least", "at most")


def read_kind(crack: Fields) -> Kind:
    """The crack kind; refused where unknown or not computed yet."""
    name = crack.choice("kind", DOCUMENT_KINDS)
    if name not in KINDS:
        raise crack.refuse("kind", f"cracks of kind {name!r} are not computed yet.")
    return KINDS[name]


def read_crack(value: Any, missing: list[Missing]) -> Crack:
    """The crack section. What the decision lacks is added to ``missing``."""
    crack = Fields("crack", value, _CRACK_KEYS)
    kind = read_kind(crack)
    if crack.flag("found", True):
        return _found(crack, kind, missing)
    return _not_found(crack, kind)


def _found(crack: Fields, kind: Kind, missing: list[Missing]) -> Crack:
    for key in ("on_record", "assumed"):
        if key in crack:
            raise crack.refuse(key, "this goes only with a place where no crack was found.")
    depth, length = _sizes(crack, kind)
    basis = crack.choice("depth_basis", _DEPTH_BASES) if "depth_basis" in crack else "measured"
    if basis != "assumed" and "depth_source" in crack:
        raise crack.refuse("depth_source", "this goes only with an assumed depth.")
    if basis == "at least":
        why = "the depth is a lower bound only, and how deep the crack truly is, is not known."
        missing.append(Missing("crack.depth_mm", why))
    combined = _with_neighbours(crack, kind, depth, length, missing)
    if combined is not None:
        depth, length = combined.depth, combined.length
    return Crack(
        kind=kind,
        found=True,
        depth=depth,
        length=length,
        combined=combined,
        depth_basis=basis,
        depth_source=crack.text("depth_source") if basis == "assumed" else None,
        sizing=_crack_sizing(crack, kind, missing),
        why_smaller=crack.text_or_none("why_smaller"),
    )


def _not_found(crack: Fields, kind: Kind) -> Crack:
    for key in (*_SIZES, "depth_basis", "depth_source", "why_smaller", "neighbours"):
        if key in crack:
            raise crack.refuse(key, 'where no crack was found, sizes go under "assumed".')
    assumed = Fields(crack.path("assumed"), crack.raw("assumed"), (*_SIZES, "source"))
    depth, length = _sizes(assumed, kind)
    return Crack(
        kind=kind,
        found=False,
        depth=depth,
        length=length,
        # The error that a measurement here would have: the stop size needs it, the rest does not.
        sizing=_crack_sizing(crack, kind, []),
        on_record=crack.flag("on_record", False),
        source=assumed.text("source"),
    )


# Kinds whose length runs along a surface, where a neighbour in the same plane lies beside it.
_SIDE_BY_SIDE = (
    "plate-through-centre",
    "plate-surface",
    "weld-toe-surface",
    "cylinder-axial-inside",
    "cylinder-axial-outside",
    "cylinder-axial-through",
    "cylinder-girth-inside",
    "cylinder-girth-outside",
    "cylinder-girth-through",
)
NEIGHBOURS = 20


def _with_neighbours(
    crack: Fields, kind: Kind, depth: float | None, length: float | None, missing: list[Missing]
) -> Combined | None:
    """[{"name", "depth_mm", "length_mm", "separation_mm"}, …]: other cracks in the same plane."""
    if "neighbours" not in crack:
        return None
    known = ("name", *_SIZES, "separation_mm")
    found: list[Neighbour] = []
    for one in crack.objects("neighbours", known, NEIGHBOURS):
        their_depth, their_length = _sizes(one, kind)
        if their_length is None:
            raise one.refuse("length_mm", "this is needed and missing.")
        separation = one.number_or_none("separation_mm", least=0.0)
        if separation is None:
            why = f"how far {one.text('name')} lies from this crack is missing."
            missing.append(Missing(one.path("separation_mm"), why))
        found.append(
            Neighbour(
                one.text("name"),
                their_depth,
                their_length,
                None if separation is None else separation * MM,
            )
        )
    if kind.name not in _SIDE_BY_SIDE or length is None:
        why = f"no rule is here for neighbours of a crack of kind {kind.name!r}."
        missing.append(Missing(crack.path("neighbours"), why))
        return None
    return combine(depth, length, found)


def _sizes(fields: Fields, kind: Kind) -> tuple[float | None, float | None]:
    """Depth and length in m, as the kind needs them."""
    for key in _SIZES:
        if key in fields and key not in kind.sizes + kind.optional_sizes:
            raise fields.refuse(key, f"a crack of kind {kind.name!r} has no such size.")
        if key in kind.sizes:
            fields.raw(key)
    depth, length = (fields.number_or_none(key, above=0.0) for key in _SIZES)
    return (
        None if depth is None else depth * MM,
        None if length is None else length * MM,
    )


def _crack_sizing(crack: Fields, kind: Kind, missing: list[Missing]) -> Sizing | None:
    if "sizing" not in crack:
        missing.append(Missing("crack.sizing", "the sizing error of the method is missing."))
        return None
    said = crack.says_none("sizing")
    if said is not None:
        return Sizing(0.0, 0.0, 0.0, 0.0, said)
    sizing = Fields(crack.path("sizing"), crack.values["sizing"], SIZING_KEYS)
    needed = [key for key in _SIZES if key in crack]
    # An assumed depth has no sizing error of its own: the assumption is the bound.
    if crack.values.get("depth_basis") in ("assumed", "at most"):
        needed = [key for key in needed if key != "depth_mm"]
    for key in needed:
        sd_key = key.replace("_mm", "_sd_mm")
        if sd_key not in sizing:
            missing.append(Missing(sizing.path(sd_key), "the sizing error is missing."))
            return None
    found = read_sizing(sizing)
    for key, bias in (("depth_mm", found.depth_bias), ("length_mm", found.length_bias)):
        if key in crack and crack.number(key) * MM <= bias:
            bias_key = key.replace("_mm", "_bias_mm")
            raise sizing.refuse(bias_key, "the bias is as large as the size itself.")
    return found


def read_sizing(sizing: Fields) -> Sizing:
    """Sizing error in m; a standard deviation left out is nil, as is a bias left out."""

    def metres(key: str, least: float | None = None) -> float:
        value = sizing.number_or_none(key, least=least)
        return 0.0 if value is None else value * MM

    return Sizing(
        depth_sd=metres("depth_sd_mm", 0.0),
        length_sd=metres("length_sd_mm", 0.0),
        depth_bias=metres("depth_bias_mm"),
        length_bias=metres("length_bias_mm"),
        said=sizing.text_or_none("method") or "",
    )


WELD_CONDITIONS = ("as-welded", "stress-relieved")


def read_body(value: Any, kind: Kind) -> Mapping[str, Any]:
    """The body of the part: lengths in m by key without unit, tables as tuples, words as text."""
    body = Fields("body", value, (*kind.body_keys, *kind.optional_body_keys))
    read: dict[str, Any] = {}
    for key in (*kind.body_keys, *kind.optional_body_keys):
        if key in body or key in kind.body_keys:
            read[key.removesuffix("_mm")] = _body_value(body, key)
    return read


def _body_value(body: Fields, key: str) -> Any:
    if key.endswith("_mm"):
        return body.number(key, above=0.0) * MM
    if key.endswith("table"):
        return _table(body, key)
    if key == "ends":
        return body.choice(key, ("free", "held"))
    if key == "weld_condition":
        return body.choice(key, WELD_CONDITIONS)
    return body.text(key)


def _table(body: Fields, key: str) -> tuple[tuple[float, float], ...]:
    rows: list[tuple[float, float]] = []
    for where, size, value in body.pairs(key, as_number, TABLE_POINTS):
        if size < 0.0 or (rows and size * MM <= rows[-1][0]):
            raise CaseRefused(
                where, "sizes in a table rise from row to row and start at 0 or more."
            )
        if value <= 0.0:
            raise CaseRefused(where, "values in this table are above 0.")
        rows.append((size * MM, value))
    if len(rows) < 2:
        raise body.refuse(key, "a table needs at least two rows.")
    return tuple(rows)
