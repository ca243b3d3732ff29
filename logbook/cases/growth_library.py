"""Published growth laws as library entries: typical values to start from, not for acceptance."""

import json
from dataclasses import dataclass
from decimal import Decimal
from functools import cache
from pathlib import Path
from typing import Any

from django.conf import settings

FILE = Path(settings.BASE_DIR) / "fixtures/growth-laws.json"


@dataclass(frozen=True)
class TypicalLaw:
    """law : as in the case document; range : in words; record : the check value copied from"""

    id: str
    name: str
    stands_for: str
    law: dict[str, Any]
    range: str
    source: str
    how: str
    record: str
    note: str

    @property
    def words(self) -> str:
        """The constants, in the units of the case document."""
        return ", ".join(f"{key} = {value}" for key, value in self.law.items() if key != "law")

    def material(self) -> dict[str, Any]:
        """The start of a material: its growth law, and that its values are typical ones."""
        return {"growth": dict(self.law), "typical": True}


@cache
def typical_laws() -> tuple[TypicalLaw, ...]:
    """All of them, in the order of the file."""
    read = json.loads(FILE.read_text("utf-8"), parse_float=Decimal)
    return tuple(TypicalLaw(**one) for one in read)


def typical_law(key: str) -> TypicalLaw | None:
    """One by its id, or None."""
    return next((one for one in typical_laws() if one.id == key), None)
