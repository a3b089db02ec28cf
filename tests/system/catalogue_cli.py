"""The catalogue by the command line: import, history, export, policies, backup and restore, verification, and what happens when it goes wrong."""

import copy
import json
import re
import shutil
import signal
import sqlite3
import tempfile
from pathlib import Path

from support import checks
from support.program import DEMO, ROOT, Running, command, free_port, permitscreen

PASSED, NOT_PASSED, BAD_INPUT, NO_ANSWER = 0, 1, 2, 3
CHANGED = "structures/P14-0032"
STRUCTURES = 12
EXAMPLE = ROOT / "deploy" / "examples" / "truss.json"
POLICY_FILE = ROOT / "deploy" / "policies" / "lrfr-permit-2013.json"
WHY = ("--reason", "system test")


def read(path):
    return json.loads(path.read_text(encoding="utf-8"))


def written(path, content):
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_text(content if isinstance(content, str) else json.dumps(content), encoding="utf-8")
    return path


def lines(result):
    """The JSON objects that a command printed, one a line."""
    return [json.loads(line) for line in result.stdout.splitlines()]


def ended(check, what, code, result, parts=()):
    """Exit code, and what it says; never a stack trace."""
    text = result.stdout + result.stderr
    check.that(f"{what}: exit code {code}", code == result.returncode, f"found {result.returncode}\n{text}")
    if parts:
        check.contains(f"{what}: it says so", parts, text)
    check.that(f"{what}: no stack trace", "   at PermitScreen" not in text and "Unhandled" not in text, text)
    return result


def tree(folder):
    """Every file below a folder with its bytes."""
    return {str(path.relative_to(folder)): path.read_bytes() for path in sorted(folder.rglob("*")) if path.is_file()}


def records_of(folder, name):
    """A folder of records with the demo in it, as version 1."""
    data = folder / name
    result = permitscreen("import", DEMO, "--data", data, *WHY)
    if result.returncode != PASSED:
        raise RuntimeError(result.stdout + result.stderr)
    return data


def spans(count):
    """A catalogue file of many small structures."""
    example = read(EXAMPLE)["structures"][0]
    return {"schema": "permitscreen/catalogue/1", "structures": [dict(copy.deepcopy(example), name=f"structures/S-{i:05d}") for i in range(count)]}


