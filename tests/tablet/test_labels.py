"""Labels: A4, one a part, and a reader of its own reads the address back."""

import io
import re
import subprocess
from collections.abc import Callable
from pathlib import Path

import pikepdf
import pytest
from django.test import Client

from logbook.tablet.labels import Label, sheet
from tests.pages.book import Book

A4 = (595.276, 841.89)  # points: 210 by 297 mm, ISO 216


def test_each_part_has_its_label_on_a4(
    book: Book, as_: Callable[[str], Client], tmp_path: Path
) -> None:
    answer = as_("crew").get("/site/lower-mill/labels/")
    with pikepdf.open(io.BytesIO(answer.content)) as pdf:
        assert len(pdf.pages) == 1
        box = [float(one) for one in pdf.pages[0].mediabox]
        assert (box[2], box[3]) == pytest.approx(A4, abs=0.5)
    file = tmp_path / "labels.pdf"
    file.write_bytes(answer.content)
    text = subprocess.run(
        ["pdftotext", file, "-"], capture_output=True, text=True, check=True
    ).stdout
    assert "G-2" in text
    assert "Lower gate, north leaf" in " ".join(text.split())


def test_twenty_five_parts_need_two_sheets() -> None:
    many = [Label(f"G-{n}", "a part", f"https://book.example/component/{n}/") for n in range(25)]
    with pikepdf.open(io.BytesIO(sheet("Lower Mill lock", many))) as pdf:
        assert len(pdf.pages) == 2


def test_the_code_has_the_highest_error_correction_and_a_quiet_zone_of_four() -> None:
    """ISO/IEC 18004: level H recovers about 30 % of the codewords; the quiet zone is 4 modules."""
    code = str(Label("G-2", "gate", "https://book.example/component/7/").code)
    found = re.search(r'viewBox="0 0 (\d+) (\d+)"', code)
    assert found is not None
    # Version 4 at level H holds 34 bytes; its side is 33 modules.
    assert int(found[1]) == 33 + 8
