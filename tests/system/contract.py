"""The protos against buf's rules, and against the contract that callers were given (contract/v1.binpb)."""

import shutil
import subprocess
import tempfile
from pathlib import Path

from support import checks
from support.program import ROOT

BUF = ROOT / "tests" / "tools" / "node_modules" / ".bin" / "buf"
BASELINE = Path(__file__).parent / "contract" / "v1.binpb"


def buf(*arguments, folder=ROOT):
    return subprocess.run([BUF, *map(str, arguments)], cwd=folder, capture_output=True, text=True, timeout=120, check=False)


def breaking(folder=ROOT):
    """Image against image: a workspace of two modules cannot be compared with one image."""
    with tempfile.TemporaryDirectory() as name:
        now = Path(name) / "now.binpb"
        built = buf("build", "-o", now, folder=folder)
        return built if built.returncode else buf("breaking", now, "--against", BASELINE, folder=folder)


def rules(check):
    for what, result in (
        ("buf lint (STANDARD)", buf("lint")),
        ("buf format", buf("format", "-d", "--exit-code")),
        ("buf breaking against the contract that callers were given", breaking()),
    ):
        check.that(f"contract: {what} has nothing to say", result.returncode == 0, result.stdout + result.stderr)


def breaking_sees_a_break(check):
    with tempfile.TemporaryDirectory() as name:
        folder = Path(name)
        shutil.copytree(ROOT / "protos", folder / "protos")
        shutil.copy(ROOT / "buf.yaml", folder)
        proto = folder / "protos" / "permitscreen" / "v1" / "application.proto"
        text = proto.read_text(encoding="utf-8")
        proto.write_text(text.replace("string reference = 1;", "string reference = 9;"), encoding="utf-8")
        result = breaking(folder)
        check.that("contract: buf breaking sees a field renumbered", result.returncode == 100, f"exit code {result.returncode}\n{result.stdout}{result.stderr}")


if __name__ == "__main__":
    checks.run(rules, breaking_sees_a_break)
