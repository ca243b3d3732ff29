"""Failure: the assessment diagram, the two criteria, and the reserve on load."""

from .diagram import OPTION_1, lr_max, option_1, option_1_curve
from .interaction import FULL_BELOW, RHO, rho
from .point import Point, Ratios, Strengths, assess_point, ratios, reserves

__all__ = [
    "FULL_BELOW",
    "OPTION_1",
    "RHO",
    "Point",
    "Ratios",
    "Strengths",
    "assess_point",
    "lr_max",
    "option_1",
    "option_1_curve",
    "ratios",
    "reserves",
    "rho",
]
