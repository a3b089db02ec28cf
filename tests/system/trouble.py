"""A full disk, a locked folder, a newer schema, files that may not be written: a clear message each time, and nothing is lost."""

import contextlib
import hashlib
import shutil
import subprocess
import tempfile
from pathlib import Path

from support import checks, figures, fleet, records, stubs
from support.program import free_port, permitscreen, recording
from support.undamaged import ACTOR, Undamaged, answers, flip, other, stop

MEBIBYTE = 1 << 20
DISK_MIB = 64
ROOM_MIB = 3
STRUCTURES = 2000
BAD_INPUT, NO_ANSWER = 2, 3


@contextlib.contextmanager
def small_disk():
    """A disk of a few mebibytes; None where this user may not mount one."""
    with tempfile.TemporaryDirectory(prefix="permitscreen-disk-") as name:
        mounted = subprocess.run(["mount", "-t", "tmpfs", "-o", f"size={DISK_MIB}m", "tmpfs", name], capture_output=True, text=True, check=False)
        if mounted.returncode != 0:
            print(f"note - skipped: no small disk can be mounted: {mounted.stderr.strip()}", flush=True)
            yield None
            return
        try:
            yield Path(name)
        finally:
            subprocess.run(["umount", "-l", name], check=True)


def remount(disk, how):
    subprocess.run(["mount", "-o", f"remount,{how}", disk], check=True)


def fill(disk, room):
    """Takes the disk's room but for a little; returns the file that takes it."""
    filler = disk / "filler"
    free = shutil.disk_usage(disk).free - room
    with filler.open("wb") as out:
        out.write(b"\0" * max(0, free))
    return filler


def sums(folder):
    """What must not change: the records' own files."""
    return {p.name: hashlib.sha256(p.read_bytes()).hexdigest() for p in folder.iterdir() if p.name in (records.CATALOGUE, records.LINES)}


def refused(check, what, folder, parts):
    """A service does not start on the folder: exit code 2, a message that says why and how to mend it, no stack."""
    before = sums(folder)
    with recording(free_port(), folder) as service:
        code = service.wait()
        check.equal(f"{what}: exit code 2", BAD_INPUT, code)
        check.contains(f"{what}: the message says what and how to mend it", parts, service.output)
        check.that(f"{what}: no stack trace", "   at PermitScreen" not in service.output and "Unhandled" not in service.output, service.output)
    check.equal(f"{what}: the files are as they were", before, sums(folder))


def answering(check, what, folder, undamaged):
    """A service answers from the folder as from undamaged records."""
    port = free_port()
    with recording(port, folder) as service, stubs.Service(port) as client:
        service.wait_until_ready()
        check.none(f"{what}: every answer is the undamaged one", other(undamaged.answers, answers(client, undamaged.structures)))
        *_, last = client.history.VerifyRecords(stubs.history.VerifyRecordsRequest(), timeout=120)
        check.that(f"{what}: the records are sound", last.result.sound, last)
        stop(service)
        return service.output


