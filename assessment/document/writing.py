"""The outcome as its one exact text: keys in the order given, no NaN, no infinity.

Numbers are written to twelve significant digits: a size goes from mm to m and back, and the last
bits of that are noise that would make 3.3 mm read 3.3000000000000003.
"""

import json
import math
from typing import Any


def settled(value: Any) -> Any:
    """Plain JSON values with floats at twelve significant digits.

    Raises ValueError for NaN and infinity: an outcome that holds one is a fault in the
    computation, never something to print.
    """
    if isinstance(value, dict):
        return {str(key): settled(inner) for key, inner in value.items()}
    if isinstance(value, list | tuple):
        return [settled(inner) for inner in value]
    if isinstance(value, bool | str | int) or value is None:
        return value
    number = float(value)
    if not math.isfinite(number):
        raise ValueError(f"an outcome cannot hold {number}")
    return float(f"{number:.12g}") + 0.0  # + 0.0 turns -0.0 into 0.0


def outcome_text(outcome: Any) -> str:
    """The exact text of an outcome (or of a list of them): same case, same installation, same
    bytes. Ends without a line break; UTF-8 when encoded."""
    return json.dumps(outcome, ensure_ascii=False, allow_nan=False, separators=(",", ":"))
