"""The cautions that every outcome carries, and those that this case adds."""

from collections.abc import Iterator, Sequence

from assessment.document.case import Case
from assessment.failure.yielding import SMALL_PART, plane_strain_thickness, plastic_zone
from assessment.interaction import INTERACTION, Combined
from assessment.leak import Leak
from assessment.validity import Mark

ALWAYS = (
    (
        "This is a proposal. The owner's codes, the local rules and licensed practice come first, "
        "and a licensed person decides and signs."
    ),
    (
        "Holds for metals below the creep range and for cracks that open straight (mode I); "
        "an oblique crack is assessed by its projection across the stress."
    ),
    (
        "No credit is taken for stable tearing, for retardation after overloads, or for "
        "compressive residual stress."
    ),
    "Growth is by the cycles given alone: corrosion and stress corrosion are clocks of their own.",
)


def cautions(
    case: Case,
    marks: Sequence[Mark],
    became_through: bool,
    leak: Leak | None,
    yielding: Sequence[str] = (),
) -> tuple[str, ...]:
    """All cautions, the usual ones first."""
    leaking = () if leak is None else (leak.words,)
    of_case = _of_case(case, became_through)
    return tuple(dict.fromkeys((*ALWAYS, *of_case, *yielding, *leaking, *_of_marks(marks))))


def of_yielding(case: Case, k: float, toughness: float) -> Iterator[str]:
    """Plane strain and the plastic zone, for the largest K of the best estimate in MPa√m."""
    strength, wall = case.material.yield_strength, case.body.get("thickness")
    needed = plane_strain_thickness(toughness, strength)
    if wall is not None and wall < needed:
        yield (
            f"The wall of {wall * 1e3:.4g} mm is thinner than the {needed * 1e3:.4g} mm that plane "
            "strain needs at this toughness (ASTM E399): a toughness measured at another thickness "
            "need not hold here."
        )
    size = case.crack.depth or case.crack.length or 0.0
    zone = plastic_zone(k, strength, "stress") if k > 0.0 else 0.0
    if size > 0.0 and zone > SMALL_PART * size:
        yield (
            f"The metal yields over about {zone * 1e3:.3g} mm ahead of the crack (Irwin, plane "
            f"stress), more than a tenth of its size: toughness alone would not be enough here."
        )


def _of_case(case: Case, became_through: bool) -> Iterator[str]:
    crack, loading = case.crack, case.loading
    if not crack.found:
        yield f"No crack was measured here: the size assessed is assumed ({crack.source})."
    yield from _of_neighbours(crack.combined)
    if crack.depth_basis == "assumed":
        yield f"Depth assumed, not measured: {crack.depth_source}."
    if crack.depth_basis == "at most":
        yield "The depth is an upper bound, used as if it were the depth."
    if crack.length is None and crack.kind.optional_sizes:
        yield "The length was not given: the shape of the front is assumed."
    if loading.residual_said is not None:
        yield f"Residual stress, as stated: {loading.residual_said}."
    if loading.residual:
        yield (
            "The residual stress stays as it is while the crack grows and the load changes; where "
            "it would press the crack shut it is not counted on."
        )
    if loading.cycles_said is not None:
        yield f"Cycles, as stated: {loading.cycles_said}."
    if loading.temperature is None:
        yield "No metal temperature is given: the toughness is taken to hold at the lowest one."
    yield from _closed_ends(case)
    yield from _weld_toe(case)
    if case.material.typical:
        yield "Material values are typical ones from a handbook and are not for acceptance."
    if became_through:
        yield (
            "At its bounding size the crack goes through the wall and is assessed as a through "
            "crack; bending of the wall then counts as membrane stress at its outer-fibre value."
        )


def _of_neighbours(combined: Combined | None) -> Iterator[str]:
    if combined is None:
        return
    for one, why in combined.joined:
        yield f"Assessed as one crack with {one.name}: {why} ({INTERACTION.source})."
    for one, why in combined.apart:
        yield f"{one.name.capitalize()} stands apart: {why} ({INTERACTION.source})."


def _closed_ends(case: Case) -> Iterator[str]:
    """Pressure on a girth crack: the axial stress that closed ends bring is easily forgotten."""
    loads, body = case.loading.peak, case.body
    pressure = loads.get("pressure", 0.0)
    if "membrane_mpa" not in case.crack.kind.load_keys or pressure == 0.0:
        return
    bore, outer = body["inner_radius"], body["inner_radius"] + body["thickness"]
    axial = pressure * bore**2 / (outer**2 - bore**2)
    yield (
        f"The axial stress of closed ends is not implied: where the ends are closed, {axial:.4g} "
        f"MPa of the membrane stress of {loads['membrane']:g} MPa is due to the pressure."
    )


def _weld_toe(case: Case) -> Iterator[str]:
    """What the magnification at a weld toe is not: a formula for every attachment."""
    if case.crack.kind.name != "weld-toe-surface":
        return
    yield (
        "The magnification at the weld toe is for attachments on both surfaces. With one on the "
        "cracked surface alone it is up to 12 % too low in bending, and on the safe side in "
        "membrane stress."
    )
    if case.body["weld_condition"] == "as-welded":
        yield (
            "As welded the whole stress range counts: the growth law has to be one for high "
            "stress ratio (0.5 and above)."
        )


def _of_marks(marks: Sequence[Mark]) -> Iterator[str]:
    for mark in marks:
        yield f"Outside its published range: {mark.sentence()}"
