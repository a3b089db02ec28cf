"""Promises, and what they are judged from: the gate's log, test results and figures in a folder. What is missing counts as no."""

import re
import sys
import xml.etree.ElementTree as ElementTree
from pathlib import Path

FOLDER = Path(sys.argv[1])
MECHANICS = "PermitScreen.Mechanics.Tests."
CATALOGUE = "PermitScreen.Catalogue.Tests."
DATA = "PermitScreen.Data.Tests."
SERVICE = "PermitScreen.Service.Tests."


def text(name):
    path = FOLDER / name
    return path.read_text(encoding="utf-8", errors="replace") if path.exists() else ""


def results():
    """Outcome of every test by its full name."""
    found = []
    for path in (FOLDER / "results").rglob("*.trx"):
        for result in ElementTree.parse(path).getroot().iter("{http://microsoft.com/schemas/VisualStudio/TeamTest/2010}UnitTestResult"):
            found.append((result.get("testName"), result.get("outcome")))
    return found


FIGURES = [line.split("\t", 1) for line in text("figures").splitlines() if "\t" in line]
RESULTS = results()
GATE = text("gate.log")


class Promise:
    """One line: every part must hold."""

    def __init__(self, what):
        self.what = what
        self.said = []
        self.lacks = []

    def needs(self, part, holds, said=None):
        if not holds:
            self.lacks.append(part)
        if said:
            self.said.append(said)

    def tests(self, *names):
        """All tests whose full name begins so were run, and passed."""
        for name in names:
            outcomes = [outcome for test, outcome in RESULTS if test.startswith(name)]
            self.needs(f"{name}: {', '.join(sorted(set(outcomes))) or 'not run'}", outcomes and set(outcomes) == {"Passed"})

    def worst(self, key, most, said):
        """Every figure of that key is at most so large; the largest is said. `{}` in the key stands for anything."""
        pattern = re.compile(re.escape(key).replace(r"\{\}", ".*") + "$")
        values = [float(value) for name, value in FIGURES if pattern.match(name)]
        self.needs(f"{key}: {max(values) if values else 'missing'}, allowed {most:g}", values and all(v <= most for v in values))
        self.said.append(f"{said} {max(values):.2g}" if values else f"{said} missing")

    def count(self, key, least, said):
        pattern = re.compile(re.escape(key).replace(r"\{\}", ".*") + "$")
        values = [int(float(value)) for name, value in FIGURES if pattern.match(name)]
        self.needs(f"{key}: {sum(values) if values else 'missing'}, at least {least}", values and sum(values) >= least)
        self.said.append(f"{sum(values) if values else 'no'} {said}")

    def least(self, key, least, said):
        """The figure of that key is at least so large; it is said."""
        values = [float(value) for name, value in FIGURES if name == key]
        self.needs(f"{key}: {min(values) if values else 'missing'}, at least {least:g}", values and min(values) >= least)
        self.said.append(f"{min(values):,.10g} {said}" if values else f"no {said}")

    def told(self, key, said):
        """A figure that is said and judged by nobody; it must be there."""
        values = [value for name, value in FIGURES if name == key]
        self.needs(f"{key}: missing", values)
        self.said.append(f"{said} {values[-1]}" if values else f"{said} missing")

    def script(self, name, log=None):
        """A script's own count, from its section of the log."""
        closing = r"^(\d+) passed, (\d+) failed$"
        section = re.search(rf"(?ms)^== {re.escape(name)}( \(.*?\))?$((?:(?!^== ).)*?){closing}", GATE) if log is None else re.search(rf"(?ms)()(){closing}", log)
        self.needs(f"{name}: failed or not run", section and int(section[3]) > 0 and int(section[4]) == 0)
        self.said.append(f"{name} {section[3]} passed, {section[4]} failed" if section else f"{name} not run")

    def seen(self, *lines):
        """These checks stand in the gate's log as passed."""
        for line in lines:
            self.needs(f"no such check passed: {line}", f"\nok - {line}" in GATE)

    def print(self):
        print(f"{'no' if self.lacks else 'yes'}\t{self.what}\t{'; '.join(self.said)}")
        for lack in self.lacks:
            print(f"    {lack}", file=sys.stderr)
        return not self.lacks


def gate(promise):
    """`dotnet test` and .ci/run pass."""
    outcomes = [outcome for _, outcome in RESULTS]
    promise.needs("tests that did not pass", outcomes and set(outcomes) == {"Passed"}, f"dotnet test {outcomes.count('Passed')} passed, {len(outcomes) - outcomes.count('Passed')} not")
    last = GATE.strip().splitlines()[-1] if GATE.strip() else "nothing"
    promise.needs(f".ci/run ended with: {last}", re.fullmatch(r"[1-9]\d* passed, 0 failed", last), f".ci/run {last}")


def all_held(promises):
    """Prints every promise; whether all hold."""
    return all([promise().print() for promise in promises])
