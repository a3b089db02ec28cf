"""What the command line tells scripts: exit codes, JSON, and messages that name the file, the field and the cure."""

import copy
import json
import re
import shutil
import socket
import tempfile
from pathlib import Path

from support import checks, oracle, stubs
from support.program import AS_OF, DEMO, POLICY, ROOT, free_port, permitscreen, serving

PASSED, NOT_PASSED, BAD_INPUT, NO_ANSWER = 0, 1, 2, 3
FIRST = DEMO / "applications" / "01-reactor-vessel-13-axles.json"
BRIDGE = DEMO / "catalogue" / "p14-0032.json"
AT = ("--as-of", AS_OF)


def read(path):
    return json.loads(path.read_text(encoding="utf-8"))


def written(folder, name, content):
    path = folder / name
    path.write_text(content if isinstance(content, str) else json.dumps(content), encoding="utf-8")
    return path


def with_crossings(*indices):
    """Application 01 on some of its crossings only."""
    file = read(FIRST)
    crossings = file["application"]["route"]["crossingList"]["crossings"]
    file["application"]["route"]["crossingList"]["crossings"] = [crossings[i] for i in indices]
    return file


def refused(check, what, result, parts):
    """Exit code 2, the message says it, and nothing looks like a verdict or a stack."""
    check.equal(f"{what}: exit code 2", BAD_INPUT, result.returncode)
    text = result.stdout + result.stderr
    check.contains(f"{what}: the message tells", parts, text)
    check.that(f"{what}: no verdict, no stack trace", "Route:" not in text and "   at PermitScreen" not in text and "Unhandled" not in text, text)


def exit_codes_of_screen(check, folder):
    passing = permitscreen("screen", written(folder, "passes.json", with_crossings(0)), *AT)
    check.equal("screen: a route that passes: exit code 0", PASSED, passing.returncode)
    check.contains("screen: and says so", ["Route: PASS\n"], passing.stdout)
    conditional = permitscreen("screen", written(folder, "conditions.json", with_crossings(0, 1)), *AT)
    check.equal("screen: a route that passes with conditions: exit code 0", PASSED, conditional.returncode)
    check.contains("screen: and names them", ["Route: PASS_WITH_CONDITIONS\n", "Travel conditions"], conditional.stdout)
    failing = permitscreen("screen", written(folder, "fails.json", with_crossings(6)), *AT)
    check.equal("screen: a route that fails: exit code 1", NOT_PASSED, failing.returncode)
    overdue = permitscreen("screen", written(folder, "not-assessed.json", with_crossings(0, 5)), *AT)
    check.equal("screen: a route with a crossing not assessed: exit code 1", NOT_PASSED, overdue.returncode)
    check.contains("screen: and says so", ["Route: NOT_ASSESSED\n", "inspection is overdue"], overdue.stdout)
    unknown = with_crossings(0)
    unknown["application"]["route"]["crossingList"]["crossings"].append({"structure": "structures/P99-0001", "relation": "CROSSING_RELATION_ON"})
    result = permitscreen("screen", written(folder, "unknown.json", unknown), *AT)
    check.equal("screen: a route over a structure that is not in the catalogue: exit code 1", NOT_PASSED, result.returncode)


def bad_files(check, folder):
    refused(check, "screen, no such file", permitscreen("screen", folder / "none.json"), ["none.json"])
    refused(check, "screen, not JSON", permitscreen("screen", written(folder, "torn.json", "{\"schema\": \"permitscreen/application/1\",\n \"appl")), ["torn.json", "not JSON", "line 2"])
    misspelt = with_crossings(0)
    axle = misspelt["application"]["configurations"][0]["loading"]["axleTrains"][0]["axles"][3]
    axle["laodKn"] = axle.pop("loadKn")
    refused(check, "screen, a field misspelt", permitscreen("screen", written(folder, "misspelt.json", misspelt)), ["misspelt.json", "axles[3].laodKn", "did you mean \"loadKn\"?"])
    negative = with_crossings(0)
    negative["application"]["configurations"][0]["loading"]["axleTrains"][0]["axles"][3]["loadKn"] = -1
    refused(check, "screen, a load below zero", permitscreen("screen", written(folder, "negative.json", negative), *AT), ["axles[3].load_kn", "Found -1", "greater than 0"])
    kind = with_crossings(0)
    kind["application"]["permitKind"] = "PERMIT_KIND_SINGLE_TRIP"
    refused(check, "screen, an unknown word", permitscreen("screen", written(folder, "kind.json", kind)), ["permit_kind", "PERMIT_KIND_SPECIAL_SINGLE_TRIP"])
    schema = with_crossings(0)
    schema["schema"] = "permitscreen/application/9"
    refused(check, "screen, another schema", permitscreen("screen", written(folder, "schema.json", schema)), ["permitscreen/application/1", "permitscreen/application/9"])
    refused(check, "screen, a catalogue in place of an application", permitscreen("screen", BRIDGE), ["p14-0032.json"])
    infinite = json.dumps(with_crossings(0)).replace("\"loadKn\": 70.0", "\"loadKn\": 1e999", 1)
    refused(check, "screen, a number beyond range", permitscreen("screen", written(folder, "infinite.json", infinite)), ["axles[0].load_kn", "finite"])


