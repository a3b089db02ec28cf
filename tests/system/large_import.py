"""Imports many small structures through the command line: progress, a break by Ctrl-C, a kill of the service, the same files again.

PERMITSCREEN_LARGE: how many structures (5,000).
"""

import contextlib
import json
import os
import pty
import re
import signal
import struct
import subprocess
import tempfile
import threading
import time
from fcntl import ioctl
from pathlib import Path
from termios import TIOCSWINSZ

from support import checks, figures, fleet, stubs
from support.program import Running, command, free_port, permitscreen, recording

COUNT = int(os.environ.get("PERMITSCREEN_LARGE", "5000"))
IN_A_TERMINAL = 1500
SLOW_ENOUGH = 20_000  # structures that take long enough for lines of progress
PATIENCE_S = 3600
NO_ANSWER = 3
ACTOR = "test of imports"


def importing(folder, port, *more):
    """`permitscreen import` of a folder into a running service; its output is no terminal."""
    arguments = command("import", folder, "--server", f"http://127.0.0.1:{port}", "--actor", ACTOR, "--reason", "the whole fleet", *more)
    return Running(arguments, "catalogue version")


def staged(port):
    """Items staged of the import that is under way."""
    with stubs.Service(port) as service:
        request = stubs.imports.ListImportsRequest(state=stubs.imports.IMPORT_STATE_STAGING)
        return sum(i.staged_count for i in service.imports.ListImports(request, timeout=60).imports)


def wait_until_staged(program, port, least):
    """Waits until so many items are staged; how many there are."""
    while program.process.poll() is None:
        if (done := staged(port)) >= least:
            return done
        time.sleep(0.02)
    raise RuntimeError(f"the import ended early:\n{program.output}")


def listed(port):
    """Structures that anybody can see."""
    result = permitscreen("list", "--json", "--server", f"http://127.0.0.1:{port}", patience=PATIENCE_S)
    return [json.loads(line)["name"] for line in result.stdout.splitlines() if '"structures/' in line]


def versions(port):
    with stubs.Service(port) as service:
        return [s.version for s in service.history.ListChangeSets(stubs.history.ListChangeSetsRequest(page_size=1000), timeout=60).change_sets]


def progress_lines(output):
    """Lines of progress: done, of how many, rate."""
    return re.findall(r"(?m)^ +([\d,]+) of ([\d,]+) items, ([\d,]+)/s(?:, (.+) left)?$", output)


def number(text):
    return int(text.replace(",", ""))