def import_and_history(check, folder):
    data = folder / "history"
    at = ("--data", data)
    files = folder / "files"
    shutil.copytree(DEMO, files)
    first = ended(check, "import of the demo", PASSED, permitscreen("import", files, *at, "--reason", "first load", "--actor", "Ødegård"))
    check.contains("import: counts and version; application files are passed over", ["13 added, 0 revised, 0 unchanged, 0 refused; catalogue version 1\n"], first.stdout)
    again = ended(check, "import of the same files", PASSED, permitscreen("import", files, *at, *WHY))
    check.contains("import of the same files: no version", ["0 added, 0 revised, 13 unchanged, 0 refused; nothing changed; the catalogue stays at version 1\n"], again.stdout)

    path = files / "catalogue" / "p14-0032.json"
    file = read(path)
    resistance = file["structures"][0]["units"][0]["effects"][0]["rated"]["resistances"][0]
    field = next(name for name in resistance if name.endswith("Kn"))
    old = resistance[field]
    resistance[field] = old - 1.5
    written(path, file)
    revised = ended(check, "import after one resistance was changed", PASSED, permitscreen("import", files, *at, "--reason", "section loss measured", "--actor", "N. Engineer", "--json"))
    counts = lines(revised)[-1]
    check.equal(
        "import --json: one revised, twelve as they were, version 2",
        (0, 1, 12, 0, "2"),
        tuple(counts[name] for name in ("addedCount", "revisedCount", "unchangedCount", "refusedCount", "publishedVersion")))

    revisions = lines(permitscreen("history", CHANGED, *at, "--json"))
    check.equal(
        "history: newest first, with versions, who and why",
        [("2", None, "N. Engineer", "section loss measured"), ("1", "2", "Ødegård", "first load")],
        [(r["fromVersion"], r.get("toVersion"), r["actor"], r["reason"]) for r in revisions])
    printed = ended(check, "history as a table", PASSED, permitscreen("history", "P14-0032", *at), ["2 revisions", "newest", "Ødegård", "section loss measured", revisions[0]["etag"]])
    check.that("history: instants in UTC", re.search(r"\d{4}-\d\d-\d\d \d\d:\d\d:\d\d", printed.stdout), printed.stdout)

    compared = lines(permitscreen("compare", CHANGED, *at, "--json"))[0]
    check.equal("compare: one field, old and new value", [(old, old - 1.5)], [(float(d["before"]), float(d["after"])) for d in compared["differences"]])
    check.that("compare: the field is named by unit, effect and resistance", re.fullmatch(r"units\[.+\]\.effects\[.+\]\.rated\.resistances\[.+\]\.\w+_kn", compared["differences"][0]["field"]), compared)
    check.equal("compare: the lines are the same", False, compared["linesDiffer"])
    ended(check, "compare as a table", PASSED, permitscreen("compare", "P14-0032", *at, "--before", "1", "--after", "2"), [compared["differences"][0]["field"], "1 field differs; the influence lines are the same."])

    newest, before = (lines(permitscreen("list", *at, *more, "--json")) for more in ((), ("--as-of-version", "1")))
    differing = [new["name"] for new, old in zip(newest, before) if new["etag"] != old["etag"]]
    check.equal("list --as-of-version: the revision of that version", ([CHANGED], STRUCTURES, STRUCTURES), (differing, len(newest), len(before)))
    shown = [json.loads(permitscreen("show", CHANGED, *at, *more, "--json").stdout)["structure"] for more in ((), ("--as-of-version", "1"))]
    values = [s["units"][0]["effects"][0]["rated"]["resistances"][0][field] for s in shown]
    check.equal("show --as-of-version: the value of that version", [old - 1.5, old], values)

    sets = lines(permitscreen("changes", *at, "--json"))
    check.equal("changes: newest first, with counts", [("2", 0, 1, 0), ("1", 13, 0, 0)], [(s["version"], s["addedCount"], s["revisedCount"], s["removedCount"]) for s in sets])
    entries = lines(permitscreen("audit", *at, "--json"))
    check.that("audit: numbers without a gap, newest first, each with its hash", [int(e["sequence"]) for e in entries] == list(range(len(entries), 0, -1)) and len({e["hash"] for e in entries}) == len(entries), entries)
    check.equal("audit --most 1: the newest only", entries[:1], lines(permitscreen("audit", *at, "--json", "--most", "1")))
    for name in ("changes", "audit"):
        ended(check, f"{name} as a table", PASSED, permitscreen(name, *at), ["section loss measured", "N. Engineer"])

    unknown = permitscreen("history", "P99-0001", *at)
    ended(check, "history of what is not there", BAD_INPUT, unknown, ["P99-0001"])
    ended(check, "list as of a version that is still to come", BAD_INPUT, permitscreen("list", *at, "--as-of-version", "99"), ["99"])
    ended(check, "a version of nothing", BAD_INPUT, permitscreen("list", *at, "--as-of-version", "0"), ["--as-of-version"])
    ended(check, "screening on the records", NOT_PASSED, permitscreen("screen", DEMO / "applications" / "01-reactor-vessel-13-axles.json", "--as-of", "2026-12-01", *at), ["catalogue version 2", "CAUTION"])


def export_round_trip(check, folder):
    data = records_of(folder, "export")
    one, two = folder / "one", folder / "two"
    ended(check, "export", PASSED, permitscreen("export", one, "--data", data), ["12 structures and 1 policy document of catalogue version 1"])
    files = tree(one)
    check.equal("export: a file a structure and policy document", (12, 1), tuple(sum(name.startswith(below) for name in files) for below in ("catalogue/", "policies/")))
    check.that("export: named after them", {"catalogue/P14-0032.json", "policies/ossel-demo@1.json"} <= set(files), files.keys())
    text = b"".join(files.values()).decode("utf-8")
    check.that("export: line feeds, no etag, no version of the catalogue", "\r" not in text and "etag" not in text and "catalogueVersion" not in text)
    other = folder / "from-export"
    ended(check, "import of the export into an empty folder", PASSED, permitscreen("import", one, "--data", other, *WHY), ["13 added"])
    ended(check, "export of that", PASSED, permitscreen("export", two, "--data", other))
    check.that("export, import, export: the same bytes", files == tree(two))
    same = [lines(permitscreen("list", "--data", place, "--json")) for place in (data, other)]
    check.that("export, import: the same etags", [s["etag"] for s in same[0]] == [s["etag"] for s in same[1]])
    ended(check, "import of the export into the records that it came from", PASSED, permitscreen("import", one, "--data", data, *WHY), ["nothing changed", "version 1"])
    ended(check, "export into a folder that is not empty", BAD_INPUT, permitscreen("export", one, "--data", data), ["not empty", "--overwrite"])
    ended(check, "export --overwrite", PASSED, permitscreen("export", one, "--data", data, "--overwrite"))
    check.that("export --overwrite: the same bytes", files == tree(one))
    ended(check, "export of one structure", PASSED, permitscreen("export", folder / "single", "--data", data, "--structure", "P14-0032"), ["1 structure"])
    check.that("export of one structure: that file only", tree(folder / "single") == {"catalogue/P14-0032.json": files["catalogue/P14-0032.json"]})


