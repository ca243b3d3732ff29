"""Exactly what a signature covers: the text that is shown, and its digest."""

import json
from typing import Any

from logbook.cases.text import digest
from logbook.journal import canonical
from logbook.models import Review


def shown(review: Review) -> dict[str, Any]:
    """Everything on the page that is signed, as exact values. Page and record read this too."""
    a = review.assessment
    location = a.location
    return {
        "site": location.component.site.name,
        "component": location.component.tag,
        "component_name": location.component.name,
        "location": f"{location.number} {location.name}",
        "crack": a.crack.number if a.crack else None,
        "proposed": {
            "entry": a.entry_number,
            "verdict": str(a.verdict),
            "reasons": json.loads(a.reasons),
            "until_on": a.until_on,
            "until_at": a.until_at,
            "governed_by": a.governed_by,
            "limit": a.limit,
            "engine": a.engine,
            "case_digest": a.case_digest,
            "outcome_digest": a.outcome_digest,
        },
        "reviewed": {
            "entry": review.entry_number,
            "by": str(review.by),
            "decision": str(review.decision),
            "verdict": str(review.verdict),
            "until_on": review.until_on,
            "until_at": review.until_at,
            "limit": review.limit,
            "grounds": review.grounds,
        },
    }


def shown_text(review: Review) -> str:
    return canonical.text(shown(review))


def shown_digest(review: Review) -> str:
    """SHA-256 of the exact text: the page carries it, the signature covers it."""
    return digest(shown_text(review))
