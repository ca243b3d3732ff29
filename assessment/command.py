"""``manage.py assess CASE.json``: the computation at a command line, with nothing of the web.

JSON alone on standard output. Exit status 0: all answered; 2: a case was refused (its place holds
``{"error": {"where": …, "why": …}}``), or the file cannot be read (said on standard error).
"""

import sys
from typing import IO, Any

from assessment import CaseRefused, assess, outcome_text
from assessment.document.reading import read_cases

USAGE = (
    "usage: manage.py assess CASE.json   (one case or a list of cases; '-' reads standard input)"
)


def run(
    arguments: list[str],
    standard_input: IO[bytes] | None = None,
    output: IO[bytes] | None = None,
    errors: IO[str] | None = None,
) -> int:
    """Answer the file named by the one argument; the exit status. Writes UTF-8 in any locale."""
    output, errors = output or sys.stdout.buffer, errors or sys.stderr
    if arguments in (["-h"], ["--help"]):
        print(USAGE, file=errors)
        return 0
    if len(arguments) != 1:
        print(USAGE, file=errors)
        return 2
    try:
        document = _read(arguments[0], standard_input or sys.stdin.buffer)
    except OSError as error:
        print(f"{arguments[0]}: {error.strerror or error}", file=errors)
        return 2
    answer, status = answered(document)
    output.write(outcome_text(answer).encode("utf-8") + b"\n")
    output.flush()
    return status


def _read(name: str, standard_input: IO[bytes]) -> bytes:
    if name == "-":
        return standard_input.read()
    with open(name, "rb") as file:
        return file.read()


def answered(document: bytes) -> tuple[Any, int]:
    """The outcome or list of outcomes, and the exit status."""
    try:
        cases = read_cases(document)
    except CaseRefused as refused:
        return refused.as_error(), 2
    if isinstance(cases, dict):
        outcome = _one(cases)
        return outcome, 2 if "error" in outcome else 0
    outcomes = [_one(case) for case in cases]
    return outcomes, 2 if any("error" in outcome for outcome in outcomes) else 0


def _one(case: Any) -> dict[str, Any]:
    try:
        if not isinstance(case, dict):
            raise CaseRefused("case", "an object is needed for each case.")
        return assess(case)
    except CaseRefused as refused:
        return dict(refused.as_error())
