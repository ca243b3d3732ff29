"""Rows that came about by one act of one person, and are never changed after."""

from django.db import models

from .journal import Leaf
from .protected import ProtectedModel


class ActRow(ProtectedModel):
    """A protected row tied to the leaf of its act.

    The rows of an act are written before its leaf has a number, so they carry the act's own id
    and the reference is checked when the transaction commits. One id ties all rows of one act.
    """

    leaf = models.ForeignKey(
        Leaf,
        to_field="act",
        db_column="act",
        on_delete=models.PROTECT,
        related_name="%(class)s_rows",
    )

    class Meta(ProtectedModel.Meta):
        abstract = True

    @property
    def entry_number(self) -> int:
        """The number that people see in the margin."""
        return self.leaf.index + 1
