"""What was sent and did not fit is kept whole, for a person to look at."""

import json
import uuid
from collections.abc import Mapping
from hashlib import sha256
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.errors import Refusal, conflict
from logbook.journal import append, canonical
from logbook.models import Component, Person, TrayItem, TraySettled

KEPT = "keep-in-tray"
SETTLED = "settle-tray"


def keep_in_tray(
    by: Person, component: Component, key: str, content: Mapping[str, Any], refusal: Refusal
) -> TrayItem:
    """Keep a sent entry that cannot be written, with the reason. Twice the same is kept once."""
    text = _storable(json.dumps(content, sort_keys=True, ensure_ascii=False, default=str))
    key = _storable(key.replace("\x00", " "))[:80]
    digest = sha256(text.encode()).hexdigest()
    act = uuid.uuid4()
    with transaction.atomic():
        # Sent twice at once, the second waits here for the first.
        Component.objects.select_for_update().get(pk=component.pk)
        there = TrayItem.objects.filter(key=key, content_digest=digest).first()
        if there is not None:
            return there
        item = TrayItem.objects.create(
            leaf_id=act,
            component=component,
            key=key,
            content=text,
            content_digest=digest,
            why=canonical.text(refusal.as_problem()),
            author=by,
            at=clock.now(),
        )
        append(
            KEPT,
            {"item": item.pk, "key": key, "content_digest": digest, "why": item.why},
            act=act,
            by=by,
            site=component.site,
        )
    return item


def _storable(text: str) -> str:
    """Half a surrogate pair, which no database takes, is kept by its escape."""
    return text.encode("utf-8", "backslashreplace").decode()


def settle_tray(by: Person, item_pk: Any, how: str) -> TraySettled:
    """A person has looked at it and says what was done."""
    item = access.tray_item_for(by, item_pk, "engineer")
    if not how.strip():
        raise Refusal("invalid", "Say what was done with it.", fields={"how": ["Say it here."]})
    if hasattr(item, "settled"):
        raise conflict("settled", "This was settled already.")
    act = uuid.uuid4()
    with transaction.atomic():
        settled = TraySettled.objects.create(
            leaf_id=act, item=item, by=by, how=how.strip(), at=clock.now()
        )
        append(
            SETTLED,
            {"item": item.pk, "how": how.strip()},
            act=act,
            by=by,
            site=item.component.site,
            because_of=[item.leaf_id],
        )
    return settled
