"""A fast load makes a ferritic steel act as if it were colder.

Toughness measured slowly is read at the metal temperature less the shift.
"""

from assessment.validity import Range, Validity

SHIFT = Validity(
    relation="shift of the transition temperature with the rate of loading",
    source="J. M. Barsom, Eng. Fract. Mech. 7 (1975) 605-618; AASHTO commentary: 215 − 1.5 σ_Y "
    "(°F, ksi) for impact, three quarters of it for loading within about a second",
    accuracy="none known; the form in °C and MPa is within 0.3 °C of the exact conversion",
    ranges=(Range("σ_Y", "yield strength", 250.0, 965.0, unit="MPa"),),
    witness="from memory; two values of the formula (from memory)",
    tests=("tests/external/test_toughness_values.py",),
)
RATES = ("static", "intermediate", "impact")
_PART = {"static": 0.0, "intermediate": 0.75, "impact": 1.0}


def shift(rate: str, yield_strength: float) -> float:
    """°C that the steel is to be taken colder: (119 − 0.12 σ_Y) for impact, σ_Y in MPa.

    Raises KeyError for another rate. Above 965 MPa the formula ends near nil and the source gives
    none.
    """
    return _PART[rate] * max(119.0 - 0.12 * yield_strength, 0.0)
