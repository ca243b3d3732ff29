"""A case as a list of lines: what it was reckoned from, each value with its unit and source."""

from collections.abc import Iterator, Mapping, Sequence
from typing import Any

from .content import Line

PARTS = ("crack", "body", "material", "loading", "usage", "criteria", "owner")
# Endings of the document's keys, longest first, and the units that they stand for.
UNITS = (
    ("_mpa_sqrt_m", "MPa√m"),
    ("_kj_per_m2", "kJ/m²"),
    ("_mpa", "MPa"),
    ("_days", "days"),
    ("_mm", "mm"),
    ("_kn", "kN"),
    ("_c", "°C"),
    ("_j", "J"),
    ("_sd", "standard deviations"),
)
LONGEST = 160


def case_lines(case: Mapping[str, Any], sources: Mapping[str, str]) -> tuple[Line, ...]:
    """sources : path of a key ("material.yield_mpa") → where the value is from. A source of a
    whole part ("material") counts for every key in it that has none of its own."""
    lines = []
    for part in PARTS:
        if part in case:
            for path, value in _leaves((part,), case[part]):
                lines.append(_line(path, value, sources))
    return tuple(lines)


def _leaves(path: tuple[str, ...], value: Any) -> Iterator[tuple[tuple[str, ...], Any]]:
    """Values with their paths; lists of numbers stay whole, lists of mappings are numbered."""
    if isinstance(value, Mapping):
        for key, inner in value.items():
            yield from _leaves((*path, str(key)), inner)
    elif _is_list(value) and any(isinstance(one, Mapping) for one in value):
        for n, inner in enumerate(value, start=1):
            yield from _leaves((*path, str(n)), inner)
    else:
        yield path, value


def _line(path: tuple[str, ...], value: Any, sources: Mapping[str, str]) -> Line:
    source = ""
    for reach in range(len(path), 0, -1):
        source = sources.get(".".join(path[:reach]), "")
        if source:
            break
    key, unit = path[-1], ""
    # "growth.c" is a constant of a law, not a temperature: only longer names carry a unit.
    for ending, name in UNITS:
        if key.endswith(ending) and len(key) > len(ending):
            key, unit = key[: -len(ending)], name
            break
    label = ", ".join(part.replace("_", " ") for part in (*path[:-1], key))
    return Line(label, f"{_text(value)} {unit}".strip(), said=True, source=source)


def _text(value: Any) -> str:
    if value is None:
        return "none"
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, float):
        return f"{value:.6g}"
    if _is_list(value):
        text = "; ".join(_text(one) for one in value)
        return text if len(text) <= LONGEST else f"{len(value)} entries: see case.json"
    return str(value)


def _is_list(value: Any) -> bool:
    return isinstance(value, Sequence) and not isinstance(value, str)
