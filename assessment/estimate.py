"""One look at one size: stress intensity and failure at the peak load, with the look's values.

The best estimate and the bounding look differ in what goes in (sizes, toughness, growth law, and
where life ends), never in how it is computed. Growth from a size on is in ``lifetime``.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field, replace

import numpy as np
from scipy.special import ellipe

from assessment.corners import Corner
from assessment.document import Case, CaseRefused
from assessment.document.case import Crack, Material
from assessment.failure import OPTION_1, RHO, Point, assess_point, drawable
from assessment.growth import CycleBlock, GrowthLaw
from assessment.kinds import parts
from assessment.toughness import Conditions, ToughnessModel, ToughnessResult, toughness
from assessment.toughness.value import TemperatureMissing
from assessment.validity import Floats, Mark

Loads = Mapping[str, float]
# Case contract: for the decision, fracture at K = toughness counts only below this load ratio.
TOUGHNESS_ALONE_BELOW = 0.3


@dataclass(frozen=True)
class Look:
    """What one look computes with.

    toughness : MPa√m; growth : law; fracture : "toughness" or "diagram"
    peak : peak load by load name, MPa; cycles : blocks per unit of usage
    reserve : life ends at the first size at which the reserve on load is this
    residual : residual stress by load name, MPa; it stays when the load is reduced
    decides : True for the bounding look, which uses the toughness criterion at low load ratio only
    """

    material: Material
    toughness: float
    growth: GrowthLaw
    fracture: str
    peak: Loads
    cycles: tuple[CycleBlock, ...]
    reserve: float
    decides: bool = False
    residual: Loads = field(default_factory=dict)

    def at_load(self, factor: float, cycles_fall: bool) -> "Look":
        """The same look with the peak load (and the cycles, where they fall too) reduced."""
        peak = {name: factor * value for name, value in self.peak.items()}
        cycles = self.cycles
        if cycles_fall:
            cycles = tuple(scaled(block, factor) for block in cycles)
        return replace(self, peak=peak, cycles=cycles)

    @property
    def has_diagram(self) -> bool:
        """The diagram can be drawn for this material."""
        return has_diagram(self.material)


@dataclass(frozen=True)
class Estimate:
    """A size at the peak load. ``k`` in MPa√m by point of the front.

    unsettled : why the criterion that the decision needs could not be used, or None
    residual_k : MPa√m of the residual stress by point, as it stands
    """

    corner: Corner
    k: Floats
    point: Point
    marks: tuple[Mark, ...]
    unsettled: str | None = None
    residual_k: Floats | None = None


def has_diagram(material: Material) -> bool:
    """Yielding is known, and the strengths lie where the diagram is published."""
    return drawable(material) and not diagram_marks(material)


def diagram_marks(material: Material) -> tuple[Mark, ...]:
    """Where the diagram's range is left; its limit on yield is that of the yield plateau."""
    if material.yielding != "discontinuous" or material.drawn_from is not None:
        return ()
    return OPTION_1.marks({"σ_Y": material.yield_strength})


def fracture_for(case: Case) -> str:
    """The criterion stated, or the diagram where none is and it can be drawn."""
    stated = case.criteria.fracture or "diagram"
    return stated if has_diagram(case.material) else "toughness"


def toughness_of(model: ToughnessModel, case: Case, where: str) -> ToughnessResult:
    """Toughness under the case's conditions; refused where a model has no temperature."""
    try:
        found = toughness(model, conditions_of(case))
    except TemperatureMissing:
        why = f"this is needed by {where}, which depends on temperature, and missing."
        raise CaseRefused("loading.temperature_c", why) from None
    if not np.isfinite(found.value):
        raise CaseRefused(where, "this correlation gives no toughness for this energy and yield.")
    if case.material.zone is None:
        return found
    steps = (replace(s, step=f"{s.step} ({case.material.zone})") for s in found.working)
    return replace(found, working=tuple(steps))


def conditions_of(case: Case) -> Conditions:
    """What toughness is read at. The front is that of the size measured: its growth is not
    followed in the toughness."""
    material, crack, body = case.material, case.crack, case.body
    return Conditions(
        temperature=case.loading.temperature,
        elastic_modulus=material.elastic_modulus,
        poisson=material.poisson,
        yield_strength=material.yield_strength,
        thickness=body.get("thickness", body.get("diameter")),
        front=None if crack.kind.through else _front_length(crack.kind.name, crack),
        rate=case.loading.rate,
    )


