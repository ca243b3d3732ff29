"""Who may see or change what: the only way to get a record, always scoped by site.

A record of another site answers as one that does not exist. Every look-up names what it is
needed for; a colleague who may see but not change gets a plain refusal.
"""

from collections.abc import Mapping
from typing import Any, TypeVar

from django.core.exceptions import ObjectDoesNotExist
from django.db.models import Model, QuerySet

from logbook.errors import not_found, not_permitted
from logbook.models import (
    Assessment,
    Basis,
    Component,
    Crack,
    DeferralRequest,
    Disposition,
    Finding,
    Inspection,
    Licence,
    Location,
    Material,
    Membership,
    Person,
    Photo,
    Record,
    Repair,
    Review,
    Role,
    Site,
    TrayItem,
)

M = TypeVar("M", bound=Model)

ANY = frozenset(Role.values)
# What each need asks for. An administrator looks after people and places, and decides nothing.
NEEDS: Mapping[str, frozenset[str]] = {
    "see": ANY,
    "log": frozenset({Role.CREW, Role.ENGINEER}),
    "engineer": frozenset({Role.ENGINEER}),
    "sign": frozenset({Role.SIGNATORY}),
    "register": frozenset({Role.ENGINEER, Role.ADMINISTRATOR}),
    "administer": frozenset({Role.ADMINISTRATOR}),
    "audit": frozenset({Role.AUDITOR, Role.ENGINEER, Role.SIGNATORY, Role.ADMINISTRATOR}),
}
NEED_SENTENCES: Mapping[str, str] = {
    "see": "You have no role at this site.",
    "log": "Only crew and engineers of this site write findings into its book.",
    "engineer": "Only an engineer of this site can do this.",
    "sign": "Only a signatory of this site can sign here.",
    "register": "Only an engineer or administrator of this site can register things here.",
    "administer": "Only an administrator of this site can change its people and settings.",
    "audit": "This page is for engineers, signatories, auditors and administrators of the site.",
}


def roles_at(person: Person, site: Site) -> frozenset[str]:
    """The live roles of a person at a site; empty for a stranger or a closed account."""
    if not person.is_authenticated or not person.is_active:
        return frozenset()
    return frozenset(
        Membership.objects.filter(person=person, site=site, ended_at__isnull=True).values_list(
            "role", flat=True
        )
    )


def sites_of(person: Person, need: str = "see") -> QuerySet[Site]:
    """The sites at which a person may do what is needed."""
    if not person.is_authenticated or not person.is_active:
        return Site.objects.none()
    return Site.objects.filter(
        pk__in=Membership.objects.filter(
            person=person, ended_at__isnull=True, role__in=NEEDS[need]
        ).values("site")
    )


def require(person: Person, site: Site, need: str) -> None:
    """Refuse unless the person may do this at the site; a stranger finds nothing at all."""
    roles = roles_at(person, site)
    if not roles:
        raise not_found("page")
    if not roles & NEEDS[need]:
        raise not_permitted(NEED_SENTENCES[need])


def _one(rows: QuerySet[M], site_path: str, person: Person, pk: Any, need: str, what: str) -> M:
    try:
        row = rows.get(pk=pk, **{f"{site_path}__in": sites_of(person)})
    except (ObjectDoesNotExist, TypeError, ValueError, OverflowError):
        raise not_found(what) from None
    site: Any = row
    for step in site_path.split("__"):
        site = getattr(site, step)
    require(person, site, need)
    return row


def site_for(person: Person, slug: str, need: str = "see") -> Site:
    try:
        site = sites_of(person).get(slug=slug)
    except Site.DoesNotExist:
        raise not_found("site") from None
    require(person, site, need)
    return site


def component_for(person: Person, pk: Any, need: str = "see") -> Component:
    rows = Component.objects.select_related("site", "picture")
    return _one(rows, "site", person, pk, need, "component")


def site_once_for(person: Person, slug: str) -> Site:
    """A site where the person logs or once did: to hand in what was written then."""
    once = Membership.objects.filter(person=person, role__in=NEEDS["log"]).values("site")
    site = Site.objects.filter(slug=slug, pk__in=once).first()
    if site is None or not person.is_active:
        raise not_found("site")
    return site


