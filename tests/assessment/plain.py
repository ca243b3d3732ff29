"""Plain things that several tests of the computation share: a steel, and kinds with simple K."""

from collections.abc import Callable
from dataclasses import dataclass, replace

import numpy as np

from assessment.failure import TensileCurve
from assessment.kinds import KINDS
from assessment.kinds.base import Kind


@dataclass(frozen=True)
class Steel:
    """Strengths and modulus in MPa; invented, of the order of a structural steel's."""

    yield_strength: float = 355.0
    ultimate_strength: float = 490.0
    elastic_modulus: float = 207e3
    yielding: str | None = "continuous"
    drawn_from: TensileCurve | None = None


def constant_factor(factor: float, thickness: float = 10.0) -> tuple[Kind, dict]:
    """K = factor σ √(πa) at any size below ``thickness`` (m), so that lives have closed forms."""
    table = ((1e-7, factor), (0.5 * thickness, factor), (thickness, factor))
    return KINDS["tabulated"], {"thickness": thickness, "table": table}


def centre_crack_with(factor: Callable[[np.ndarray], np.ndarray]) -> Kind:
    """A centre crack whose geometry factor is a given function of 2a/W."""

    def k(x, loads, body):
        return (factor(2 * x[0] / body["width"]) * loads["membrane"] * np.sqrt(np.pi * x[0]))[None]

    return replace(KINDS["plate-through-centre"], stress_intensity=k)


def membrane(value: float) -> dict:
    return {"membrane": np.asarray(float(value))}
