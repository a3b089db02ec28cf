"""What tests/oracle expects of the demo, and the comparison with a screening in JSON form."""

import json
import math

from .program import DEMO, ROOT

EXPECTED = json.loads((ROOT / "tests" / "oracle" / "demo_expected.json").read_text(encoding="utf-8"))["applications"]
TOLERANCE = 1e-9


def expected(file):
    return next(a for a in EXPECTED if a["file"] == file)


def application(file):
    """An application of the demo as the contract's JSON."""
    return json.loads((DEMO / "applications" / file).read_text(encoding="utf-8"))["application"]


def misses(by, screening):
    """Every verdict, rung, outcome, rating factor, k and governing effect that differs; and how many numbers were compared."""
    found = []
    numbers = 0

    def same(at, wanted, value):
        if wanted != value:
            found.append(f"{at}: oracle {wanted}, found {value}")

    def number(at, wanted, value):
        nonlocal numbers
        numbers += 1
        agree = wanted is None and value is None or (
            wanted is not None and value is not None and math.isclose(wanted, value, rel_tol=TOLERANCE, abs_tol=TOLERANCE))
        if not agree:
            found.append(f"{at}: oracle {wanted}, found {value}")

    same("verdict", "VERDICT_" + by["verdict"], screening["verdict"])
    crossings = screening["crossings"]
    same("number of crossings", len(by["crossings"]), len(crossings))
    for i, (want, have) in enumerate(zip(by["crossings"], crossings)):
        at = f"crossings[{i}]"
        same(f"{at}.structure", want["structure"], have["structure"])
        same(f"{at}.verdict", "VERDICT_" + want["verdict"], have["verdict"])
        same(f"{at}.rungId", want["rungId"] or "", have.get("rungId", ""))
        codes = sorted({r["code"].removeprefix("REASON_CODE_") for r in have.get("reasons", [])})
        same(f"{at}.reasons", sorted(set(want["reasons"])), codes)
        rungs = have.get("rungs", [])
        same(f"{at}: number of rungs", len(want.get("rungs") or []), len(rungs))
        for r, (step, rung) in enumerate(zip(want.get("rungs") or [], rungs)):
            here = f"{at}.rungs[{r}]"
            same(f"{here}.rungId", step["rungId"], rung["rungId"])
            same(f"{here}.outcome", "RUNG_OUTCOME_" + step["outcome"], rung["outcome"])
            number(f"{here}.ratingFactor", step["ratingFactor"], rung.get("ratingFactor"))
            number(f"{here}.largestAxleFactor", step["largestAxleFactor"], rung.get("largestAxleFactor"))
            if step.get("governing"):
                effect = rung.get("governing", {}).get("effect", {})
                named = tuple(effect.get(k) for k in ("unitId", "effectId", "planeId", "sense"))
                if named not in [tuple(g[k] for k in ("unitId", "effectId", "planeId", "sense")) for g in step["governing"]]:
                    found.append(f"{here}.governing: {named} is none of the oracle's")
    return found, numbers
