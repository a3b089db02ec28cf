"""Judges the promises of tests/done/01 from logs, test results and figures. What is missing counts as no."""

import re
import sys
import xml.etree.ElementTree as ElementTree
from pathlib import Path

FOLDER = Path(sys.argv[1])
LONG = sys.argv[2] == "long"
PAIRS = 20_000 if LONG else 300
MECHANICS = "PermitScreen.Mechanics.Tests."
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

    def script(self, name, log=None):
        """A script's own count, from its section of the log."""
        section = re.search(rf"(?ms)^== {re.escape(name)}( \(.*?\))?$(.*?)^(\d+) passed, (\d+) failed$", GATE) if log is None else re.search(r"(?ms)()()^(\d+) passed, (\d+) failed$", log)
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


def two_commands():
    p = Promise("README's run command builds, starts, screens, prints and leaves the service answering; dotnet test and .ci/run pass")
    p.script("README's command in the fresh clone", text("readme.log"))
    outcomes = [outcome for _, outcome in RESULTS]
    p.needs("tests that did not pass", outcomes and set(outcomes) == {"Passed"}, f"dotnet test {outcomes.count('Passed')} passed, {len(outcomes) - outcomes.count('Passed')} not")
    last = GATE.strip().splitlines()[-1] if GATE.strip() else "nothing"
    p.needs(f".ci/run ended with: {last}", re.fullmatch(r"[1-9]\d* passed, 0 failed", last), f".ci/run {last}")
    return p


def ordinates():
    p = Promise("ordinates agree with closed forms within 1e-9 and with a finite element solver within 1e-5")
    p.tests(MECHANICS + "Trusses.ClosedFormTests.", MECHANICS + "Trusses.ReferencePrattTests.", MECHANICS + "Trusses.CcxTests.")
    p.worst("mechanics.closed_form[{}].worst", 1e-9, "closed forms, worst")
    p.worst("mechanics.ccx[{}].worst_share_of_largest", 1e-5, "CalculiX, worst share of the largest ordinate")
    return p


def extremes():
    p = Promise(f"{PAIRS:,} random pairs: exact extremes bound a 1 mm scan; position reproduces; decimal arithmetic and the plain path agree; symmetries hold; a common factor divides RF")
    p.tests(MECHANICS + "Extremes.RandomPairsTests.", MECHANICS + "Extremes.DecimalOracleTests.", MECHANICS + "Extremes.SymmetryTests.A_mirrored_line",
            MECHANICS + "Extremes.SymmetryTests.Responses_of_two_groups_of_axles_add_up", MECHANICS + "Extremes.SymmetryTests.A_combination_of_lines",
            MECHANICS + "Extremes.SymmetryTests.Reactions_balance", SERVICE + "Properties.LoadTests.A_common_factor")
    p.count("mechanics.pairs.count", PAIRS, "pairs")
    p.worst("mechanics.pairs.scan_above_exact.worst_relative", 1e-9, "scan above exact")
    p.worst("mechanics.pairs.exact_above_scan.worst_share_of_half_step", 1, "exact above scan, share of half a step")
    p.worst("mechanics.pairs.position_reproduces.worst_relative", 1e-12, "position reproduces within")
    p.count("mechanics.decimal_oracle.pairs", 200, "pairs in decimal arithmetic")
    p.worst("mechanics.decimal_oracle.worst_relative", 1e-12, "worst")
    p.count("mechanics.pairs.fast_equals_plain.compared", 1, "comparisons of fast and plain path equal to the bit")
    p.seen(*(f"python: axle loads times {times} divide the RF of 21 rungs by it within 1e-12" for times in (0.5, 1.25, 3)))
    p.said.append("RF divided by 3 common factors on 21 rungs within 1e-12")
    return p


def mutated():
    p = Promise("10,000 mutated trusses are refused by name or solved accurately; there is no third outcome")
    p.tests(MECHANICS + "Trusses.MutatedTrussTests.")
    p.count("mechanics.mutated[{}]", 10_000, "trusses")
    p.count("mechanics.mutated[solved]", 1, "solved")
    p.worst("mechanics.mutated.worst_equilibrium", 1e-9, "joints balance within")
    return p


def deletion():
    p = Promise("no optional field, deleted, makes a verdict better")
    p.tests(SERVICE + "Deletion.")
    told = [value for key, value in FIGURES if key == "deletion"]
    p.needs("figure deletion: missing", told, "; ".join(told))
    return p


def seeded():
    p = Promise("nine seeded faults each turn a test red")
    told = [value for key, value in FIGURES if key == "seeded-faults"]
    p.needs(f"figure seeded-faults: {told or 'missing'}", told == ["9 of 9 red"], "; ".join(told) or "not run")
    return p


def clients():
    p = Promise("clients in other languages screen, read BadRequest details and meet the deadline")
    for script in ("reflection", "python_client", "node_client"):
        p.script(script)
    p.seen("reflection: screens application 01", "reflection: its BadRequest details name every field at once", "python: the details tell of axles[0].load_kn",
           "python: a deadline of 2 s on a route of 10,000 crossings is exceeded, and no verdict comes", "python: a call that is cancelled ends as CANCELLED")
    return p


if __name__ == "__main__":
    held = [promise().print() for promise in (two_commands, ordinates, extremes, mutated, deletion, seeded, clients)]
    print("n/a\ta newcomer screens a truss of their own\tsee the closing note")
    sys.exit(0 if all(held) else 1)
