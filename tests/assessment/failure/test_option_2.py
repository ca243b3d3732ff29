"""Option 2: closed forms, the value from outside, Option 1 as its neighbour, and whole cases."""

import math
from typing import Any

import numpy as np
import pytest

from assessment import CaseRefused, assess, read_case
from assessment.failure import TensileCurve, limit_curve, option_2, summary
from tests.assessment.examples import surface
from tests.assessment.plain import Steel
from tests.external.checks import BY_ID

E, YIELD, ULTIMATE = 207e3, 355.0, 490.0


def power_law(n: float = 8.0, alpha: float = 0.002, points: int = 190) -> TensileCurve:
    """Ramberg-Osgood: ε = σ/E + α (σ/σ_Y)^n."""
    stress = np.linspace(20.0, 560.0, points)
    strain = stress / E + alpha * (stress / YIELD) ** n
    return TensileCurve(tuple(zip(strain, stress, strict=True)), true=True)


def test_an_elastic_metal_has_the_elastic_diagram() -> None:
    curve = TensileCurve(((0.001, 0.001 * E), (0.002, 0.002 * E), (0.01, 0.01 * E)), true=True)
    lr = np.linspace(0.0, 1.19, 50)
    assert option_2(lr, YIELD, ULTIMATE, E, curve) == pytest.approx(1 / np.sqrt(1 + lr**2 / 2))


def test_a_power_law_metal_by_its_closed_form() -> None:
    lr = np.linspace(0.05, 1.19, 60)
    strain = lr * YIELD / E + 0.002 * lr**8
    exact = 1.0 / np.sqrt(E * strain / (lr * YIELD) + lr**3 * YIELD / (2.0 * E * strain))
    assert option_2(lr, YIELD, ULTIMATE, E, power_law()) == pytest.approx(exact, rel=1e-3)


def test_the_value_from_outside_at_the_proof_stress() -> None:
    """ε_ref = σ_Y/E + 0.002 at L_r = 1 (from memory, high confidence)."""
    check = BY_ID["fad_opt2_1"]
    found = option_2(1.0, YIELD, ULTIMATE, E, power_law())
    assert float(found) == pytest.approx(check["value"], rel=1e-3), check["source"]


def test_it_starts_at_one_falls_and_is_nil_beyond_the_cut_off() -> None:
    lr = np.linspace(0.0, 1.3, 400)
    f = option_2(lr, YIELD, ULTIMATE, E, power_law())
    assert f[0] == 1.0 and np.all(np.diff(f) <= 1e-12)
    assert np.all(f[lr > 1.1902] == 0.0) and np.all(f[lr < 1.19] > 0.0)


def test_a_plateau_drops_at_yield_to_its_end() -> None:
    """With λ = E ε/σ_Y at the end of the plateau, f(1) = (λ + 1/2λ)^(-1/2)."""
    first = YIELD / E
    curve = TensileCurve(((first, YIELD), (0.02, YIELD), (0.2, 600.0)), true=True)
    lam = E * 0.02 / YIELD
    assert float(option_2(1.0, YIELD, ULTIMATE, E, curve)) == pytest.approx(
        (lam + 1 / (2 * lam)) ** -0.5
    )
    assert float(option_2(1.0 - 1e-9, YIELD, ULTIMATE, E, curve)) == pytest.approx(1.5**-0.5)


def test_engineering_and_true_are_the_same_curve() -> None:
    true = power_law()
    engineering = TensileCurve(
        tuple((math.expm1(e), s / math.exp(e)) for e, s in true.points), true=False
    )
    lr = np.linspace(0.1, 1.15, 30)
    assert option_2(lr, YIELD, ULTIMATE, E, engineering) == pytest.approx(
        option_2(lr, YIELD, ULTIMATE, E, true), rel=1e-9
    )


def test_after_the_neck_an_engineering_curve_says_nothing() -> None:
    curve = TensileCurve(((0.002, 400.0), (0.1, 500.0), (0.2, 450.0)), true=False)
    strain, stress = curve.true_points()
    assert strain[-1] == pytest.approx(math.log(1.1)) and stress[-1] == pytest.approx(550.0)
    assert np.isnan(curve.strain_at(np.asarray(551.0)))


