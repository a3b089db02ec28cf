"""What a run leaves: read through the service and, for every byte of the lines, from the files after a clean stop."""

import signal

from . import records, stubs, worklist
from .program import free_port, recording

_PAGE = 1000


def _pages(call, request, items):
    """Every item of a listing."""
    found = []
    while True:
        answer = call(request, timeout=120)
        found += getattr(answer, items)
        if not answer.next_page_token:
            return found
        request.page_token = answer.next_page_token


def _revisions(service, name):
    answer = _pages(service.history.ListRevisions, stubs.history.ListRevisionsRequest(parent=name, page_size=_PAGE), "revisions")
    return [(r.from_version, r.to_version if r.HasField("to_version") else None, r.etag, r.actor, r.reason) for r in answer]


def _verify(service):
    last = None
    problems = []
    for message in service.history.VerifyRecords(stubs.history.VerifyRecordsRequest(), timeout=300):
        problems += message.problems
        last = message
    result = last.result
    return {"sound": result.sound, "problems": problems, "audit entries": result.audit_entry_count, "revisions": result.revision_count, "lines": result.line_count}


def read(folder, driver):
    """Everything of a folder but instants."""
    port = free_port()
    with recording(port, folder) as running, stubs.Service(port) as service:
        running.wait_until_ready()
        backlog = service.maintenance.GetBacklog(stubs.maintenance.GetBacklogRequest(), timeout=60).backlog
        structures = _pages(service.catalogue.ListStructures, stubs.catalogue.ListStructuresRequest(page_size=_PAGE), "structures")
        policies = _pages(service.policies.ListPolicies, stubs.policy.ListPoliciesRequest(page_size=_PAGE), "policies")
        sets = _pages(service.history.ListChangeSets, stubs.history.ListChangeSetsRequest(page_size=_PAGE), "change_sets")
        audit = _pages(service.history.ListAuditEntries, stubs.history.ListAuditEntriesRequest(page_size=_PAGE), "audit_entries")
        imports = _pages(service.imports.ListImports, stubs.imports.ListImportsRequest(page_size=_PAGE), "imports")
        changed = sorted({o.resource for o in driver.operations if o.revises or o.removes})
        left = {
            "version and backlog": [("version", backlog.catalogue_version), ("pending", backlog.pending_count), ("kept", backlog.kept_count)],
            "structures": [(s.name, s.etag, s.catalogue_version, s.SerializeToString(deterministic=True)) for s in structures],
            "policies": [(p.name, p.document_version, p.etag, p.catalogue_version, p.SerializeToString(deterministic=True)) for p in policies],
            "change sets": [(s.version, s.action, s.actor, s.reason, s.added_count, s.revised_count, s.removed_count) for s in sets],
            "audit entries": [(a.sequence, a.action, a.subject, a.actor, a.reason, a.version) for a in audit],
            "imports": [(i.name, i.state, i.base_version, i.staged_count, i.added_count, i.revised_count, i.unchanged_count, i.published_version) for i in imports],
            "revisions of what was changed": [(name, *revision) for name in changed for revision in _revisions(service, name)],
            "verification": sorted((k, str(v)) for k, v in _verify(service).items()),
        }
        code, _ = running.end(signal.SIGTERM)
        if code != 0:
            raise RuntimeError(f"a clean stop ended with exit code {code}\n{running.output}")
    left["revisions in the file"] = records.revisions(folder)
    left["line blobs"] = sorted(records.lines(folder).items())
    return left


def differences(wanted, found):
    """Items that only one side has, a few of them."""
    if wanted == found:
        return []
    a, b = set(wanted), set(found)
    told = [f"missing {item!r}"[:300] for item in sorted(a - b, key=repr)[:5]] + [f"unexpected {item!r}"[:300] for item in sorted(b - a, key=repr)[:5]]
    return told or [f"the same items in another order or number: {len(wanted)} and {len(found)}"]


def faults(left, driver):
    """What contradicts the list of work and what was acknowledged: something lost, something made twice, something unsound."""
    found = []
    if driver.left:
        found.append(f"{driver.left} operations were not acknowledged")
    by_name = {}
    for name, start, end, etag, *_ in left["revisions of what was changed"]:
        by_name.setdefault(name, []).append((start, end, etag))
    versions = []
    for operation, noted in zip(driver.operations, driver.acknowledged):
        if operation.versioned:
            versions.append(noted.version)
        if operation.revises and not any(start == noted.version and etag == noted.etag for start, _, etag in by_name.get(noted.resource, [])):
            found.append(f"{operation.label}: acknowledged in version {noted.version} with etag {noted.etag}; there are {by_name.get(noted.resource)}")
        if operation.removes and not any(end == noted.version for _, end, _ in by_name.get(noted.resource, [])):
            found.append(f"{operation.label}: acknowledged in version {noted.version}; there are {by_name.get(noted.resource)}")
    if versions != list(range(versions[0], versions[0] + len(versions))):
        found.append(f"the versions acknowledged do not follow each other: {versions}")
    made = sorted(s[0] for s in left["change sets"] if s[2] == worklist.ACTOR)
    if made != versions:
        found.append(f"change sets of the list: {made}; acknowledged were {versions}")
    audited = sorted(a[5] for a in left["audit entries"] if a[3] == worklist.ACTOR and a[5])
    if audited != versions:
        found.append(f"audit entries with a version: {audited}; acknowledged were {versions}")
    wanted = worklist.revisions_wanted(driver.operations)
    counted = {}
    for row in left["revisions in the file"]:
        counted[row[1]] = counted.get(row[1], 0) + 1
    for name in sorted(wanted.keys() | counted.keys()):
        if wanted.get(name) != counted.get(name):
            found.append(f"{name}: {counted.get(name)} revisions; the list makes {wanted.get(name)}")
    if ("sound", "True") not in left["verification"]:
        found.append(f"the records are not sound: {left['verification']}")
    if ("pending", 0) not in left["version and backlog"]:
        found.append(f"lines are pending: {left['version and backlog']}")
    return found[:20]