def remove_backup_restore(check, folder):
    data = records_of(folder, "keeping")
    at = ("--data", data)
    file = folder / "catalogue.backup"
    backup = ended(check, "backup", PASSED, permitscreen("backup", file, *at), ["catalogue version 1"])
    check.that("backup: as many bytes as it says", f"{file.stat().st_size:,} bytes" in backup.stdout, backup.stdout)
    content = file.read_bytes()
    ended(check, "backup onto a file that is there", BAD_INPUT, permitscreen("backup", file, *at), ["is there already"])
    check.that("backup onto a file that is there: left alone, and no part left beside it", file.read_bytes() == content and not list(folder.glob("*.part")))

    gone = ended(check, "remove", PASSED, permitscreen("remove", "P31-0021", *at, "--reason", "demolished"), ["structures/P31-0021 Grey Ash Bridge", "version 2", "--as-of-version 1"])
    ended(check, "remove: out of the newest version", BAD_INPUT, permitscreen("show", "P31-0021", *at), ["P31-0021"])
    ended(check, "remove: still in the version before", PASSED, permitscreen("show", "P31-0021", *at, "--as-of-version", "1"), ["Grey Ash Bridge"])
    ended(check, "remove again", BAD_INPUT, permitscreen("remove", "P31-0021", *at, *WHY), ["P31-0021"])
    check.that("remove: prints the etag of what is gone", re.search(r"etag [0-9a-f]{24}", gone.stdout), gone.stdout)

    ended(check, "restore --check-only", PASSED, permitscreen("restore", file, *at, "--check-only"), ["sound", "version 1"])
    check.equal("restore --check-only: nothing replaced", STRUCTURES - 1, len(lines(permitscreen("list", *at, "--json"))))
    torn = written(folder / "torn.backup", "")
    torn.write_bytes(content[: len(content) // 2])
    ended(check, "restore of a torn backup", BAD_INPUT, permitscreen("restore", torn, *at, *WHY))
    check.equal("restore of a torn backup: nothing replaced", STRUCTURES - 1, len(lines(permitscreen("list", *at, "--json"))))
    ended(check, "restore", PASSED, permitscreen("restore", file, *at, "--reason", "undo the removal"), ["Restored catalogue version 1 as version 3", "version 2", "kept"])
    ended(check, "restore: what was removed is back", PASSED, permitscreen("show", "P31-0021", *at), ["Grey Ash Bridge"])
    check.equal("restore: all structures", STRUCTURES, len(lines(permitscreen("list", *at, "--json"))))
    ended(check, "restore: the audit log says so", PASSED, permitscreen("audit", *at), ["restore backup", "undo the removal"])
    ended(check, "records after a restore are sound", PASSED, permitscreen("verify", *at), ["Sound:"])
    ended(check, "restore of what is not there", BAD_INPUT, permitscreen("restore", folder / "none", *at, *WHY), ["none"])


def verification(check, folder):
    data = records_of(folder, "verify")
    at = ("--data", data)
    ended(check, "backlog --watch", PASSED, permitscreen("backlog", "--watch", *at))
    waiting = lines(permitscreen("backlog", *at, "--json"))[0]
    check.equal("backlog: nothing pending, nothing damaged, lines kept", ("0", "0", True), (waiting["pendingCount"], waiting["damagedCount"], int(waiting["keptCount"]) >= STRUCTURES))
    ended(check, "collect: every line is named", PASSED, permitscreen("collect", *at), ["0 trusses deleted"])
    sound = ended(check, "verify", PASSED, permitscreen("verify", *at), ["Sound:", "Note it down outside"])
    newest = re.search(r"Newest hash: ([0-9a-f]{64})", sound.stdout).group(1)
    check.that("verify: it read entries, revisions and lines", re.search(r"Sound: [1-9]\d* audit entries, 13 revisions and 1[0-9] kept lines", sound.stdout), sound.stdout)
    check.equal("verify: the hash is that of the newest audit entry", newest, lines(permitscreen("audit", *at, "--json", "--most", "1"))[0]["hash"])
    ended(check, "verify --known-hash", PASSED, permitscreen("verify", *at, "--known-hash", newest))
    ended(check, "verify --known-hash with another hash", NOT_PASSED, permitscreen("verify", *at, "--known-hash", "0" * 64), ["NOT SOUND", "problem: "])
    result = lines(permitscreen("verify", *at, "--json"))[-1]["result"]
    check.equal("verify --json: the result last", (True, "0"), (result["sound"], result["problemCount"]))

    with sqlite3.connect(data / "catalogue.db") as database:
        sequence, = database.execute("SELECT max(sequence) FROM audit").fetchone()
        changed = database.execute("UPDATE audit SET reason = 'System test' WHERE sequence = ?", (sequence,)).rowcount
    database.close()
    check.equal("one letter of an audit entry is changed behind its back", 1, changed)
    ended(check, "verify after that", NOT_PASSED, permitscreen("verify", *at), ["NOT SOUND", "problem: ", f"entry {sequence}"])


def one_process_a_folder(check, folder):
    data = records_of(folder, "locked")
    port = free_port()
    with Running(command("serve", "--data", data, "--port", port), "Catalogue ready") as program:
        program.wait_until_ready()
        second = ended(check, "a second process on the same records", BAD_INPUT, permitscreen("list", "--data", data), [str(data)])
        check.that("a second process: nothing is listed", "P14-0032" not in second.stdout, second.stdout)
        ended(check, "serve on the same records", BAD_INPUT, permitscreen("serve", "--data", data, "--port", free_port()), [str(data)])
        server = ("--server", f"http://127.0.0.1:{port}")
        ended(check, "the service on them answers", PASSED, permitscreen("list", *server), ["structures/P31-0202", "catalogue version 1"])
        ended(check, "a change through the service", PASSED, permitscreen("remove", "P31-0202", *server, *WHY), ["version 2"])
    ended(check, "the records are kept", PASSED, permitscreen("list", "--data", data), ["11 structures", "catalogue version 2"])


def policy_states(check, folder):
    at = ("--data", folder / "policies")
    document = "policies/lrfr-permit-2013@1"
    added = ended(check, "policy add", PASSED, permitscreen("policy", "add", POLICY_FILE, *at, *WHY), [f"{document}: draft, not confirmed; catalogue version 1"])
    check.that("policy add: prints the etag", re.search(r"etag [0-9a-f]{24}", added.stdout), added.stdout)
    enact = ("policy", "enact", "lrfr-permit-2013@1", "--from", "2026-01-01", "--to", "2027-12-31", *at, *WHY)
    ended(check, "policy enact, unconfirmed", BAD_INPUT, permitscreen(*enact), ["confirm"])
    confirm = ("policy", "confirm", "lrfr-permit-2013@1", "--person", "A. Engineer", "--on", "2025-12-15", "--reference", "decision 7/2025", *at, *WHY)
    ended(check, "policy confirm", PASSED, permitscreen(*confirm), [f"{document}: draft, confirmed by A. Engineer on 2025-12-15; catalogue version 2"])
    ended(check, "policy enact", PASSED, permitscreen(*enact), [f"{document}: in force from 2026-01-01 to 2027-12-31, confirmed by A. Engineer", "catalogue version 3"])
    ended(check, "policy confirm, in force", BAD_INPUT, permitscreen(*confirm), ["in force"])
    ended(check, "policy add of the next document", PASSED, permitscreen("policy", "add", written(folder / "next.json", _next_document()), *at, *WHY), ["policies/lrfr-permit-2013@2: draft"])
    ended(check, "policy add of that document again", BAD_INPUT, permitscreen("policy", "add", folder / "next.json", *at, *WHY), ["policies/lrfr-permit-2013@2"])
    ended(check, "list shows the documents beside each other", PASSED, permitscreen("list", *at), [document, "policies/lrfr-permit-2013@2", "in force", "from 2026-01-01 to 2027-12-31", "A. Engineer", "nobody"])
    ended(check, "policy withdraw", PASSED, permitscreen("policy", "withdraw", document, *at, *WHY), [f"{document}: withdrawn"])
    ended(check, "policy enact, withdrawn", BAD_INPUT, permitscreen(*enact), ["withdrawn"])
    states = [r["fromVersion"] for r in lines(permitscreen("history", document, *at, "--json"))]
    check.equal("history of a document: each step is a version", ["5", "3", "2", "1"], states)
    ended(check, "compare of a document", PASSED, permitscreen("compare", document, *at, "--before", "2", "--after", "3"), ["state", "in_force_from"])
    ended(check, "policy withdraw without a version", BAD_INPUT, permitscreen("policy", "withdraw", "lrfr-permit-2013", *at, *WHY), ["lrfr-permit-2013@1"])


def _next_document():
    file = read(POLICY_FILE)
    file["policy"]["documentVersion"] = 2
    return file


def import_broken_off(check, folder):
    """SIGINT in the middle; the same command goes on, and the end is that of an import nobody disturbed."""
    count = 1500
    file = written(folder / "spans.json", spans(count))
    data = folder / "broken-off"
    arguments = ("import", file, "--data", data, "--piece", "5", "--reason", "many spans")
    with Running(command(*arguments), f" of {count:,} items") as program:
        program.wait_until_ready()
        code, _ = program.end(signal.SIGINT)
    check.equal("import broken off by SIGINT: exit code 3", NO_ANSWER, code)
    check.contains("import broken off: how to go on, word for word", ["Interrupted", "Nothing is lost", f"permitscreen import {file}", "'many spans'"], program.output)
    check.that("import broken off: no stack trace", "   at " not in program.output, program.output)
    ended(check, "import broken off: nothing of it is seen", PASSED, permitscreen("list", "--data", data), ["0 structures"])
    rest = ended(check, "import gone on with", PASSED, permitscreen(*arguments), ["Going on with imports/", f" of {count:,}", "many spans"])
    start = re.search(r"from item ([\d,]+) of", rest.stdout)
    check.that("import gone on with: from where it was", start and 0 < int(start.group(1).replace(",", "")) < count, rest.stdout)
    check.contains("import gone on with: all of it, once, as one version", [f"{count:,} added, 0 revised, 0 unchanged, 0 refused; catalogue version 1"], rest.stdout)
    whole = folder / "whole"
    ended(check, "the same import undisturbed", PASSED, permitscreen("import", file, "--data", whole, "--reason", "many spans"), [f"{count:,} added"])
    etags = [[s["etag"] for s in lines(permitscreen("list", "--data", place, "--json"))] for place in (data, whole)]
    check.that("the same catalogue as of an import undisturbed", etags[0] == etags[1] and len(etags[0]) == count)


def import_through_a_kill(check, folder):
    """The service is killed under an import and comes back: the import waits, and sends the same piece again."""
    count = 1500
    file = written(folder / "killed.json", spans(count))
    data = folder / "killed"
    port = free_port()
    serve = command("serve", "--data", data, "--port", port)
    importing = command("import", file, "--server", f"http://127.0.0.1:{port}", "--piece", "5", "--timeout", "60", *WHY)
    with Running(serve, "Catalogue ready") as service:
        service.wait_until_ready()
        with Running(importing, f" of {count:,} items") as program:
            program.wait_until_ready()
            service.end(signal.SIGKILL)
            with Running(serve, "Catalogue ready"):
                code = program.wait()
    check.equal("import while the service was killed and started again: exit code 0", PASSED, code)
    check.contains("import through a kill: it tells that it tried again, and ends whole", ["trying again", f"{count:,} added, 0 revised, 0 unchanged, 0 refused"], program.output)
    ended(check, "records after a kill are sound", PASSED, permitscreen("verify", "--data", data), ["Sound:"])
    again = command("import", file, "--server", f"http://127.0.0.1:{free_port()}", *WHY)
    with Running(again, "cannot be reached") as nobody:
        check.equal("import with nobody there: exit code 3", NO_ANSWER, nobody.wait())
    check.contains("import with nobody there: the command to go on with", ["cannot be reached", f"permitscreen import {file}"], nobody.output)


def bad_files(check, folder):
    data = folder / "bad"
    at = ("--data", data)
    files = folder / "mixed"
    good = spans(4)
    good["structures"][1]["units"][0]["truss"]["members"][0]["areaM2"] = -1
    good["structures"][2]["units"][0]["truss"]["members"][0]["areaM3"] = 1
    written(files / "spans.json", good)
    written(files / "torn.json", "{\"schema\": \"permitscreen/catalogue/1\",\n \"structures\": [{]}")
    told = ["spans.json structures[1]", "area_m2", "Found -1", "structures[2].units[0].truss.members[0].areaM3", "did you mean \"areaM2\"?", "torn.json", "not JSON: line 2"]
    refused = ended(check, "import of files at fault", BAD_INPUT, permitscreen("import", files, *at, *WHY), [*told, "Nothing was published", "3 items were refused", "--allow-partial"])
    check.that("import of files at fault: no version is told", "catalogue version" not in refused.stdout, refused.stdout)
    ended(check, "import of files at fault: nothing is in the catalogue", PASSED, permitscreen("list", *at), ["0 structures"])
    partial = permitscreen("import", files, *at, *WHY, "--allow-partial")
    ended(check, "import --allow-partial", PASSED, partial, [*told, "2 added, 0 revised, 0 unchanged, 3 refused; catalogue version 1"])
    listed = [s["name"] for s in lines(permitscreen("list", *at, "--json"))]
    check.equal("import --allow-partial: the others are in", ["structures/S-00000", "structures/S-00003"], listed)
    refusals = lines(permitscreen("import", files, *at, *WHY, "--json"))
    check.equal("import --json: each item refused, then the import", (4, 3, "IMPORT_STATE_CANCELLED"), (len(refusals), refusals[-1]["refusedCount"], refusals[-1]["state"]))

    twice = spans(2)
    twice["structures"][1]["name"] = twice["structures"][0]["name"]
    ended(check, "import of a structure that stands in it twice", BAD_INPUT, permitscreen("import", written(folder / "twice.json", twice), *at, *WHY), ["structures/S-00000"])
    ended(check, "import of an application by name", BAD_INPUT, permitscreen("import", DEMO / "applications" / "01-reactor-vessel-13-axles.json", *at, *WHY), ["an application file"])
    ended(check, "import of a folder without catalogue files", BAD_INPUT, permitscreen("import", DEMO / "applications", *at, *WHY), ["no catalogue or policy file"])
    ended(check, "import of what is not there", BAD_INPUT, permitscreen("import", folder / "none", *at, *WHY), ["none"])
    ended(check, "import without a reason", BAD_INPUT, permitscreen("import", EXAMPLE, *at), ["--reason"])
    ended(check, "import without records", BAD_INPUT, permitscreen("import", EXAMPLE, *WHY), ["--data", "--server"])
    ended(check, "import with no actor", BAD_INPUT, permitscreen("import", EXAMPLE, *at, *WHY, "--actor", " "), ["--actor"])
    ended(check, "import in pieces of nothing", BAD_INPUT, permitscreen("import", EXAMPLE, *at, *WHY, "--piece", "0"), ["--piece", "2000"])
    ended(check, "records in a folder that is not there", BAD_INPUT, permitscreen("list", "--data", folder / "misspelt"), ["misspelt", "import"])
    check.that("records in a folder that is not there: none is made", not (folder / "misspelt").exists())
    ended(check, "records in what is a file", BAD_INPUT, permitscreen("list", "--data", EXAMPLE), ["truss.json"])
    ended(check, "records and files at once", BAD_INPUT, permitscreen("list", *at, "--catalogue", EXAMPLE), ["--data", "--catalogue"])
    ended(check, "serve of nothing", BAD_INPUT, permitscreen("serve"), ["--data", "--catalogue"])
    ended(check, "serve of records and files at once", BAD_INPUT, permitscreen("serve", *at, "--catalogue", EXAMPLE, "--policies", POLICY_FILE), ["--data", "--catalogue"])


def everything(check):
    with tempfile.TemporaryDirectory() as folder:
        check.all(
            (
                import_and_history,
                export_round_trip,
                remove_backup_restore,
                verification,
                one_process_a_folder,
                policy_states,
                import_broken_off,
                import_through_a_kill,
                bad_files,
            ),
            Path(folder))


if __name__ == "__main__":
    checks.run(everything)
