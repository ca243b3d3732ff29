"""The figures of one crack or place as the book has them: rows in, figures out."""

import json
from collections.abc import Iterable, Mapping
from datetime import date
from decimal import Decimal
from typing import Any

from logbook.models import Assessment, Crack, Disposition, Finding, Measurement, Verdict

from .diagram import diagram_figure
from .drawing import Figure
from .from_outcome import diagram_story, section_story, size_story
from .section import section_figure
from .size_usage import Look, size_figure
from .words import counts

TWO_SIDED_95 = 1.959964  # standard normal, 97.5 %


def figures_of(
    crack: Crack,
    assessment: Assessment | None,
    *,
    disposition: Disposition | None = None,
    binds: tuple[date | None, Decimal | None] | None = None,
    decimal_sign: str = ".",
    up_to: int | None = None,
) -> tuple[Figure, ...]:
    """Size against usage, the diagram, the crack to scale: those that there are numbers for.

    disposition : what is in force, where it is signed: its date and counter are drawn
    binds : date and counter that bind now, where they are not the proposal's own
    up_to : index of the last leaf that counts, for a record or a past day
    """
    case = _document(assessment.case_text if assessment else None)
    outcome = _document(assessment.outcome_text if assessment else None)
    what = str(crack).capitalize()
    binding = disposition or assessment
    component = crack.component
    figures = []
    measured = measurements(crack, up_to=up_to)
    if measured:
        of = drawn_size(measured)
        sizing = _sizing(assessment)
        until_on, until_at = _next_look(binding) if binds is None else binds
        story = size_story(
            what=what,
            counter=counts(component.counter_unit),
            per_day=float(component.per_day),
            looks=[look_of(one, of, sizing) for one in measured],
            of=of,
            case=case,
            outcome=outcome,
            signed=disposition is not None,
            next_on=until_on,
            next_usage=None if until_at is None else float(until_at),
            no_growth_why="No growth is reckoned here; the reasons say why.",
            decimal_sign=decimal_sign,
        )
        figures.append(size_figure(story))
    if case and outcome:
        diagram = diagram_story(what=what, case=case, outcome=outcome, decimal_sign=decimal_sign)
        section = section_story(what=what, case=case, outcome=outcome, decimal_sign=decimal_sign)
        figures += [diagram_figure(diagram)] if diagram else []
        figures += [section_figure(section)] if section else []
    return tuple(figures)


def _next_look(
    binding: Assessment | Disposition | None,
) -> tuple[date | None, Decimal | None]:
    """A part that is out of use waits for a decision, not for a look."""
    if binding is None or binding.verdict in (Verdict.REFER, Verdict.WITHDRAW):
        return None, None
    return binding.until_on, binding.until_at


def measurements(crack: Crack, *, up_to: int | None = None) -> list[Measurement]:
    """All sizes of a crack, struck ones too, oldest first."""
    rows = Measurement.objects.filter(crack=crack).select_related(
        "finding__inspection", "finding__strike_out", "finding__leaf"
    )
    if up_to is not None:
        rows = rows.filter(finding__leaf__index__lte=up_to)
    return sorted(rows, key=lambda one: (one.finding.inspection.found_on, one.pk))


def drawn_size(measured: Iterable[Measurement]) -> str:
    """Depth decides, so it is drawn wherever one was measured; else the length."""
    return "depth" if any(one.depth_mm is not None for one in measured) else "length"


def look_of(measurement: Measurement, of: str, sizing: Mapping[str, Mapping[str, Any]]) -> Look:
    """sizing : by method, as the basis holds it."""
    finding: Finding = measurement.finding
    inspection = finding.inspection
    size = measurement.depth_mm if of == "depth" else measurement.length_mm
    value = None if size is None else float(size)
    error = sizing.get(inspection.method)
    low = high = None
    if value is not None and error is not None and error.get(f"{of}_sd_mm") is not None:
        # Bias is how much too large the method reads on average.
        middle = value - float(error.get(f"{of}_bias_mm", 0.0))
        reach = TWO_SIDED_95 * float(error[f"{of}_sd_mm"])
        low, high = middle - reach, middle + reach
    struck = getattr(finding, "strike_out", None)
    return Look(
        usage=float(inspection.counter),
        on=inspection.found_on,
        size_mm=value,
        method=inspection.method,
        low_mm=low,
        high_mm=high,
        note=_note(measurement, of),
        struck_why="" if struck is None else struck.reason,
        entry=finding.entry_number,
    )


def _note(measurement: Measurement, of: str) -> str:
    if of == "depth" and measurement.depth_basis == "at-least":
        return "at least"
    return measurement.why_smaller


def _sizing(assessment: Assessment | None) -> Mapping[str, Mapping[str, Any]]:
    if assessment is None or assessment.basis is None:
        return {}
    errors = json.loads(assessment.basis.body).get("sizing")
    if not isinstance(errors, dict):
        return {}
    return {method: error for method, error in errors.items() if isinstance(error, dict)}


def _document(text: str | None) -> dict[str, Any]:
    return {} if text is None else json.loads(text)
