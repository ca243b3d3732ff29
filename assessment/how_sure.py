"""By how much each input may be worse before the verdict changes, and what to measure next."""

from dataclasses import dataclass, replace
from typing import Any

import numpy as np

from assessment.document import Case, read_case
from assessment.forecast.sensitivity import Margin, margins, measure_next, sentence
from assessment.procedure import compute


@dataclass(frozen=True)
class HowSure:
    """margins : each input with its factor; next : one sentence, None where no interval is given"""

    margins: tuple[Margin, ...]
    next: str | None


def how_sure(document: str | bytes | dict[str, Any]) -> HowSure:
    """Decides the case anew at worse and at better inputs: some thirty times the work of one.

    The bounding look alone decides here; the forecast, which can only be stricter, is left out.
    """
    case = replace(read_case(document), uncertainty=None)
    _, days = _decided(case)
    found = margins(case, _decided)
    if days is None:
        return HowSure(found, None)
    return HowSure(found, sentence(days, measure_next(case, _decided)))


def _decided(case: Case) -> tuple[str, float | None]:
    with np.errstate(all="ignore"):
        found = compute(case)
    days = None if found.next is None else float(found.next.days)
    return found.decision.verdict, days
