"""The computation: from a case document to an outcome. Imports nothing of the web application.

This door is all that the application may import:

assess(document) -> outcome     one case as dict, text or bytes; CaseRefused where it cannot be
read_case(document) -> Case     the same checks, nothing computed
outcome_text(outcome) -> str    the outcome's one exact text
CaseRefused                     ``where`` is the key, ``why`` the sentence
ENGINE                          name and version that every outcome carries
chapters() -> tuple             every relation computed with: range, source, accuracy, witness
how_sure(document)              how much worse inputs may be, and what to measure next
tensile_summary(material)       proof stress, ultimate strength and energy of a tensile curve
KINDS                           the crack kinds computed here, by their plain names (each a Kind)
"""

from assessment.document import Case, CaseRefused, read_case
from assessment.document.tensile import tensile_summary
from assessment.document.writing import outcome_text
from assessment.engine import ENGINE
from assessment.how_sure import HowSure, how_sure
from assessment.kinds import KINDS, Kind
from assessment.methods import Chapter, chapters
from assessment.procedure import assess

__all__ = [
    "ENGINE",
    "KINDS",
    "Case",
    "CaseRefused",
    "Chapter",
    "HowSure",
    "Kind",
    "assess",
    "chapters",
    "how_sure",
    "outcome_text",
    "read_case",
    "tensile_summary",
]
