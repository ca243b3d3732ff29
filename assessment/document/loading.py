"""Reads ``loading``: the peak load, what is said of residual stress, and the cycles."""

from typing import Any

from assessment.document.case import Loading, Missing
from assessment.document.fields import Fields
from assessment.document.profile import Profiles
from assessment.document.refusal import CaseRefused
from assessment.document.stress_history import KEYS, read_history_cycles
from assessment.growth import CycleBlock
from assessment.kinds.base import Kind
from assessment.toughness import RATES

CYCLE_BINS = 200
# A cycle may exceed the peak by what rounding in a decimal document can make of equal numbers.
PEAK_SLACK = 1e-9

_KEYS = ("peak", "residual", "cycles", "temperature_c", "rate", "reducible_part", "cycles_fall")


def read_loading(
    value: Any, profiles: Profiles, yield_strength: float, missing: list[Missing]
) -> Loading:
    """The loading section; residual stress or cycles that are not there go to ``missing``.

    profiles : takes up the stress profiles that are given

    Two keys are ours: ``reducible_part`` (0 to 1) is the part of the peak load that a limiter can
    take away, ``cycles_fall`` says that the cycles fall in the same proportion as the peak.
    """
    loading = Fields("loading", value, _KEYS)
    peak = _peak(loading, profiles)
    cycles, cycles_said = _cycles(loading, profiles, peak, missing)
    said, residual = _residual(loading, profiles, yield_strength, missing)
    return Loading(
        peak=peak,
        cycles=cycles,
        cycles_said=cycles_said,
        residual_said=said,
        residual=residual,
        temperature=loading.number_or_none("temperature_c", least=-273.15),
        rate=loading.choice("rate", RATES) if "rate" in loading else None,
        reducible=loading.number_or_none("reducible_part", above=0.0, most=1.0),
        cycles_fall=loading.flag("cycles_fall", False),
    )


def load_name(key: str) -> str:
    """``membrane_mpa`` → ``membrane``."""
    return key.rpartition("_")[0]


def with_word(key: str, word: str) -> str:
    """``membrane_mpa``, ``range`` → ``membrane_range_mpa``."""
    name, _, unit = key.rpartition("_")
    return f"{name}_{word}_{unit}"


def _peak(loading: Fields, profiles: Profiles) -> dict[str, float]:
    kind = profiles.kind
    peak = Fields(loading.path("peak"), loading.raw("peak"), (*kind.load_keys, "profile"))
    profile = profiles.read(peak)
    if not profile and not any(key in peak for key in kind.load_keys):
        raise CaseRefused(peak.where, f"one of {', '.join(kind.load_keys)} is needed.")
    named = {load_name(key): peak.number_or_none(key) or 0.0 for key in kind.load_keys}
    return named | profile


def _residual(
    loading: Fields, profiles: Profiles, yield_strength: float, missing: list[Missing]
) -> tuple[str | None, dict[str, float]]:
    """What is said of it, and its stresses by the kind's own load names."""
    if "residual" not in loading:
        why = 'residual stress is missing; where there is none, write "none: " and why.'
        missing.append(Missing(loading.path("residual"), why))
        return None, {}
    said = loading.says_none("residual")
    if said is not None:
        return said, {}
    keys = ("membrane_mpa", "bending_mpa", "level", "source", "profile")
    fields = Fields(loading.path("residual"), loading.values["residual"], keys)
    kind, profile = profiles.kind, profiles.read(fields)
    if profile:
        for key in ("membrane_mpa", "bending_mpa", "level"):
            if key in fields:
                raise fields.refuse(key, "give either this or a profile, not both.")
        return fields.text_or_none("source") or "as given", profile
    if "level" in fields:
        return _level(fields, kind, yield_strength, missing)
    if "membrane_mpa" not in fields and "bending_mpa" not in fields:
        raise fields.refuse(
            "membrane_mpa", "membrane_mpa, bending_mpa, a level or a profile is needed."
        )
    given = {name: fields.number_or_none(f"{name}_mpa") or 0.0 for name in ("membrane", "bending")}
    source = fields.text_or_none("source")
    return source or "as given", _for_kind(fields, kind, given, missing)


# BS 7910:2013, 7.1.8 (from memory): yield magnitude as welded; after heat treatment 30 % of yield
# along the weld and 20 % across it.
RESIDUAL_LEVELS = {
    "as-welded": (1.0, "yield magnitude, as welded"),
    "heat-treated-along": (0.3, "30 % of yield, heat treated, stress along the weld"),
    "heat-treated-across": (0.2, "20 % of yield, heat treated, stress across the weld"),
}


def _level(
    fields: Fields, kind: Kind, yield_strength: float, missing: list[Missing]
) -> tuple[str, dict[str, float]]:
    """A level of the standard, chosen by name and never silent: a membrane stress."""
    for key in ("membrane_mpa", "bending_mpa"):
        if key in fields:
            raise fields.refuse(key, "give either stresses or a level, not both.")
    part, words = RESIDUAL_LEVELS[fields.choice("level", tuple(RESIDUAL_LEVELS))]
    source = fields.text("source")
    given = {"membrane": part * yield_strength, "bending": 0.0}
    return f"{words} (BS 7910:2013, 7.1.8); {source}", _for_kind(fields, kind, given, missing)


