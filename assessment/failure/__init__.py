"""Failure: the assessment diagram, the two criteria, and the reserve on load."""

from .diagram import OPTION_1, lr_max, option_1
from .interaction import FULL_BELOW, RHO, rho
from .limit import Strengths, diagram_of, drawable, limit, limit_curve
from .option_2 import OPTION_2, option_2
from .point import Point, Ratios, assess_point, ratios, reserves
from .tensile import Summary, TensileCurve, summary

__all__ = [
    "FULL_BELOW",
    "OPTION_1",
    "OPTION_2",
    "RHO",
    "Point",
    "Ratios",
    "Strengths",
    "Summary",
    "TensileCurve",
    "assess_point",
    "diagram_of",
    "drawable",
    "limit",
    "limit_curve",
    "lr_max",
    "option_1",
    "option_2",
    "ratios",
    "reserves",
    "rho",
    "summary",
]
