import numpy as np
import pytest
from scipy.stats import logistic, norm

from assessment.detection import Curve, found_in_any


@pytest.mark.parametrize(("shape", "law"), [("log-odds", logistic), ("log-normal", norm)])
def test_the_curve_is_the_distribution_of_ln_size(shape: str, law: object) -> None:
    curve = Curve(shape, np.log(3.0), 0.4, "length")
    sizes = np.array([0.5, 1.0, 3.0, 4.0])
    expected = law.cdf(np.log(sizes), np.log(3.0), 0.4)  # type: ignore[attr-defined]
    assert curve.uncapped(sizes) == pytest.approx(expected)
    assert curve.uncapped(curve.size_found(0.9)) == pytest.approx(0.9)
    assert curve.uncapped(0.0) == 0.0


def test_no_size_is_found_for_certain() -> None:
    curve = Curve("log-normal", 0.0, 0.3, "length")
    assert curve.probability(1e6) == 0.99
    with pytest.raises(ValueError, match="between 0 and 0.99"):
        curve.size_found(0.995)


def test_looks_by_one_method_are_one_look() -> None:
    assert found_in_any([0.7, 0.8, 0.6]) == 0.8
    assert found_in_any([0.7, 0.8], independent=True) == pytest.approx(0.94)
    assert found_in_any([0.9] * 9, independent=True) == 0.99
    assert found_in_any([]) == 0.0


@pytest.mark.parametrize(
    ("shape", "sigma", "most"), [("normal", 0.3, 0.9), ("log-odds", 0.0, 0.9), ("log-odds", 1, 1.0)]
)
def test_impossible_curves_are_refused(shape: str, sigma: float, most: float) -> None:
    with pytest.raises(ValueError):
        Curve(shape, 0.0, sigma, "length", most)
