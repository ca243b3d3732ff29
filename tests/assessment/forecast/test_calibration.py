"""The calibration of ``tests.full.calibration`` at a reduced size, fewer samples each."""

import numpy as np
import pytest

from assessment.forecast import case_forecast

from .calibration import MODEL, World, coverage, faults, ranks

CRACKS = 60


@pytest.fixture(autouse=True)
def _few_samples(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(case_forecast, "SAMPLES", 1024)
    monkeypatch.setattr(case_forecast, "_STAGE", 512)
    monkeypatch.setattr(case_forecast, "ENOUGH", 200.0)
    monkeypatch.setattr(case_forecast, "LEAST", 20.0)


def test_the_forecast_is_as_sure_as_it_says() -> None:
    assert faults(ranks(CRACKS, 1, MODEL)) == []


@pytest.mark.parametrize("told", [0.5, 2.0])
def test_a_sizing_error_misstated_by_two_is_caught(told: float) -> None:
    assert faults(ranks(CRACKS, 2, World(told=told)))


def test_the_check_itself() -> None:
    rng = np.random.default_rng(0)
    even = rng.random((2, 400))
    assert faults(even) == []
    assert faults(0.5 + 0.6 * (even - 0.5))  # too wide
    assert faults(np.clip(0.5 + 1.6 * (even - 0.5), 0.0, 1.0))  # too narrow
    assert faults(even**1.5)  # biased
    assert coverage(np.array([0.5, 0.99, 0.2, 0.8])) == [0.25, 0.75, 0.75]
