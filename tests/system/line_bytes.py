"""Influence lines are the same bytes whatever the processor offers: with AVX-512 switched off, with AVX2 switched off, and with neither off."""

import re
import signal
import tempfile
import time
from pathlib import Path

from support import checks, figures, fleet, records, stubs
from support.program import DEMO, free_port, permitscreen, recording

STRUCTURES = 320
# The settings of .NET 10 (it does not know EnableAVX512F any more). Without AVX2 there is no AVX-512 either.
SETTINGS = [
    ("neither switched off", {}),
    ("AVX-512 switched off", {"DOTNET_EnableAVX512": "0"}),
    ("AVX2 switched off", {"DOTNET_EnableAVX2": "0"}),
    ("all vector instructions switched off", {"DOTNET_EnableHWIntrinsic": "0"}),
]


def processor():
    """Whether the machine has AVX2 and AVX-512."""
    flags = set(re.search(r"(?m)^flags\s*: (.*)$", Path("/proc/cpuinfo").read_text(encoding="utf-8"))[1].split()) if Path("/proc/cpuinfo").exists() else set()
    return "avx2" in flags, "avx512f" in flags


def wait_for_lines(port):
    with stubs.Service(port) as service:
        while True:
            backlog = service.maintenance.GetBacklog(stubs.maintenance.GetBacklogRequest(), timeout=120).backlog
            if backlog.pending_count == 0:
                return backlog
            time.sleep(0.1)


def kept(check, what, environment, files):
    """Lines that a service with these settings computes, and what it says of its processor."""
    with tempfile.TemporaryDirectory(prefix="permitscreen-bytes-") as data:
        port = free_port()
        with recording(port, data, environment=environment) as service:
            service.wait_until_ready()
            said = service.line_with("Processor: ", 10) or ""
            result = permitscreen("import", DEMO / "catalogue", files, "--server", f"http://127.0.0.1:{port}", "--actor", "test of lines", "--reason", "lines of every kind")
            check.equal(f"lines, {what}: the import ends with exit code 0", 0, result.returncode)
            backlog = wait_for_lines(port)
            check.equal(f"lines, {what}: this service computed them all", backlog.kept_count, backlog.computed_count)
            code, _ = service.end(signal.SIGTERM)
            check.equal(f"lines, {what}: a clean stop", 0, code)
        found = re.search(r"vectors of (\d+) bits, AVX2 (yes|no), AVX-512 (yes|no)", said)
        return records.lines(data), found and (int(found[1]), found[2] == "yes", found[3] == "yes"), said


def line_bytes(check):
    avx2, avx512 = processor()
    with tempfile.TemporaryDirectory(prefix="permitscreen-fleet-") as name:
        files = Path(name)
        fleet.write(files, STRUCTURES)
        found = []
        for what, environment in SETTINGS:
            blobs, vectors, said = kept(check, what, environment, files)
            print(f"note - {what}: {said.split('Processor: ')[-1]}", flush=True)
            wanted = {0: (avx2, avx512), 1: (avx2, False), 2: (False, False), 3: (False, False)}[len(found)]
            check.equal(f"lines, {what}: the service's own words say that it took effect (AVX2, AVX-512)", wanted, vectors and vectors[1:])
            found.append((what, blobs))
    (_, plain), *others = found
    least = fleet.different_trusses(STRUCTURES)
    check.that(f"lines: more than {least} different trusses", len(plain) > least, len(plain))
    for what, blobs in others:
        differ = [key.hex() for key in sorted(plain.keys() | blobs.keys()) if plain.get(key) != blobs.get(key)]
        check.none(f"lines, {what}: {len(plain)} blobs equal byte for byte", [f"{key} differs" for key in differ[:10]])
    figures.note("line_bytes.blobs", len(plain))
    figures.note("line_bytes.bytes", sum(map(len, plain.values())))
    figures.note("line_bytes.settings", len(found))
    if not avx512:
        print("note - this machine has no AVX-512: the run with it switched off tells nothing more than the one with neither off", flush=True)
    figures.note("line_bytes.machine", f"AVX2 {'yes' if avx2 else 'no'}, AVX-512 {'yes' if avx512 else 'no'}")


if __name__ == "__main__":
    checks.run(line_bytes)
