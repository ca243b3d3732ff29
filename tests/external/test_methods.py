"""Every relation has a source, an accuracy, a witness, and tests that exist and use it."""

import ast
import re
from functools import cache
from pathlib import Path

import pytest

from assessment import KINDS, chapters
from assessment.methods import Method

ROOT = Path(__file__).parents[2]
METHODS = [(chapter, method) for chapter in chapters() for method in chapter.methods]


def ids(value: object) -> str:
    return value.key if isinstance(value, Method) else ""


@cache
def functions(file: str) -> frozenset[str]:
    tree = ast.parse((ROOT / file).read_text("utf-8"))
    return frozenset(node.name for node in ast.walk(tree) if isinstance(node, ast.FunctionDef))


def helpers(text: str) -> list[Path]:
    """The files beside a test that it imports from."""
    named = re.findall(r"from \.(\w+) import", text)
    near = [ROOT / f"tests/external/{name}.py" for name in named]
    if "tests.assessment.examples" in text:
        near.append(ROOT / "tests/assessment/examples.py")
    return [file for file in near if file.exists()]


@pytest.mark.parametrize(("chapter", "method"), METHODS, ids=ids)
def test_nothing_is_computed_without_a_witness(chapter: object, method: Method) -> None:
    record = method.validity
    assert record.source.strip() and record.accuracy.strip() and record.witness.strip()
    assert record.tests, f"{method.key} names no test"
    for name in record.tests:
        file, _, test = name.partition("::")
        assert test == "" or test in functions(file), name
        assert any(one.startswith("test_") for one in functions(file)), name


@pytest.mark.parametrize(("chapter", "method"), METHODS, ids=ids)
def test_the_tests_named_speak_of_the_relation(chapter: object, method: Method) -> None:
    """By the file that holds it, or by a kind that uses it."""
    module = method.key.removesuffix("-" + method.key.rsplit("-", 1)[-1])
    stem = re.split(r"relations-|failure-|toughness-", module)[-1].replace("-", "_")
    words = {*method.kinds, stem, *(part for part in stem.split("_") if len(part) > 5)}
    words |= {"diagram", "rho", "toughness"} if not method.kinds else set()
    for name in method.validity.tests:
        text = (ROOT / name.partition("::")[0]).read_text("utf-8")
        text += "".join(file.read_text("utf-8") for file in helpers(text))
        assert any(word in text for word in words), (name, words)


def test_none_is_without_a_witness_but_what_is_always_referred() -> None:
    bare = {method.key for _, method in METHODS if method.validity.witness == "none"}
    assert bare == {"relations-edge-crack-held", "toughness-value-unshifted"}


def test_every_kind_and_every_record_of_a_kind_is_listed() -> None:
    listed = [method.validity for _, method in METHODS]
    for kind in KINDS.values():
        assert all(record in listed for record in kind.relations), kind.name
    assert len({method.key for _, method in METHODS}) == len(METHODS)
    assert {name for _, method in METHODS for name in method.kinds} == set(KINDS)


def test_what_rests_on_memory_names_what_confirms_it() -> None:
    """A coefficient that only memory supports is confirmed by a computation of its own."""
    for _, method in METHODS:
        witness = method.validity.witness
        if witness.startswith(("from memory", "coefficients from memory")):
            assert re.search(r"[;,(] ?\w+", witness), method.key
