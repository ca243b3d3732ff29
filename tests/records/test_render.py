"""The printed record, read back from its bytes."""

import re
import subprocess
from io import BytesIO

import pikepdf
import pytest

from logbook.records.render import OnlyOurs, Refused, qr_text, record_html, render_record
from tests.records.contents import ROOT, content

CREW_NEVER_READS = ("disposition", "bounding", "basis", "criteria", "case", "outcome")


@pytest.fixture(scope="module")
def pdf():
    return render_record(content())


def text_of(pdf, first, last):
    command = ["pdftotext", "-f", str(first), "-l", str(last), "-", "-"]
    said = subprocess.run(command, input=pdf, capture_output=True, check=True).stdout.decode()
    return re.sub(r"\s+", " ", said)


def pages_of(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        return len(read.pages)


def test_page_one_answers_alone(pdf):
    said = text_of(pdf, 1, 1)
    for words in (
        "12", "C-17", "Quay crane, jib foot", "4 Lower chord", "crack 2", "restrict",
        "May be used only up to 12 t.", "tag 88 hangs", "14 Dec 2026 or 14,400 lifts",
        "Ása Wójcik-Öz", "Board of Lifting Engineers 4471", "approved and signed by",
        "5 May 2026, 16:20 +02:00", "local rules", ROOT[:32], ROOT[32:], "211 entries",
    ):  # fmt: skip
        assert words in said


def test_page_one_speaks_the_crew_s_words(pdf):
    said = text_of(pdf, 1, 1).lower()
    assert not [word for word in CREW_NEVER_READS if re.search(rf"\b{word}\b", said)]


def test_every_page_says_its_number_and_the_record_s(pdf):
    pages = pages_of(pdf)
    for page in range(1, pages + 1):
        assert f"Record 12 page {page} of {pages}" in text_of(pdf, page, page)


def test_a_part_out_of_use_is_black_edged_and_says_so():
    out = render_record(content(verdict="withdraw", held=True, sentence="Take it out of use now."))
    assert "Not to be used" in text_of(out, 1, 1)
    assert 'class="leaf first black"' in record_html(content(held=True))
    assert "Not to be used" not in text_of(render_record(content()), 1, 1)


def test_what_was_seen_the_working_and_its_sources_follow(pdf):
    said = text_of(pdf, 2, pages_of(pdf))
    for words in (
        "struck out: read from the wrong edge", "second reading agrees", "UT-12 revision 3",
        "Newman & Raju 1981", "K = F · σ · √(π · a / Q)", "MPa√m", "lowest of three",
        "No credit is taken", "not computed yet", "tree as in RFC 9162",
    ):  # fmt: skip
        assert words in said


def test_case_and_outcome_are_attached_as_the_document_s_data(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        assert set(read.attachments) == {"case.json", "outcome.json"}
        held = read.attachments["case.json"].get_file().read_bytes()
        assert held == b'{"case":1}'
        related = read.Root.AF
        assert len(related) == 2
        assert {str(one.AFRelationship) for one in related} == {"/Data"}


def test_it_is_written_as_pdf_a_3(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        with read.open_metadata() as about:
            assert about["pdfaid:part"] == "3"
            assert about["pdfaid:conformance"] == "B"
        assert str(read.Root.OutputIntents[0].S) == "/GTS_PDFA1"
        assert "/Encrypt" not in read.trailer
        assert "/JavaScript" not in read.Root.get("/Names", {})


def test_every_face_is_inside(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        fonts = [one for one in read.objects if isinstance(one, pikepdf.Dictionary)]
        described = [one for one in fonts if one.get("/Type") == "/FontDescriptor"]
        assert described
        assert all({"/FontFile2", "/FontFile3"} & set(one.keys()) for one in described)
        names = " ".join(str(one.FontName) for one in described)
    assert "B612" in names and "Bitter" in names


def test_figures_are_vectors(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        pages = [n for n in range(len(read.pages)) if "Figure 1." in text_of(pdf, n + 1, n + 1)]
        assert pages
        for n in pages:
            assert "/Image" not in drawn_on(read.pages[n])
        # The same walk does find the picture on the first page.
        assert "/Image" in drawn_on(read.pages[0])


def drawn_on(stream):
    """Sorts of everything that a page draws, through all the forms in it."""
    sorts = set()
    for operands, _ in pikepdf.parse_content_stream(stream, operators="Do"):
        named = stream.Resources.XObject[str(operands[0])]
        sorts.add(str(named.Subtype))
        if str(named.Subtype) == "/Form":
            sorts |= drawn_on(named)
    return sorts


def test_same_content_same_bytes(pdf):
    assert render_record(content()) == pdf
    assert render_record(content(journal_size=212)) != pdf


def test_dates_inside_are_those_of_the_signature(pdf):
    with pikepdf.open(BytesIO(pdf)) as read:
        assert str(read.docinfo.CreationDate).startswith("D:20260505142000")
        assert str(read.docinfo.ModDate).startswith("D:20260505142000")


def test_nothing_outside_is_ever_fetched():
    fetcher = OnlyOurs({"record:picture": (b"x", "image/jpeg")})
    assert fetcher.fetch("record:picture").read() == b"x"
    for address in ("file:///etc/passwd", "http://localhost/", "record:other", "data:,x"):
        with pytest.raises(Refused):
            fetcher.fetch(address)


def test_words_of_people_never_become_markup():
    nasty = '<img src="file:///etc/passwd"><style>@import "http://x/"</style>&amp;'
    made = content(sentence=nasty, limit=nasty, reasons=(nasty,))
    html = record_html(made)
    assert '<img src="file:' not in html and "<style>@import" not in html
    assert '<img src="file:///etc/passwd">' in text_of(render_record(made), 1, 1)


def test_a_record_with_nothing_reckoned_prints_too():
    bare = content(
        figures=(), steps=(), inputs=(), rules=None, photos=(), attachments=(), look=(),
        sightings=(), decided=(), cautions=(), not_reckoned="Nothing could be reckoned.",
    )  # fmt: skip
    said = text_of(render_record(bare), 1, 9)
    assert "Nothing could be reckoned." in said
    assert "No inspection is on record here." in said
    assert "Nothing is attached" in said


def test_the_square_says_what_the_paper_can_be_held_against():
    assert qr_text(content()) == f"record 12\njournal 211 entries\nroot {ROOT}"
    assert "<path" in record_html(content())
