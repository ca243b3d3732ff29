"""Rows that are written once: the model and its queryset refuse to change or remove them.

The database refuses too (logbook/journal/triggers.py); this is the first, friendlier wall.
"""

from typing import Any, NoReturn

from django.db import models


class NeverChanged(RuntimeError):
    """Someone tried to change or remove what people relied on: a fault in the program."""


def _refuse(what: str, model: type[models.Model]) -> NoReturn:
    raise NeverChanged(f"{model.__name__} rows are written once and never {what}.")


class ProtectedQuerySet(models.QuerySet[Any]):
    def update(self, **kwargs: Any) -> int:
        _refuse("changed", self.model)

    def delete(self) -> tuple[int, dict[str, int]]:
        _refuse("removed", self.model)

    def bulk_update(self, objs: Any, fields: Any, batch_size: int | None = None) -> int:
        _refuse("changed", self.model)

    def update_or_create(self, *args: Any, **kwargs: Any) -> tuple[Any, bool]:
        _refuse("changed", self.model)


class ProtectedModel(models.Model):
    """Base of every protected table; the triggers are installed for each of its subclasses."""

    objects = ProtectedQuerySet.as_manager()

    class Meta:
        abstract = True

    def save(self, *args: Any, **kwargs: Any) -> None:
        if not self._state.adding:
            _refuse("changed", type(self))
        kwargs["force_insert"] = True
        super().save(*args, **kwargs)

    def delete(self, *args: Any, **kwargs: Any) -> tuple[int, dict[str, int]]:
        _refuse("removed", type(self))
