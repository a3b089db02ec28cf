"""A client in another language: stubs made from the protos by the distribution's protoc, python3-grpcio."""

import math
import threading
import time

import grpc
from support import checks, oracle, stubs
from support.program import AS_OF, DEMO, POLICY, free_port, serving

APPLICATIONS = sorted(p.name for p in (DEMO / "applications").glob("*.json"))
FIRST = APPLICATIONS[0]
CROSSINGS_OF_A_LONG_ROUTE = 10_000


def long_route():
    """More work than any deadline below allows."""
    whole = oracle.application(FIRST)
    crossings = whole["route"]["crossingList"]["crossings"]
    whole["route"]["crossingList"]["crossings"] = [crossings[i % len(crossings)] for i in range(CROSSINGS_OF_A_LONG_ROUTE)]
    return stubs.request(whole, POLICY, AS_OF, view="SCREENING_VIEW_BASIC")


def screens_the_demo(check, service, _):
    for file in APPLICATIONS:
        answer = service.screening.ScreenApplication(stubs.request(oracle.application(file), POLICY, AS_OF), timeout=60)
        misses, numbers = oracle.misses(oracle.expected(file), stubs.as_json(answer)["screening"])
        check.none(f"python: {file}: verdicts, rungs and {numbers} factors are the oracle's within {oracle.TOLERANCE:g}", misses)
        screening = answer.screening
        counts = screening.counts
        check.equal(f"python: {file}: the counts are those of the crossings", len(screening.crossings), getattr(counts, "pass") + counts.pass_with_conditions + counts.not_assessed + counts.fail)
        check.contains(f"python: {file}: caution and versions come along", ["licensed engineer"], screening.caution)
        check.that(f"python: {file}: catalogue, mechanics, rating and policy are named", screening.catalogue_version >= 1 and screening.mechanics_version and screening.rating_version and screening.policy_etag)


def same_question_same_answer(check, service, _):
    request = stubs.request(oracle.application(FIRST), POLICY, AS_OF)
    answers = {service.screening.ScreenApplication(request, timeout=60).SerializeToString(deterministic=True) for _ in range(3)}
    check.equal("python: the same question has the same answer to the byte", 1, len(answers))


def a_common_factor_divides_rf(check, service, _):
    """Where nobody else is on the structure, and the live-load factor does not depend on weight."""
    def factors(times):
        application = oracle.application(FIRST)
        for axle in application["configurations"][0]["loading"]["axleTrains"][0]["axles"]:
            axle["loadKn"] *= times
        answer = stubs.as_json(service.screening.ScreenApplication(stubs.request(application, POLICY, AS_OF), timeout=60))["screening"]
        return {(c["structure"], r["rungId"]): r["ratingFactor"] for c in answer["crossings"] for r in c["rungs"] if r["rungId"].startswith("alone") and "ratingFactor" in r}

    plain = factors(1)
    for times in (0.5, 1.25, 3):
        scaled = factors(times)
        misses = [f"{at}: {plain[at]} becomes {scaled.get(at)}" for at in plain if not math.isclose(scaled.get(at, 0) * times, plain[at], rel_tol=1e-12)]
        check.none(f"python: axle loads times {times} divide the RF of {len(plain)} rungs by it within 1e-12", misses)


def reads_what_was_refused(check, service, _):
    wrong = oracle.application(FIRST)
    train = wrong["configurations"][0]["loading"]["axleTrains"][0]
    train["axles"][0]["loadKn"] = 0.0
    train["axles"][5]["offsetM"] = 2.0
    wrong["route"]["crossingList"]["crossings"][1]["structure"] = "bridges/P14-0087"
    del wrong["travelTo"]
    error = stubs.refused(lambda: service.screening.ScreenApplication(stubs.request(wrong, POLICY, AS_OF), timeout=60))
    check.equal("python: an invalid application is refused", grpc.StatusCode.INVALID_ARGUMENT, error and error.code())
    detail = stubs.details(error, stubs.BadRequest)
    violations = {v.field: v.description for v in detail.field_violations} if detail else {}
    for field in ("axles[0].load_kn", "axles[5].offset_m", "crossings[1].structure", "travel_to"):
        told = [d for f, d in violations.items() if f.startswith("application.") and f.endswith(field)]
        check.that(f"python: the details tell of {field}, with a description", told and all(len(d) > 10 for d in told), violations)
    check.that("python: a field refused says the value found and what is allowed", any("Found 0" in d and "greater than 0" in d for d in violations.values()), violations)
    for value in (float("nan"), float("inf")):
        request = stubs.request(oracle.application(FIRST), POLICY, AS_OF)
        request.application.configurations[0].loading.axle_trains[0].axles[3].load_kn = value
        error = stubs.refused(lambda r=request: service.screening.ScreenApplication(r, timeout=60))
        check.equal(f"python: a load of {value} is refused", grpc.StatusCode.INVALID_ARGUMENT, error and error.code())


