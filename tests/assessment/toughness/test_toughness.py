"""Toughness: fixed, by temperature, from the energy release rate."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from assessment.toughness import ByTemperature, Conditions, EnergyRelease, Fixed, toughness
from assessment.toughness.value import TemperatureMissing

TABLE = ByTemperature(((-40.0, 45.0), (-20.0, 60.0), (20.0, 140.0)))


def of(model, temperature=None):
    return toughness(model, Conditions(temperature, 210e3, 0.3, 355.0))


def test_a_fixed_value_is_that_value_at_any_temperature():
    assert of(Fixed(80.0)).value == 80.0
    assert of(Fixed(80.0), -60.0).value == 80.0
    assert of(Fixed(80.0)).marks == ()


@pytest.mark.parametrize(
    ("temperature", "value"),
    [(-40.0, 45.0), (-30.0, 52.5), (-20.0, 60.0), (0.0, 100.0), (20.0, 140.0)],
)
def test_a_table_is_read_in_straight_lines_between_its_points(temperature, value):
    result = of(TABLE, temperature)
    assert result.value == pytest.approx(value, rel=1e-12)
    assert result.marks == ()


@pytest.mark.parametrize(
    ("temperature", "nearest"), [(-40.001, 45.0), (-300.0, 45.0), (20.001, 140.0)]
)
def test_outside_a_table_the_value_is_marked_and_never_extrapolated(temperature, nearest):
    result = of(TABLE, temperature)
    assert result.value == nearest
    assert [mark.value for mark in result.marks] == [temperature]
    assert "toughness table" in result.marks[0].sentence()


def test_a_table_without_a_temperature_is_misuse():
    with pytest.raises(TemperatureMissing):
        of(TABLE)


def test_energy_release_by_hand():
    """By hand: √(20e3 J/m² × 210e9 Pa) = 64.807e6 Pa√m; ÷ √(1 − 0.09) = 67.937 in plane strain."""
    assert of(EnergyRelease(20.0, "stress")).value == pytest.approx(64.8074, rel=1e-5)
    assert of(EnergyRelease(20.0, "strain")).value == pytest.approx(67.9366, rel=1e-5)


@given(st.floats(0.01, 1e3), st.sampled_from(["stress", "strain"]))
def test_energy_release_turns_back_into_the_same_energy(g_c, plane):
    value = of(EnergyRelease(g_c, plane)).value
    stiff = 210e9 / (1 - 0.3**2) if plane == "strain" else 210e9
    assert (value * 1e6) ** 2 / stiff == pytest.approx(1e3 * g_c, rel=1e-12)


@given(st.floats(-40.0, 20.0), st.floats(-40.0, 20.0))
def test_a_rising_table_rises_between_its_points(one, other):
    low, high = sorted((one, other))
    assert of(TABLE, low).value <= of(TABLE, high).value


@pytest.mark.parametrize("model", [Fixed(80.0), EnergyRelease(20.0, "strain"), TABLE])
def test_the_working_ends_in_the_value(model):
    result = of(model, 0.0)
    assert result.working[-1].value == result.value
    assert result.working[-1].unit == "MPa√m"
    assert result.working[-1].source
