"""The program under test, run as a user runs it: as a process of its own."""

import os
import signal
import socket
import subprocess
import threading
import time
from pathlib import Path

ROOT = Path(__file__).resolve().parents[3]
DEMO = ROOT / "deploy" / "demo"
AS_OF = "2026-12-01"
POLICY = "policies/ossel-demo"
PATIENCE_S = 120

# The published program; tests/system/run sets it.
PROGRAM = os.environ.get("PERMITSCREEN_PROGRAM", str(ROOT / "out" / "permitscreen" / "permitscreen.dll"))


def command(*arguments):
    return ["dotnet", PROGRAM, *map(str, arguments)]


def permitscreen(*arguments, folder=ROOT):
    """Runs a command to its end: exit code, output, errors."""
    return subprocess.run(command(*arguments), cwd=folder, capture_output=True, text=True, timeout=PATIENCE_S, check=False)


def free_port():
    with socket.socket() as listener:
        listener.bind(("127.0.0.1", 0))
        return listener.getsockname()[1]


def answers(port):
    """Whether anything takes connections on a port of the loopback address."""
    with socket.socket() as caller:
        caller.settimeout(5)
        return caller.connect_ex(("127.0.0.1", port)) == 0


class Running:
    """A command that stays: started on entry, killed on leaving where it has not ended."""

    def __init__(self, arguments, ready, folder=ROOT):
        self._arguments = arguments
        self._ready = ready
        self._folder = folder
        self._lines = []
        self._seen = threading.Event()

    def __enter__(self):
        # A process group of its own, so that a signal reaches all its processes and no others, as Ctrl-C does in a terminal.
        self.process = subprocess.Popen(
            self._arguments, cwd=self._folder, stdout=subprocess.PIPE, stderr=subprocess.STDOUT, text=True, start_new_session=True)
        self._reader = threading.Thread(target=self._read, daemon=True)
        self._reader.start()
        return self

    def __exit__(self, *_):
        if self.process.poll() is None:
            os.killpg(self.process.pid, signal.SIGKILL)
            self.process.wait(PATIENCE_S)

    def _read(self):
        for line in self.process.stdout:
            self._lines.append(line)
            if self._ready in line:
                self._seen.set()
        self._seen.set()

    @property
    def output(self):
        return "".join(self._lines)

    def wait_until_ready(self, patience=PATIENCE_S):
        """Waits for the line that tells readiness, or for the end of the process."""
        self._seen.wait(patience)
        if self._ready not in self.output:
            raise RuntimeError(f"{self._arguments} is not ready; it printed\n{self.output}")
        return self

    def end(self, number, patience=PATIENCE_S):
        """Sends a signal: exit code and seconds until the end."""
        start = time.monotonic()
        os.killpg(self.process.pid, number)
        return self.wait(patience), time.monotonic() - start

    def wait(self, patience=PATIENCE_S):
        code = self.process.wait(patience)
        self._reader.join(10)
        return code

    def cpu_seconds(self):
        """Processor time used so far."""
        fields = Path(f"/proc/{self.process.pid}/stat").read_text(encoding="utf-8").rsplit(")", 1)[1].split()
        return (int(fields[11]) + int(fields[12])) / os.sysconf("SC_CLK_TCK")


def serving(port, catalogue=DEMO / "catalogue", policies=DEMO / "policies", *more):
    """`permitscreen serve`; ready once its catalogue is."""
    return Running(command("serve", "--catalogue", catalogue, "--policies", policies, "--port", port, *more), "Catalogue ready")
