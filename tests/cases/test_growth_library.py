"""The library of published growth laws: copied from the records, readable, marked typical."""

import json
import math
from pathlib import Path
from typing import Any

import pytest

from assessment import assess
from assessment.growth import TwoStage
from logbook.cases.growth_library import TypicalLaw, typical_law, typical_laws
from tests.assessment.examples import surface

FIXTURES = Path(__file__).parents[2] / "fixtures"
RECORDS: dict[str, Any] = {
    one["id"]: one
    for file in ("further-relations.json", "failure-growth-life.json")
    for one in json.loads((FIXTURES / "checks" / file).read_text("utf-8"))
}
UNIT = math.sqrt(1000.0)  # N/mm^1.5 in 1 MPa√m


def ids(one: TypicalLaw) -> str:
    return one.id


@pytest.mark.parametrize("one", typical_laws(), ids=ids)
def test_it_is_its_record_in_other_units(one: TypicalLaw) -> None:
    record = RECORDS[one.record]
    assert (one.source, one.how) == (record["source"], record["how"])
    law, value = {k: v if k == "law" else float(v) for k, v in one.law.items()}, record["value"]
    if law["law"] == "two-stage":
        a1, m1, a2, m2, crossing = value
        assert law["c1"] == pytest.approx(a1 * UNIT**m1 / 1e3, rel=1e-5)
        assert law["c2"] == pytest.approx(a2 * UNIT**m2 / 1e3, rel=1e-5)
        drawn = TwoStage(law["c1"], law["m1"], law["c2"], law["m2"])
        assert drawn.crossing * UNIT == pytest.approx(crossing, rel=0.004)
    elif one.record.startswith("b79"):
        assert law["c"] == pytest.approx(value[0] * UNIT ** value[1] / 1e3, rel=1e-5)
    elif one.record.startswith("barsom"):
        assert law["c"] * 1e3 == pytest.approx(value[0]) and law["m"] == value[1]
        in_inches = value[2] * 25.4e-3 / (6.894757 * math.sqrt(0.0254)) ** value[1]
        assert law["c"] == pytest.approx(in_inches, rel=0.01)
    else:
        assert law["c"] * 1e3 == pytest.approx(value[2])
        assert (law["m"], law["gamma"]) == (value[3], value[4])


@pytest.mark.parametrize("one", typical_laws(), ids=ids)
def test_a_case_on_it_is_computed_and_referred(one: TypicalLaw) -> None:
    law = {k: v if k == "law" else float(v) for k, v in one.law.items()}
    found = assess(
        surface(
            material__growth=law,
            material__bounding__growth=law,
            material__typical=one.material()["typical"],
        )
    )
    assert found["life"]["usage"] is None or found["life"]["usage"] > 0.0
    assert found["disposition"]["verdict"] in ("refer", "withdraw")


def test_environments_are_laws_of_their_own_and_worse_than_air() -> None:
    air, sea = typical_law("simple-air"), typical_law("simple-sea")
    assert air is not None and sea is not None and typical_law("nobody") is None
    assert sea.law["c"] > 4 * air.law["c"]
    assert all(one.range and one.stands_for and one.source for one in typical_laws())
    assert len({one.id for one in typical_laws()}) == len(typical_laws())
