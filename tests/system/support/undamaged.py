"""Records of the demo as a service left them, with the answers that they give; tests damage copies of them."""

import contextlib
import json
import re
import shutil
import signal
import tempfile
import time
from pathlib import Path

import grpc

from . import oracle, records, stubs
from .program import AS_OF, DEMO, POLICY, free_port, permitscreen, recording

ACTOR = "test of damage"
APPLICATIONS = sorted(path.name for path in (DEMO / "applications").glob("*.json"))


class Undamaged:
    """A folder of records, the answers it gives, and its lines."""

    def __init__(self, folder):
        self.folder = Path(folder) / "undamaged"
        port = free_port()
        with recording(port, self.folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            result = permitscreen("import", DEMO / "catalogue", DEMO / "policies", "--server", f"http://127.0.0.1:{port}", "--actor", ACTOR, "--reason", "the demo")
            if result.returncode != 0:
                raise RuntimeError(f"the demo cannot be imported:\n{result.stdout}{result.stderr}")
            wait_for_lines(client)
            self.structures = [s.name for s in client.catalogue.ListStructures(stubs.catalogue.ListStructuresRequest(page_size=1000), timeout=60).structures]
            self.answers = answers(client, self.structures)
            stop(service)
        self.lines = records.lines(self.folder)

    @contextlib.contextmanager
    def copy(self):
        with tempfile.TemporaryDirectory(prefix="permitscreen-damage-") as folder:
            yield Path(shutil.copytree(self.folder, Path(folder) / "records"))


def stop(service):
    code, _ = service.end(signal.SIGTERM)
    if code != 0:
        raise RuntimeError(f"a clean stop ended with exit code {code}:\n{service.output}")


def wait_for_lines(client):
    """Waits for the lines, and tells the backlog."""
    while (backlog := client.maintenance.GetBacklog(stubs.maintenance.GetBacklogRequest(), timeout=120).backlog).pending_count > 0:
        time.sleep(0.1)
    return backlog


def answers(client, structures):
    """Every screening of the demo and the lines of every structure, by what was asked; of an error its code."""
    asked = {f: lambda f=f: client.screening.ScreenApplication(stubs.request(oracle.application(f), POLICY, AS_OF), timeout=120) for f in APPLICATIONS}
    asked |= {s: lambda s=s: client.catalogue.ListInfluenceLines(stubs.catalogue.ListInfluenceLinesRequest(parent=s, page_size=1000), timeout=120) for s in structures}
    found = {}
    for what, ask in asked.items():
        try:
            # Residuals are those of the structure; an etag cannot differ where the content does not.
            found[what] = json.dumps(stubs.as_json(ask()), sort_keys=True)
        except grpc.RpcError as error:
            found[what] = error.code().name
    return found


def other(wanted, found, allowed=()):
    """What is answered differently, other than by an error that is allowed."""
    return [f"{what}: {found[what][:200]}" for what in wanted if found[what] != wanted[what] and found[what] not in allowed]


def flip(data, at, bit):
    """Bytes with one bit changed."""
    changed = bytearray(data)
    changed[at] ^= 1 << bit
    return bytes(changed)


def flip_in_file(path, at, bit):
    data = path.read_bytes()
    path.write_bytes(flip(data, at, bit))


def said(service, pattern):
    return re.search(pattern, service.output) is not None
