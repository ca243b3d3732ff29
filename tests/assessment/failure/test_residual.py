"""Residual stress: it adds to K, stays while the load changes, and is never a credit."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment import assess
from assessment.failure import reserves, rho
from assessment.growth import CycleBlock, Paris, Walker, grow, rates
from assessment.kinds import KINDS
from tests.assessment.examples import changed, surface

KIND = KINDS["plate-surface"]
BODY = {"thickness": 0.02, "width": 0.4}
X = np.array([[0.004], [0.008]])


def loads(membrane: float, bending: float = 0.0) -> dict[str, np.ndarray]:
    return {"membrane": np.asarray(membrane), "bending": np.asarray(bending)}


class Steel:
    yield_strength, ultimate_strength, elastic_modulus = 355.0, 510.0, 207000.0
    yielding, drawn_from = "continuous", None


def reserve(membrane, held, fracture="diagram", toughness=80.0):
    found, _ = reserves(KIND, X, loads(membrane), BODY, Steel(), toughness, fracture, loads(held))
    return float(found[0])


def test_without_load_or_residual_stress_or_when_it_has_yielded_the_term_is_nil():
    assert rho(np.asarray(0.0), np.asarray(0.5)) == 0.0
    assert rho(np.asarray(1.0), np.asarray(1.05)) == 0.0
    assert rho(np.asarray(1.0), np.asarray(2.0)) == 0.0


@pytest.mark.parametrize("at", [0.8, 1.05])
def test_the_term_is_steady_where_its_parts_meet(at):
    for chi in (0.1, 1.0, 3.9, 6.0):
        just = [float(rho(np.asarray(chi), np.asarray(at + d))) for d in (-1e-9, 1e-9)]
        assert just[0] == pytest.approx(just[1], abs=1e-7)


def test_by_toughness_alone_it_takes_its_k_away():
    """By hand: F = (K_mat − K_s)/K_p, and K_s/K_p is the ratio of the stresses."""
    plain = reserve(100.0, 0.0, "toughness", 30.0)
    assert reserve(100.0, 50.0, "toughness", 30.0) == pytest.approx(plain - 0.5, rel=1e-9)


def test_on_the_diagram_the_reserve_is_where_the_ray_meets_the_limit():
    """The definition itself, evaluated apart from the search."""
    from assessment.failure import option_1

    f = reserve(100.0, 120.0)
    k = KIND.stress_intensity(X, loads(1.0), BODY)
    lr = float(KIND.reference_stress(X, loads(100.0), BODY)[0]) / 355.0
    kp, ks = 100.0 * k / 80.0, 120.0 * k / 80.0
    total = f * kp + ks + rho(ks * lr / kp, np.asarray(f * lr))
    limit = option_1(f * lr, 355.0, 510.0, 207000.0, "continuous")
    assert float(np.max(total)) == pytest.approx(float(limit), rel=1e-6)


def test_what_breaks_by_itself_needs_no_load():
    assert reserve(100.0, 1000.0, "toughness", 30.0) == 0.0
    assert reserve(100.0, 1000.0, "diagram", 30.0) == 0.0


@given(st.floats(10, 300), st.floats(0, 350), st.floats(0, 1.0))
def test_more_of_it_never_leaves_more_reserve(membrane, held, more):
    for fracture in ("toughness", "diagram"):
        assert reserve(membrane, held * (1 + more), fracture) <= reserve(
            membrane, held, fracture
        ) * (1 + 1e-9)


@given(st.floats(10, 300), st.floats(-350, 0))
def test_compression_is_no_credit(membrane, held):
    for fracture in ("toughness", "diagram"):
        assert reserve(membrane, held, fracture) == reserve(membrane, 0.0, fracture)


def test_growth_sees_the_whole_cycle_moved():
    """By hand: a cycle −50…+50 opens half; moved by +50 it opens whole and R is 0; moved by +100,
    R = 50/150. Kmin and Kmax of each point move by that point's own K."""
    k = np.ravel(KIND.stress_intensity(X, loads(1.0), BODY))
    law = Paris(1e-12, 3.0)

    def speed(held, law=law):
        block = CycleBlock({"membrane": 100.0}, None, {"membrane": 50.0}, 1.0, {"membrane": held})
        return np.ravel(rates(KIND, X, BODY, law, (block,)))

    np.testing.assert_allclose(speed(0.0), 1e-12 * (50.0 * k) ** 3)
    np.testing.assert_allclose(speed(50.0), 1e-12 * (100.0 * k) ** 3)
    np.testing.assert_allclose(speed(-80.0), speed(0.0))
    walker = Walker(1e-12, 3.0, 0.5)
    expected = 1e-12 * (100.0 * k / (1 - 50.0 / 150.0) ** 0.5) ** 3
    np.testing.assert_allclose(speed(100.0, walker), expected)


def test_it_shortens_life_and_never_lengthens_it():
    blocks = [
        CycleBlock({"membrane": 100.0}, 0.0, None, 1.0, {"membrane": held} if held else {})
        for held in (0.0, 100.0)
    ]
    end = lambda x: 0.01 - x[0]  # noqa: E731
    lives = [
        float(grow(KIND, X[:, 0], BODY, Walker(1e-12, 3.0, 0.5), (one,), end).usage[0])
        for one in blocks
    ]
    assert lives[1] < lives[0]


def test_a_case_with_residual_stress_is_assessed_and_says_so():
    plain = assess(surface())
    held = assess(surface(loading__residual={"membrane_mpa": 60, "bending_mpa": 10}))
    assert held["failure"]["toughness_ratio"] > plain["failure"]["toughness_ratio"]
    assert held["failure"]["reserve_on_load"] <= plain["failure"]["reserve_on_load"]
    assert all(point["residual_k_mpa_sqrt_m"] > 0 for point in held["stress_intensity"])
    assert any("Residual stress intensity factor" in step["step"] for step in held["working"])
    assert any("stays as it is" in said for said in held["cautions"])
    assert not any("residual" in reason for reason in held["disposition"]["reasons"])


@pytest.mark.parametrize(
    ("level", "part"),
    [("as-welded", 1.0), ("heat-treated-along", 0.3), ("heat-treated-across", 0.2)],
)
def test_the_levels_of_the_standard(level, part):
    """BS 7910:2013, 7.1.8, from memory: yield magnitude; 30 % and 20 % after heat treatment."""
    case = surface(loading__residual={"level": level, "source": "weld map 7"})
    same = changed(case, loading__residual={"membrane_mpa": part * case["material"]["yield_mpa"]})
    assert assess(case)["failure"] == assess(same)["failure"]
    assert any(level.split("-")[0] in said for said in assess(case)["cautions"])


@pytest.mark.parametrize(
    ("residual", "where"),
    [
        ({"level": "as-welded"}, "loading.residual.source"),
        ({"level": "mild", "source": "x"}, "loading.residual.level"),
        ({"level": "as-welded", "source": "x", "membrane_mpa": 3}, "loading.residual.membrane_mpa"),
        ({}, "loading.residual.membrane_mpa"),
        ({"membrane_mpa": "some"}, "loading.residual.membrane_mpa"),
    ],
)
def test_what_cannot_be_read_is_refused(residual, where):
    from assessment import CaseRefused

    with pytest.raises(CaseRefused) as refused:
        assess(surface(loading__residual=residual))
    assert refused.value.where == where
