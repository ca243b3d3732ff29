"""Toughness from the energy of a Charpy V-notch test, by published correlations.

A correlation speaks for the temperature of the Charpy test. At a higher metal temperature steel is
at least as tough; at a lower one nothing is said, and the case is referred.
"""

import math
from collections.abc import Callable
from dataclasses import dataclass

from assessment.validity import Range, Validity

from .models import Conditions

_TESTS = ("tests/external/test_toughness_values.py",)
_ENERGY = "Charpy energy"


@dataclass(frozen=True)
class Correlation:
    """formula : as printed in the working; value : (energy in J, conditions) -> K_mat in MPa√m

    lower_bound : False for a fit through the middle, which serves the best estimate alone
    """

    name: str
    validity: Validity
    formula: str
    value: Callable[[float, Conditions], float]
    lower_bound: bool


def _annex_j(energy: float, at: Conditions) -> float:
    """The lower of transition (for the size at hand) and upper shelf."""
    size = 0.025 if at.size is None else at.size
    transition = 20.0 + (12.0 * math.sqrt(energy) - 20.0) * math.pow(0.025 / size, 0.25)
    return min(transition, 0.54 * energy + 55.0)


def _rolfe_novak_barsom(energy: float, at: Conditions) -> float:
    strength = at.yield_strength
    left = energy / strength - 0.01
    return strength * math.sqrt(0.64 * left) if left > 0.0 else math.nan


ANNEX_J = Validity(
    relation="toughness from Charpy energy, BS 7910 annex J",
    source="BS 7910, annex J (lower shelf and transition; upper shelf 0.54 C_v + 55)",
    accuracy="a lower bound for ferritic steels, as the standard means it; none stated in figures",
    ranges=(Range("C_v", _ENERGY, 3.0, 120.0, unit="J", basis="common practice, no source"),),
    witness="from memory (medium confidence); three values of the formula; equal at 25 mm to "
    "12 √C_v; the two branches meet near 42 J",
    tests=_TESTS,
)
ROBERTS_NEWTON = Validity(
    relation="toughness from Charpy energy, Roberts and Newton",
    source="R. Roberts & C. Newton, WRC Bulletin 265 (1981), lower bound",
    accuracy="a lower bound to the data it was drawn under",
    ranges=(Range("C_v", _ENERGY, 4.0, 82.0, unit="J", basis="from memory"),),
    witness="from memory; two values of the formula (from memory), and its form in ft lb",
    tests=_TESTS,
)
SAILORS_CORTEN = Validity(
    relation="toughness from Charpy energy, Sailors and Corten",
    source="R. H. Sailors & H. T. Corten, ASTM STP 514 (1972) 164-191",
    accuracy="a fit through the middle of the data; no figure known",
    ranges=(Range("C_v", _ENERGY, 7.0, 70.0, unit="J"),),
    witness="from memory; two values of the formula (from memory), and its form in ft lb",
    tests=_TESTS,
)
BARSOM = Validity(
    relation="dynamic toughness from Charpy energy, Barsom",
    source="J. M. Barsom, Eng. Fract. Mech. 7 (1975) 605-618; as read in the Forensic Structural "
    "Engineering Handbook (Ratay), ch. 11: K_Id = √(5 CVN E) in psi, in and ft lb",
    accuracy="a fit through the middle of the data; a static toughness at the same temperature "
    "lies above it",
    ranges=(
        Range("C_v", _ENERGY, 4.0, 82.0, unit="J", basis="from memory"),
        Range("σ_Y", "yield strength", 250.0, 965.0, unit="MPa", basis="from memory"),
    ),
    witness="read; two values, and the form in SI units within 0.5 % of the exact conversion",
    tests=_TESTS,
)
ROLFE_NOVAK_BARSOM = Validity(
    relation="toughness on the upper shelf from Charpy energy, Rolfe, Novak and Barsom",
    source="S. T. Rolfe & S. R. Novak, ASTM STP 463 (1970); J. M. Barsom & S. T. Rolfe, ASTM STP "
    "466 (1970); as read in the Forensic Structural Engineering Handbook (Ratay), ch. 11",
    accuracy="a fit through the middle of the data on the upper shelf; no figure known",
    ranges=(
        Range("C_v", _ENERGY, 31.0, 121.0, unit="J", basis="from memory"),
        Range("σ_Y", "yield strength", 690.0, 1700.0, unit="MPa", basis="from memory"),
    ),
    witness="read; two values, and the form in SI units 0.6 % below the exact conversion",
    tests=_TESTS,
)

CORRELATIONS = {
    one.name: one
    for one in (
        Correlation(
            "BS 7910 annex J",
            ANNEX_J,
            "K_mat = min{20 + (12 √C_v − 20)(25 mm/B)^0.25, 0.54 C_v + 55}",
            _annex_j,
            True,
        ),
        Correlation(
            "Roberts & Newton 1981",
            ROBERTS_NEWTON,
            "K_mat = 8.47 C_v^0.63",
            lambda energy, at: 8.47 * energy**0.63,
            True,
        ),
        Correlation(
            "Sailors & Corten 1972",
            SAILORS_CORTEN,
            "K_mat = 14.6 √C_v",
            lambda energy, at: 14.6 * math.sqrt(energy),
            False,
        ),
        Correlation(
            "Barsom 1975",
            BARSOM,
            "K_Id = √(0.64 C_v E/1000)",
            lambda energy, at: math.sqrt(0.64e-3 * energy * at.elastic_modulus),
            False,
        ),
        Correlation(
            "Rolfe, Novak & Barsom 1970",
            ROLFE_NOVAK_BARSOM,
            "(K_mat/σ_Y)² = 0.64 (C_v/σ_Y − 0.01)",
            _rolfe_novak_barsom,
            False,
        ),
    )
}
BELOW_TEST = Validity(
    relation="a correlation with Charpy energy",
    source="it speaks for the temperature of the Charpy test",
    accuracy="none stated",
    ranges=(
        Range("T − T_Charpy", "metal temperature over that of the Charpy test", 0.0, unit="°C"),
    ),
    witness="steel is no tougher in the cold: common practice, no source",
    tests=_TESTS,
)


def named(said: str) -> Correlation | None:
    """The correlation of a published name; spelling of &, commas, case and the year are free."""
    wanted = _letters(said)
    for name, one in CORRELATIONS.items():
        if wanted in (_letters(name), _letters(name).rstrip("0123456789")):
            return one
    return None


def _letters(said: str) -> str:
    return "".join(c for c in said.lower().replace(" and ", " ") if c.isalnum())
