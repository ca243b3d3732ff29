"""Where a crack stands against the two criteria, and how much more load it takes.

Residual stress is nil here; when it comes, it adds to K alone and stays fixed along the ray.
"""

from dataclasses import dataclass
from typing import Protocol

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind, Loads
from assessment.validity import Floats

from .diagram import lr_max, option_1

STEPS = 60
CAUSES = ("fracture", "collapse")


class Strengths(Protocol):
    """What the criteria need of a material; MPa."""

    @property
    def yield_strength(self) -> float: ...
    @property
    def ultimate_strength(self) -> float: ...
    @property
    def elastic_modulus(self) -> float: ...
    @property
    def yielding(self) -> str | None: ...


@dataclass(frozen=True)
class Point:
    """One crack at the peak load.

    load_ratio : reference stress ÷ yield strength
    toughness_ratio : largest K of the front ÷ toughness (nil where the crack is held shut)
    limit : the largest acceptable toughness ratio at this load ratio
    reserve : factor on all loads that brings the point to the limit; None where no load would
    acceptable : reserve above 1; None where it could not be computed
    cause : what the reserve ends in, "fracture" or "collapse"
    fracture : the criterion used, "toughness" or "diagram"
    """

    load_ratio: float
    toughness_ratio: float
    limit: float | None
    reserve: float | None
    acceptable: bool | None
    cause: str | None
    fracture: str


def assess_point(
    kind: Kind,
    x: Floats,
    loads: Loads,
    body: Body,
    material: Strengths,
    toughness: float,
    fracture: str,
) -> Point:
    """One crack at one load; see ``reserves`` for the criteria.

    x : front variables in m, shape (n,); loads in MPa; toughness in MPa√m
    fracture : "toughness" or "diagram"; the diagram needs material.yielding
    """
    lr, kr = _ratios(kind, x, loads, body, material, toughness)
    limit: float | None = None
    if fracture == "diagram" and material.yielding is not None and np.isfinite(lr):
        limit = float(
            option_1(
                lr,
                material.yield_strength,
                material.ultimate_strength,
                material.elastic_modulus,
                material.yielding,
            )
        )
    reserve, collapses = _reserve(lr, kr, material, fracture)
    value = float(reserve)
    if np.isnan(value):
        return Point(float(lr), float(kr), limit, None, None, None, fracture)
    if np.isinf(value):
        return Point(float(lr), float(kr), limit, None, True, None, fracture)
    cause = CAUSES[int(bool(collapses))]
    return Point(float(lr), float(kr), limit, value, value > 1.0, cause, fracture)


def reserves(
    kind: Kind,
    x: Floats,
    loads: Loads,
    body: Body,
    material: Strengths,
    toughness: float,
    fracture: str,
) -> tuple[Floats, NDArray[np.bool_]]:
    """Reserve on load for many sizes at once, and True where it ends in collapse.

    "toughness": the smaller of K_mat/K and flow strength/reference stress, with the flow strength
    the mean of yield and ultimate. "diagram": the factor F with F·K_r = f(F·L_r), K_r = K/K_mat;
    at the cut-off it is collapse. K and reference stress are linear in load.

    x : shape (front variables, samples). Returns arrays of shape (samples,); infinite where no
    load fails the crack, NaN where K or the reference stress cannot be evaluated.
    """
    lr, kr = _ratios(kind, x, loads, body, material, toughness)
    return _reserve(lr, kr, material, fracture)


def _ratios(
    kind: Kind, x: Floats, loads: Loads, body: Body, material: Strengths, toughness: float
) -> tuple[Floats, Floats]:
    k = np.max(kind.stress_intensity(x, loads, body), axis=0)
    # A front that is pressed shut does not run: a negative K drives nothing.
    kr = np.where(k > 0.0, k, np.where(np.isnan(k), np.nan, 0.0)) / toughness
    lr = kind.reference_stress(x, loads, body) / material.yield_strength
    return np.asarray(lr, dtype=float), np.asarray(kr, dtype=float)


def _reserve(
    lr: Floats, kr: Floats, material: Strengths, fracture: str
) -> tuple[Floats, NDArray[np.bool_]]:
    cut_off = lr_max(material.yield_strength, material.ultimate_strength)
    with np.errstate(divide="ignore", invalid="ignore"):
        by_collapse = np.where(lr > 0.0, cut_off / lr, np.where(np.isnan(lr), np.nan, np.inf))
        by_toughness = np.where(kr > 0.0, 1.0 / kr, np.where(np.isnan(kr), np.nan, np.inf))
    if fracture == "toughness" or material.yielding is None:
        # The flow strength is yield × L_r,max, so the cut-off serves both criteria.
        reserve = np.minimum(by_collapse, by_toughness)
        return reserve, by_collapse < by_toughness
    reserve = _on_the_diagram(lr, kr, by_collapse, by_toughness, material)
    return reserve, reserve >= by_collapse * (1.0 - 1e-9)


def _on_the_diagram(
    lr: Floats, kr: Floats, by_collapse: Floats, by_toughness: Floats, material: Strengths
) -> Floats:
    """Bisection along the ray. F·K_r rises and f(F·L_r) falls, so there is one crossing; where
    the ray meets the vertical cut-off (or the plateau's drop) the crossing is that point."""
    high = np.minimum(by_collapse, by_toughness)
    low = np.zeros_like(high)
    bounded = np.isfinite(high)
    high = np.where(bounded, high, 1.0)
    for _ in range(STEPS):
        middle = 0.5 * (low + high)
        f = option_1(
            middle * lr,
            material.yield_strength,
            material.ultimate_strength,
            material.elastic_modulus,
            str(material.yielding),
        )
        holds = middle * kr < f
        low = np.where(holds, middle, low)
        high = np.where(holds, high, middle)
    return np.where(bounded, low, np.minimum(by_collapse, by_toughness))