def bad_options(check, _):
    refused(check, "an unknown command", permitscreen("scren", FIRST), ["scren"])
    refused(check, "an unknown option", permitscreen("screen", FIRST, "--polcy", POLICY), ["--polcy"])
    refused(check, "a date written another way", permitscreen("screen", FIRST, "--as-of", "1.12.2026"), ["1.12.2026", "2026-12-01"])
    refused(check, "a policy that is not there", permitscreen("screen", FIRST, "--policy", "policies/none"), ["policies/none", POLICY])
    refused(check, "a structure that is not there", permitscreen("show", "P99-0001"), ["P99-0001"])
    refused(check, "an effect that is not there", permitscreen("show", "P14-0032", "--effect", "L2L9"), ["L2L9", "Did you mean"])
    refused(check, "a timeout of nothing", permitscreen("list", "--timeout", "0"), ["--timeout"])
    refused(check, "a timeout that is no number", permitscreen("list", "--timeout", "soon"), ["soon", "--timeout"])
    refused(check, "a server that is no address", permitscreen("list", "--server", "localhost"), ["--server", "http://127.0.0.1:5080"])
    refused(check, "a server and a catalogue", permitscreen("list", "--server", "http://127.0.0.1:1", "--catalogue", BRIDGE), ["--server", "--catalogue"])
    refused(check, "a folder that is not there", permitscreen("list", "--catalogue", "/none/such", "--policies", DEMO / "policies"), ["/none/such"])
    refused(check, "a catalogue without policies", permitscreen("list", "--catalogue", BRIDGE), ["--policies"])
    with socket.socket() as taken:
        taken.bind(("127.0.0.1", 0))
        taken.listen()
        port = taken.getsockname()[1]
        told = [f"Port {port} is in use", "--port"]
        refused(check, "serve on a port in use", permitscreen("serve", "--catalogue", BRIDGE, "--policies", DEMO / "policies", "--port", port), told)
        refused(check, "demo on a port in use", permitscreen("demo", "--port", port), told)
    refused(check, "a port beyond range", permitscreen("serve", "--catalogue", BRIDGE, "--policies", DEMO / "policies", "--port", 70000), ["--port", "65535"])
    refused(check, "demo on a port beyond range", permitscreen("demo", "--port", 70000), ["--port", "65535"])
    refused(check, "an address that is none", permitscreen("serve", "--catalogue", BRIDGE, "--policies", DEMO / "policies", "--address", "here"), ["--address", "here"])
    refused(check, "a zone that is none", permitscreen("serve", "--catalogue", BRIDGE, "--policies", DEMO / "policies", "--zone", "Ossel/Valley"), ["Ossel/Valley"])
    helped = permitscreen("--help")
    check.equal("--help: exit code 0", 0, helped.returncode)
    check.contains("--help: lists the commands and the exit codes", ["demo", "screen", "check", "list", "show", "serve", "2 bad input"], helped.stdout)


def no_answer(check, _):
    nobody = permitscreen("screen", FIRST, *AT, "--policy", POLICY, "--server", f"http://127.0.0.1:{free_port()}")
    check.equal("nobody there: exit code 3", NO_ANSWER, nobody.returncode)
    check.that("nobody there: says that the service cannot be reached, and gives no verdict", "cannot be reached" in nobody.stderr and "Route:" not in nobody.stdout, nobody.stderr)
    late = permitscreen("screen", FIRST, *AT, "--policy", POLICY, "--timeout", "0.001")
    check.equal("a deadline of 1 ms: exit code 3", NO_ANSWER, late.returncode)
    check.that("a deadline of 1 ms: no verdict", "Route:" not in late.stdout, late.stdout)
    with socket.socket() as deaf:
        deaf.bind(("127.0.0.1", 0))
        deaf.listen()
        silent = permitscreen("list", "--server", f"http://127.0.0.1:{deaf.getsockname()[1]}", "--timeout", "1")
        check.equal("a server that says nothing: exit code 3", NO_ANSWER, silent.returncode)
        check.that("a server that says nothing: says why", len(silent.stderr.strip()) > 10 and "Unhandled" not in silent.stderr, silent.stderr)