def interrupted(check, files, port):
    """Breaks the import off with Ctrl-C; items staged then."""
    with importing(files, port) as program:
        done = wait_until_staged(program, port, COUNT // 4)
        code, _ = program.end(signal.SIGINT, 60)
        check.equal("large import: Ctrl-C ends it with exit code 3", NO_ANSWER, code)
        check.contains("large import: it says that nothing is lost and how to go on", ["Nothing is lost", "Go on with", "import"], program.output)
        check.that("large import: it was in the middle", COUNT // 4 <= done < COUNT, done)
        check.equal("large import: nobody sees anything of it yet", 0, len(listed(port)))
        progressing(check, "large import, broken off", program.output)
        return staged(port)


def resumed(check, files, port, before, restart):
    """Goes on; the service is killed on the way and started again."""
    with importing(files, port) as program:
        wait_until_staged(program, port, max(before + 1, COUNT * 6 // 10))
        restart()
        code = program.wait(PATIENCE_S)
        check.equal("large import: the service is killed and started again, and the import ends with exit code 0", 0, code)
        going_on = re.search(r"Going on with imports/\S+ from item ([\d,]+) of ([\d,]+)", program.output)
        check.that("large import: it goes on where it was broken off", going_on and number(going_on[1]) >= before and number(going_on[2]) == COUNT, program.output)
        check.contains("large import: it says that the service could not be reached and that it tries again", ["cannot be reached", "trying again"], program.output)
        check.contains("large import: all are added in one version", [f"{COUNT:,} added, 0 revised, 0 unchanged, 0 refused", "catalogue version"], program.output)
        progressing(check, "large import, gone on with", program.output)


def progressing(check, what, output):
    """Plain lines of progress. One comes every two seconds, so that a small import may have none."""
    lines = progress_lines(output)
    if COUNT >= SLOW_ENOUGH:
        check.that(f"{what}: lines of progress with rate and time left", any(line[3] for line in lines), output)
    wrong = [line for line in lines if number(line[1]) != COUNT or number(line[0]) > COUNT]
    check.none(f"{what}: {len(lines)} lines of progress tell how many of how many", [str(line) for line in wrong])


def lines_ready(port):
    """Waits for the lines; the backlog, and seconds."""
    start = time.monotonic()
    with stubs.Service(port) as service:
        while True:
            backlog = service.maintenance.GetBacklog(stubs.maintenance.GetBacklogRequest(), timeout=300).backlog
            if backlog.pending_count == 0:
                return backlog, time.monotonic() - start
            time.sleep(0.2)


def complete(check, port, versions_before):
    """All is there once, in one version, with its lines; returns the seconds until the lines were."""
    backlog, waited = lines_ready(port)
    names = listed(port)
    check.equal("large import: all are listed, each once", (COUNT, COUNT), (len(names), len(set(names))))
    check.equal("large import: it made one version", len(versions_before) + 1, len(versions(port)))
    check.equal("large import: lines of every truss are kept", (fleet.different_trusses(COUNT), 0), (backlog.kept_count, len(backlog.failures)))
    return waited


def repeated(check, files, port):
    """The same files once more make no version; seconds."""
    before = versions(port)
    start = time.monotonic()
    with importing(files, port) as program:
        check.equal("large import: the same files again: exit code 0", 0, program.wait(PATIENCE_S))
        seconds = time.monotonic() - start
        check.contains("large import: the same files again: all unchanged", [f"0 added, 0 revised, {COUNT:,} unchanged, 0 refused", "nothing changed"], program.output)
    check.equal("large import: the same files again make no version", before, versions(port))
    return seconds


def large(check):
    with tempfile.TemporaryDirectory(prefix="permitscreen-large-") as name, contextlib.ExitStack() as stack:
        files, data = Path(name) / "files", Path(name) / "data"
        paths = fleet.write(files, COUNT)
        looked_at = permitscreen("check", paths[0], paths[-1], patience=PATIENCE_S)
        check.contains("large import: its files have no faults", [" 0 faults"], looked_at.stdout[-200:])
        port = free_port()
        services = [stack.enter_context(recording(port, data)).wait_until_ready()]
        memory = []

        def restart():
            memory.append(services[-1].largest_memory_mb())
            services[-1].kill()
            services.append(stack.enter_context(recording(port, data)))

        before = versions(port)
        start = time.monotonic()
        resumed(check, files, port, interrupted(check, files, port), restart)
        seconds = time.monotonic() - start
        waited = complete(check, port, before)
        again = repeated(check, files, port)
        memory.append(services[-1].largest_memory_mb())
        code, _ = services[-1].end(signal.SIGTERM)
        check.equal("large import: a clean stop", 0, code)
        figures.note("large_import.structures", COUNT)
        figures.note("large_import.seconds", round(seconds, 1))
        figures.note("large_import.items_per_second", round(COUNT / seconds))
        figures.note("large_import.lines_ready_after_seconds", round(waited, 1))
        figures.note("large_import.again_seconds", round(again, 1))
        figures.note("large_import.again_items_per_second", round(COUNT / again))
        figures.note("large_import.service_largest_memory_mb", round(max(memory)))
        figures.note("large_import.records_mb", round(sum(f.stat().st_size for f in data.iterdir()) / 1e6))


def in_a_terminal(arguments, output_too):
    """Runs a command whose error output is a terminal: exit code and what the terminal got."""
    ours, theirs = pty.openpty()
    ioctl(theirs, TIOCSWINSZ, struct.pack("HHHH", 40, 140, 0, 0))
    environment = {**os.environ, "TERM": "xterm-256color"}
    process = subprocess.Popen(
        arguments, stdout=theirs if output_too else subprocess.DEVNULL, stderr=theirs, stdin=theirs, env=environment, start_new_session=True)
    os.close(theirs)
    seen = bytearray()

    def read():
        try:
            while part := os.read(ours, 65536):
                seen.extend(part)
        except OSError:
            return  # Nobody holds the terminal's other side any more: the process has ended.

    reader = threading.Thread(target=read, daemon=True)
    reader.start()
    code = process.wait(600)
    reader.join(10)
    os.close(ours)
    return code, re.sub(r"\x1b\[[0-9;?]*[A-Za-z]", "", seen.decode("utf-8", "replace"))


def bar(check):
    with tempfile.TemporaryDirectory(prefix="permitscreen-bar-") as name:
        files = Path(name) / "files"
        fleet.write(files, IN_A_TERMINAL)
        for what, output_too in (("terminal", True), ("terminal, output into a file", False)):
            data = Path(name) / f"data-{output_too}"
            arguments = command("import", files, "--data", data, "--actor", ACTOR, "--reason", "seen in a terminal", "--piece", 50)
            code, screen = in_a_terminal(arguments, output_too)
            check.equal(f"{what}: exit code 0", 0, code)
            shown = re.findall(r"Importing ([━─=#█-]+) +([\d,]+) of ([\d,]+) items, ([\d,]+)/s, ([^\r\n]+?) left", screen)
            check.that(f"{what}: a bar with items done, rate and time left", shown and all(number(s[2]) == IN_A_TERMINAL for s in shown), screen[-1500:])
            counts = [number(s[1]) for s in shown]
            check.that(f"{what}: it moves forward", len(set(counts)) >= 2 and counts == sorted(counts), counts)
            figures.note(f"large_import.bar_states[{what}]", len(set(counts)))


if __name__ == "__main__":
    checks.run(bar, large)
