"""Kills the service at instants drawn by progress while it imports, revises and computes lines; it must end as if nothing had happened.

The instants come from PERMITSCREEN_HALT_AT, which stops the process dead at a moment of its work with the records, and from the acknowledgements
that the driver gets. What an undisturbed run leaves is the reference. PERMITSCREEN_KILLS: how many kills (30).
"""

import os
import random
import shutil
import signal
import tempfile
import threading
import time

from support import checks, ending, figures, records, worklist
from support.driver import CutOff, Driver
from support.program import ROOT, free_port, recording
from support.stubs import Service

KILLS = int(os.environ.get("PERMITSCREEN_KILLS", "30"))
KILLS_IN_A_FOLDER = 5
SEED = 20261201
IN_A_BATCH = 128  # trusses whose lines the worker keeps at once, at most; so many batches are passed at least
HALTS = {"InMigration", "InsideTransaction", "AfterCommit", "LinesInsideTransaction", "LinesAfterCommit", "BeforeStrike"}
LINES = {"LinesInsideTransaction", "LinesAfterCommit", "BeforeStrike"}
IN_TRANSACTION = {"InMigration", "InsideTransaction", "LinesInsideTransaction"}
CHANGES = {"InsideTransaction", "AfterCommit"}
ANYWHERE, PUBLICATION = "anywhere in the first import", "its publication"
AFTER, DURING = "after an acknowledgement", "during a call"
# In this order, so that a smaller number of kills has every kind too.
KINDS = [
    "InsideTransaction", "AfterCommit", "LinesInsideTransaction", "InMigration", "LinesAfterCommit", DURING, "BeforeStrike", "AfterCommit", "InsideTransaction", AFTER,
    "LinesAfterCommit", "InsideTransaction", "AfterCommit", "InMigration", "InsideTransaction", "LinesInsideTransaction", "AfterCommit", AFTER, "InsideTransaction", "BeforeStrike",
    "InMigration", "AfterCommit", "InsideTransaction", DURING, "LinesAfterCommit", "AfterCommit", "InMigration", "InsideTransaction", "LinesInsideTransaction", AFTER,
]


def migration_moments():
    """How many moments the migrations of a fresh folder pass: each statement, and the end of each script."""
    scripts = sorted((ROOT / "src" / "PermitScreen.Data.Sqlite").rglob("*.sql"))
    texts = [script.read_text(encoding="utf-8") for script in scripts]
    return sum(len([s for s in text.split(";\n") if s.strip()]) + 1 for text in texts)


class Killing:
    """One kill that is to come: its kind, and how it came about."""

    def __init__(self, kind, draw):
        self.kind = kind
        self._draw = draw
        self.count = 0

    def aim(self, driver, pending, kills_left, into_import):
        """Draws the instant from what is still to come, leaving room for the kills after it, or from the first import where that is asked for."""
        if self.kind == "InMigration":
            most = migration_moments()
        elif self.kind in LINES:
            trusses = pending if driver.published else worklist.fleet.different_trusses(worklist.IMPORTED)
            most = trusses // IN_A_BATCH // kills_left
        elif into_import and not driver.published:
            # A fresh service first notes which mechanics its lines are of: one commit more.
            most = driver.left_of_first_import + (self.kind in CHANGES and not driver.acknowledged)
        else:
            most = driver.left // kills_left
        publishing = into_import == PUBLICATION and self.kind in CHANGES and not driver.published
        self.count = most if publishing else self._draw.randint(1, max(1, most))
        return {"PERMITSCREEN_HALT_AT": f"{self.kind}:{self.count}"} if self.kind in HALTS else {}

    @property
    def name(self):
        return f"{self.kind}:{self.count}" if self.kind in HALTS else f"{self.kind} ({self.count})"

    def hooks(self, kill):
        """What the driver is to call where the kill goes by acknowledgements."""
        passed = 0
        pause = self._draw.uniform(0, 0.01)

        def step():
            nonlocal passed
            passed += 1
            if passed == self.count:
                if self.kind == DURING:
                    time.sleep(pause)
                kill()
                if self.kind == AFTER:
                    raise CutOff(self.name)

        return {"after_call": step} if self.kind == AFTER else {"in_call": step} if self.kind == DURING else {}


