"""The demo: what it prints, and that it leaves the service answering. With --readme, the command of README.md word for word."""

import math
import re
import signal
import subprocess
import sys

from support import checks, oracle
from support.program import AS_OF, DEMO, PATIENCE_S, POLICY, ROOT, Running, answers, command, free_port, permitscreen

FILE = "01-reactor-vessel-13-axles.json"
LAST_LINE = "Stop it with Ctrl-C."
ENDS_WITHIN_S = 10
NUMBER = r"(-?[\d.]+)"


def unwrapped(text):
    """Long lines are broken with what follows set in by 9 or 22 spaces."""
    return re.sub(r"\n(?: {9}| {22})(?=\S)", " ", text)


def sections(text):
    """Text by crossing: number, resource name, verdict, lines."""
    parts = re.split(r"(?m)^(\d+)\. (structures/\S+) .*: (PASS|PASS_WITH_CONDITIONS|FAIL|NOT_ASSESSED)$", text)
    return [(int(parts[i]), parts[i + 1], parts[i + 2], parts[i + 3]) for i in range(1, len(parts), 4)]


def truncated(value):
    return math.trunc(value * 100 + 1e-9) / 100


def reported(crossing):
    """The rung whose factors stand in the table: the first that passes, or the last that is available."""
    passing = [r for r in crossing["rungs"] if r["outcome"] == "PASSES"]
    available = [r for r in crossing["rungs"] if r["outcome"] != "UNAVAILABLE"]
    return passing[0] if passing else available[-1]


def printed(check, output):
    """Caution, verdicts, travel conditions, what governs, lead axle, arithmetic."""
    text = unwrapped(output)
    by = oracle.expected(FILE)
    check.contains("demo: the caution stands before any verdict", ["CAUTION"], text.split("Route:")[0])
    check.contains("demo: it says no load rating, no permit, review by a licensed engineer", ["no load rating and no permit", "licensed engineer"], text)
    check.contains("demo: the route's verdict", [f"Route: {by['verdict']}"], text)
    found = sections(text)
    check.equal("demo: structures in travel order", [c["structure"] for c in by["crossings"]], [name for _, name, _, _ in found])
    for want, (_, name, verdict, lines) in zip(by["crossings"], found):
        short = name.removeprefix("structures/")
        check.equal(f"demo: {short} is {want['verdict']}, as the oracle says", want["verdict"], verdict)
        conditions = re.search(r"(?m)^   Travel conditions  \S.*$", lines)
        check.that(f"demo: {short} has travel conditions just when it passes", bool(conditions) == want["verdict"].startswith("PASS"), lines)
        governs = re.search(r"(?m)^   Governs +(.+), (tension|compression|bearing|uplift), plane (\S+) \(member\)", lines)
        allowed = [(g["planeId"], g["sense"].removeprefix("EFFECT_SENSE_").lower()) for g in reported(want)["governing"]]
        check.that(f"demo: {short} names member, sense and plane that govern", governs and (governs[3], governs[2]) in allowed, f"{allowed}\n{lines}")
        lead = re.search(rf"(?m)^   Vehicle +lead axle at {NUMBER} m(?: \(just (?:before|after)\))?, (forward|in reverse), axles [\d, -]+ on the deck", lines)
        check.that(f"demo: {short} tells the lead axle's place, the direction and the axles on the deck", lead, lines)
        arithmetic(check, short, lines, reported(want))
        rungs = re.findall(r"(?m)^   Rung +(\S+): (passes|fails|unavailable|not assessed)", lines)
        outcomes = [(r["rungId"], r["outcome"].lower().replace("_", " ")) for r in want["rungs"]]
        check.equal(f"demo: {short} shows how every rung came out", outcomes, rungs)
        row = re.search(rf"(?m)^ +\d+ +{short} .*? {want['verdict']} +{NUMBER} +{NUMBER} ", text)
        factors = (truncated(reported(want)["ratingFactor"]), truncated(reported(want)["largestAxleFactor"]))
        check.that(f"demo: {short} has RF and k of the oracle in the table", row and (float(row[1]), float(row[2])) == factors, f"{factors}\n{row and row[0]}")