def _for_kind(
    fields: Fields, kind: Kind, given: dict[str, float], missing: list[Missing]
) -> dict[str, float]:
    """The stresses as the kind takes them: bending that it does not know counts as membrane."""
    names = {load_name(key) for key in kind.load_keys}
    if kind.residual_names:
        return {kind.residual_names[name]: value for name, value in given.items() if value}
    if "membrane" not in names:
        why = f"residual stress is not computed for cracks of kind {kind.name!r}."
        missing.append(Missing(fields.where, why))
        return {}
    if "bending" in names:
        return {name: value for name, value in given.items() if value}
    total = given["membrane"] + abs(given["bending"])
    return {"membrane": total} if total else {}


def _cycles(
    loading: Fields, profiles: Profiles, peak: dict[str, float], missing: list[Missing]
) -> tuple[tuple[CycleBlock, ...], str | None]:
    if "cycles" not in loading:
        why = 'the cycles are missing; where there are none, write "none: " and why.'
        missing.append(Missing(loading.path("cycles"), why))
        return (), None
    said = loading.says_none("cycles")
    if said is not None:
        return (), said
    kind = profiles.kind
    if isinstance(loading.values["cycles"], dict):
        fields = Fields(loading.path("cycles"), loading.values["cycles"], KEYS)
        return read_history_cycles(fields, kind, peak, PEAK_SLACK, CYCLE_BINS)
    keys = [with_word(key, word) for word in ("range", "max") for key in kind.load_keys]
    known = (*keys, "stress_ratio", "per_usage", "profile")
    entries = loading.objects("cycles", known, CYCLE_BINS)
    blocks = tuple(_block(entry, profiles, peak) for entry in entries)
    if not blocks:
        raise loading.refuse(
            "cycles", 'an empty list: where there are none, write "none: " and why.'
        )
    return blocks, None


def _block(entry: Fields, profiles: Profiles, peak: dict[str, float]) -> CycleBlock:
    kind, profile = profiles.kind, profiles.read(entry)
    ranges = {name: r for name, r in _by_load(entry, kind, "range", least=0.0).items() if r}
    ranges |= profile
    if not ranges:
        keys = ", ".join(with_word(key, "range") for key in kind.load_keys)
        raise CaseRefused(entry.where, f"one of {keys} is needed, above 0.")
    given = [key for key in kind.load_keys if with_word(key, "max") in entry]
    ratio = entry.number_or_none("stress_ratio", below=1.0)
    if (ratio is None) == (not given):
        words = "both are given" if given else "one of them is needed"
        raise entry.refuse("stress_ratio", f"either stress_ratio or the maxima: {words}.")
    if profile and ratio is None:
        raise entry.refuse("stress_ratio", "cycles given by a profile need their stress_ratio.")
    maxima = None if ratio is not None else _by_load(entry, kind, "max")
    for name in maxima or ():
        ranges.setdefault(name, 0.0)
    if profiles.by_name:
        _check_peak_profile(entry, profiles, peak, ranges, ratio, maxima)
    else:
        _check_peak(entry, kind, peak, ranges, ratio, maxima)
    per_usage = entry.number("per_usage", above=0.0)
    return CycleBlock(ranges=ranges, stress_ratio=ratio, maxima=maxima, per_usage=per_usage)


def _by_load(entry: Fields, kind: Kind, word: str, least: float | None = None) -> dict[str, float]:
    """The loads that are given, by name. One that is left out is nil and need not be computed."""
    given = [key for key in kind.load_keys if with_word(key, word) in entry]
    return {load_name(key): entry.number(with_word(key, word), least=least) for key in given}


def _check_peak(
    entry: Fields,
    kind: Kind,
    peak: dict[str, float],
    ranges: dict[str, float],
    ratio: float | None,
    maxima: dict[str, float] | None,
) -> None:
    for name, swing in ranges.items():
        largest = swing / (1.0 - (ratio or 0.0)) if maxima is None else maxima.get(name, 0.0)
        if largest > peak[name] + PEAK_SLACK * abs(peak[name]):
            raise entry.refuse(
                next(with_word(key, "range") for key in kind.load_keys if load_name(key) == name),
                f"the cycle's maximum of {largest:g} exceeds the peak of {peak[name]:g}.",
            )


def _check_peak_profile(
    entry: Fields,
    profiles: Profiles,
    peak: dict[str, float],
    ranges: dict[str, float],
    ratio: float | None,
    maxima: dict[str, float] | None,
) -> None:
    """Where profiles act, the stress at each of their points is what may not exceed the peak."""
    scale = 1.0 / (1.0 - (ratio or 0.0))
    largest = maxima or {name: scale * swing for name, swing in ranges.items()}
    for x in profiles.places():
        reached, most = profiles.stress(largest, x), profiles.stress(peak, x)
        if reached > most + PEAK_SLACK * max(abs(reached), abs(most)):
            raise CaseRefused(
                entry.where,
                f"the cycle's maximum of {reached:.6g} MPa at {x * 1e3:.6g} mm exceeds the peak of "
                f"{most:.6g} MPa there.",
            )
