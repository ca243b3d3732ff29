"""Registering on the pages: places, materials, a first basis, a licence renewed, a password."""

from decimal import Decimal
from typing import Any

import pytest
from django.urls import reverse

from logbook.actions.register_licence import register_licence
from logbook.actions.register_material import register_material
from logbook.models import Basis, Licence, Location, Material
from tests.pages.book import PASSWORD, STEEL, Book, basis_body

As = Any


def rows(values: dict[str, str]) -> dict[str, str]:
    """Values by name as the form's rows send them."""
    made = {}
    for number, (name, value) in enumerate(values.items()):
        made |= {f"name-{number}": name, f"value-{number}": value, f"source-{number}": "drawing 7"}
    return made


def test_a_place_is_added_once(book: Book, as_: As) -> None:
    address = reverse("add-location", args=[book.gate.pk])
    sent = {"name": "Sill, left bolt", "described": "below the walkway"}
    assert as_("engineer").post(address, sent).status_code == 302
    assert Location.objects.filter(name="Sill, left bolt").count() == 1
    again = as_("engineer").post(address, sent | {"name": "sill, LEFT bolt"})
    assert again.status_code == 400 and "A place of this name" in again.content.decode()


STEEL_ROWS = {
    "yield_mpa": "355", "ultimate_mpa": "510", "elastic_modulus_mpa": "207000", "poisson": "0,3",
    "yielding": "continuous", "toughness.model": "fixed", "toughness.k_mat_mpa_sqrt_m": "90",
    "growth.law": "paris", "growth.c": "3e-12", "growth.m": "3",
}  # fmt: skip


def test_a_material_that_no_case_could_carry_is_refused_beside_its_value(
    book: Book, as_: As
) -> None:
    address = reverse("new-material", args=[book.site.slug])
    head = {"name": "Plate 9", "source": "certificate 9"}
    before = Material.objects.count()
    bad = as_("engineer").post(address, head | rows(STEEL_ROWS | {"yield_mpa": "abc"}))
    said = bad.content.decode()
    assert bad.status_code == 400 and "a number is needed here" in said and "[&#x27;" not in said
    assert 'value="abc"' in said  # what was typed is kept
    bad = as_("engineer").post(address, head | rows(STEEL_ROWS | {"poisson": "7"}))
    assert bad.status_code == 400 and Material.objects.count() == before
    assert as_("engineer").post(address, head | rows(STEEL_ROWS)).status_code == 302


def test_the_next_revision_starts_from_the_one_before(book: Book, as_: As) -> None:
    one = Material.objects.get()
    page = as_("engineer").get(reverse("material", args=[one.pk])).content.decode()
    assert f"?from={one.pk}" in page
    form = as_("engineer").get(reverse("new-material", args=[book.site.slug]), {"from": one.pk})
    assert 'value="355"' in form.content.decode() and "source-0" not in form.content.decode()
    elsewhere = reverse("new-material", args=[book.site.slug])
    assert as_("engineer").get(elsewhere, {"from": 10**6}).status_code == 404


def test_a_first_basis_asks_for_the_kind_and_then_for_its_values(book: Book, as_: As) -> None:
    address = reverse("revise-basis", args=[book.toe.pk])
    first = as_("engineer").get(address).content.decode()
    assert "What is the body" in first and "?kind=plate-surface" in first
    form = as_("engineer").get(address, {"kind": "plate-surface"}).content.decode()
    for name in ("body.thickness_mm", "loading.peak.membrane_mpa", "criteria.load_reserve"):
        assert f'value="{name}"' in form
    values = {
        "body.width_mm": "400", "body.thickness_mm": "22", "loading.peak.membrane_mpa": "120",
        "loading.peak.bending_mpa": "20", "loading.residual": "none: stress relieved",
        "criteria.load_reserve": "1.4",
    }  # fmt: skip
    head = {
        "kind": "plate-surface", "reason": "first", "step": "write",
        "material": str(Material.objects.get().pk),
    }  # fmt: skip
    short = {name: value for name, value in values.items() if name != "body.thickness_mm"}
    bad = as_("engineer").post(address, head | rows(short))
    said = bad.content.decode()
    assert bad.status_code == 400 and "this is needed and missing" in said and "[&#x27;" not in said
    assert said.count("Another value: its name") >= 4
    assert as_("engineer").post(address, head | rows(values)).status_code == 302
    assert Basis.objects.filter(location=book.toe).count() == 1