def arithmetic(check, short, lines, rung):
    """The numbers printed lead to the factor printed."""
    capacity = re.search(rf"(?m)^   Capacity +C = {NUMBER} × φ {NUMBER} × φcφs {NUMBER} = {NUMBER} kN", lines)
    dead = re.search(rf"(?m)^   Dead load +ΣγD = (.+) = {NUMBER} kN", lines)
    numerator = re.search(rf"(?m)^   Numerator +N = C − ΣγD = {NUMBER} kN", lines)
    factored = [float(x) for x in re.findall(rf"(?m)^   Live load .* = {NUMBER} kN", lines)]
    factor = re.search(rf"(?m)^   Rating factor +RF = {NUMBER} / {NUMBER} = {NUMBER}, shown as {NUMBER}; k = {NUMBER}", lines)
    if not check.that(f"demo: {short} prints capacity, dead load, live load and factor", capacity and dead and numerator and factored and factor, lines):
        return
    given, phi, product, c = map(float, capacity.groups())
    terms = sum(float(a) * float(b) for a, b in re.findall(rf"\w+ {NUMBER} × {NUMBER}", dead[1]))
    n, (above, below, rf, shown, k) = float(numerator[1]), map(float, factor.groups())
    # Within what the digits printed allow: factors have three decimals, amounts two.
    steps = {
        "C": (given * phi * product, c, 1.5),
        "ΣγD": (terms, float(dead[2]), 0.5),
        "N": (c - float(dead[2]), n, 0.015),
        "N above the line": (n, above, 1e-9),
        "Σ live": (sum(factored), below, 0.025),
        "RF": (above / below, rf, 1e-3),
        "RF of the oracle": (rung["ratingFactor"], rf, 1e-4),
        "RF as shown": (truncated(rung["ratingFactor"]), shown, 1e-9),
        "k as shown": (truncated(rung["largestAxleFactor"]), k, 1e-9),
    }
    wrong = [f"{name}: {a} against {b}" for name, (a, b, within) in steps.items() if not abs(a - b) <= within]
    check.none(f"demo: {short}: the arithmetic printed adds up to the oracle's RF", wrong)


def answering(check, port, ask=permitscreen):
    """The service that the demo leaves behind."""
    second = ask("screen", DEMO / "applications" / "02-transformer-19-axles.json", "--as-of", AS_OF, "--policy", POLICY, "--server", f"http://127.0.0.1:{port}")
    check.equal("demo: afterwards the service screens another application", 1, second.returncode)
    verdicts = [verdict for _, _, verdict, _ in sections(unwrapped(second.stdout))]
    check.equal("demo: with the oracle's verdicts", [c["verdict"] for c in oracle.expected("02-transformer-19-axles.json")["crossings"]], verdicts)


def stops(check, what, demo, port):
    code, seconds = demo.end(signal.SIGINT)
    check.equal(f"{what}: Ctrl-C ends it with exit code 0", 0, code)
    check.that(f"{what}: within {ENDS_WITHIN_S} s", seconds < ENDS_WITHIN_S, f"{seconds:.1f} s")
    check.that(f"{what}: afterwards nobody listens", not answers(port))


def published_program(check):
    port = free_port()
    with Running(command("demo", "--port", port), LAST_LINE) as demo:
        demo.wait_until_ready()
        printed(check, demo.output)
        check.contains("demo: it says where the service answers", [f"http://127.0.0.1:{port}"], demo.output)
        answering(check, port)
        check.that("demo: it keeps running", demo.process.poll() is None, demo.output)
        stops(check, "demo", demo, port)


def once(check):
    result = permitscreen("demo", "--once", "--port", 0, folder="/")
    check.equal("demo --once, from another folder: exit code of a route that does not pass", 1, result.returncode)
    check.contains("demo --once: the same verdicts", ["1 pass, 3 pass with conditions, 1 not assessed, 2 fail"], result.stdout)


def readme(check):
    lines = (ROOT / "README.md").read_text(encoding="utf-8").splitlines()
    run = next((line.split("#")[0].strip() for line in lines if re.match(r"dotnet run .*-- demo\b", line)), None)
    if not check.that("README: it has a command that runs the demo", run):
        return

    def ask(*arguments):
        program = run.split(" -- ")[0].split()
        return subprocess.run([*program, "--no-build", "--", *map(str, arguments)], cwd=ROOT, capture_output=True, text=True, timeout=PATIENCE_S, check=False)

    with Running(["bash", "-c", f"exec {run}"], LAST_LINE) as demo:
        demo.wait_until_ready(600)
        printed(check, demo.output)
        port = int(re.search(r"answers at http://127\.0\.0\.1:(\d+)", demo.output)[1])
        answering(check, port, ask)
        stops(check, "README", demo, port)


if __name__ == "__main__":
    checks.run(readme) if "--readme" in sys.argv[1:] else checks.run(published_program, once)