def what_is_not_there(check, service, _):
    error = stubs.refused(lambda: service.catalogue.GetStructure(stubs.catalogue.GetStructureRequest(name="structures/P99-0001"), timeout=10))
    check.equal("python: an unknown structure is NOT_FOUND", grpc.StatusCode.NOT_FOUND, error and error.code())
    check.equal("python: with its name in ResourceInfo", "structures/P99-0001", getattr(stubs.details(error, stubs.ResourceInfo), "resource_name", None))
    error = stubs.refused(lambda: service.screening.ScreenApplication(stubs.request(oracle.application(FIRST), "policies/none-such", AS_OF), timeout=10))
    check.equal("python: an unknown policy is NOT_FOUND", grpc.StatusCode.NOT_FOUND, error and error.code())
    check.contains("python: with the policies that there are", [POLICY], error.details() if error else "")
    absent = oracle.application(FIRST)
    absent["route"]["crossingList"]["crossings"][0]["structure"] = "structures/P99-0001"
    answer = service.screening.ScreenApplication(stubs.request(absent, POLICY, AS_OF), timeout=60).screening
    first = stubs.as_json(answer)["crossings"][0]
    check.equal("python: a crossing that is not in the catalogue is not assessed, and no error", ("VERDICT_NOT_ASSESSED", "REASON_CODE_NOT_IN_CATALOGUE"), (first["verdict"], first["reasons"][0]["code"]))
    error = stubs.refused(lambda: service.screening.ScreenApplication(stubs.request(oracle.application(FIRST), POLICY, AS_OF, minCatalogueVersion=99), timeout=10))
    check.equal("python: a catalogue version that is not there yet is UNAVAILABLE", grpc.StatusCode.UNAVAILABLE, error and error.code())
    error = stubs.refused(lambda: service.catalogue.DeleteStructure(stubs.catalogue.DeleteStructureRequest(name="structures/P14-0032"), timeout=10))
    check.equal("python: a catalogue read from files cannot be changed: FAILED_PRECONDITION", grpc.StatusCode.FAILED_PRECONDITION, error and error.code())


def validates_only(check, service, _):
    answer = service.screening.ScreenApplication(stubs.request(oracle.application(FIRST), POLICY, AS_OF, validateOnly=True), timeout=10)
    check.that("python: validate_only answers without a screening", not answer.HasField("screening"))


def pages(check, service, _):
    whole = [s.name for s in service.catalogue.ListStructures(stubs.catalogue.ListStructuresRequest(), timeout=10).structures]
    names, token, count = [], "", 0
    while count == 0 or token:
        page = service.catalogue.ListStructures(stubs.catalogue.ListStructuresRequest(page_size=5, page_token=token), timeout=10)
        names += [s.name for s in page.structures]
        token, count = page.next_page_token, count + 1
    check.equal("python: pages of 5 give the whole list, in order of name", (sorted(whole), 3), (names, count))
    error = stubs.refused(lambda: service.catalogue.ListStructures(stubs.catalogue.ListStructuresRequest(page_token="x"), timeout=10))
    check.equal("python: a token of no list is refused", grpc.StatusCode.INVALID_ARGUMENT, error and error.code())
    check.equal("python: lists the policy", [POLICY], [p.name for p in service.policies.ListPolicies(stubs.policy.ListPoliciesRequest(), timeout=10).policies])


