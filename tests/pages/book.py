"""A small invented book for the page tests, written by the actions themselves."""

import datetime
import uuid
from dataclasses import dataclass
from decimal import Decimal
from typing import Any

from logbook.actions.answer import answer_now
from logbook.actions.known import known_of
from logbook.actions.log_inspection import log_inspection
from logbook.actions.register_component import add_location, register_component
from logbook.actions.register_licence import register_licence
from logbook.actions.register_material import register_material
from logbook.actions.revise_basis import adopt_basis, revise_basis
from logbook.entry import read_inspection
from logbook.models import (
    Component,
    Inspection,
    Licence,
    Location,
    Membership,
    Person,
    Role,
    Site,
)

PASSWORD = "lock-gate-by-lamp-7"
FIGURES = "invented for the tests"

STEEL: dict[str, Any] = {
    "yield_mpa": 355,
    "ultimate_mpa": 510,
    "elastic_modulus_mpa": 210000,
    "poisson": Decimal("0.3"),
    "yielding": "continuous",
    "toughness": {"model": "fixed", "k_mat_mpa_sqrt_m": 120},
    "growth": {"law": "paris", "c": Decimal("3E-12"), "m": 3, "threshold_mpa_sqrt_m": 2},
    "bounding": {
        "toughness": {"model": "fixed", "k_mat_mpa_sqrt_m": 80},
        "growth": {"law": "paris", "c": Decimal("6E-12"), "m": 3, "threshold_mpa_sqrt_m": 2},
        "stands_for": "invented lower bound for the tests",
    },
    "typical": False,
}


def basis_body(peak_mpa: int = 120) -> dict[str, Any]:
    """A crack from the surface of a wide plate under bending and pull."""
    return {
        "kind": "plate-surface",
        "body": {"width_mm": 400, "thickness_mm": 22},
        "material": STEEL,
        "loading": {
            "peak": {"membrane_mpa": peak_mpa, "bending_mpa": 20},
            "residual": "none: stress relieved, invented certificate",
            "temperature_c": -10,
            "cycles": [
                {
                    "membrane_range_mpa": 60,
                    "bending_range_mpa": 10,
                    "stress_ratio": Decimal("0.1"),
                    "per_usage": 1,
                }
            ],
        },
        "criteria": {
            "fracture": "diagram",
            "load_reserve": Decimal("1.4"),
            "life_factor": 2,
            "size_confidence_sd": 2,
            "longest_interval_days": 365,
            "shortest_interval_days": 30,
            "failure_probability": Decimal("0.001"),
            "surprise": Decimal("0.01"),
        },
        "owner": {"allows_restriction": True},
        "sizing": {
            "ultrasound": {
                "depth_sd_mm": Decimal("0.5"),
                "length_sd_mm": 2,
                "depth_bias_mm": 0,
                "length_bias_mm": 0,
                "source": FIGURES,
            }
        },
        "depth_ratio": {"value": Decimal("0.4"), "source": FIGURES},
        "could_miss": {"depth_mm": 1, "length_mm": 4, "source": FIGURES},
        "sources": {"body": FIGURES, "loading": FIGURES, "criteria": FIGURES},
    }


@dataclass
class Book:
    """One site with its people, a gate with two places, and another site nobody here belongs to."""

    site: Site
    elsewhere: Site
    people: dict[str, Person]
    licence: Licence
    gate: Component
    heel: Location
    toe: Location

    def log(
        self,
        found_on: str,
        counter: int,
        *findings: dict[str, Any],
        by: str = "crew",
        head: dict[str, Any] | None = None,
    ) -> Any:
        """An inspection in the book, answered."""
        data = entry_data(found_on, counter, *findings) | (head or {})
        draft = read_inspection(data, known_of(self.gate))
        made: Inspection = log_inspection(self.people[by], draft)
        answer_now(made.leaf_id)
        return made


def entry_data(found_on: str, counter: int, *findings: dict[str, Any]) -> dict[str, Any]:
    return {
        "key": str(uuid.uuid4()),
        "found_on": found_on,
        "counter": str(counter),
        "method": "ultrasound",
        "procedure": "UP-7",
        "procedure_revision": "C",
        "instrument": "flaw detector 12",
        "calibration_valid_until": "2027-06-30",
        "surface": "bare",
        "coverage": "all of it",
        "inspector_name": "Ilka Berend",
        "qualification_level": "level 2",
        "qualification_valid_until": "2028-01-31",
        "findings": list(findings),
    }


def crack_seen(place: Location, depth: str, length: str, crack: str = "new") -> dict[str, Any]:
    return {
        "location": place.pk,
        "what": "crack",
        "crack": crack,
        "depth_basis": "measured",
        "depth_mm": depth,
        "length_mm": length,
        "remarks": "runs along the toe of the weld",
    }


def _site(slug: str, name: str) -> Site:
    return Site.objects.create(
        slug=slug,
        name=name,
        time_zone="Europe/Budapest",
        on_call_name="Ödön Várszegi",
        on_call_phone="+36 00 555 0100",
        working_weekdays="12345",
    )


def _person(username: str, full_name: str, **more: Any) -> Person:
    return Person.objects.create_user(username, password=PASSWORD, full_name=full_name, **more)


def write_book() -> Book:
    site, elsewhere = _site("lower-mill", "Lower Mill lock"), _site("far-quay", "Far Quay")
    people = {
        "crew": _person("crew", "Ilka Berend"),
        "engineer": _person("engineer", "Tamás Őri"),
        "second": _person("second", "Réka Sólyom"),
        "signatory": _person("signatory", "Magda Vértesi"),
        "auditor": _person("auditor", "Pál Kender"),
        "administrator": _person("administrator", "Zita Halmos"),
        "stranger": _person("stranger", "Nobody Here"),
    }
    roles = {name: name for name in Role.values} | {"second": Role.ENGINEER}
    for name, role in roles.items():
        Membership.objects.create(person=people[name], site=site, role=role)
    Membership.objects.create(person=people["stranger"], site=elsewhere, role=Role.CREW)
    licence = register_licence(
        people["administrator"],
        site,
        people["signatory"].pk,
        body="Invented Board",
        number="V-118",
        discipline="fatigue and fracture",
        valid_from=datetime.date(2024, 1, 1),
        valid_to=datetime.date(2030, 1, 1),
    )
    gate = register_component(
        people["engineer"],
        site,
        tag="G-2",
        name="Lower gate, north leaf",
        counter_name="lock fillings",
        counter_unit="filling",
        per_day=Decimal(20),
        description="north side, behind the ladder",
        serial="LM-1974-2",
    )
    heel = add_location(people["engineer"], gate.pk, name="Heel post, upper weld")
    toe = add_location(
        people["engineer"], gate.pk, name="Mitre post, foot", described="from the lower walkway"
    )
    register_material(
        people["engineer"], site, name="Gate plate", body=STEEL, source="invented for the tests"
    )
    basis = revise_basis(people["engineer"], heel.pk, body=basis_body(), reason="first basis")
    adopt_basis(people["second"], basis.pk)
    return Book(site, elsewhere, people, licence, gate, heel, toe)