def test_the_summary_by_hand() -> None:
    """Elastic to 400 MPa at 0.2 %, then flat to 10 %: area 0.4 + 39.2 MJ/m³; proof 400 MPa."""
    curve = TensileCurve(((0.002, 400.0), (0.1, 400.0)), true=False)
    found = summary(curve, 200e3)
    assert found.energy == pytest.approx(0.4 + 39.2) and found.ultimate == 400.0
    assert found.proof == pytest.approx(400.0)
    brittle = summary(TensileCurve(((0.001, 200.0), (0.003, 600.0)), true=False), 200e3)
    assert brittle.proof is None


def test_the_stronger_metal_can_take_less_energy() -> None:
    strong = TensileCurve(((0.008, 1600.0), (0.02, 1700.0)), true=False)
    mild = TensileCurve(((0.0012, 250.0), (0.15, 420.0), (0.3, 400.0)), true=False)
    one, other = summary(strong, 207e3), summary(mild, 207e3)
    assert one.ultimate > 4.0 * other.ultimate and one.energy < other.energy / 4.0


CURVE = {
    "strain": "true",
    "points": [[float(e), float(s)] for e, s in power_law(points=60).points],
}


def test_a_case_on_option_2() -> None:
    brittle = {"material__toughness__k_mat_mpa_sqrt_m": 45}
    one = assess(surface(material__tensile_curve=CURVE, **brittle))
    two = assess(surface(material__tensile_curve=CURVE, criteria__diagram="option 2", **brittle))
    assert "Option 1" in one["figures"]["diagram"]["method"]
    assert "Option 2" in two["figures"]["diagram"]["method"]
    assert two["failure"]["reserve_on_load"] != one["failure"]["reserve_on_load"]
    assert any("Option 2" in step["formula"] for step in two["working"])
    lr, kr = (two["failure"][key] for key in ("load_ratio", "toughness_ratio"))
    reserve = two["failure"]["reserve_on_load"]
    at_limit = option_2(reserve * lr, 355.0, 490.0, E, power_law(points=60))
    assert reserve * kr == pytest.approx(float(at_limit), rel=1e-6)


def test_the_drawn_curve_is_the_one_assessed_on() -> None:
    steel = Steel(drawn_from=power_law())
    points = np.array(limit_curve(steel))
    assert points[:-1, 1] == pytest.approx(
        option_2(points[:-1, 0], YIELD, ULTIMATE, E, power_law())
    )


def test_option_2_needs_no_word_on_yielding() -> None:
    from tests.assessment.examples import DROP

    changes = {"material__yielding": DROP, "material__tensile_curve": CURVE}
    assert assess(surface(**changes, criteria__diagram="option 2"))["failure"]["acceptable"]


REFUSED: list[tuple[Any, str]] = [
    ({"strain": "true", "points": [[0.001, 200], [0.002, 400]]}, "three points"),
    ({"strain": "true", "points": [[0.001, 200], [0.002, 300], [0.1, 350]]}, "flow strength"),
    ({"strain": "true", "points": [[0.001, 200], [0.002, 500], [0.1, 450]]}, "does not fall"),
    ({"strain": "true", "points": [[0.0, 200], [0.002, 500], [0.1, 550]]}, "start above 0"),
    ({"strain": "nominal", "points": CURVE["points"]}, "engineering"),
    ({"strain": "true", "points": [[0.001, -5], [0.002, 500], [0.1, 550]]}, "above 0"),
]


@pytest.mark.parametrize(("curve", "words"), REFUSED)
def test_a_bad_curve_is_refused(curve: Any, words: str) -> None:
    with pytest.raises(CaseRefused) as caught:
        read_case(surface(material__tensile_curve=curve))
    assert "tensile_curve" in caught.value.where and words in caught.value.why


def test_option_2_without_a_curve_is_refused() -> None:
    with pytest.raises(CaseRefused, match="option 2"):
        read_case(surface(criteria__diagram="option 2"))