def _front_length(kind: str, crack: Crack) -> float | None:
    """Length in m of an elliptical front: a quarter (corner), a half, or the whole (embedded)."""
    if crack.depth is None or crack.length is None:
        return None
    corner, inner = "corner" in kind, "embedded" in kind
    a = crack.depth / 2.0 if inner else crack.depth
    c = crack.length if corner else crack.length / 2.0
    small, large = sorted((a, c))
    whole = 4.0 * large * float(ellipe(1.0 - (small / large) ** 2))
    return whole * (0.25 if corner else 1.0 if inner else 0.5)


def scaled(block: CycleBlock, factor: float) -> CycleBlock:
    """A cycle block with all its stresses multiplied."""
    maxima = block.maxima
    if maxima is not None:
        maxima = {name: factor * value for name, value in maxima.items()}
    ranges = {name: factor * value for name, value in block.ranges.items()}
    return replace(block, ranges=ranges, maxima=maxima)


def loads_for(corner: Corner, loads: Loads) -> Loads:
    """The loads as the corner's kind takes them.

    A through crack takes membrane stress alone. What bends the wall then counts as membrane at
    its outer-fibre value, which nowhere along the front is less than what truly acts there.
    """
    names = [key.rpartition("_")[0] for key in corner.kind.load_keys]
    names.extend(corner.kind.residual_names.values())
    if corner.became:
        # What bent the wall, not what bends the plate in its own plane.
        names = [name for name in names if name != "bending"]
    if corner.kind.profile_over is not None and not corner.became:
        names.extend(name for name in loads if name.startswith(parts.PROFILE))
    if all(name in names for name in loads):
        return loads
    extra = sum(
        abs(value) * _most(name, corner) for name, value in loads.items() if name not in names
    )
    return {name: loads.get(name, 0.0) + (extra if name == "membrane" else 0.0) for name in names}


def _most(name: str, corner: Corner) -> float:
    """The largest stress of a profile in MPa; 1 for a load that is in MPa itself."""
    if not name.startswith(parts.PROFILE):
        return 1.0
    return float(max(abs(stress) for _, stress in corner.body["profiles"][name]))


def arrays(loads: Loads) -> dict[str, Floats]:
    """Loads as the kinds take them."""
    return {name: np.asarray(value, dtype=float) for name, value in loads.items()}


def estimate(look: Look, corner: Corner) -> Estimate:
    """Stress intensity and failure of one size at the peak load. ``corner`` is not broken."""
    loads = arrays(loads_for(corner, look.peak))
    kind, x, body = corner.kind, corner.x, corner.body
    k = np.asarray(kind.stress_intensity(x, loads, body), dtype=float)
    given = (kind, x, loads, body, look.material, look.toughness)
    held = arrays(loads_for(corner, look.residual)) if look.residual else {}
    point, unsettled = assess_point(*given, look.fracture, held), None
    alone = look.fracture == "toughness" and not point.load_ratio < TOUGHNESS_ALONE_BELOW
    if look.decides and alone:
        if look.has_diagram:
            point = assess_point(*given, "diagram", held)
        else:
            unsettled = _unsettled(look.material, point.load_ratio)
    residual_k = np.zeros_like(k)
    if held:
        residual_k = np.asarray(kind.stress_intensity(x, held, body), dtype=float)
    marks = (*kind.marks(x, body), *_interaction_marks(point, k, residual_k))
    return Estimate(corner, k, point, marks, unsettled, residual_k)


def _interaction_marks(point: Point, k: Floats, residual_k: Floats) -> tuple[Mark, ...]:
    """Where the term for residual stress and yielding is used outside its range."""
    opened = (k > 0.0) & (residual_k > 0.0)
    if point.fracture != "diagram" or not np.any(opened):
        return ()
    chi = np.max(np.where(opened, residual_k, 0.0) / np.where(opened, k, 1.0)) * point.load_ratio
    return RHO.marks({"χ": float(chi)})


def _unsettled(material: Material, load_ratio: float) -> str:
    why = "material.yielding is missing"
    if material.yielding is not None:
        why = " ".join(mark.sentence() for mark in diagram_marks(material))
    return (
        f"The load ratio is {load_ratio:.3g}, where the diagram is needed (from "
        f"{TOUGHNESS_ALONE_BELOW:g} on), and it cannot be used: {why}."
    )
