"""Fault injection: one seeded run after the other, each with a tablet of its own.

Chromium speaks through a proxy with the real server under gunicorn. In each run a person writes
entries by the page itself while the line is cut, delayed, doubled and sent again later, the server
is killed and started, the browser is killed while it saves, the tab is closed, the clock is wrong,
two tabs are open, the session runs out or the store is cleared. After that everything is whole
again, and what was acknowledged ("Written down" stood on the page) is counted against the book.
"""

import contextlib
import os
import random
import shutil
import signal
import tempfile
import time
from collections import Counter
from dataclasses import dataclass, field
from hashlib import sha256
from pathlib import Path
from typing import Any

from playwright.sync_api import BrowserContext, Error, Page, Playwright, expect

from tests.pages.book import PASSWORD

from .conftest import jpeg
from .proxy import FAULTS, Proxy
from .served import PLACES, Served

KILL_SERVER, KILL_BROWSER, CLOSE_TAB, WRONG_CLOCK, TWO_TABS, EXPIRED, CLEARED, ON_THE_LINE = (
    "server killed",
    "browser killed",
    "tab closed",
    "clock wrong",
    "two tabs",
    "session expired",
    "store cleared",
    "the line alone",
)
EVENTS = (
    KILL_SERVER,
    KILL_BROWSER,
    CLOSE_TAB,
    WRONG_CLOCK,
    TWO_TABS,
    EXPIRED,
    CLEARED,
    ON_THE_LINE,
)
TOOLS = {
    "How you looked": "ultrasound",
    "Procedure": "UP-7",
    "Its revision": "C",
    "Instrument": "flaw detector 12",
    "Its calibration is valid until": "2035-06-30",
    "Who looked": "Ilka Berend",
    "Level of the qualification": "level 2",
    "The qualification is valid until": "2035-01-31",
    "Surface": "bare",
    "How much of it you covered": "all of it",
}
# The clock of the tablet, wrong by days: found on is said by the person, and is not touched.
SHIFT = """() => {
  const off = %d;
  const Real = Date;
  const now = () => Real.now() + off;
  globalThis.Date = class extends Real {
    constructor(...a) { if (a.length) super(...a); else super(now()); }
    static now() { return now(); }
  };
}"""


@dataclass
class Count:
    runs: int = 0
    acknowledged: int = 0
    in_the_book: int = 0
    photos: int = 0
    photos_identical: int = 0
    not_acknowledged_and_in_the_book: int = 0
    said_to_be_lost: int = 0
    faults: Counter[str] = field(default_factory=Counter)
    wrong: list[str] = field(default_factory=list)

    def __str__(self) -> str:
        befell = ", ".join(f"{name} {n}" for name, n in sorted(self.faults.items()))
        return (
            f"{self.runs} runs: {self.acknowledged} entries acknowledged, {self.in_the_book} of "
            f"them in the book once; {self.photos} photos, {self.photos_identical} identical; "
            f"{self.not_acknowledged_and_in_the_book} more in the book that a killed browser did "
            f"not get to acknowledge; {len(self.wrong)} lost, doubled or half. Faults: {befell}."
        )


