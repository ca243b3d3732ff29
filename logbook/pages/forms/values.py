"""Values by name, each with its source: how a basis or a material is typed.

A name is a path, such as ``loading.peak.membrane_mpa`` or ``loading.cycles.1.per_usage``; its
ending carries the unit. What is left empty is left out: nothing is filled in for anybody.
"""

import json
import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from decimal import Decimal
from typing import Any

from django.utils.translation import gettext as _
from django.utils.translation import gettext_lazy

from logbook.cases.basis import asked_by
from logbook.errors import invalid
from logbook.records.case_lines import UNITS

NUMBER = re.compile(r"-?\d+(?:[.,]\d+)?(?:[eE][-+]?\d+)?")
NAME = re.compile(r"[a-z0-9][a-z0-9_.-]{0,119}")
SPARE = 4
MOST = 400

CRITERIA = (
    "fracture",
    "load_reserve",
    "life_factor",
    "size_confidence_sd",
    "longest_interval_days",
    "shortest_interval_days",
    "failure_probability",
    "surprise",
)
# What a value may be, for names whose value is a word or needs a word of care.
HINTS = {
    "yielding": gettext_lazy("continuous or discontinuous"),
    "typical": gettext_lazy("yes: handbook values, never for acceptance; or no"),
    "toughness.model": gettext_lazy(
        "fixed, by-temperature, energy-release, charpy or master-curve"
    ),
    "growth.law": gettext_lazy("paris, two-stage or walker"),
    "growth.c": gettext_lazy("m/cycle with ΔK in MPa√m"),
    "bounding.stands_for": gettext_lazy("such as: lowest of three tests; mean plus two deviations"),
    "loading.residual": gettext_lazy(
        "none: and why there is none. Where there is some, leave this empty and name "
        "loading.residual.membrane_mpa, or loading.residual.level (as-welded, "
        "heat-treated-along, heat-treated-across) with loading.residual.source, below"
    ),
    "loading.temperature_c": gettext_lazy("lowest metal temperature at which the peak can occur"),
    "per_usage": gettext_lazy("cycles per count of the counter"),
    "body.ends": gettext_lazy("free to rotate, or held: write free or held"),
    "body.held_length_mm": gettext_lazy(
        "between the two sections that held ends keep parallel; left empty, held ends are referred"
    ),
    "body.table": gettext_lazy("[[depth in mm, geometry factor], …]"),
    "criteria.fracture": gettext_lazy("diagram, or toughness"),
    "criteria.load_reserve": gettext_lazy("factor on load that must remain"),
    "criteria.life_factor": gettext_lazy("life is divided by it; common practice: at least 2"),
    "criteria.size_confidence_sd": gettext_lazy("deviations of the sizing error that are added"),
    "owner.allows_restriction": gettext_lazy("yes or no"),
    "owner.leak_tolerated": gettext_lazy("yes or no"),
    "depth_ratio.value": gettext_lazy(
        "depth taken as this part of the length, where only that is seen"
    ),
    "separation.least_mm": gettext_lazy("the least metal between two cracks at this place"),
    "could_miss.source": gettext_lazy("where it comes from that a look may miss this much"),
}
MATERIAL = (
    "yield_mpa",
    "ultimate_mpa",
    "elastic_modulus_mpa",
    "poisson",
    "yielding",
    "typical",
    "toughness.model",
    "toughness.k_mat_mpa_sqrt_m",
    "growth.law",
    "growth.c",
    "growth.m",
    "growth.threshold_mpa_sqrt_m",
    "bounding.stands_for",
    "bounding.toughness.model",
    "bounding.toughness.k_mat_mpa_sqrt_m",
    "bounding.growth.law",
    "bounding.growth.c",
    "bounding.growth.m",
    "bounding.growth.threshold_mpa_sqrt_m",
)


def names_for(kind: str) -> tuple[str, ...]:
    """The names that a basis for this kind of crack asks for."""
    body, loads = asked_by(kind)
    return (
        *(f"body.{name}" for name in body),
        *(f"loading.peak.{load}" for load in loads),
        "loading.residual",
        "loading.temperature_c",
        *(f"loading.cycles.1.{_range_of(load)}" for load in loads),
        "loading.cycles.1.stress_ratio",
        "loading.cycles.1.per_usage",
        *(f"criteria.{name}" for name in CRITERIA),
        "owner.allows_restriction",
        "depth_ratio.value",
        "depth_ratio.source",
        "separation.least_mm",
        "separation.source",
        "could_miss.depth_mm",
        "could_miss.length_mm",
        "could_miss.source",
    )


def _range_of(load: str) -> str:
    """membrane_mpa → membrane_range_mpa."""
    name, _unit, unit = load.rpartition("_")
    return f"{name}_range_{unit}"


@dataclass
class Row:
    number: int
    name: str
    value: str = ""
    source: str = ""
    said: list[str] = field(default_factory=list)

    @property
    def unit(self) -> str:
        """By the ending of the name, as the case document has it."""
        last = self.name.rsplit(".", 1)[-1]
        return next((unit for ending, unit in UNITS if _ends(last, ending)), "")

    @property
    def label(self) -> str:
        """ "loading, peak, membrane": the path in words, without the unit's ending."""
        name = self.name
        for ending, unit in UNITS:
            if unit == self.unit and _ends(name.rsplit(".", 1)[-1], ending):
                name = name[: -len(ending)]
                break
        return ", ".join(part.replace("_", " ") for part in name.split("."))

    @property
    def hint(self) -> str:
        """What the value may be, by the end of its name."""
        fits = (hint for end, hint in HINTS.items() if f".{self.name}".endswith(f".{end}"))
        return str(next(fits, ""))

    @property
    def spare(self) -> bool:
        """A row whose name is typed too."""
        return not self.name


