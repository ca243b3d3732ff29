"""``{{ assessment|reasons }}``: the sentences that a proposal gives for itself.

``plain_reasons`` says the same to the crew, who need no word of the calculation's own.
"""

import json
import re

from django import template

from logbook.models import Assessment

register = template.Library()

# The longer phrase first; the last ones catch the single words.
PLAIN = (
    ("The assumed crack has no length to compare with the method's.",
     "Whether this method finds a crack here in time is not known."),
    ("The assumed crack has no depth to compare with the method's.",
     "Whether this method finds a crack here in time is not known."),
    ("bounding life divided by the life factor", "its life taken at its worst, cut for safety"),
    ("The bounding reserve on load", "The reserve on load, taken at its worst,"),
    ("At its bounding size", "At the largest size that it may have"),
    ("today's bounding size", "the largest size that it may have today"),
    ("the peak of the basis", "the largest load"),
    ("No basis is on record here:", "Nothing to reckon with is on record here:"),
    ("An engineer has to write its basis.", "An engineer has to supply it."),
    ("The basis of this place was written, and nobody has adopted it yet.",
     "What is needed to reckon here was written, and nobody has released it yet."),
    ("the basis gives no", "nobody has laid down a"),
    ("the basis does not say", "nobody has laid down"),
    ("bounding", "worst"),
    ("basis", "data on record"),
    ("criteria", "owner's limits"),
    ("disposition", "verdict"),
    ("outcome", "result"),
)  # fmt: skip
# "crack.sizing: the sizing error is missing." → what stands behind the key.
KEY = re.compile(r"^[a-z_]+(?:[.\[][a-z_0-9.\]]+)+: ")


@register.filter
def reasons(assessment: Assessment) -> list[str]:
    return [str(sentence) for sentence in json.loads(assessment.reasons)]


@register.filter
def plain_reasons(assessment: Assessment) -> list[str]:
    return [plain(sentence) for sentence in reasons(assessment)]


@register.filter
def plain(sentence: str) -> str:
    """One sentence or table cell in plain words; what has none of the words stays as it is."""
    said = KEY.sub("", sentence)
    for word, instead in PLAIN:
        said = said.replace(word, instead).replace(word.capitalize(), instead.capitalize())
    return said[:1].upper() + said[1:]
