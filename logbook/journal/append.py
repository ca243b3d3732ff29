"""Writing the next leaf: the last thing an action does before it commits."""

import secrets
import uuid
from collections.abc import Iterable, Mapping
from hashlib import sha256
from typing import Any

from django.db import connection

from logbook import clock
from logbook.models import Head, Leaf, NameBeside, Person, Site

from . import canonical, rows, tree

SCHEMA = 1


def append(
    kind: str,
    content: Mapping[str, Any],
    *,
    act: uuid.UUID,
    by: Person | None,
    site: Site | None,
    because_of: Iterable[uuid.UUID] = (),
    names: Mapping[str, str] | None = None,
) -> Leaf:
    """Append one act, after its rows are written: it locks the head till commit.

    Only projections are refreshed after it, since they order what they find by leaf.

    The leaf also holds a digest of every row that carries the act (see rows.py).

    kind : what was done, e.g. "log-inspection"
    content : everything the act said, as text, whole numbers, decimals, dates, lists and mappings
    act : the id that the rows of this act carry
    by : who did it; None for the application itself
    because_of : acts that led to this one
    names : further names said in the act (an inspector not on the books); each stands beside the
        leaf, and the leaf holds its salted digest

    Raises RuntimeError outside a transaction; TypeError for content without an exact form.
    """
    if not connection.in_atomic_block:
        raise RuntimeError("append belongs inside the action's transaction")
    said = dict(names or {})
    if by is not None:
        said["by"] = by.full_name or by.username
    salts = {key: secrets.token_hex(16) for key in said}
    payload = canonical.to_bytes(
        {
            "schema": SCHEMA,
            "kind": kind,
            "act": act,
            "site": site.slug if site is not None else None,
            "by": by.pk if by is not None else None,
            "names": {key: name_digest(salts[key], said[key]) for key in said},
            "because_of": list(because_of),
            "content": dict(content),
            "rows": rows.written(act),
            "at": clock.now(),
            "nonce": secrets.token_hex(16),
        }
    )
    leaf = _write(kind, act, payload)
    NameBeside.objects.bulk_create(
        NameBeside(leaf=leaf, key=key, details=said[key], salt=salts[key]) for key in sorted(said)
    )
    return leaf


def name_digest(salt: str, name: str) -> str:
    """What a leaf holds instead of a name: without the salt it cannot be guessed back."""
    return sha256(f"{salt}\n{name}".encode()).hexdigest()


def _write(kind: str, act: uuid.UUID, payload: bytes) -> Leaf:
    head = Head.objects.select_for_update().get(pk=1)
    hashed = tree.leaf_hash(payload)
    leaf = Leaf.objects.create(
        index=head.size,
        act=act,
        schema=SCHEMA,
        kind=kind,
        payload=payload,
        leaf_hash=hashed,
        at=clock.now(),
    )
    frontier = tree.append(tree.unpack(bytes(head.frontier)), head.size, hashed)
    head.size += 1
    head.frontier = tree.pack(frontier)
    head.root = tree.root(frontier)
    head.save(update_fields=["size", "frontier", "root"])
    return leaf