def json_output(check, _):
    port = free_port()
    server = ("--server", f"http://127.0.0.1:{port}")
    with serving(port) as program, stubs.Service(port) as service:
        program.wait_until_ready()
        printed = permitscreen("screen", FIRST, *AT, "--policy", POLICY, "--json", *server)
        check.equal("screen --json: exit code of the verdict", NOT_PASSED, printed.returncode)
        answer = service.screening.ScreenApplication(stubs.request(oracle.application(FIRST.name), POLICY, AS_OF), timeout=60)
        check.that("screen --json: equals what the service answers to another client", json.loads(printed.stdout) == stubs.as_json(answer)["screening"])
        own = permitscreen("screen", FIRST, *AT, "--json")
        check.that("screen --json: the same from a service of the command's own", json.loads(own.stdout) == json.loads(printed.stdout))
        structures = [json.loads(line) for line in permitscreen("list", "--json", *server).stdout.splitlines()]
        check.equal("list --json: one object a line", 12, len({s["name"] for s in structures}))
        shown = json.loads(permitscreen("show", "P14-0087", "--json", *server).stdout)
        check.that("show --json: structure and lines", shown["structure"]["name"] == "structures/P14-0087" and len(shown["lines"]) == 24, shown.keys())
        listed = permitscreen("list", *server)
        check.that("list: exit code 0, structures and policy", listed.returncode == 0 and "structures/P31-0202" in listed.stdout and POLICY in listed.stdout, listed)
        drawn = permitscreen("show", "P14-0032", "--effect", "L2L3", *server)
        check.contains("show --effect: ordinates", ["12.000 m", "1.066667"], drawn.stdout)


def faults_and_gaps(check, folder):
    good = permitscreen("check", BRIDGE, DEMO / "policies", written(folder, "passes.json", with_crossings(0)))
    check.equal("check: nothing to say of good files: exit code 0", PASSED, good.returncode)
    gaps = permitscreen("check", DEMO)
    check.equal("check: gaps only: exit code 1", NOT_PASSED, gaps.returncode)
    check.contains("check: a gap names structure and field", ["gap ", "structures/P31-0021", "effects[14].rated.dead_loads", "0 faults"], gaps.stdout)
    lines = [json.loads(line) for line in permitscreen("check", DEMO, "--json").stdout.splitlines()]
    check.equal("check --json: the same gaps, one object a line", ({"gap"}, {"structures/P31-0021"}), ({x["kind"] for x in lines}, {x["resource"] for x in lines}))
    whole = read(BRIDGE)
    for what, change, parts in FAULTS:
        broken = copy.deepcopy(whole)
        change(broken["structures"][0]["units"][0]["truss"], broken["structures"][0])
        path = written(folder, "broken.json", broken)
        refused(check, f"check, {what}", permitscreen("check", path), ["broken.json", *parts])
    result = permitscreen("check", written(folder, "empty.json", "{}"), BRIDGE)
    check.equal("check: one file of two at fault: exit code 2", BAD_INPUT, result.returncode)
    check.contains("check: and the good one is looked at too", ["ok ", "structures/P14-0032"], result.stdout)


def _without(items, name):
    items[:] = [item for item in items if item["name"] != name]


FAULTS = [
    ("a member to a node that is not there", lambda t, _: t["members"][3].update(endNode="L9"), ["truss.members[3].end_node", "L9"]),
    ("an area below zero", lambda t, _: t["members"][2].update(areaM2=-0.0105), ["truss.members[2].area_m2", "-0.0105", "greater than 0"]),
    ("two nodes in one place", lambda t, _: t["nodes"][8].update(xM=6.0, yM=7.5), ["U1", "U2"]),
    ("a node twice", lambda t, _: t["nodes"].append(dict(t["nodes"][2])), ["truss.nodes[12].name", "L2"]),
    ("a mechanism: a diagonal taken out", lambda t, s: (_without(t["members"], "U2L3"), _without_effect(s, "U2L3")), ["mechanism", "move"]),
    ("a support taken out", lambda t, _: t["supports"].pop(), ["effects[23].reaction.support", "\"end\" is no support"]),
    ("a misspelt field", lambda t, _: t["members"][0].update(areaM3=1), ["members[0].areaM3", "did you mean \"areaM2\"?"]),
    ("a text for a number", lambda t, _: t["nodes"][1].update(xM="6 m"), ["nodes[1].x_m", "6 m", "a finite number"]),
]


def _without_effect(structure, member):
    unit = structure["units"][0]
    unit["effects"] = [e for e in unit["effects"] if e.get("axialMember") != member]


def readme_examples(check, folder):
    """The commands that README.md gives for one's own files, word for word, but that the program is built already."""
    lines = (ROOT / "README.md").read_text(encoding="utf-8").splitlines()
    own = [line.split(" -- ", 1)[1].split("#")[0].split() for line in lines if re.match(r"dotnet run .* -- (check|screen) ", line)]
    check.equal("README: it shows check and screen on one's own files", ["check", "screen"], [words[0] for words in own])
    shutil.copytree(ROOT / "deploy" / "examples", folder / "my-files")
    (folder / "deploy").symlink_to(ROOT / "deploy")
    for words in own:
        result = permitscreen(*words, folder=folder)
        check.equal(f"README: {' '.join(words[:2])}: exit code 0", PASSED, result.returncode)
        wanted = [" 0 faults", " 0 gaps"] if words[0] == "check" else ["Route: PASS", "Numerator", "Rating factor"]
        check.contains(f"README: {' '.join(words[:2])}: what it prints", wanted, result.stdout)


def everything(check):
    with tempfile.TemporaryDirectory() as folder:
        check.all((exit_codes_of_screen, bad_files, bad_options, no_answer, json_output, faults_and_gaps, readme_examples), Path(folder))


if __name__ == "__main__":
    checks.run(everything)
