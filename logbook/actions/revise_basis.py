"""What a place is assessed on: written as a new revision, adopted by someone else."""

import uuid
from decimal import Decimal
from typing import Any

from django.db import transaction

from logbook import access, clock
from logbook.actions import ask
from logbook.actions.fields import needed
from logbook.cases import rows, text
from logbook.cases.basis import check_basis_body
from logbook.errors import conflict, not_permitted
from logbook.journal import append
from logbook.models import Basis, BasisAdoption, Component, Location, Person

WRITTEN = "revise-basis"
ADOPTED = "adopt-basis"

# For each criterion, the direction in which it becomes easier.
EASIER_WHEN_SMALLER = (
    "load_reserve",
    "life_factor",
    "size_confidence_sd",
    "shortest_interval_days",
    "surprise",
)
EASIER_WHEN_LARGER = ("longest_interval_days", "failure_probability")


def revise_basis(by: Person, location_pk: Any, *, body: dict[str, Any], reason: str) -> Basis:
    """Write the next revision. Nothing changes until someone else adopts it."""
    location = access.location_for(by, location_pk, "engineer")
    said = needed({"reason": reason}, {"reason": "Say why it is written or changed."})
    check_basis_body(body)
    exact = text.exact(body)
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=location.component_id)
        last = location.bases.order_by("-revision").first()
        made = Basis.objects.create(
            leaf_id=act,
            location=location,
            revision=(last.revision if last else 0) + 1,
            author=by,
            body=exact,
            digest=text.digest(exact),
            created_at=clock.now(),
            **said,
        )
        append(
            WRITTEN,
            {
                "basis": made.pk,
                "location": location.pk,
                "revision": made.revision,
                "body": exact,
                **said,
            },
            act=act,
            by=by,
            site=location.component.site,
            because_of=[last.leaf_id] if last else [],
        )
    return made


def adopt_basis(by: Person, basis_pk: Any) -> BasisAdoption:
    """Adopt a revision: by someone other than its author; easing a criterion needs a signatory.

    The place and every open crack there is assessed anew.
    """
    basis = access.basis_for(by, basis_pk, "see")
    site = basis.location.component.site
    roles = access.roles_at(by, site)
    if not roles & {"engineer", "signatory"}:
        raise not_permitted("Only an engineer or signatory of this site adopts a basis.")
    if basis.author_id == by.pk:
        raise not_permitted("You wrote this basis: someone else has to adopt it.")
    eased = eased_criteria(basis.location, basis)
    if eased and "signatory" not in roles:
        raise not_permitted(f"This eases {', '.join(eased)}: that needs a signatory.")
    act = uuid.uuid4()
    with transaction.atomic():
        Component.objects.select_for_update().get(pk=basis.location.component_id)
        if hasattr(basis, "adoption"):
            raise conflict("adopted", "This revision was adopted already.")
        newest = basis.location.bases.order_by("-revision").first()
        if newest != basis:
            raise conflict("newer", "A newer revision was written. Read that one.")
        made = BasisAdoption.objects.create(leaf_id=act, basis=basis, by=by, at=clock.now())
        append(
            ADOPTED,
            {"basis": basis.pk, "revision": basis.revision, "eased": eased},
            act=act,
            by=by,
            site=site,
            because_of=[basis.leaf_id],
        )
        _ask_where_something_is_known(basis.location, act)
    return made


def _ask_where_something_is_known(location: Location, act: uuid.UUID) -> None:
    if rows.last_look(location, None) is not None:
        ask.for_assessment(location, None, act)
    for crack in location.cracks.filter(closed_at__isnull=True):
        ask.for_assessment(location, crack, act)


def eased_criteria(location: Location, basis: Basis) -> list[str]:
    """The criteria that this revision makes easier than the adopted one."""
    before = rows.adopted_basis(location)
    if before is None:
        return []
    old = text.read(before.body)
    new = text.read(basis.body)
    was, becomes = old.get("criteria", {}), new.get("criteria", {})
    eased = [
        name
        for name in (*EASIER_WHEN_SMALLER, *EASIER_WHEN_LARGER)
        if _eases(name, was.get(name), becomes.get(name))
    ]
    if was.get("fracture") == "diagram" and becomes.get("fracture") != "diagram":
        eased.append("fracture")
    for name in ("allows_restriction", "leak_tolerated"):
        if new.get("owner", {}).get(name) and not old.get("owner", {}).get(name):
            eased.append(name)
    fixed, kept = (one.get("owner", {}).get("fixed_date") for one in (old, new))
    if fixed and (not kept or str(kept.get("on")) > str(fixed.get("on"))):
        eased.append("fixed_date")
    return eased


def _eases(name: str, was: Any, becomes: Any) -> bool:
    if was is None or becomes is None:
        return was is not None
    smaller = Decimal(becomes) < Decimal(was)
    larger = Decimal(becomes) > Decimal(was)
    return smaller if name in EASIER_WHEN_SMALLER else larger
