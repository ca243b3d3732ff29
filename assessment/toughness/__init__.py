"""Fracture toughness models: from what a certificate says to one value in MPa√m."""

from .charpy import CORRELATIONS, Correlation, named
from .loading_rate import RATES
from .models import (
    ByTemperature,
    Charpy,
    Conditions,
    EnergyRelease,
    Fixed,
    MasterCurve,
    ToughnessModel,
)
from .value import ToughnessResult, toughness

__all__ = [
    "CORRELATIONS",
    "RATES",
    "ByTemperature",
    "Charpy",
    "Conditions",
    "Correlation",
    "EnergyRelease",
    "Fixed",
    "MasterCurve",
    "ToughnessModel",
    "ToughnessResult",
    "named",
    "toughness",
]
