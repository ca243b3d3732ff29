"""The toughness that a model gives, with the step that shows how."""

import math
from dataclasses import dataclass

from assessment.kinds.base import WorkingStep
from assessment.validity import Mark, Range, Validity

from .models import ByTemperature, EnergyRelease, Fixed, ToughnessModel

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


@dataclass(frozen=True)
class ToughnessResult:
    """value in MPa√m; marks where the model's range is left; working for the record."""

    value: float
    marks: tuple[Mark, ...]
    working: tuple[WorkingStep, ...]


class TemperatureMissing(ValueError):
    """A table by temperature and no temperature to read it at."""


def toughness(
    model: ToughnessModel,
    temperature: float | None,
    elastic_modulus: float,
    poisson: float,
) -> ToughnessResult:
    """K_mat in MPa√m.

    temperature : °C, the lowest at which the peak can occur; needed by a table alone
    elastic_modulus : MPa; poisson : dimensionless

    A table is read between its points. Outside it the nearest point is shown and marked: the
    table says nothing there, and the case is referred.
    Raises TemperatureMissing where a table has no temperature to be read at.
    """
    if isinstance(model, Fixed):
        return ToughnessResult(model.k_mat, (), (_step("K_mat", "", model.k_mat, DEFINITION),))
    if isinstance(model, EnergyRelease):
        return _from_energy(model, elastic_modulus, poisson)
    if temperature is None:
        raise TemperatureMissing("the toughness is given by temperature, and no temperature is.")
    return _from_table(model, temperature)


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
