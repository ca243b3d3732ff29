"""tabulated: the geometry factor as a table of the basis, membrane stress.

Between the rows a curve that keeps the table's rises and falls (PCHIP); outside the table nothing
is known, and the size is marked.
"""

from functools import lru_cache

import numpy as np
from scipy.interpolate import PchipInterpolator

from assessment.relations import reference_stress
from assessment.validity import Floats, Mark, Range, Validity

from . import parts
from .base import Body, Kind, Loads, WorkingStep

TABLE_SOURCE = "the geometry factor table of the basis"


@lru_cache(maxsize=256)
def _curve(table: tuple[tuple[float, float], ...]) -> PchipInterpolator:
    sizes, values = zip(*table, strict=True)
    return PchipInterpolator(sizes, values, extrapolate=False)


def _factor(x: Floats, body: Body) -> Floats:
    """NaN outside the table."""
    return np.asarray(_curve(body["table"])(x[0]))


def _k(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane = parts.load(loads, "membrane")
    return np.asarray(_factor(x, body) * membrane * np.sqrt(np.pi * x[0]))[None]


def _reference(x: Floats, loads: Loads, body: Body) -> Floats:
    membrane = np.abs(parts.load(loads, "membrane"))
    table = body.get("limit_load_table")
    if table is not None:
        # Limit load with the crack ÷ limit load without it.
        return np.asarray(membrane / _curve(table)(x[0]))
    return np.asarray(membrane / (1.0 - x[0] / body["thickness"]))


def _range_of(table: tuple[tuple[float, float], ...], words: str) -> Validity:
    return Validity(
        relation=words,
        source=TABLE_SOURCE,
        accuracy="as the table",
        ranges=(Range("a", "the crack size", table[0][0] * 1e3, table[-1][0] * 1e3, unit="mm"),),
        witness="data of the basis",
    )


def _checks(x: Floats, body: Body) -> parts.Checks:
    size = {"a": np.asarray(x[0] * 1e3)}
    checks = [(_range_of(body["table"], "the geometry factor table"), size)]
    if body.get("limit_load_table") is not None:
        checks.append((_range_of(body["limit_load_table"], "the limit load table"), size))
    return checks


def _impossible(x: Floats, body: Body) -> str | None:
    if x[0] > body["thickness"]:
        return (
            f"the crack ({parts.millimetres(x[0])}) is deeper than the wall "
            f"({parts.millimetres(body['thickness'])})."
        )
    return None


def _marks(x: Floats, body: Body) -> tuple[Mark, ...]:
    return parts.marks_of(_checks(x, body))


def _working(x: Floats, loads: Loads, body: Body) -> tuple[WorkingStep, ...]:
    membrane = float(parts.load(loads, "membrane"))
    size = f"a = {parts.millimetres(x[0])}"
    limit = (
        "σ_ref = P_m ÷ (limit load with crack ÷ without), from the table"
        if body.get("limit_load_table") is not None
        else "σ_ref = P_m / (1 − a/t): no limit load table is given"
    )
    f = _factor(x, body)
    return (
        parts.step_factor("Geometry factor", "F(a) from the table", size, f, TABLE_SOURCE),
        parts.step_k(
            "tip",
            "K = F σ √(πa)",
            f"F = {float(f):.4g}, σ = {membrane:g} MPa, {size}",
            _k(x, loads, body)[0],
            TABLE_SOURCE,
        ),
        parts.step_reference(
            limit,
            f"P_m = {membrane:g} MPa, {size}, t = {parts.millimetres(body['thickness'])}",
            _reference(x, loads, body),
            reference_stress.THICKNESS.source,
        ),
    )


KIND = Kind(
    name="tabulated",
    words="a crack whose geometry factor is given as a table",
    body_keys=("thickness_mm", "table"),
    optional_body_keys=("limit_load_table",),
    load_keys=("membrane_mpa",),
    sizes=("depth_mm",),
    points=("tip",),
    front=lambda depth, length, body: parts.one(depth),
    sizes_of=lambda x, body: (x[0], None),
    stress_intensity=_k,
    reference_stress=_reference,
    nominal_stress=parts.nominal,
    impossible=_impossible,
    wall=lambda x, body: (body["thickness"] - x[0])[None],
    inside=lambda x, body: parts.all_hold(_checks(x, body)),
    marks=_marks,
    relations=(reference_stress.THICKNESS,),
    working=_working,
    becomes=lambda x, body: None,
)
