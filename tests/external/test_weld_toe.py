"""The weld toe against the published forms, plane finite elements and its limits."""

import math

import numpy as np
import pytest

from assessment import KINDS, assess
from assessment.corners import sizes_to_corner
from assessment.estimate import loads_for
from assessment.relations import weld_toe
from tests.assessment.examples import surface

from .checks import BY_ID, given, starting
from .fem.weld_toe import geometry_factor

THICKNESS = 0.025
BODY = {"width": 10.0, "thickness": THICKNESS, "attachment_length": 0.025}
ONE = np.asarray(1.0)


@pytest.mark.parametrize("name", starting("mk2d"))
def test_the_published_forms(name: str) -> None:
    """Values of the forms from memory; each source stands in the record."""
    check = BY_ID[name]
    attachment = given(check, "L/B") * THICKNESS
    z = np.asarray(given(check, "z/B") * THICKNESS)
    membrane, bending = weld_toe.magnification(z, attachment, THICKNESS)
    found = membrane if "axial" in check["quantity"] else bending
    assert float(found) == pytest.approx(check["value"], rel=1e-4), check["source"]


@pytest.mark.parametrize("load", ["tension", "bending"])
@pytest.mark.parametrize(
    ("relative", "attachment"),
    [(0.005, 1.0), (0.02, 2.0), (0.05, 0.5), (0.1, 3.0), (0.2, 1.0), (0.4, 2.0), (0.8, 0.7)],
)
def test_attachments_on_both_surfaces_against_plane_elements(
    load: str, relative: float, attachment: float
) -> None:
    """What the accuracy says: 3 % low to 12 % high."""
    plain = geometry_factor(relative, None, load)
    by_elements = geometry_factor(relative, attachment, load, both=True) / plain
    z = np.asarray(relative * THICKNESS)
    found = weld_toe.magnification(z, attachment * THICKNESS, THICKNESS)
    here = float(found[0 if load == "tension" else 1])
    assert 0.97 <= here / by_elements <= 1.12


@pytest.mark.parametrize(("load", "low", "high"), [("tension", 1.02, 1.38), ("bending", 0.87, 1.0)])
def test_an_attachment_on_the_cracked_surface_alone_is_what_the_caution_says(
    load: str, low: float, high: float
) -> None:
    by_elements = geometry_factor(0.02, 2.0, load) / geometry_factor(0.02, None, load)
    found = weld_toe.magnification(np.asarray(0.02 * THICKNESS), 2.0 * THICKNESS, THICKNESS)
    assert low <= float(found[0 if load == "tension" else 1]) / by_elements <= high


def test_the_plain_plate_of_the_elements_is_an_edge_crack() -> None:
    """A half plane: 1.1215 (closed form; Tada, Paris & Irwin, from memory)."""
    assert geometry_factor(0.005, None, "tension") == pytest.approx(1.1215, rel=0.01)


def test_near_the_toe_it_rises_as_the_corner_singularity_does() -> None:
    """M_k ~ z^(λ-1) at the notch of 225° of metal; λ = 0.6736 from the symmetric eigenvalue
    equation sin(λ·225°) + λ sin(225°) = 0 (Williams 1952)."""
    angle = math.radians(225.0)
    eigen = 0.6736
    assert math.sin(eigen * angle) + eigen * math.sin(angle) == pytest.approx(0.0, abs=1e-4)
    z = np.array([1e-4, 2e-4])
    for found in weld_toe.magnification(z, 0.05, THICKNESS):
        slope = math.log(float(found[1] / found[0])) / math.log(2.0)
        assert slope == pytest.approx(eigen - 1.0, abs=0.02)


def test_never_below_one_and_without_a_jump() -> None:
    z = np.geomspace(1e-4, 0.99, 20_001) * THICKNESS
    for attachment in (0.3, 0.9, 1.0, 1.01, 1.9, 2.0, 2.1, 5.0):
        for found in weld_toe.magnification(z, attachment * THICKNESS, THICKNESS):
            assert np.all(found >= 1.0) and np.all(np.diff(found) <= 0.0)
            assert np.max(-np.diff(np.log(found))) < 2e-4


def test_far_from_the_toe_it_is_the_crack_in_a_plate() -> None:
    x = np.array([0.6 * THICKNESS, 0.6 * THICKNESS])
    toe = KINDS["weld-toe-surface"].stress_intensity(x, {"membrane": ONE}, BODY)
    plate = KINDS["plate-surface"].stress_intensity(x, {"membrane": ONE}, BODY)
    assert toe[0] == pytest.approx(plate[0], rel=1e-12) and toe[1] > 1.5 * plate[1]


def test_residual_stress_is_not_magnified() -> None:
    x = np.array([0.001, 0.004])
    toe = KINDS["weld-toe-surface"].stress_intensity(x, {"residual_membrane": ONE}, BODY)
    plate = KINDS["plate-surface"].stress_intensity(x, {"membrane": ONE}, BODY)
    assert toe == pytest.approx(plate, rel=1e-12)


BODY_MM = {
    "width_mm": 200,
    "thickness_mm": 20,
    "attachment_length_mm": 30,
    "weld_condition": "as-welded",
}
LEVEL = {"level": "heat-treated-across", "source": "procedure 4 (invented)"}


def test_an_as_welded_toe_without_residual_stress_is_referred() -> None:
    case = surface(crack__kind="weld-toe-surface", body=BODY_MM)
    found = assess(case)
    assert found["disposition"]["verdict"] in ("refer", "withdraw")
    assert any("weld is as welded" in reason for reason in found["disposition"]["reasons"])
    relieved = assess(
        surface(
            crack__kind="weld-toe-surface",
            body={**BODY_MM, "weld_condition": "stress-relieved"},
            loading__residual=LEVEL,
        )
    )
    assert not any("weld is as welded" in reason for reason in relieved["disposition"]["reasons"])
    assert any("both surfaces" in caution for caution in relieved["cautions"])
    assert any("weld toe" in step["step"] for step in relieved["working"])


def test_the_toe_is_worse_than_the_plate_but_for_its_residual_stress() -> None:
    plain = assess(surface(loading__residual=LEVEL))
    toe = assess(
        surface(
            crack__kind="weld-toe-surface",
            body={**BODY_MM, "weld_condition": "stress-relieved"},
            loading__residual=LEVEL,
        )
    )
    by_at = [{one["at"]: one for one in found["stress_intensity"]} for found in (plain, toe)]
    for at in ("deepest", "surface"):
        assert by_at[1][at]["k_mpa_sqrt_m"] > by_at[0][at]["k_mpa_sqrt_m"]
        assert by_at[1][at]["residual_k_mpa_sqrt_m"] == by_at[0][at]["residual_k_mpa_sqrt_m"]
    assert toe["life"]["usage"] < plain["life"]["usage"]


def test_once_through_the_wall_residual_stress_counts_as_membrane() -> None:
    body = {"width": 0.2, "thickness": 0.02, "attachment_length": 0.03}
    through = sizes_to_corner(KINDS["weld-toe-surface"], body, 0.02, 0.06)
    assert through.became and through.kind.name == "plate-through-centre"
    assert loads_for(through, {"residual_membrane": 70.0}) == {"membrane": 70.0}
    still = sizes_to_corner(KINDS["weld-toe-surface"], body, 0.01, 0.06)
    held = {"residual_membrane": 70.0, "residual_bending": 5.0}
    assert loads_for(still, held) == held
