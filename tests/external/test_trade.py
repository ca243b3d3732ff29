"""Facts of the trade that the computation has to agree with: common practice, no source, unless a
source is named."""

import math

import pytest

from assessment import assess
from tests.assessment.examples import surface

from .checks import BY_ID
from .test_directions import CASES, case_of

# What is not an everyday shape: a force instead of a stress, a hole's own concentration, a table,
# a crack that is deep for its section.
EVERYDAY = {
    "plate-through-centre": (0.95, 1.25),
    "plate-through-edge": (1.0, 1.25),
    "plate-through-both-edges": (1.0, 1.25),
    "plate-surface": (0.6, 1.25),
    "plate-corner": (0.6, 1.25),
    "plate-embedded": (0.6, 1.25),
    "bar-surface": (0.5, 1.25),
}


@pytest.mark.parametrize("kind", EVERYDAY)
def test_the_geometry_factor_of_everyday_shapes_is_close_to_one(kind: str) -> None:
    """About 0.8 to 1.25 for through cracks; for a part-through one the same without the shape of
    its front, √Q."""
    low, high = EVERYDAY[kind]
    factors = [one["geometry_factor"] for one in assess(case_of(kind))["stress_intensity"]]
    assert low <= max(factors) <= high
    sizes = CASES[kind][0]
    if kind in ("plate-surface", "plate-corner", "plate-embedded"):
        a = sizes["depth_mm"] / (2 if kind == "plate-embedded" else 1)
        c = sizes["length_mm"] / (1 if kind == "plate-corner" else 2)
        without_shape = max(factors) * math.sqrt(1 + 1.464 * (a / c) ** 1.65)
        assert 0.8 <= without_shape <= 1.35


def test_a_strong_ceramic_breaks_below_about_one_per_cent_of_strain() -> None:
    """Alumina of 4 MPa√m with a flaw of 20 μm: the strain at its critical stress."""
    found = assess(
        surface(
            crack={"kind": "plate-surface", "depth_mm": 0.02, "length_mm": 0.04,
                   "sizing": "none: a flaw of the grain"},
            body={"width_mm": 10, "thickness_mm": 3},
            material__yield_mpa=4000, material__ultimate_mpa=4000,
            material__elastic_modulus_mpa=380000, material__poisson=0.22,
            material__yielding="continuous",
            material__toughness={"model": "fixed", "k_mat_mpa_sqrt_m": 4},
            loading__peak={"membrane_mpa": 100}, loading__cycles="none: steady",
            criteria__fracture="toughness",
        )
    )  # fmt: skip
    strain = found["critical"]["stress_mpa"] / 380000
    assert 0.0005 < strain < 0.01


def test_toughness_values_as_printed() -> None:
    """Callister & Rethwisch, read: 4340 tempered at 425 °C 87.4, at 260 °C 50.0 although stronger;
    soda-lime glass 0.7 to 0.8 MPa√m. The stronger temper breaks from the smaller crack."""
    soft, hard = (BY_ID[f"kic_cal_4340 tempered {t} C"]["value"] for t in (425, 260))
    assert soft == [1420, 87.4] and hard == [1640, 50.0]
    low, high = BY_ID["kic_cal_soda-lime glass"]["value"]
    assert low <= 0.75 <= high

    def critical(strength: float, toughness: float) -> float:
        found = assess(
            surface(
                crack={"kind": "plate-through-centre", "length_mm": 1.0, "sizing": "none: cut"},
                body={"width_mm": 400, "thickness_mm": 20},
                material__yield_mpa=strength,
                material__ultimate_mpa=1.1 * strength,
                material__yielding="continuous",
                material__toughness={"model": "fixed", "k_mat_mpa_sqrt_m": toughness},
                loading__peak={"membrane_mpa": 500},
                loading__cycles="none: steady",
            )
        )
        return float(found["critical"]["length_mm"])

    assert critical(*soft) > 2.0 * critical(*hard)


@pytest.mark.parametrize(("peak", "alone"), [(40, True), (250, False)])
def test_toughness_alone_decides_only_at_a_low_load_ratio(peak: float, alone: bool) -> None:
    """The case contract: below a load ratio of 0.3, else the diagram."""
    found = assess(
        surface(
            criteria__fracture="toughness",
            loading__peak={"membrane_mpa": peak},
            loading__cycles="none: steady",
        )
    )
    assert (found["bounding"]["failure"]["load_ratio"] < 0.3) is alone
    criterion = found["bounding"]["failure"]["criterion"]
    assert criterion == ("toughness" if alone else "diagram")
