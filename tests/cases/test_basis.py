"""Parts of a basis with which no entry could be reckoned are refused when it is written."""

from typing import Any

import pytest

from logbook.cases.basis import check_basis_body
from logbook.errors import Refusal
from tests.pages.book import basis_body


@pytest.mark.parametrize(
    ("change", "field"),
    [
        ({"depth_ratio": {"value": "half", "source": "x"}}, "depth_ratio"),
        ({"depth_ratio": {"value": -1, "source": "x"}}, "depth_ratio"),
        ({"depth_ratio": {"value": True, "source": "x"}}, "depth_ratio"),
        ({"sizing": {"ultrasound": 0.5}}, "sizing.ultrasound"),
        ({"detection": {"ultrasound": "none: x"}}, "detection.ultrasound"),
        ({"kind": "no-such-kind"}, "kind"),
        ({"colour": "grey"}, "colour"),
    ],
)
def test_unfit_parts(change: dict[str, Any], field: str) -> None:
    with pytest.raises(Refusal) as refused:
        check_basis_body(basis_body() | change)
    assert field in refused.value.fields


def test_a_method_without_sizing_error_may_say_so() -> None:
    check_basis_body(basis_body() | {"sizing": {"ultrasound": "none: measured on the cut piece"}})
