"""Failure: the assessment diagram, the two criteria, and the reserve on load."""

from .diagram import OPTION_1, lr_max, option_1, option_1_curve
from .point import Point, Strengths, assess_point, reserves

__all__ = [
    "OPTION_1",
    "Point",
    "Strengths",
    "assess_point",
    "lr_max",
    "option_1",
    "option_1_curve",
    "reserves",
]
