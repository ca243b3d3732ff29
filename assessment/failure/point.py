"""Where a crack stands against the two criteria, and how much more load it takes.

Residual stress adds to K alone and stays as it is while the load is multiplied; with the diagram
its interaction with yielding adds ρ (interaction.py).
"""

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from assessment.kinds.base import Body, Kind, Loads
from assessment.validity import Floats

from .diagram import lr_max
from .interaction import FULL_BELOW, rho
from .limit import Strengths, drawable, limit

STEPS = 60
CAUSES = ("fracture", "collapse")


@dataclass(frozen=True)
class Point:
    """One crack at the peak load.

    load_ratio : reference stress ÷ yield strength
    toughness_ratio : largest K of the front, residual stress and ρ with it, ÷ toughness (nil where
        the crack is held shut)
    limit : the largest acceptable toughness ratio at this load ratio
    reserve : factor on all loads, residual stress as it is, that brings the point to the limit;
        None where no load would
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


@dataclass(frozen=True)
class Ratios:
    """What the criteria compare, each of shape (points, samples) but load_ratio: (samples,).

    load : K of the loads ÷ toughness; residual : K of the residual stress ÷ toughness, nil where
    it presses the crack shut, for which no credit is taken
    """

    load_ratio: Floats
    load: Floats
    residual: Floats

    @property
    def chi(self) -> Floats:
        """K_s L_r / K_p at each point; nil where the load does not open the crack."""
        with np.errstate(divide="ignore", invalid="ignore"):
            found = self.residual * self.load_ratio / self.load
        return np.where(self.load > 0.0, found, 0.0)

    def toughness_ratio(self, factor: Floats | float, diagram: bool) -> Floats:
        """The largest of the front at so many times the load, shape (samples,)."""
        total = factor * self.load + self.residual
        if diagram and np.any(self.residual > 0.0):
            total = total + rho(self.chi, factor * self.load_ratio)
        return np.asarray(np.max(total, axis=0))


def ratios(
    kind: Kind,
    x: Floats,
    loads: Loads,
    body: Body,
    material: Strengths,
    toughness: float,
    residual: Loads,
) -> Ratios:
    """x : front variables in m, shape (n, samples); loads, residual in MPa; toughness in MPa√m."""
    k = np.asarray(kind.stress_intensity(x, loads, body), dtype=float)
    # A front that is pressed shut does not run: a negative K drives nothing.
    load = np.where(np.isnan(k), np.nan, np.maximum(k, 0.0)) / toughness
    lr = np.asarray(kind.reference_stress(x, loads, body) / material.yield_strength, dtype=float)
    if not residual:
        return Ratios(lr, load, np.zeros_like(load))
    held = np.asarray(kind.stress_intensity(x, residual, body), dtype=float) / toughness
    return Ratios(lr, load, np.where(np.isnan(held), np.nan, np.maximum(held, 0.0)))


def assess_point(
    kind: Kind,
    x: Floats,
    loads: Loads,
    body: Body,
    material: Strengths,
    toughness: float,
    fracture: str,
    residual: Loads | None = None,
) -> Point:
    """One crack at one load; see ``reserves`` for the criteria.

    x : front variables in m, shape (n,); loads in MPa; toughness in MPa√m
    fracture : "toughness" or "diagram"; the diagram needs to be drawable
    residual : residual stress by load name, MPa
    """
    found = ratios(kind, x, loads, body, material, toughness, residual or {})
    lr, drawn = float(found.load_ratio), fracture == "diagram" and drawable(material)
    kr = float(found.toughness_ratio(1.0, drawn))
    most = float(limit(lr, material)) if drawn and np.isfinite(lr) else None
    reserve, collapses = _reserve(found, material, fracture)
    value = float(reserve)
    if np.isnan(value):
        return Point(lr, kr, most, None, None, None, fracture)
    if np.isinf(value):
        return Point(lr, kr, most, None, True, None, fracture)
    cause = CAUSES[int(bool(collapses))]
    return Point(lr, kr, most, value, value > 1.0, cause, fracture)


def reserves(
    kind: Kind,
    x: Floats,
    loads: Loads,
    body: Body,
    material: Strengths,
    toughness: float,
    fracture: str,
    residual: Loads | None = None,
) -> tuple[Floats, NDArray[np.bool_]]:
    """Reserve on load for many sizes at once, and True where it ends in collapse.

    "toughness": the smaller of (K_mat − K_s)/K and flow strength/reference stress, with the flow
    strength the mean of yield and ultimate. "diagram": the first factor F with
    F·K_r + K_s/K_mat + ρ(F·L_r) = f(F·L_r), K_r = K/K_mat; at the cut-off it is collapse. K and
    reference stress are linear in load; the residual stress stays.

    x : shape (front variables, samples). Returns arrays of shape (samples,); infinite where no
    load fails the crack, nil where the residual stress alone does, NaN where K or the reference
    stress cannot be evaluated.
    """
    found = ratios(kind, x, loads, body, material, toughness, residual or {})
    return _reserve(found, material, fracture)


def _reserve(found: Ratios, material: Strengths, fracture: str) -> tuple[Floats, NDArray[np.bool_]]:
    cut_off = lr_max(material.yield_strength, material.ultimate_strength)
    lr, load, held = found.load_ratio, found.load, found.residual
    unknown = np.isnan(lr) | np.any(np.isnan(load + held), axis=0)
    with np.errstate(divide="ignore", invalid="ignore"):
        by_collapse = np.where(lr > 0.0, cut_off / lr, np.inf)
        at_points = np.where(load > 0.0, np.maximum(1.0 - held, 0.0) / load, np.inf)
    # Where the residual stress alone breaks the crack, no load is needed.
    by_toughness = np.where(np.any(held >= 1.0, axis=0), 0.0, np.min(at_points, axis=0))
    if fracture == "toughness" or not drawable(material):
        # The flow strength is yield × L_r,max, so the cut-off serves both criteria.
        reserve = np.minimum(by_collapse, by_toughness)
        return np.where(unknown, np.nan, reserve), by_collapse < by_toughness
    drawn = _on_the_diagram(found, np.minimum(by_collapse, by_toughness), material)
    collapses = drawn >= by_collapse * (1.0 - 1e-9)
    return np.where(unknown, np.nan, drawn), collapses


def _on_the_diagram(found: Ratios, most: Floats, material: Strengths) -> Floats:
    """The first crossing along the ray, between no load and ``most``.

    Without residual stress F·K_r rises and f(F·L_r) falls, so there is one crossing. With it, ρ
    falls between L_r = 0.8 and 1.05, so the ray is followed up to each of the two in turn. Where
    it meets the vertical cut-off (or the plateau's drop) the crossing is that point.
    """
    bounded = np.isfinite(most)
    low, high = np.zeros_like(most), np.where(bounded, most, 1.0)
    if np.any(found.residual > 0.0):
        with np.errstate(divide="ignore", invalid="ignore"):
            knee = np.where(found.load_ratio > 0.0, FULL_BELOW / found.load_ratio, np.inf)
        fails_by_knee = (knee < high) & ~_holds(found, np.minimum(knee, high), material)
        high = np.where(fails_by_knee, knee, high)
        starts_failed = bounded & ~_holds(found, np.zeros_like(most), material)
        high = np.where(starts_failed, 0.0, high)
    for _ in range(STEPS):
        middle = 0.5 * (low + high)
        holds = _holds(found, middle, material)
        low = np.where(holds, middle, low)
        high = np.where(holds, high, middle)
    return np.where(bounded, low, most)


def _holds(found: Ratios, factor: Floats, material: Strengths) -> NDArray[np.bool_]:
    most = limit(factor * found.load_ratio, material)
    return np.asarray(found.toughness_ratio(factor, True) < most)
