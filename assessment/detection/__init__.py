"""What a method finds: curves, their fit from trials, repeated looks, and looking back at a
find."""

from .curves import Curve, found_in_any
from .fit import Fit, fit

__all__ = ["Curve", "Fit", "fit", "found_in_any"]