def test_another_kind_can_be_chosen(book: Book, as_: As) -> None:
    address = reverse("revise-basis", args=[book.heel.pk])
    assert "as it is now" in as_("engineer").get(address, {"choose": "1"}).content.decode()
    page = as_("engineer").get(address, {"kind": "plate-through-edge"}).content.decode()
    assert 'value="body.ends"' in page
    assert basis_body()["kind"] == "plate-surface" and STEEL["yield_mpa"] == 355


def test_a_licence_is_renewed_under_its_number(book: Book) -> None:
    import datetime

    old = book.licence
    new = register_licence(
        book.people["administrator"], book.site, old.person_id, body=old.body, number=old.number,
        discipline=old.discipline, valid_from=old.valid_to + datetime.timedelta(days=1),
        valid_to=old.valid_to + datetime.timedelta(days=700),
    )  # fmt: skip
    assert Licence.objects.filter(number=old.number).count() == 2 and new.pk != old.pk


def test_a_person_changes_the_first_password(book: Book, as_: As) -> None:
    address = reverse("new-password")
    client = as_("crew")
    sent = {"password": PASSWORD, "new": "a longer rope 77", "again": "a longer rope 77"}
    for bad, words in (
        ({"again": "another"}, "not the same"),
        ({"new": "short", "again": "short"}, "too weak"),
        ({"password": "not mine"}, "not your password"),
    ):
        answer = client.post(address, sent | bad)
        assert answer.status_code in (400, 403) and words in answer.content.decode()
    assert client.post(address, sent).status_code == 302
    person = book.people["crew"]
    person.refresh_from_db()
    assert person.check_password("a longer rope 77")
    assert client.get(reverse("me")).status_code == 200  # still signed in


@pytest.mark.parametrize("typed", ["1,000", "56,676"])
def test_thousands_are_not_taken_for_decimals(book: Book, as_: As, typed: str) -> None:
    from logbook.entry.text import Unreadable, decimal

    with pytest.raises(Unreadable, match="thousands"):
        decimal(typed)
    assert decimal("0,125") == decimal("0.125") and decimal("8,40") == decimal("8.4")


def test_a_tensile_curve_is_read_for_strength_and_energy(book: Book, as_: As) -> None:
    """0.4 + 430 × 0.048 + 460 × 0.05 = 44.04 MJ/m³ by hand."""
    curve = {
        "strain": "engineering",
        "points": [
            [Decimal("0.002"), 400],
            [Decimal("0.05"), 460],
            [Decimal("0.1"), 460],
        ],
    }
    made = register_material(
        book.people["engineer"],
        book.site,
        name="S400",
        body=STEEL | {"tensile_curve": curve},
        source="certificate 9 (invented)",
    )
    page = as_("engineer").get(reverse("material", args=[made.pk])).content.decode()
    assert (
        "44.04" in page and "area below the curve" in page and "Strength is not toughness" in page
    )
    plain = Material.objects.exclude(pk=made.pk)[0]
    page = as_("engineer").get(reverse("material", args=[plain.pk])).content.decode()
    assert "area below the curve" not in page and "Strength is not toughness" in page


def test_a_published_growth_law_starts_a_material(book: Book, as_: As) -> None:
    listed = as_("crew").get(reverse("growth-laws", args=[book.site.slug]))
    page = listed.content.decode()
    assert listed.status_code == 200 and "Typical values" in page and "start a material" not in page
    assert as_("stranger").get(reverse("growth-laws", args=[book.site.slug])).status_code == 404
    address = reverse("new-material", args=[book.site.slug])
    form = as_("engineer").get(f"{address}?typical=two-stage-air-rfrom-0.5-2sd").content.decode()
    assert 'value="two-stage"' in form and "growth.c2" in form and 'value="5.1"' in form
    assert "typical" in form
