"""Plane strain and the plastic zone: a value from outside, the balance of force, cautions."""

import math

import pytest
from scipy.integrate import quad

from assessment import assess
from assessment.failure.yielding import plane_strain_thickness, plastic_zone
from tests.assessment.examples import surface
from tests.external.checks import BY_ID, given


def test_plane_strain_thickness() -> None:
    check = BY_ID["psvalid_ex"]
    found = plane_strain_thickness(given(check, "KIc"), given(check, "sy"))
    assert 1e3 * found == pytest.approx(check["value"], rel=1e-4), check["source"]


def test_the_zone_carries_the_force_that_the_elastic_stress_would() -> None:
    """Irwin: what lies above yield within r_y is moved ahead, which doubles the length."""
    k, strength = 40.0, 355.0
    r_y = (k / strength) ** 2 / (2.0 * math.pi)
    force = quad(lambda u: 2.0 * k / math.sqrt(2.0 * math.pi), 0.0, math.sqrt(r_y))[0]
    assert force == pytest.approx(strength * plastic_zone(k, strength, "stress"))
    assert plastic_zone(k, strength, "strain") == pytest.approx(
        plastic_zone(k, strength, "stress") / 3.0
    )
    with pytest.raises(KeyError):
        plastic_zone(k, strength, "both")


def test_the_cautions_speak_where_they_apply_and_are_silent_elsewhere() -> None:
    """2.5 (110/355)² = 240 mm; a strong metal of little toughness needs 2.5 (30/1400)² = 1.1 mm."""
    tough = assess(surface())
    assert any("240 mm that plane strain needs" in one for one in tough["cautions"])
    assert any("ahead of the crack" in one for one in tough["cautions"])
    strong = assess(
        surface(
            material__yield_mpa=1400,
            material__ultimate_mpa=1600,
            material__yielding="continuous",
            material__toughness={"model": "fixed", "k_mat_mpa_sqrt_m": 30},
        )
    )
    assert not any("plane strain" in one for one in strong["cautions"])
    assert not any("ahead of the crack" in one for one in strong["cautions"])
