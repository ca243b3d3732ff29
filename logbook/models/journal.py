"""The append-only log: leaves, the names beside them, and the head of the tree."""

from django.db import models

from .protected import ProtectedModel


class Leaf(ProtectedModel):
    """One act, as the exact bytes that were hashed. Never JSON: a database may reorder it."""

    # Taken under the lock on the head: no sequence, so no gap. People see index + 1.
    index = models.PositiveBigIntegerField(primary_key=True)
    # Ties the rows of the act to its leaf; they are written before the index is known.
    act = models.UUIDField(unique=True)
    schema = models.PositiveSmallIntegerField()
    kind = models.CharField(max_length=40)
    payload = models.BinaryField()
    leaf_hash = models.BinaryField(max_length=32)
    at = models.DateTimeField()

    class Meta(ProtectedModel.Meta):
        indexes = [models.Index(fields=["kind"])]

    @property
    def entry_number(self) -> int:
        return self.index + 1


class NameBeside(ProtectedModel):
    """A name or personal detail that the leaf holds only as a salted digest."""

    leaf = models.ForeignKey(Leaf, on_delete=models.PROTECT, related_name="names")
    key = models.CharField(max_length=40)
    details = models.TextField(help_text="canonical JSON text")
    salt = models.CharField(max_length=64)

    class Meta(ProtectedModel.Meta):
        constraints = [models.UniqueConstraint(fields=["leaf", "key"], name="name_beside_once")]


class Head(models.Model):
    """The one row that every append locks last: size, frontier and root of the tree."""

    size = models.PositiveBigIntegerField(default=0)
    frontier = models.BinaryField(default=bytes)
    root = models.BinaryField(max_length=32)

    class Meta:
        constraints = [
            models.CheckConstraint(condition=models.Q(id=1), name="one_head"),
        ]
