"""What an act wrote, row by row: the leaf holds a digest of each, so a later edit shows.

A superuser can lift a trigger, edit a row and put the trigger back. The leaf cannot be edited with
it, since its own hash is in the tree.
"""

import uuid
from collections.abc import Iterator
from hashlib import sha256
from typing import Any

from django.apps import apps
from django.db.models import Model

from logbook.models import ActRow

from . import canonical


def act_models() -> list[type[ActRow]]:
    """Every concrete model whose rows belong to an act, in a stable order."""
    found = [m for m in apps.get_app_config("logbook").get_models() if issubclass(m, ActRow)]
    return sorted(found, key=lambda m: m._meta.db_table)


def digest(row: Model) -> str:
    """SHA-256 of all columns of a row as the database gives them back."""
    columns = {f.attname: _exact(getattr(row, f.attname)) for f in row._meta.concrete_fields}
    return sha256(canonical.to_bytes(columns)).hexdigest()


def _exact(value: Any) -> Any:
    # The shortest text that reads back as the same number: the same on every machine.
    return repr(value) if isinstance(value, float) else value


def written(act: uuid.UUID) -> dict[str, dict[str, str]]:
    """Table to primary key to digest, for every row that carries the act."""
    found: dict[str, dict[str, str]] = {}
    for model in act_models():
        rows = {str(row.pk): digest(row) for row in model._default_manager.filter(leaf_id=str(act))}
        if rows:
            found[model._meta.db_table] = rows
    return found


def differences(claimed: dict[tuple[str, str], tuple[str, str]]) -> Iterator[str | None]:
    """Compare every row of every act table with what its leaf holds.

    claimed : (table, primary key) to (act, digest), gathered from all leaves
    Yields None for each row that fits, and a sentence for each that does not.
    """
    left = dict(claimed)
    for model in act_models():
        table = model._meta.db_table
        for row in model._default_manager.order_by("pk").iterator(chunk_size=2000):
            act, held = left.pop((table, str(row.pk)), (None, None))
            name = f"{model._meta.verbose_name} {row.pk}"
            if act is None:
                yield f"{name} is in no leaf: it was put in from outside"
            elif act != str(row.leaf_id) or held != digest(row):
                yield f"{name} is not what its leaf says: it was changed from outside"
            else:
                yield None
    for table, pk in left:
        yield f"row {pk} of {table} is in a leaf and not in the table: it was removed"
