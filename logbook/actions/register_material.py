"""A material, or a new revision of one."""

import uuid
from typing import Any

from django.db import transaction

from logbook import access
from logbook.actions.fields import needed
from logbook.cases import text
from logbook.cases.basis import check_material
from logbook.journal import append
from logbook.models import Material, Person, Site

KIND = "register-material"


def register_material(
    by: Person, site: Site, *, name: str, body: dict[str, Any], source: str
) -> Material:
    """body is the "material" part of the case document, numbers as Decimal or int.

    Raises Refusal ("invalid") with the value's own name where the computation could not read it.
    """
    access.require(by, site, "engineer")
    read = needed(
        {"name": name, "source": source},
        {"name": "Name the material.", "source": "Say where its values come from."},
    )
    check_material(body)
    exact = text.exact(body)
    act = uuid.uuid4()
    with transaction.atomic():
        Site.objects.select_for_update().get(pk=site.pk)
        last = Material.objects.filter(site=site, name=read["name"]).order_by("-revision").first()
        made = Material.objects.create(
            leaf_id=act,
            site=site,
            revision=(last.revision if last else 0) + 1,
            body=exact,
            author=by,
            **read,
        )
        append(
            KIND,
            {"material": made.pk, "revision": made.revision, "body": exact, **read},
            act=act,
            by=by,
            site=site,
        )
    return made