@dataclass
class Run:
    """One tablet, one seed."""

    playwright: Playwright
    served: Served
    seed: int
    count: Count

    def __post_init__(self) -> None:
        self.chance = random.Random(self.seed)
        self.proxy = Proxy(self.served.port, self.chance)
        self.address = f"http://127.0.0.1:{self.proxy.port}"
        self.profile = Path(tempfile.mkdtemp(prefix="tablet-"))
        self.event = EVENTS[self.seed % len(EVENTS)]
        self.acknowledged: dict[str, bytes | None] = {}
        self.context: BrowserContext | None = None
        self.shift = 0

    def go(self) -> None:
        try:
            self._open()
            self._load()
            self._walk()
            self._settle()
            self._compare()
        finally:
            self._shut()
            self.proxy.close()
            shutil.rmtree(self.profile, ignore_errors=True)
        self.count.runs += 1
        self.count.faults.update(self.proxy.done)
        self.count.faults[self.event] += 1

    # -- the browser --

    def _open(self) -> None:
        self.context = self.playwright.chromium.launch_persistent_context(
            str(self.profile),
            executable_path="/usr/bin/chromium",
            viewport={"width": 800, "height": 1280},
            has_touch=True,
            args=["--no-sandbox"],
        )
        if self.shift:
            self.context.add_init_script(f"({SHIFT % self.shift})()")
        self.page = self.context.pages[0]
        self.page.set_default_timeout(20_000)

    def _shut(self) -> None:
        if self.context is not None:
            with contextlib.suppress(Error):
                self.context.close()
            self.context = None

    def _kill_browser(self) -> None:
        """SIGKILL to the browser that was started with this run's own profile."""
        mark = f"--user-data-dir={self.profile}".encode()
        for one in Path("/proc").iterdir():
            with contextlib.suppress(OSError):
                words = (one / "cmdline").read_bytes().split(b"\0")
                if mark in words and not any(word.startswith(b"--type=") for word in words):
                    os.kill(int(one.name), signal.SIGKILL)
        self._shut()
        self._open()
        self._home()

    # -- the way of the person --

    def _sign_in(self, page: Page) -> None:
        page.goto(f"{self.address}/sign-in/?next=/tablet/")
        if "/sign-in/" in page.url:
            page.get_by_label("Sign-in name").fill("crew")
            page.get_by_label("Password").fill(PASSWORD)
            page.get_by_role("main").get_by_role("button", name="Sign in").click()
        page.wait_for_url("**/tablet/**")

    def _load(self) -> None:
        self._sign_in(self.page)
        expect(self.page.get_by_text("As the book stood at")).to_be_visible(timeout=20_000)
        self.page.evaluate("navigator.serviceWorker.ready")
        self.page.goto(f"{self.address}/tablet/#/round")
        self.page.get_by_role("button", name="Begin a round").click()
        self._place()
        day = time.strftime("%Y-%m-%d")
        self.page.get_by_label("Day you looked").fill(day)
        self.page.get_by_label("Counter reading").fill("1200")
        for label, value in TOOLS.items():
            self.page.get_by_label(label, exact=True).fill(value)
        self.page.get_by_role("button", name="Go to the places").click()
        expect(self.page.get_by_text("What do you see here?")).to_be_visible()

    def _home(self) -> None:
        self.page.goto(f"{self.address}/tablet/")
        self.page.locator("html[data-ready=yes]").wait_for(state="attached")

    def _place(self) -> None:
        # Two places come before the ribs; crack places are kept apart from the others.
        n = 3 + self.chance.randrange(PLACES)
        self.page.goto(f"{self.address}/tablet/#/place/{n}")

    def _write(self, page: Page) -> None:
        """One entry by the page; it counts as acknowledged once "Written down" stands there."""
        n = 3 + self.chance.randrange(PLACES)
        page.goto(f"{self.address}/tablet/#/place/{n}")
        photo = None
        expect(page.get_by_text("What do you see here?")).to_be_visible()
        if self.chance.random() < 0.5:
            page.get_by_role("button", name="could not look").click()
            page.get_by_label("Why you could not look").fill("under water")
        else:
            page.get_by_role("button").filter(has_text="a crack").or_(
                page.get_by_role("button", name="another crack")
            ).first.click()
            for digit in str(self.chance.randrange(10, 99)):
                page.get_by_role("button", name=digit, exact=True).click()
            page.get_by_role("button", name="next", exact=True).click()
            page.get_by_role("button", name="9", exact=True).click()
            photo = jpeg(
                self.chance.randrange(200, 900), f"hsl({self.chance.randrange(360)},60%,40%)"
            )
            page.get_by_label("Photos").set_input_files(
                {"name": "p.jpg", "mimeType": "image/jpeg", "buffer": photo}
            )
            expect(page.get_by_role("button", name="leave this photo out")).to_be_visible()
        page.get_by_role("button", name="Write it down").click()
        expect(
            page.get_by_role("heading", name="Written down").or_(
                page.get_by_role("heading", name="The verdict")
            )
        ).to_be_visible()
        self.acknowledged[page.url.rsplit("/", 1)[-1]] = photo

    def _walk(self) -> None:
        self.proxy.plan = [self.chance.choice(FAULTS) for _ in range(self.chance.randrange(2, 5))]
        entries = 3
        at = self.chance.randrange(entries)
        for n in range(entries):
            if n == at:
                self._befall()
            else:
                self._write(self.page)
            with contextlib.suppress(Error):
                self._send_now()

    def _send_now(self) -> None:
        self.page.goto(f"{self.address}/tablet/#/send")
        self.page.get_by_role("button", name="Send now").click()

    def _befall(self) -> None:
        if self.event == KILL_SERVER:
            self._write(self.page)
            self._send_now()
            self.page.wait_for_timeout(self.chance.randrange(120))
            self.served.kill()
            self._write(self.page)
            self.served.start()
        elif self.event == KILL_BROWSER:
            self._begin_to_write_and_kill()
        elif self.event == CLOSE_TAB:
            self._write(self.page)
            other = self._context().new_page()
            self.page.close()
            self.page = other
            self.page.set_default_timeout(20_000)
            self._home()
        elif self.event == WRONG_CLOCK:
            self.shift = self.chance.choice([-1, 1]) * self.chance.randrange(2, 4000) * 86_400_000
            self._shut()
            self._open()
            self._home()
            self._write(self.page)
        elif self.event == TWO_TABS:
            other = self._context().new_page()
            other.set_default_timeout(20_000)
            other.goto(f"{self.address}/tablet/")
            other.locator("html[data-ready=yes]").wait_for(state="attached")
            self._write(other)
            self._write(self.page)
            other.close()
        elif self.event == EXPIRED:
            with self.served_sessions_gone():
                self._write(self.page)
        elif self.event == CLEARED:
            self._clear_the_store()
        else:
            self.proxy.cut_off = True
            self._write(self.page)
            self.proxy.cut_off = False

    @contextlib.contextmanager
    def served_sessions_gone(self) -> Any:
        self.served.ask("DELETE FROM django_session")
        yield

    def _context(self) -> BrowserContext:
        assert self.context is not None
        return self.context

    def _begin_to_write_and_kill(self) -> None:
        self.page.goto(f"{self.address}/tablet/#/place/{3 + self.chance.randrange(PLACES)}")
        self.page.get_by_role("button", name="could not look").click()
        self.page.get_by_label("Why you could not look").fill("killed while saving")
        self.page.get_by_role("button", name="Write it down").click(no_wait_after=True)
        time.sleep(self.chance.uniform(0, 0.08))
        self._kill_browser()

    def _clear_the_store(self) -> None:
        """What waits is saved to a file; the store is cleared; the tablet must say what was lost,
        and the file brings it back."""
        self.proxy.cut_off = True
        self._write(self.page)
        held = self.page.evaluate(
            "import('/static/logbook/tablet/export.js').then((m) => m.waitingFile())"
        )
        address = self.address
        self.page.goto("about:blank")
        session = self._context().new_cdp_session(self.page)
        session.send("Storage.clearDataForOrigin", {"origin": address, "storageTypes": "indexeddb"})
        session.detach()
        self.proxy.cut_off = False
        self._home()
        waiting = len(held["items"])
        self.page.goto(f"{self.address}/tablet/#/")
        expect(self.page.get_by_text("This tablet cleared its store")).to_be_visible()
        expect(self.page.get_by_text(f"{waiting}\u00a0entr")).to_be_visible()
        self.count.said_to_be_lost += waiting
        self._take_in(held)

    def _take_in(self, held: dict[str, Any]) -> None:
        import json

        self.proxy.plan = []
        self._sign_in(self.page)
        self.page.goto(f"{self.address}/site/lower-mill/tablets/file/")
        self.page.get_by_label("The file that the tablet saved").set_input_files(
            {"name": "w.json", "mimeType": "application/json", "buffer": json.dumps(held).encode()}
        )
        self.page.get_by_role("button", name="Read it").click()
        expect(self.page.get_by_role("heading", name="From the file of a tablet")).to_be_visible()
        self._load()

    # -- afterwards --

    def _settle(self) -> None:
        """All is whole again: sign in, send until nothing waits, then the late repeats arrive."""
        self.proxy.plan = []
        self._sign_in(self.page)
        self._home()
        for _turn in range(20):
            self._send_now()
            with contextlib.suppress(AssertionError):
                expect(self.page.get_by_text("Nothing waits to be sent.").first).to_be_visible(
                    timeout=3000
                )
                break
        self.proxy.replay()

    def _compare(self) -> None:
        stuck = self.page.get_by_text("not taken: see To send").count()
        if stuck:
            self.count.wrong.append(f"seed {self.seed}: {stuck} refused")
        for key, photo in self.acknowledged.items():
            self.count.acknowledged += 1
            rows = self.served.ask(
                "SELECT i.id,"
                " (SELECT count(*) FROM logbook_finding f WHERE f.inspection_id = i.id),"
                " (SELECT count(*) FROM logbook_sentfromtablet s WHERE s.inspection_id = i.id)"
                " FROM logbook_inspection i WHERE i.key = ?",
                [key.replace("-", "")],
            )
            if len(rows) == 1 and rows[0][1:] == (1, 1):
                self.count.in_the_book += 1
            else:
                self.count.wrong.append(f"seed {self.seed} ({self.event}): {key} {rows}")
            if photo is not None:
                self._compare_photo(key, photo)

    def _compare_photo(self, key: str, photo: bytes) -> None:
        self.count.photos += 1
        digest = sha256(photo).hexdigest()
        arrived = self.served.ask(
            "SELECT count(*) FROM logbook_photo p JOIN logbook_finding f ON f.id = p.finding_id"
            " JOIN logbook_inspection i ON i.id = f.inspection_id"
            " WHERE i.key = ? AND p.sha256 = ? AND p.arrived_at IS NOT NULL",
            [key.replace("-", ""), digest],
        )
        file = self.served.data / "photos" / digest[:2] / digest
        if arrived == [(1,)] and file.read_bytes() == photo:
            self.count.photos_identical += 1
        else:
            self.count.wrong.append(f"seed {self.seed} ({self.event}): photo of {key} {arrived}")


def whole_book(served: Served, count: Count, acknowledged: set[str]) -> None:
    """Nothing is in the book twice or by half, and what nobody acknowledged is counted."""
    keys = [str(row[0]) for row in served.ask("SELECT key FROM logbook_inspection")]
    if len(keys) != len(set(keys)):
        count.wrong.append("a key stands twice in the book")
    count.not_acknowledged_and_in_the_book = len(set(keys) - acknowledged)


def runs(playwright: Playwright, data: Path, seeds: range, say: Any = print) -> Count:
    served = Served(data, 0)
    from .served import free_port

    served.port = free_port()
    served.make()
    served.start()
    count, acknowledged = Count(), set[str]()
    try:
        for seed in seeds:
            run = Run(playwright, served, seed, count)
            began = time.monotonic()
            run.go()
            acknowledged |= {key.replace("-", "") for key in run.acknowledged}
            say(f"seed {seed}, {run.event}: {time.monotonic() - began:.1f} s")
        whole_book(served, count, acknowledged)
    finally:
        served.kill()
    say(str(count))
    return count
