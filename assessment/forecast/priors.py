"""What is held of cracks before any is seen. Set on principle and on made-up cracks, not on data.

All are wide: a history of a few readings, or a fleet of a few cracks, soon outweighs them.
"""

from dataclasses import dataclass

import numpy as np

# Exponent of size: m times the slope of ln K over ln a. m is 2.5 to 3.5 for most metals; the slope
# is 0.5 for a crack in a wide body and nears 1 where the far edge is felt. From memory: m of BS
# 7910 and of handbooks; the spread is common practice, no source.
EXPONENT_MEAN, EXPONENT_SD = 2.1, 0.8
# Log rate of a crack of no known fleet: as good as nothing.
LOG_RATE_SD = 4.0
# Log rate of a crack that is unlike its fleet: a factor of 3.
UNLIKE_LOG_RATE_SD = 1.1


@dataclass(frozen=True)
class Lognormal:
    """A positive quantity: median, and sd of its natural log."""

    median: float
    log_sd: float


# Between parts of one fleet: sd of ln rate, and of the exponent. Specimens of one heat scatter by
# a factor of about 1.3 in rate, service cracks by more (common practice, no source).
RATE_BETWEEN = Lognormal(0.3, 0.8)
EXPONENT_BETWEEN = Lognormal(0.25, 0.7)
CORRELATION_SD = 0.7  # of the inverse hyperbolic tangent
# Within one crack: sd of ln rate as it wanders, and how long a deviation lasts, over the readings'
# whole span.
WANDER = Lognormal(0.12, 0.6)
WANDER_SPAN = Lognormal(0.4, 0.7)
# Reading error beside rounding, over the step to which sizes are recorded.
READING_ERROR = Lognormal(0.5, 0.5)
# Error in the time of a reading that all cracks read together share, over the time between them.
COMMON_TIME = Lognormal(0.03, 1.0)


def rounding_variance(step: float) -> float:
    """Variance of the error of rounding to a multiple of ``step``: step²/12 (uniform)."""
    return float(np.square(step) / 12.0)
