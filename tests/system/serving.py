"""A service as an operator meets it: start, readiness, refusal, stop; who can reach it."""

import copy
import json
import signal
import tempfile
import threading
import time
from pathlib import Path

import grpc
from support import checks, oracle, stubs
from support.program import AS_OF, DEMO, POLICY, Running, answers, command, free_port, serving

ENDS_WITHIN_S = 10
MANY = 1500
FIRST = "01-reactor-vessel-13-axles.json"
LISTENING = "0A"


def read(path):
    return json.loads(path.read_text(encoding="utf-8"))


def changed_copy(folder, name, change):
    """A file of the demo's catalogue with a change, under the same name."""
    file = read(DEMO / "catalogue" / name)
    change(file["structures"][0])
    (folder / name).write_text(json.dumps(file), encoding="utf-8")


def large_catalogue(folder):
    """So many different trusses that readiness takes a while."""
    whole = read(DEMO / "catalogue" / "p14-0145.json")
    structure = whole["structures"][0]
    whole["structures"] = []
    for i in range(MANY):
        another = copy.deepcopy(structure)
        another["name"] = f"structures/Q-{i:05}"
        another["units"][0]["truss"]["members"][0]["areaM2"] *= 1 + i * 1e-6
        whole["structures"].append(another)
    (folder / "many.json").write_text(json.dumps(whole), encoding="utf-8")


def broken_catalogue(check):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        changed_copy(folder, "p14-0032.json", lambda s: s["units"][0]["truss"]["members"][4].update(areaM2=0.0))
        changed_copy(folder, "p14-0087.json", lambda s: s["units"][0]["truss"]["nodes"][2].update(xM=-3.0))
        changed_copy(folder, "p31-0118.json", lambda s: s["roadway"].update(laneCuont=2))
        port = free_port()
        with serving(port, folder) as service:
            code = service.wait()
            check.equal("a catalogue at fault: the service ends by itself with exit code 2", 2, code)
            check.contains("a catalogue at fault: all files and fields at once", [
                "p14-0032.json", "structures[0].units[0].truss.members[4].area_m2", "p14-0087.json", "p31-0118.json", "roadway.laneCuont", "did you mean \"laneCount\"?",
            ], service.output)
            check.that("a catalogue at fault: it was never ready", "Catalogue ready" not in service.output, service.output)
            check.that("a catalogue at fault: nobody listens", not answers(port))


def broken_policy(check):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        policy = read(DEMO / "policies" / "ossel-demo.json")
        del policy["policy"]["method"]
        (folder / "policy.json").write_text(json.dumps(policy), encoding="utf-8")
        with serving(free_port(), DEMO / "catalogue", folder) as service:
            check.equal("a policy at fault: exit code 2", 2, service.wait())
            check.contains("a policy at fault: file and field", ["policy.json", "policy.method"], service.output)


