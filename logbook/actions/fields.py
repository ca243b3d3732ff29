"""Reading the short text fields of a registration; every gap gets its sentence."""

from collections.abc import Mapping

from logbook.errors import invalid


def needed(values: Mapping[str, str], sentences: Mapping[str, str]) -> dict[str, str]:
    """The trimmed values of all named fields. Refusal with a sentence for each that is blank."""
    trimmed = {name: str(values.get(name, "")).strip() for name in sentences}
    wrong = {name: [sentences[name]] for name, value in trimmed.items() if not value}
    if wrong:
        raise invalid("Some of this is still missing.", wrong)
    return trimmed
