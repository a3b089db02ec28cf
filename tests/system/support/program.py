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
SERVES = ("Catalogue ready", "Listening at")  # in either order

# Each process begins elsewhere, and no port is given out twice.
_PORTS = iter([20_000 + (os.getpid() * 41 + at) % 12_000 for at in range(12_000)])

# The published program; tests/system/run sets it.
PROGRAM = os.environ.get("PERMITSCREEN_PROGRAM", str(ROOT / "out" / "permitscreen" / "permitscreen.dll"))


def command(*arguments):
    return ["dotnet", PROGRAM, *map(str, arguments)]


def permitscreen(*arguments, folder=ROOT, patience=PATIENCE_S):
    """Runs a command to its end: exit code, output, errors."""
    return subprocess.run(command(*arguments), cwd=folder, capture_output=True, text=True, timeout=patience, check=False)


def free_port():
    """A port that nobody listens on, below those that the system gives to callers, which might take it before the service does."""
    for port in _PORTS:
        with socket.socket() as listener:
            try:
                listener.bind(("127.0.0.1", port))
                return port
            except OSError:
                continue  # Taken; the next one is tried.
    raise RuntimeError("no port is free")


def answers(port):
    """Whether anything takes connections on a port of the loopback address."""
    with socket.socket() as caller:
        caller.settimeout(5)
        return caller.connect_ex(("127.0.0.1", port)) == 0


def heeds_interrupts():
    """A run in the background of a script ignores SIGINT, and so would all that it starts."""
    signal.signal(signal.SIGINT, signal.SIG_DFL)


class Running:
    """A command that stays: started on entry, killed on leaving where it has not ended."""

    def __init__(self, arguments, ready, folder=ROOT, environment=None):
        self._arguments = arguments
        self._ready = (ready,) if isinstance(ready, str) else ready
        self._folder = folder
        self._environment = {**os.environ, **(environment or {})}
        self._lines = []
        self._ended = False
        self._news = threading.Condition()

    def __enter__(self):
        # A process group of its own, so that a signal reaches all its processes and no others, as Ctrl-C does in a terminal.
        self.process = subprocess.Popen(
            self._arguments, cwd=self._folder, env=self._environment, stdout=subprocess.PIPE, stderr=subprocess.STDOUT, text=True, start_new_session=True,
            preexec_fn=heeds_interrupts)
        self._reader = threading.Thread(target=self._read, daemon=True)
        self._reader.start()
        return self

    def __exit__(self, *_):
        if self.process.poll() is None:
            os.killpg(self.process.pid, signal.SIGKILL)
            self.process.wait(PATIENCE_S)

    def _read(self):
        for line in self.process.stdout:
            with self._news:
                self._lines.append(line)
                self._news.notify_all()
        with self._news:
            self._ended = True
            self._news.notify_all()

    @property
    def output(self):
        return "".join(self._lines)

    def wait_until_ready(self, patience=PATIENCE_S):
        """Waits for what tells readiness, or for the end of the process."""
        if not self.becomes_ready(patience):
            raise RuntimeError(f"{self._arguments} is not ready; it printed\n{self.output}")
        return self

    def becomes_ready(self, patience=PATIENCE_S):
        """Whether all lines came that tell readiness, before the process or the time ended."""
        return all(self.line_with(text, patience) is not None for text in self._ready)

    def line_with(self, text, patience=PATIENCE_S):
        """Waits for a line that holds a text: the line; None where the process ends without it, or the time does."""
        def found():
            return next((line.strip() for line in self._lines if text in line), None)

        with self._news:
            self._news.wait_for(lambda: self._ended or found(), patience)
            return found()

    def end(self, number, patience=PATIENCE_S):
        """Sends a signal: exit code and seconds until the end."""
        start = time.monotonic()
        os.killpg(self.process.pid, number)
        return self.wait(patience), time.monotonic() - start

    def wait(self, patience=PATIENCE_S):
        code = self.process.wait(patience)
        self._reader.join(10)
        return code

    def kill(self):
        """Ends the whole process group at once, as a loss of power would."""
        os.killpg(self.process.pid, signal.SIGKILL)
        self.process.wait(PATIENCE_S)

    def largest_memory_mb(self):
        """Largest resident memory so far, MB, as the kernel counts it."""
        status = Path(f"/proc/{self.process.pid}/status").read_text(encoding="utf-8")
        return int(status.split("VmHWM:")[1].split()[0]) / 1024

    def cpu_seconds(self):
        """Processor time used so far."""
        fields = Path(f"/proc/{self.process.pid}/stat").read_text(encoding="utf-8").rsplit(")", 1)[1].split()
        return (int(fields[11]) + int(fields[12])) / os.sysconf("SC_CLK_TCK")


def serving(port, catalogue=DEMO / "catalogue", policies=DEMO / "policies", *more):
    """`permitscreen serve`; ready once its catalogue is."""
    return Running(command("serve", "--catalogue", catalogue, "--policies", policies, "--port", port, *more), SERVES)


def recording(port, data, *more, environment=None):
    """`permitscreen serve` on records in a folder; ready once its catalogue is."""
    return Running(command("serve", "--data", data, "--port", port, *more), SERVES, environment=environment)
