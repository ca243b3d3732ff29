"""The append-only log: leaf, tree, proof, verify, append, and the triggers that refuse change."""

from .append import append, name_digest

__all__ = ["append", "name_digest"]
