"""Fracture toughness models: from what a certificate says to one value in MPa√m."""

from .models import ByTemperature, EnergyRelease, Fixed, ToughnessModel
from .value import ToughnessResult, toughness

__all__ = [
    "ByTemperature",
    "EnergyRelease",
    "Fixed",
    "ToughnessModel",
    "ToughnessResult",
    "toughness",
]
