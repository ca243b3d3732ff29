"""Text of a case document → plain lists and dicts, read strictly.

JSON as commonly read forgives too much: of two equal keys the last wins, NaN and 1e999 pass as
numbers, and a page of brackets overflows the stack. Each of these is refused here by its key, so
that nothing further in has to think of them.
"""

import json
import math
from typing import Any

from assessment.document.refusal import CaseRefused

LARGEST_BYTES = 1_000_000
LARGEST_LIST_BYTES = 100 * LARGEST_BYTES
DEEPEST = 12


class _Object(dict[str, Any]):
    """A JSON object that remembers which of its keys came twice."""

    twice: str | None = None


def _object(pairs: list[tuple[str, Any]]) -> _Object:
    found = _Object()
    for key, value in pairs:
        if key in found and found.twice is None:
            found.twice = key
        found[key] = value
    return found


def read_json(document: str | bytes | dict[str, Any] | list[Any]) -> Any:
    """The document as lists, dicts, text, numbers, true, false and null.

    Takes UTF-8 bytes, text, or what is already lists and dicts (which is written out and read
    again, so that there is one way in). Raises CaseRefused: over 1 MB, not JSON, deeper than
    12 levels, a key given twice, a number that is not finite, text that UTF-8 cannot hold.
    """
    if isinstance(document, _Object):
        value: Any = document
        _text(document, LARGEST_BYTES)
    else:
        value = _parse(_text(document, LARGEST_BYTES))
    _check(value, "", 1)
    return value


def read_cases(document: bytes) -> list[Any] | dict[str, Any]:
    """One case, or a list of cases, each still to be read with ``read_json``."""
    found: Any = _parse(_text(document, LARGEST_LIST_BYTES))
    if isinstance(found, list | dict):
        return found
    raise CaseRefused("case", "a case, or a list of cases, is needed.")


def _parse(text: str) -> Any:
    try:
        return json.loads(text, object_pairs_hook=_object, parse_constant=float)
    except RecursionError:
        raise CaseRefused("case", _too_deep()) from None
    except ValueError as error:
        raise CaseRefused("case", f"this is not JSON: {error}.") from None


def _text(document: str | bytes | dict[str, Any] | list[Any], most: int) -> str:
    if isinstance(document, bytes):
        _check_length(len(document), most)
        try:
            return document.decode("utf-8")
        except UnicodeDecodeError as error:
            raise CaseRefused("case", f"this is not UTF-8 text: {error}.") from None
    if not isinstance(document, str):
        try:
            document = json.dumps(document)
        except RecursionError:
            raise CaseRefused("case", _too_deep()) from None
        except (TypeError, ValueError) as error:
            raise CaseRefused("case", f"this cannot be written as JSON: {error}.") from None
    _check_length(len(document.encode("utf-8", "surrogatepass")), most)
    return document


def _check_length(count: int, most: int) -> None:
    if count > most:
        raise CaseRefused("case", f"{count} bytes is over the limit of {most}.")


def _too_deep() -> str:
    return f"nested deeper than {DEEPEST} levels."


def _check(value: Any, where: str, level: int) -> None:
    if isinstance(value, dict | list) and level > DEEPEST:
        raise CaseRefused(where or "case", _too_deep())
    if isinstance(value, _Object):
        if value.twice is not None:
            raise CaseRefused(_join(where, _shown(value.twice)), "this key is given twice.")
        for key, inner in value.items():
            _check_text(key, where or "case")
            _check(inner, _join(where, _shown(key)), level + 1)
    elif isinstance(value, list):
        for index, inner in enumerate(value):
            _check(inner, f"{where}[{index}]", level + 1)
    elif isinstance(value, str):
        _check_text(value, where or "case")
    elif isinstance(value, int | float) and not is_finite(value):
        raise CaseRefused(where or "case", "this number is not finite.")


def is_finite(value: int | float) -> bool:
    """True for a number that a double can hold."""
    try:
        return math.isfinite(float(value))
    except OverflowError:
        return False


def _check_text(text: str, where: str) -> None:
    # A lone surrogate or a null character passes JSON, but no database and no page can hold it.
    try:
        text.encode("utf-8")
    except UnicodeEncodeError:
        raise CaseRefused(where, "this text holds a character that UTF-8 cannot write.") from None
    if "\0" in text:
        raise CaseRefused(where, "this text holds a null character.")


def _join(where: str, key: str) -> str:
    return f"{where}.{key}" if where else key


def _shown(key: str) -> str:
    shown = key.encode("ascii", "backslashreplace").decode("ascii")
    return shown if len(shown) <= 60 else shown[:57] + "..."