def policy_out_of_force(check):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        policy = read(DEMO / "policies" / "ossel-demo.json")
        policy["policy"]["name"] = "policies/ended"
        policy["policy"]["inForceTo"] = {"year": 2026, "month": 11, "day": 30}
        (folder / "ended.json").write_text(json.dumps(policy), encoding="utf-8")
        port = free_port()
        with serving(port, DEMO / "catalogue", folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            request = stubs.request(oracle.application(FIRST), "policies/ended", AS_OF)
            error = stubs.refused(lambda: client.screening.ScreenApplication(request, timeout=30))
            check.equal("a policy not in force any more: FAILED_PRECONDITION", grpc.StatusCode.FAILED_PRECONDITION, error and error.code())
            violations = getattr(stubs.details(error, stubs.PreconditionFailure), "violations", [])
            check.that("a policy not in force any more: PreconditionFailure names it", [v.subject for v in violations] == ["policies/ended"], violations)
            before = stubs.request(oracle.application(FIRST), "policies/ended", "2026-11-30")
            check.that("a policy on its last day: a screening", client.screening.ScreenApplication(before, timeout=30).HasField("screening"))


def readiness(check):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        large_catalogue(folder)
        port = free_port()
        with serving(port, folder) as service, stubs.Service(port) as client:
            health = [client.health(60)]
            hasty = stubs.refused(lambda: client.catalogue.GetStructure(stubs.catalogue.GetStructureRequest(name="structures/Q-00007"), timeout=0.2))
            check.equal("before the lines are ready: NOT_SERVING", "NOT_SERVING", health[0])
            check.equal("before the lines are ready: a call with a short deadline gets no answer", grpc.StatusCode.DEADLINE_EXCEEDED, hasty and hasty.code())
            check.that("before the lines are ready: the log has not said so", "Catalogue ready" not in service.output, service.output)
            patient = client.catalogue.GetStructure(stubs.catalogue.GetStructureRequest(name="structures/Q-00007"), timeout=300)
            check.equal("a patient call waits for them, and is answered", "structures/Q-00007", patient.structure.name)
            check.equal("after that: SERVING", "SERVING", client.health())
            service.wait_until_ready()
            check.contains("the log tells how many", [f"{MANY} structures"], service.output)
            code, seconds = service.end(signal.SIGTERM)
            check.equal("SIGTERM: exit code 0", 0, code)
            check.that(f"SIGTERM: ends within {ENDS_WITHIN_S} s", seconds < ENDS_WITHIN_S, f"{seconds:.1f} s")
            check.that("SIGTERM: nobody listens", not answers(port))
        port = free_port()
        with serving(port, folder) as service, stubs.Service(port) as client:
            client.health(60)
            code, seconds = service.end(signal.SIGTERM)
            check.that("SIGTERM while lines are computed: exit code 0, in time", code == 0 and seconds < ENDS_WITHIN_S, f"{code}, {seconds:.1f} s\n{service.output}")
            check.that("SIGTERM while lines are computed: they were not ready", "Catalogue ready" not in service.output, service.output)


def stops_while_at_work(check):
    port = free_port()
    with serving(port) as service, stubs.Service(port) as client:
        service.wait_until_ready()
        application = oracle.application(FIRST)
        crossings = application["route"]["crossingList"]["crossings"]
        application["route"]["crossingList"]["crossings"] = crossings[:1] * 10_000
        call = client.screening.ScreenApplication.future(stubs.request(application, POLICY, AS_OF, view="SCREENING_VIEW_BASIC"), timeout=300)
        time.sleep(1)
        code, seconds = service.end(signal.SIGTERM)
        check.that(f"SIGTERM while a call is at work: ends within {ENDS_WITHIN_S} s", seconds < ENDS_WITHIN_S, f"{seconds:.1f} s")
        check.equal("SIGTERM while a call is at work: exit code 0", 0, code)
        ended = threading.Event()
        call.add_done_callback(lambda _: ended.set())
        check.that("SIGTERM while a call is at work: the call ends, with an answer or an error", ended.wait(30), call)


def listening_addresses(port):
    """Local addresses of sockets that listen on a port, as the kernel lists them."""
    found = []
    for table in ("tcp", "tcp6"):
        for line in Path(f"/proc/net/{table}").read_text(encoding="utf-8").splitlines()[1:]:
            _, local, _, state, *_ = line.split()
            address, number = local.split(":")
            if state == LISTENING and int(number, 16) == port:
                found.append(address)
    return found


def loopback_only(check):
    loopback = "0100007F"
    port = free_port()
    with serving(port) as service:
        service.wait_until_ready()
        check.equal("serve: listens on the loopback address and nowhere else", [loopback], listening_addresses(port))
    port = free_port()
    with Running(command("demo", "--port", port), "Stop it with Ctrl-C.") as demo:
        demo.wait_until_ready()
        check.equal("demo: listens on the loopback address and nowhere else", [loopback], listening_addresses(port))
        code, seconds = demo.end(signal.SIGTERM)
        check.that(f"demo: SIGTERM ends it with exit code 0 within {ENDS_WITHIN_S} s", code == 0 and seconds < ENDS_WITHIN_S, f"{code}, {seconds:.1f} s")


if __name__ == "__main__":
    checks.run(broken_catalogue, broken_policy, policy_out_of_force, readiness, stops_while_at_work, loopback_only)
