"""``{{ assessment|reasons }}``: the sentences that a proposal gives for itself."""

import json

from django import template

from logbook.models import Assessment

register = template.Library()


@register.filter
def reasons(assessment: Assessment) -> list[str]:
    return [str(sentence) for sentence in json.loads(assessment.reasons)]
