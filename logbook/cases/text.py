"""One exact text of a case: keys in order, numbers as typed, no float in between."""

import datetime
import json
from decimal import Decimal
from hashlib import sha256
from typing import Any


def exact(value: Any) -> str:
    """Canonical JSON text. Decimals become JSON numbers digit for digit (8.4 stays 8.4).

    Raises TypeError for a float or any other type without an exact text.
    """
    if value is None or isinstance(value, bool | str | int):
        return json.dumps(value, ensure_ascii=False)
    if isinstance(value, Decimal):
        if not value.is_finite():
            raise TypeError(f"{value} is no number for a case")
        plain = f"{value:f}"
        return plain.rstrip("0").rstrip(".") if "." in plain else plain
    if isinstance(value, datetime.date):
        return json.dumps(value.isoformat())
    if isinstance(value, dict):
        parts = (f"{json.dumps(key)}:{exact(value[key])}" for key in sorted(value))
        return "{" + ",".join(parts) + "}"
    if isinstance(value, list | tuple):
        return "[" + ",".join(exact(part) for part in value) + "]"
    raise TypeError(f"{type(value).__name__} has no exact text in a case")


def read(text: str) -> Any:
    """The inverse: numbers with a decimal point come back as Decimal."""
    return json.loads(text, parse_float=Decimal)


def digest(text: str) -> str:
    return sha256(text.encode("utf-8")).hexdigest()