def locked(check, undamaged):
    with undamaged.copy() as folder:
        port = free_port()
        with recording(port, folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            refused(check, "locked", folder, ["in use by another process", "--server"])
            one = permitscreen("import", undamaged.folder.parent / "none", "--data", folder, "--actor", ACTOR, "--reason", "second process")
            check.equal("locked: another command on the same folder: exit code 2", BAD_INPUT, one.returncode)
            listed = permitscreen("backlog", "--data", folder)
            check.that("locked: and it says so", listed.returncode == BAD_INPUT and "in use by another process" in listed.stderr, listed)
            check.none("locked: the first goes on", other(undamaged.answers, answers(client, undamaged.structures)))
            stop(service)


def newer_schema(check, undamaged):
    with undamaged.copy() as folder:
        known = records.rows(folder / records.CATALOGUE, "PRAGMA user_version")[0][0]
        records.change(folder / records.CATALOGUE, f"PRAGMA user_version = {known + 98}")
        refused(check, "newer schema", folder, ["newer version", f"schema version is {known + 98}", "backup"])
        records.change(folder / records.CATALOGUE, f"PRAGMA user_version = {known}")
        answering(check, "newer schema, set back", folder, undamaged)
    with undamaged.copy() as folder:
        records.change(folder / records.LINES, "PRAGMA user_version = 99")
        answering(check, "newer schema of the kept lines: they are computed anew", folder, undamaged)


def foreign_files(check, undamaged):
    with undamaged.copy() as folder:
        records.change(folder / records.CATALOGUE, "PRAGMA application_id = 12345")
        refused(check, "a database of another program", folder, [records.CATALOGUE, "another program"])
    with undamaged.copy() as folder:
        (folder / records.CATALOGUE).write_bytes(b"not a database at all, though a file of this name\n" * 200)
        refused(check, "no database at all", folder, [records.CATALOGUE, "damaged or is no database"])
    with undamaged.copy() as folder:
        whole = (folder / records.CATALOGUE).read_bytes()
        (folder / records.CATALOGUE).write_bytes(whole[:len(whole) // 2])
        refused(check, "half a database", folder, [records.CATALOGUE, "damaged"])
    with undamaged.copy() as folder:
        (folder / records.LINES).write_bytes(flip((folder / records.LINES).read_bytes(), 20, 4)[:9000])
        answering(check, "half a file of kept lines: they are computed anew", folder, undamaged)


def read_only(check, undamaged):
    with small_disk() as disk:
        if disk is None:
            return
        folder = Path(shutil.copytree(undamaged.folder, disk / "records"))
        remount(disk, "ro")
        refused(check, "read-only", folder, ["may not be read or written", "right to read and write"])
        remount(disk, "rw")
        answering(check, "read-only, writable again", folder, undamaged)


def full_disk(check, undamaged):
    with small_disk() as disk, tempfile.TemporaryDirectory(prefix="permitscreen-fleet-") as files:
        if disk is None:
            return
        fleet.write(Path(files), STRUCTURES)
        folder = Path(shutil.copytree(undamaged.folder, disk / "records"))
        port = free_port()
        importing = ("import", files, "--server", f"http://127.0.0.1:{port}", "--actor", ACTOR, "--reason", "more than there is room for")
        with recording(port, folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            filler = fill(disk, ROOM_MIB * MEBIBYTE)
            result = permitscreen(*importing)
            text = result.stdout + result.stderr
            check.that("full disk: an import ends with an error", result.returncode in (BAD_INPUT, NO_ANSWER), result)
            check.contains("full disk: it says that no room is left and what to do", ["no room is left", "Make room"], text)
            check.that("full disk: no stack trace", "   at PermitScreen" not in text, text)
            check.none("full disk: the service goes on answering as before", other(undamaged.answers, answers(client, undamaged.structures)))
            filler.unlink()
            again = permitscreen(*importing)
            check.that("full disk: once there is room the same import is completed by the same service", again.returncode == 0 and f"{STRUCTURES:,} added" in again.stdout, again)
            stop(service)
        fill(disk, 0)
        with recording(free_port(), folder) as service:
            if not service.becomes_ready():
                code = service.wait()
                check.that("full disk: a service that does not start says why", code in (BAD_INPUT, NO_ANSWER) and "no room is left" in service.output, f"{code}\n{service.output}")
                check.that("full disk: no stack trace at the start", "   at PermitScreen" not in service.output, service.output)
            else:
                check.that("full disk: a service starts without room", True)
        (disk / "filler").unlink()
        port = free_port()
        with recording(port, folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            *_, last = client.history.VerifyRecords(stubs.history.VerifyRecordsRequest(), timeout=120)
            check.that("full disk: afterwards the records are sound", last.result.sound, last)
            names = [s.name for s in _structures(client)]
            check.equal("full disk: nothing is lost", len(undamaged.structures) + STRUCTURES, len(names))
            stop(service)
        figures.note("damage.full_disk", "yes")


def _structures(client):
    request = stubs.catalogue.ListStructuresRequest(page_size=1000, view=stubs.catalogue.STRUCTURE_VIEW_BASIC)
    found = []
    while True:
        page = client.catalogue.ListStructures(request, timeout=120)
        found += page.structures
        if not page.next_page_token:
            return found
        request.page_token = page.next_page_token


def everything(check):
    with tempfile.TemporaryDirectory(prefix="permitscreen-trouble-") as folder:
        undamaged = Undamaged(folder)
        check.all((locked, newer_schema, foreign_files, read_only, full_disk), undamaged)
        figures.note("damage.troubles", check.passed)


if __name__ == "__main__":
    checks.run(everything)