def component_of(site: Site, pk: Any) -> Component:
    """A component of a site that the person has been let to already."""
    try:
        return Component.objects.select_related("site", "picture").get(pk=pk, site=site)
    except (Component.DoesNotExist, TypeError, ValueError, OverflowError):
        raise not_found("component") from None


def location_for(person: Person, pk: Any, need: str = "see") -> Location:
    rows = Location.objects.select_related("component__site")
    return _one(rows, "component__site", person, pk, need, "location")


def crack_for(person: Person, pk: Any, need: str = "see") -> Crack:
    rows = Crack.objects.select_related("component__site", "location")
    return _one(rows, "component__site", person, pk, need, "crack")


def material_for(person: Person, pk: Any, need: str = "see") -> Material:
    return _one(
        Material.objects.select_related("site", "leaf"), "site", person, pk, need, "material"
    )


def basis_for(person: Person, pk: Any, need: str = "see") -> Basis:
    rows = Basis.objects.select_related("location__component__site", "leaf", "author")
    return _one(rows, "location__component__site", person, pk, need, "basis")


def inspection_for(person: Person, pk: Any, need: str = "see") -> Inspection:
    rows = Inspection.objects.select_related("component__site", "leaf", "author")
    return _one(rows, "component__site", person, pk, need, "inspection")


def finding_for(person: Person, pk: Any, need: str = "see") -> Finding:
    rows = Finding.objects.select_related(
        "inspection__component__site", "location", "crack", "leaf"
    )
    return _one(rows, "inspection__component__site", person, pk, need, "finding")


def photo_for(person: Person, pk: Any, need: str = "see") -> Photo:
    return _one(Photo.objects.select_related("site"), "site", person, pk, need, "photo")


def assessment_for(person: Person, pk: Any, need: str = "see") -> Assessment:
    rows = Assessment.objects.select_related("location__component__site", "crack", "basis", "leaf")
    return _one(rows, "location__component__site", person, pk, need, "proposal")


def review_for(person: Person, pk: Any, need: str = "see") -> Review:
    rows = Review.objects.select_related(
        "assessment__location__component__site", "assessment__crack", "by", "leaf"
    )
    return _one(rows, "assessment__location__component__site", person, pk, need, "review")


def disposition_for(person: Person, pk: Any, need: str = "see") -> Disposition:
    rows = Disposition.objects.select_related(
        "location__component__site", "crack", "review", "licence", "leaf"
    )
    return _one(rows, "location__component__site", person, pk, need, "signed verdict")


def deferral_request_for(person: Person, pk: Any, need: str = "see") -> DeferralRequest:
    rows = DeferralRequest.objects.select_related(
        "disposition__location__component__site", "by", "leaf"
    )
    return _one(
        rows, "disposition__location__component__site", person, pk, need, "deferral request"
    )


def repair_for(person: Person, pk: Any, need: str = "see") -> Repair:
    rows = Repair.objects.select_related("location__component__site", "crack", "leaf")
    return _one(rows, "location__component__site", person, pk, need, "repair")


def record_for(person: Person, number: Any, need: str = "see") -> Record:
    return _one(Record.objects.select_related("site"), "site", person, number, need, "record")


def tray_item_for(person: Person, pk: Any, need: str = "engineer") -> TrayItem:
    rows = TrayItem.objects.select_related("component__site", "author")
    return _one(rows, "component__site", person, pk, need, "tray entry")


def licence_for(person: Person, pk: Any, day: Any, site: Site) -> Licence:
    """A licence of the person's own that this site has on its books, in force on the day."""
    try:
        licence = Licence.objects.get(pk=pk, person=person, site=site)
    except (Licence.DoesNotExist, ValueError, OverflowError):
        raise not_found("licence of yours") from None
    if not licence.in_force(day):
        raise not_permitted(
            f"Licence {licence} is not in force today (valid {licence.valid_from:%-d %b %Y} to "
            f"{licence.valid_to:%-d %b %Y}{', revoked' if licence.revoked_at else ''})."
        )
    return licence
