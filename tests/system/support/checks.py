"""Counts checks, one line each; a script that does not run to its end has failed."""

import sys
import traceback


class Checks:
    """Checks of one script."""

    def __init__(self):
        self.passed = 0
        self.failed = 0

    def that(self, what, holds, why=""):
        """One check; `why` is printed where it fails."""
        if holds:
            self.passed += 1
            print(f"ok - {what}", flush=True)
        else:
            self.failed += 1
            print(f"not ok - {what}", flush=True)
            for line in str(why).strip().splitlines()[:40]:
                print(f"    {line}", flush=True)
        return bool(holds)

    def equal(self, what, expected, found):
        return self.that(what, expected == found, f"expected {expected!r}\nfound    {found!r}")

    def contains(self, what, parts, text):
        """Every part stands in the text."""
        missing = [part for part in parts if part not in text]
        return self.that(what, not missing, f"missing {missing!r} in\n{text}")

    def none(self, what, misses):
        """A list of misses is empty."""
        return self.that(what, not misses, "\n".join(misses))

    def all(self, parts, *arguments):
        """Runs parts of a script; one that breaks off is a failed check, and the others still run."""
        for part in parts:
            try:
                part(self, *arguments)
            except Exception:  # pylint: disable=broad-except
                self.that(f"{part.__name__.replace('_', ' ')}: runs to its end", False, traceback.format_exc())


def run(*parts):
    """Runs the parts of a script, and ends the process."""
    checks = Checks()
    checks.all(parts)
    print(f"{checks.passed} passed, {checks.failed} failed", flush=True)
    sys.exit(1 if checks.failed else 0)