class Values:
    """The rows as typed, to be shown again and to be read."""

    def __init__(self, rows: Sequence[Row], sourced: bool = True) -> None:
        self.rows = list(rows)
        self.sourced = sourced

    @classmethod
    def of(
        cls, names: Sequence[str], body: Mapping[str, Any], sources: Mapping[str, str]
    ) -> "Values":
        """What is there already, then the names that are asked for, then a few spare rows."""
        have = {name: _text(value) for name, value in leaves(body)}
        order = [*have, *(name for name in names if name not in have)]
        rows = [
            Row(number, name, have.get(name, ""), _source(name, sources) if name in have else "")
            for number, name in enumerate(order)
        ]
        return cls([*rows, *(Row(len(rows) + n, "") for n in range(SPARE))])

    @classmethod
    def posted(cls, data: Mapping[str, Any]) -> "Values":
        rows = []
        for number in range(MOST):
            if f"name-{number}" not in data:
                break
            rows.append(
                Row(
                    number,
                    data[f"name-{number}"].strip(),
                    data.get(f"value-{number}", "").strip(),
                    data.get(f"source-{number}", "").strip(),
                )
            )
        typed = [row for row in rows if row.name or row.value or row.source]
        numbered = [Row(n, row.name, row.value, row.source) for n, row in enumerate(typed)]
        return cls([*numbered, *(Row(len(typed) + n, "") for n in range(SPARE))])

    def body(self) -> dict[str, Any]:
        """The values as a nested mapping. Raises Refusal where a name cannot be one."""
        body: dict[str, Any] = {}
        for row in self.rows:
            if row.value:
                self._put(body, row)
        wrong = {row.name or "name": row.said for row in self.rows if row.said}
        if wrong:
            raise invalid(_("Some of these names do not fit."), wrong)
        return _lists(body)

    def _put(self, body: dict[str, Any], row: Row) -> None:
        if not NAME.fullmatch(row.name):
            row.said.append(_("Give the value its name, such as body.thickness_mm."))
            return
        *path, last = row.name.split(".")
        at = body
        for part in path:
            at = at.setdefault(part, {})
            if not isinstance(at, dict):
                row.said.append(_("Another row has already given this a value."))
                return
        at[last] = value_of(row.value)

    def sources(self) -> dict[str, str]:
        return {row.name: row.source for row in self.rows if row.name and row.source and row.value}

    def show(self, fields: Mapping[str, Sequence[str]]) -> list[str]:
        """The sentences of a refusal at their rows; the rest come back."""
        by_name = {row.name: row for row in self.rows if row.name}
        left: list[str] = []
        for name, sentences in fields.items():
            row = by_name.get(name) or by_name.get(name.split(".", 1)[-1])
            if row is None:
                left += [f"{Row(0, name).label}: {one}" for one in sentences]
            elif not row.said:
                row.said.extend(sentences)
        return left


def _source(name: str, sources: Mapping[str, str]) -> str:
    """Of the value itself, or of the part of the basis that it belongs to."""
    path = name.split(".")
    reach = (".".join(path[:length]) for length in range(len(path), 0, -1))
    return next((sources[part] for part in reach if sources.get(part)), "")


def _ends(name: str, ending: str) -> bool:
    """A constant called c is no temperature: only longer names carry a unit."""
    return name.endswith(ending) and len(name) > len(ending)


def value_of(typed: str) -> Any:
    """A number, yes or no, a list in brackets, or the words as they are."""
    if NUMBER.fullmatch(typed):
        number = Decimal(typed.replace(",", "."))
        whole = number == number.to_integral_value() and "e" not in typed.lower()
        return int(number) if whole and "." not in str(number) else number
    if typed.lower() in ("true", "yes"):
        return True
    if typed.lower() in ("false", "no"):
        return False
    if typed[:1] in "[{":
        try:
            return json.loads(typed, parse_float=Decimal)
        except ValueError:
            raise invalid(
                _("A list does not read: %(start)s …") % {"start": typed[:40]}, {}
            ) from None
    return typed


def leaves(value: Any, path: str = "") -> Iterator[tuple[str, Any]]:
    """(path, value) of everything in a body; lists of mappings are numbered from 1."""
    if isinstance(value, Mapping):
        for key, inner in value.items():
            yield from leaves(inner, f"{path}.{key}" if path else str(key))
    elif isinstance(value, list) and any(isinstance(one, Mapping) for one in value):
        for number, inner in enumerate(value, start=1):
            yield from leaves(inner, f"{path}.{number}")
    else:
        yield path, value


def _lists(value: Any) -> Any:
    """Mappings whose keys are all numbers become lists again."""
    if not isinstance(value, dict):
        return value
    inner = {key: _lists(one) for key, one in value.items()}
    if inner and all(key.isdecimal() for key in inner):
        return [inner[key] for key in sorted(inner, key=int)]
    return inner


def _text(value: Any) -> str:
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, list):
        return json.dumps(value, default=float)
    return str(value)
