"""The toughness that a model gives, with the step that shows how."""

import math
from dataclasses import dataclass, replace

from assessment.kinds.base import WorkingStep
from assessment.validity import Mark, Range, Validity

from .charpy import BELOW_TEST, CORRELATIONS
from .loading_rate import SHIFT, shift
from .master_curve import MASTER_CURVE, at_size, tolerance
from .models import (
    ByTemperature,
    Charpy,
    Conditions,
    EnergyRelease,
    Fixed,
    MasterCurve,
    ToughnessModel,
)

DEFINITION = "definition; value from the basis"
ENERGY = Validity(
    relation="toughness from the critical energy release rate",
    source=(
        "G. R. Irwin, Analysis of stresses and strains near the end of a crack traversing a "
        "plate, J. Appl. Mech. 24 (1957) 361-364"
    ),
    accuracy="exact for linear elastic behaviour",
    ranges=(),
    witness="definition of the energy release rate; checked against E and ν by hand",
    tests=("tests/assessment/toughness/test_toughness.py::test_energy_release_by_hand",),
)
UNSHIFTED = Validity(
    relation="toughness under a fast load",
    source="none: one value, or a Charpy energy, says nothing of colder metal",
    accuracy="none stated",
    ranges=(Range("rate", "a load faster than the test (1) and not as slow (0)", 0.0, 0.0),),
    witness="none",
    tests=("tests/assessment/toughness/test_toughness.py",),
)


@dataclass(frozen=True)
class ToughnessResult:
    """value in MPa√m; marks where the model's range is left; working for the record."""

    value: float
    marks: tuple[Mark, ...]
    working: tuple[WorkingStep, ...]


class TemperatureMissing(ValueError):
    """A model that depends on temperature and no temperature to read it at."""


def toughness(model: ToughnessModel, at: Conditions) -> ToughnessResult:
    """K_mat in MPa√m of a model under the conditions of the case.

    A table is read between its points. Outside it the nearest point is shown and marked: the
    table says nothing there, and the case is referred. A load faster than the test shifts what
    depends on temperature, and marks what does not.
    Raises TemperatureMissing where a model has no temperature to be read at.
    """
    if isinstance(model, Fixed | EnergyRelease):
        return _fast(_steady(model, at), at)
    if at.temperature is None:
        raise TemperatureMissing("the toughness depends on temperature, and none is given.")
    if isinstance(model, Charpy):
        # The dynamic correlation is for impact itself.
        fast = _from_charpy(model, at, at.temperature)
        return fast if model.correlation == "Barsom 1975" else _fast(fast, at)
    colder, steps, marks = _shifted(at, at.temperature)
    if isinstance(model, ByTemperature):
        found = _from_table(model, colder)
    else:
        found = _from_master_curve(model, at, colder)
    return ToughnessResult(found.value, (*marks, *found.marks), (*steps, *found.working))


def _steady(model: Fixed | EnergyRelease, at: Conditions) -> ToughnessResult:
    if isinstance(model, EnergyRelease):
        return _from_energy(model, at.elastic_modulus, at.poisson)
    return ToughnessResult(model.k_mat, (), (_step("K_mat", "", model.k_mat, DEFINITION),))


def _fast(found: ToughnessResult, at: Conditions) -> ToughnessResult:
    if at.rate in (None, "static"):
        return found
    return replace(found, marks=(*found.marks, *UNSHIFTED.marks({"rate": 1.0})))


def _shifted(
    at: Conditions, temperature: float
) -> tuple[float, tuple[WorkingStep, ...], tuple[Mark, ...]]:
    if at.rate in (None, "static"):
        return temperature, (), ()
    colder = shift(str(at.rate), at.yield_strength)
    step = WorkingStep(
        "Temperature that the toughness is read at",
        "T − T_s, T_s = 119 − 0.12 σ_Y for impact, three quarters for an intermediate rate",
        f"T = {temperature:g} °C, σ_Y = {at.yield_strength:g} MPa, {at.rate}",
        temperature - colder,
        "°C",
        SHIFT.source,
    )
    return temperature - colder, (step,), SHIFT.marks({"σ_Y": at.yield_strength})