class Session:
    """The service from one start to one kill, or to the end of the work."""

    def __init__(self, folder, driver, killing, environment):
        self._folder = folder
        self._driver = driver
        self._killing = killing
        self._environment = environment
        self._unanswered = None
        self._where = ""
        self._killed = threading.Event()
        self._over = threading.Event()

    def run(self):
        """Whether the service was killed."""
        port = free_port()
        with recording(port, self._folder, environment=self._environment) as service:
            watch = threading.Thread(target=self._watch, args=(service,), daemon=True)
            watch.start()
            try:
                self._work(service, port)
            except CutOff:
                if not self._killed.wait(30):
                    raise RuntimeError(f"the service went away and was not killed; it printed\n{service.output}") from None
            finally:
                self._over.set()
            if not self._killed.is_set():
                code, _ = service.end(signal.SIGTERM)
                if code != 0:
                    raise RuntimeError(f"a clean stop ended with exit code {code}\n{service.output}")
            return self._killed.is_set()

    def in_flight(self):
        """What the kill interrupted: an unanswered call, lines to be computed, a transaction; and the words for it."""
        pending, version = records.left_behind(self._folder)
        open_transaction = self._killing.kind in IN_TRANSACTION
        words = [f"{len(self._driver.acknowledged)} of {len(self._driver.operations)} operations acknowledged, version {version} committed"]
        words.append(f"unanswered: {self._unanswered}" if self._unanswered else "no call unanswered")
        words.append(f"{pending} trusses pending")
        words += [self._where] if self._where else []
        return bool(self._unanswered or pending or open_transaction), "; ".join(words), pending

    def _watch(self, service):
        """Kills where the service says that it halted."""
        if not self._killing or self._killing.kind not in HALTS:
            return
        while not self._over.is_set():
            if line := service.line_with("halted at ", 0.5):
                self._kill(service, line.split("(", 1)[1].rstrip(")"))
                return

    def _kill(self, service, where=""):
        self._unanswered, self._where = self._driver.calling, where
        service.kill()
        self._killed.set()

    def _work(self, service, port):
        if not service.becomes_ready():
            raise CutOff("before it was ready")
        with Service(port) as client:
            self._driver.repeat_last(client)
            hooks = self._killing.hooks(lambda: self._kill(service)) if self._killing else {}
            self._driver.run(client, **hooks)
            self._driver.wait_for_lines(client)


def plan(draw):
    """Kinds of kill by folder; migrations come first, because only a fresh folder has them. In every other folder a kill that goes by changes follows,
    which then falls into the first import."""
    kinds = [KINDS[i % len(KINDS)] for i in range(KILLS)]
    folders = -(-KILLS // KILLS_IN_A_FOLDER)
    shares = [kinds[i::folders] for i in range(folders)]
    for number, share in enumerate(shares):
        draw.shuffle(share)
        share.sort(key=lambda kind: 0 if kind == "InMigration" else 1 if kind in CHANGES and into_import(number) else 2)
    return shares


def into_import(number):
    """Where in the first import the first kill by changes of a folder falls; None where it is drawn over all the work."""
    return (PUBLICATION, None, ANYWHERE, None)[number % 4]


def undisturbed(check):
    with tempfile.TemporaryDirectory(prefix="permitscreen-kills-") as folder:
        driver = Driver(worklist.make())
        start = time.monotonic()
        Session(folder, driver, None, {}).run()
        seconds = time.monotonic() - start
        reference = ending.read(folder, driver)
        check.none("kills: the undisturbed run ends as its list says", ending.faults(reference, driver))
        figures.note("kills.undisturbed_seconds", round(seconds, 1))
        figures.note("kills.operations", len(driver.operations))
        figures.note("kills.line_blobs", len(reference["line blobs"]))
        return reference


def disturbed(number, kinds, draw, told):
    """One folder from nothing to the end of the list; returns what it left, the driver, and the kinds of kill that did not come about."""
    folder = tempfile.mkdtemp(prefix="permitscreen-kills-")
    driver = Driver(worklist.make())
    waiting = list(kinds)
    pending = 0
    while True:
        killing = Killing(waiting[0], draw) if waiting else None
        session = Session(folder, driver, killing, killing.aim(driver, pending, len(waiting), into_import(number)) if killing else {})
        if not session.run():
            return folder, driver, waiting
        waiting.pop(0)
        flying, words, pending = session.in_flight()
        told.append(flying)
        print(f"kill {len(told):2} - folder {number + 1}, {killing.name}: {words}: {'in flight' if flying else 'idle'}", flush=True)


def kills(check):
    draw = random.Random(SEED)
    reference = undisturbed(check)
    told = []
    shares = plan(draw)
    number = 0
    while number < len(shares) and number < 2 * KILLS:
        folder, driver, missed = disturbed(number, shares[number], draw, told)
        left = ending.read(folder, driver)
        shutil.rmtree(folder)
        number += 1
        at = f"kills: folder {number}"
        for what in reference:
            check.none(f"{at}: {what} as without kills", ending.differences(reference[what], left[what]))
        check.none(f"{at}: all acknowledged is there, nothing was made twice, records are sound", ending.faults(left, driver))
        check.none(f"{at}: what was acknowledged and sent again was answered as before", driver.repeated)
        if missed:
            print(f"note - folder {number} ended before {', '.join(missed)}; another folder follows", flush=True)
            shares.append(missed)
    check.equal(f"kills: {KILLS} kills", KILLS, len(told))
    least = -(-2 * KILLS // 3)
    check.that(f"kills: at least {least} fell with work in flight", sum(told) >= least, f"{sum(told)} of {len(told)}")
    figures.note("kills", len(told))
    figures.note("kills.in_flight", sum(told))
    figures.note("kills.folders", number)


if __name__ == "__main__":
    checks.run(kills)
