"""A client that knows nothing but the address: buf curl, by reflection, in a folder without protos."""

import base64
import json
import os
import subprocess
import tempfile

from support import checks, oracle
from support.program import AS_OF, POLICY, ROOT, free_port, serving

BUF = ROOT / "tests" / "tools" / "node_modules" / ".bin" / "buf"
FILE = "01-reactor-vessel-13-axles.json"
SCREEN = "permitscreen.v1.ScreeningService/ScreenApplication"
INVALID_ARGUMENT = 3
NOT_FOUND = 5


def curl(port, *arguments, body=None):
    """Exit code (8 times the code of gRPC), output, errors."""
    with tempfile.TemporaryDirectory() as empty:
        data = [] if body is None else ["-d", "@-"]
        method = f"/{arguments[0]}" if arguments and not arguments[0].startswith("-") else ""
        options = arguments[1:] if method else arguments
        return subprocess.run(
            [BUF, "curl", "--protocol", "grpc", "--http2-prior-knowledge", *options, *data, f"http://127.0.0.1:{port}{method}"],
            cwd=empty, input=None if body is None else json.dumps(body), capture_output=True, text=True, timeout=120, check=False,
            env={**os.environ, "BUF_CACHE_DIR": empty})


def request(**changes):
    year, month, day = map(int, AS_OF.split("-"))
    return {"application": oracle.application(FILE), "policy": POLICY, "asOfDate": {"year": year, "month": month, "day": day}, "view": "SCREENING_VIEW_FULL", **changes}


def known_by_reflection(check, port):
    services = curl(port, "--list-services").stdout.split()
    expected = {"permitscreen.v1.ScreeningService", "permitscreen.v1.CatalogueService", "permitscreen.v1.PolicyService", "grpc.health.v1.Health"}
    check.that("reflection: lists the services", expected <= set(services), services)
    methods = curl(port, "--list-methods").stdout.split()
    check.that("reflection: lists the methods", SCREEN in methods, methods)
    health = curl(port, "grpc.health.v1.Health/Check", body={})
    check.equal("reflection: the health service says SERVING", "SERVING", json.loads(health.stdout or "{}").get("status"))


def screens(check, port):
    answer = curl(port, SCREEN, body=request())
    if check.equal("reflection: screens application 01", 0, answer.returncode):
        screening = json.loads(answer.stdout)["screening"]
        misses, numbers = oracle.misses(oracle.expected(FILE), screening)
        check.none(f"reflection: verdicts, rungs and {numbers} factors are the oracle's", misses)
        check.contains("reflection: the answer carries the caution", ["no load rating and no permit"], screening.get("caution", ""))
    basic = curl(port, SCREEN, body=request(view="SCREENING_VIEW_BASIC"))
    crossings = json.loads(basic.stdout)["screening"]["crossings"]
    check.that("reflection: the BASIC view has verdicts and no rungs", all("verdict" in c and "rungs" not in c for c in crossings), basic.stdout[:500])


def refuses(check, port):
    wrong = request(policy="ossel")
    axles = wrong["application"]["configurations"][0]["loading"]["axleTrains"][0]["axles"]
    axles[2]["loadKn"] = -88.0
    del axles[4]["offsetM"]
    answer = curl(port, SCREEN, body=wrong)
    check.equal("reflection: an invalid request ends with INVALID_ARGUMENT", 8 * INVALID_ARGUMENT, answer.returncode)
    check.contains("reflection: its code is shown", ['"code": "invalid_argument"'], answer.stderr)
    error = json.loads(answer.stderr)
    detail = next((d for d in error.get("details", []) if d["type"] == "google.rpc.BadRequest"), {"value": ""})
    # buf shows a detail's bytes in base64, and its fields where reflection knows the message.
    shown = json.dumps(detail.get("debug", {})) + base64.b64decode(detail["value"] + "==").decode("utf-8", "replace")
    check.contains("reflection: its BadRequest details name every field at once", ["axles[2].load_kn", "axles[4].offset_m", "policy"], shown)
    check.contains("reflection: with what was found and what is allowed", ["Found -88; allowed is a number greater than 0, kN", "Missing; say where the axle stands"], shown)
    missing = curl(port, "permitscreen.v1.CatalogueService/GetStructure", body={"name": "structures/X-1"})
    check.equal("reflection: an unknown structure ends with NOT_FOUND", 8 * NOT_FOUND, missing.returncode)


def everything(check):
    port = free_port()
    with serving(port) as service:
        service.wait_until_ready()
        check.all((known_by_reflection, screens, refuses), port)


if __name__ == "__main__":
    checks.run(everything)