def influence_lines(check, service, _):
    """P14-0032 is a through Pratt truss of six panels of 6 m, 7.5 m high."""
    lines = service.catalogue.ListInfluenceLines(stubs.catalogue.ListInfluenceLinesRequest(parent="structures/P14-0032"), timeout=10)
    check.equal("python: a line for every effect of P14-0032", 24, len(lines.influence_lines))
    check.that("python: the residual of the analyses is told, and small", 0 <= lines.largest_residual < 1e-9, lines.largest_residual)
    one = service.catalogue.ListInfluenceLines(stubs.catalogue.ListInfluenceLinesRequest(parent="structures/P14-0032", effect_id="L2L3"), timeout=10).influence_lines
    # Ritter's section through L2L3, moments about U2: N = M(12 m) / 7.5 m; a unit load there gives M = 12 × 24 / 36 = 8 m.
    peak = max(one[0].points, key=lambda p: p.after_per_kn) if one else None
    check.that("python: the lower chord's peak is the moment of the joint opposite over the height", peak and peak.chainage_m == 12.0 and abs(peak.after_per_kn - 8 / 7.5) < 1e-12, one)
    error = stubs.refused(lambda: service.catalogue.ListInfluenceLines(stubs.catalogue.ListInfluenceLinesRequest(parent="structures/P14-0032", effect_id="L2L4"), timeout=10))
    check.equal("python: an unknown effect is NOT_FOUND", grpc.StatusCode.NOT_FOUND, error and error.code())
    check.contains("python: with the nearest name", ["Did you mean L2L"], error.details() if error else "")


def rests(program):
    """Waits until the service has ended the work of calls that nobody waits for: seconds of processor time in the last second looked at."""
    used = float("inf")
    for _ in range(10):
        before = program.cpu_seconds()
        time.sleep(1)
        used = program.cpu_seconds() - before
        if used < 0.3:
            break
    return used


def deadlines(check, service, program):
    request = long_route()
    error = stubs.refused(lambda: service.screening.ScreenApplication(request, timeout=0.001))
    check.equal("python: a deadline of 1 ms is exceeded", grpc.StatusCode.DEADLINE_EXCEEDED, error and error.code())
    before = program.cpu_seconds()
    error = stubs.refused(lambda: service.screening.ScreenApplication(request, timeout=2))
    check.equal("python: a deadline of 2 s on a route of 10,000 crossings is exceeded, and no verdict comes", grpc.StatusCode.DEADLINE_EXCEEDED, error and error.code())
    check.that("python: the service was at work until then", program.cpu_seconds() - before > 0.2, program.cpu_seconds() - before)
    check.that("python: and ends that work", rests(program) < 0.3)
    answer = service.screening.ScreenApplication(stubs.request(oracle.application(FIRST), POLICY, AS_OF), timeout=60)
    check.equal("python: the next call is answered", oracle.expected(FIRST)["verdict"], stubs.as_json(answer)["screening"]["verdict"].removeprefix("VERDICT_"))


def cancels(check, service, program):
    call = service.screening.ScreenApplication.future(long_route(), timeout=300)
    threading.Timer(1, call.cancel).start()
    try:
        call.result(timeout=60)
        outcome = "an answer"
    except (grpc.RpcError, grpc.FutureCancelledError):
        outcome = call.code()
    check.equal("python: a call that is cancelled ends as CANCELLED", grpc.StatusCode.CANCELLED, outcome)
    check.that("python: and the service ends its work", rests(program) < 0.3)
    check.equal("python: the service still answers", "SERVING", service.health())


def too_large(check, service, _):
    wrong = oracle.application(FIRST)
    crossings = wrong["route"]["crossingList"]["crossings"]
    wrong["route"]["crossingList"]["crossings"] = crossings[:1] * (CROSSINGS_OF_A_LONG_ROUTE + 1)
    error = stubs.refused(lambda: service.screening.ScreenApplication(stubs.request(wrong, POLICY, AS_OF), timeout=60))
    check.equal("python: a route longer than the limit is refused", grpc.StatusCode.INVALID_ARGUMENT, error and error.code())


def everything(check):
    port = free_port()
    with serving(port) as program, stubs.Service(port) as service:
        program.wait_until_ready()
        check.all((screens_the_demo, same_question_same_answer, a_common_factor_divides_rf, reads_what_was_refused, what_is_not_there, validates_only, pages, influence_lines,
                   deadlines, cancels, too_large), service, program)
        check.that("python: the log has no internal error", "failed; error id" not in program.output, program.output)


if __name__ == "__main__":
    checks.run(everything)
