"""``python manage.py assess``: as one would call it, with no settings and nothing in the
environment."""

import json
import subprocess
import sys
from pathlib import Path

from assessment import assess, outcome_text
from assessment.command import answered
from tests.assessment.examples import surface

ROOT = Path(__file__).resolve().parents[2]


def call(*arguments: str, text: str = "") -> subprocess.CompletedProcess[bytes]:
    # An environment with nothing of Django in it, and a locale that is not UTF-8.
    return subprocess.run(
        [sys.executable, "manage.py", "assess", *arguments],
        input=text.encode(),
        capture_output=True,
        cwd=ROOT,
        env={"LC_ALL": "C", "PYTHONUTF8": "0"},
        timeout=60,
    )


def test_one_case_from_a_file(tmp_path):
    file = tmp_path / "case.json"
    file.write_text(json.dumps(surface()))
    done = call(str(file))
    assert done.returncode == 0, done.stderr
    assert done.stdout.decode() == outcome_text(assess(surface())) + "\n"
    assert done.stderr == b""


def test_a_list_from_standard_input_keeps_its_order_and_places_the_refused():
    cases = [surface(), surface(crack__depth_mm=-1), surface(crack__depth_mm=4.0)]
    done = call("-", text=json.dumps(cases))
    assert done.returncode == 2
    first, second, third = json.loads(done.stdout)
    assert first == assess(cases[0])
    assert set(second) == {"error"} and second["error"]["where"] == "crack.depth_mm"
    assert third == assess(cases[2])


def test_nothing_of_the_web_is_imported():
    script = (
        "import sys, manage; from assessment.command import answered;"
        "answered(open(0,'rb').read());"
        "print([m for m in sys.modules if m.split('.')[0] in ('django', 'logbook')])"
    )
    done = subprocess.run(
        [sys.executable, "-c", script],
        input=json.dumps(surface()).encode(),
        capture_output=True,
        cwd=ROOT,
        env={},
        timeout=60,
    )
    assert done.stdout.decode().strip() == "[]", done.stderr


def test_what_cannot_be_read_says_so_and_prints_nothing():
    done = call("no-such-file.json")
    assert (done.returncode, done.stdout) == (2, b"")
    assert b"no-such-file.json" in done.stderr


def test_a_file_that_is_no_case_is_refused():
    for document in (b"{", b"3", b'["text", 3, null, []]'):
        answer, status = answered(document)
        assert status == 2
        errors = answer if isinstance(answer, list) else [answer]
        assert all(set(one) == {"error"} for one in errors)


def test_a_refused_case_in_a_list_may_hold_a_key_twice():
    good = json.dumps(surface())
    twice = good.replace('"case": 1', '"case": 1, "case": 1', 1)
    answer, status = answered(f"[{twice}, {good}]".encode())
    assert status == 2
    assert answer[0]["error"] == {"where": "case", "why": "this key is given twice."}
    assert "disposition" in answer[1]
