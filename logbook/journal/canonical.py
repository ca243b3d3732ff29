"""One exact byte form: sorted keys, no spaces, UTF-8, and numbers that cannot drift.

Decimals are written as strings, as they were typed; floating numbers are refused, since their
text depends on who prints them.
"""

import datetime
import decimal
import json
import uuid
from typing import Any


def _plain(value: Any) -> Any:
    if value is None or isinstance(value, bool | str | int):
        return value
    if isinstance(value, decimal.Decimal):
        return str(value)
    if isinstance(value, datetime.datetime):
        if value.tzinfo is None:
            raise TypeError("a time in the journal needs its offset")
        return value.astimezone(datetime.UTC).isoformat(timespec="microseconds")
    if isinstance(value, datetime.date):
        return value.isoformat()
    if isinstance(value, uuid.UUID):
        return str(value)
    if isinstance(value, dict):
        if not all(isinstance(key, str) for key in value):
            raise TypeError("keys in the journal are text")
        return {str(key): _plain(part) for key, part in value.items()}
    if isinstance(value, list | tuple):
        return [_plain(part) for part in value]
    raise TypeError(f"{type(value).__name__} has no exact form in the journal")


def text(value: Any) -> str:
    """The canonical JSON text. TypeError for a float, a naive time or an unknown type."""
    return json.dumps(_plain(value), sort_keys=True, separators=(",", ":"), ensure_ascii=False)


def to_bytes(value: Any) -> bytes:
    return text(value).encode("utf-8")