def _from_master_curve(model: MasterCurve, at: Conditions, temperature: float) -> ToughnessResult:
    over = temperature - model.t0
    k_25 = tolerance(over, model.probability)
    value = k_25 if at.size is None else at_size(k_25, at.size)
    numbers = (
        f"T = {temperature:g} °C, T_0 = {model.t0:g} °C, P = {model.probability:g}, "
        f"B = {1e3 * (at.size or 0.025):.4g} mm"
    )
    step = _step(
        "K_Jc = 20 + [ln(1/(1 − P))]^¼ [11 + 77 e^(0.019 (T − T_0))] (25 mm/B)^¼",
        numbers,
        value,
        MASTER_CURVE.source,
    )
    return ToughnessResult(value, MASTER_CURVE.marks({"T − T_0": over}), (step,))


def _from_charpy(model: Charpy, at: Conditions, temperature: float) -> ToughnessResult:
    one = CORRELATIONS[model.correlation]
    value = one.value(model.energy, at)
    known = {"C_v": model.energy, "σ_Y": at.yield_strength}
    marks = (
        *one.validity.marks({r.symbol: known[r.symbol] for r in one.validity.ranges}),
        *BELOW_TEST.marks({"T − T_Charpy": temperature - model.temperature}),
    )
    numbers = f"C_v = {model.energy:g} J at {model.temperature:g} °C, T = {temperature:g} °C, "
    numbers += f"σ_Y = {at.yield_strength:g} MPa, E = {at.elastic_modulus:g} MPa, "
    numbers += f"B = {1e3 * (at.size or 0.025):.4g} mm"
    return ToughnessResult(value, marks, (_step(one.formula, numbers, value, one.validity.source),))


def _from_energy(model: EnergyRelease, elastic_modulus: float, poisson: float) -> ToughnessResult:
    """K² = G E (plane stress), G E / (1 − ν²) (plane strain). kJ/m² × MPa = 1e-3 MPa² m."""
    stiff = elastic_modulus / (1.0 - poisson**2) if model.plane == "strain" else elastic_modulus
    value = math.sqrt(model.g_c * 1e-3 * stiff)
    formula = "K_mat = √(G_c E / (1 − ν²))" if model.plane == "strain" else "K_mat = √(G_c E)"
    numbers = f"G_c = {model.g_c:g} kJ/m², E = {elastic_modulus:g} MPa, ν = {poisson:g}"
    return ToughnessResult(value, (), (_step(formula, numbers, value, ENERGY.source),))


def _from_table(model: ByTemperature, temperature: float) -> ToughnessResult:
    low, high = model.points[0][0], model.points[-1][0]
    table = Validity(
        relation="the toughness table of the basis",
        source=DEFINITION,
        accuracy="as the table",
        ranges=(Range("T", "the temperature", low, high, unit="°C"),),
        witness="data of the basis",
    )
    value = _between(model.points, temperature)
    numbers = f"T = {temperature:g} °C, table from {low:g} to {high:g} °C"
    step = _step("K_mat(T), linear between the points", numbers, value, DEFINITION)
    return ToughnessResult(value, table.marks({"T": temperature}), (step,))


def _between(points: tuple[tuple[float, float], ...], t: float) -> float:
    """Linear between points; the end value outside, which the caller marks."""
    if t <= points[0][0]:
        return points[0][1]
    for (t0, k0), (t1, k1) in zip(points, points[1:], strict=False):
        if t <= t1:
            return k0 + (k1 - k0) * (t - t0) / (t1 - t0)
    return points[-1][1]


def _step(formula: str, numbers: str, value: float, source: str) -> WorkingStep:
    return WorkingStep("Fracture toughness", formula, numbers, value, "MPa√m", source)
