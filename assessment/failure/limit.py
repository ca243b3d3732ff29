"""The diagram of a material: Option 2 where its curve was chosen, else Option 1."""

from typing import Protocol

import numpy as np

from assessment.validity import Floats, Validity

from .diagram import OPTION_1, lr_max, option_1
from .option_2 import OPTION_2, option_2
from .tensile import TensileCurve


class Strengths(Protocol):
    """What the criteria need of a material; MPa. drawn_from : the curve of Option 2, or None."""

    @property
    def yield_strength(self) -> float: ...
    @property
    def ultimate_strength(self) -> float: ...
    @property
    def elastic_modulus(self) -> float: ...
    @property
    def yielding(self) -> str | None: ...
    @property
    def drawn_from(self) -> TensileCurve | None: ...


def diagram_of(material: Strengths) -> Validity:
    """The record of the diagram used."""
    return OPTION_1 if material.drawn_from is None else OPTION_2


def drawable(material: Strengths) -> bool:
    """Enough is known to draw a diagram."""
    return material.yielding is not None or material.drawn_from is not None


def limit(load_ratio: Floats | float, material: Strengths) -> Floats:
    """The largest acceptable toughness ratio at a load ratio, on the diagram of the material."""
    strengths = (
        material.yield_strength,
        material.ultimate_strength,
        material.elastic_modulus,
    )
    if material.drawn_from is not None:
        return option_2(load_ratio, *strengths, material.drawn_from)
    return option_1(load_ratio, *strengths, str(material.yielding))


def limit_curve(material: Strengths) -> tuple[tuple[float, float], ...]:
    """Points (L_r, K_r) of the limit for drawing, from L_r = 0 down to K_r = 0 at the cut-off."""
    end = lr_max(material.yield_strength, material.ultimate_strength)
    lr = np.concatenate([np.linspace(0.0, 0.999999, 60), np.linspace(1.0, end, 40)])
    f = limit(lr, material)
    return (*((float(a), float(b)) for a, b in zip(lr, f, strict=True)), (end, 0.0))
