"""How far the metal yields ahead of a crack, and how thick a wall has to be for plane strain."""

import math

from assessment.validity import Validity

_TESTS = ("tests/assessment/failure/test_yielding.py",)
PLANE_STRAIN = Validity(
    relation="thickness from which a crack is in plane strain",
    source="ASTM E399: thickness, crack and ligament at least 2.5 (K/σ_Y)²",
    accuracy="a rule of the test standard",
    ranges=(),
    witness="from memory; one value (computed)",
    tests=_TESTS,
)
PLASTIC_ZONE = Validity(
    relation="plastic zone ahead of a crack",
    source="G. R. Irwin (1960): (1/π)(K/σ_Y)² in plane stress, a third of it in plane strain",
    accuracy="an estimate of its size; small-scale yielding",
    ranges=(),
    witness="from memory; the stress ahead of the crack, σ = K/√(2πr), carries the same force",
    tests=_TESTS,
)
# Where the zone is a larger part of the crack than this, K alone no longer describes the tip.
# Common practice, no source.
SMALL_PART = 0.1


def plane_strain_thickness(k: float, yield_strength: float) -> float:
    """m; 2.5 (K/σ_Y)². k : MPa√m; yield_strength : MPa"""
    ratio = k / yield_strength
    return 2.5 * ratio * ratio


def plastic_zone(k: float, yield_strength: float, plane: str) -> float:
    """Length in m ahead of the tip; plane "stress" or "strain".

    Raises KeyError for another word.
    """
    part = {"stress": 1.0, "strain": 1.0 / 3.0}[plane]
    ratio = k / yield_strength
    return part / math.pi * ratio * ratio
