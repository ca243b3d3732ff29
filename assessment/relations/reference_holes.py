"""Reference stress of plates with a cracked hole."""

import numpy as np

from assessment.validity import Floats, Range, Validity

NET = Validity(
    relation="reference stress of a plate with cracks at a hole",
    source=(
        "net section beside hole and cracks under the bypass and the pin force (equilibrium), "
        "the plate held from bending in its own plane"
    ),
    accuracy="a lower bound of the limit load where the plate cannot bend in its own plane",
    ranges=(Range("(D + ΣL)/W", "hole and cracks over plate width", 0.0, 1.0, False, True),),
    witness="derivation",
)


def net_section(stress: Floats, removed: Floats) -> Floats:
    """σ / (1 − removed). stress : bypass and pin force over the whole section, MPa; removed : the
    part of the width that hole and cracks take."""
    return np.asarray(np.abs(stress) / (1.0 - removed))
