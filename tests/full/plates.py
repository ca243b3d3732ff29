"""The three-dimensional values of fixtures/checks/plate-solids.json, computed again at full size.

About a minute a shape: python -m tests.full, or pytest tests/full/plates.py
"""

import pytest

from tests.external.plate_solids import SHAPES, Shape, by_elements, stored


@pytest.mark.parametrize("shape", SHAPES, ids=str)
def test_the_stored_values_are_what_the_elements_give(shape: Shape) -> None:
    found = by_elements(shape)
    for at, value in found.items():
        assert value == pytest.approx(stored(shape, *at), abs=2e-4), at
