"""Screens every demo application with the oracle and writes what the product must answer.

    python3 tests/oracle/screen.py            writes tests/oracle/demo_expected.json
    python3 tests/oracle/screen.py --print    prints a table instead
    python3 tests/oracle/screen.py --effects  prints every effect of every rung as CSV instead
"""

import argparse
import csv
import json
import sys
from datetime import date
from pathlib import Path

from liveload import Train
from rating import Policy, UnitModel, screen_crossing, VERDICT_ORDER

HERE = Path(__file__).resolve().parent
DEMO = HERE.parent.parent / "deploy" / "demo"
AS_OF = date(2026, 12, 1)


def read_json(path):
    """Reads one JSON file."""
    return json.loads(path.read_text(encoding="utf-8"))


def read_catalogue(folder):
    """All structures of a catalogue folder: {name: message}."""
    found = {}
    for path in sorted(folder.glob("*.json")):
        file = read_json(path)
        assert file["schema"] == "permitscreen/catalogue/1", path
        for structure in file["structures"]:
            assert structure["name"] not in found, structure["name"]
            found[structure["name"]] = structure
    return found


def screen_demo(demo=DEMO, as_of=AS_OF):
    """Screens all applications of a demo folder."""
    catalogue = read_catalogue(demo / "catalogue")
    (policy_path,) = sorted((demo / "policies").glob("*.json"))
    policy_file = read_json(policy_path)
    policy = Policy(policy_file["policy"])
    models = {}
    answers = []
    for path in sorted((demo / "applications").glob("*.json")):
        application = read_json(path)["application"]
        trains = {c["configurationId"]: Train(c["loading"]["axleTrains"][0]) for c in application["configurations"]}
        crossings = []
        for crossing in application["route"]["crossingList"]["crossings"]:
            structure = catalogue[crossing["structure"]]
            if structure["name"] not in models:
                models[structure["name"]] = [UnitModel(u, structure, policy) for u in structure["units"]]
            crossings.append(screen_crossing(structure, models[structure["name"]], policy, application, crossing, as_of, trains))
        worst = max((c["verdict"] for c in crossings), key=VERDICT_ORDER.index)
        answers.append({"file": path.name, "reference": application["reference"], "verdict": worst, "crossings": crossings})
    return {"note": "Written by tests/oracle/screen.py from the files under deploy/demo; see tests/oracle/README.md.",
            "asOfDate": as_of.isoformat(), "policy": policy_file["policy"]["name"], "applications": answers}


def without_working(node):
    """Drops the oracle's own working (keys that begin with an underscore)."""
    if isinstance(node, dict):
        return {k: without_working(v) for k, v in node.items() if not k.startswith("_")}
    if isinstance(node, list):
        return [without_working(v) for v in node]
    return node


def print_table(answer):
    """Prints one line per crossing and rung."""
    for application in answer["applications"]:
        print(f"\n{application['file']}  {application['verdict']}")
        for c in application["crossings"]:
            print(f"  {c['structure']:24} {c['relation'][18:]:5} {c['verdict']:20} {c['rungId']:29} {','.join(c['reasons'])}")
            for r in c["rungs"]:
                rf = "-" if r["ratingFactor"] is None else f"{r['ratingFactor']:.3f}"
                k = "-" if r["largestAxleFactor"] is None else f"{r['largestAxleFactor']:.3f}"
                g = r["governing"][0] if r["governing"] else {}
                print(f"      {r['rungId']:29} {r['outcome']:12} RF {rf:>6}  k {k:>6}  {g.get('unitId', '')} {g.get('effectId', '')} "
                      f"{g.get('planeId', '')} {g.get('sense', '')[13:]} {g.get('element', '')} {','.join(r['reasons'])}")


def print_effects(answer):
    """Prints RF, k, numerator and denominator of every rated effect, kN."""
    out = csv.writer(sys.stdout, lineterminator="\n")
    out.writerow(["reference", "crossing", "structure", "rung_id", "configuration_id", "unit_id", "effect_id", "plane_id", "sense",
                  "passes", "rating_factor", "largest_axle_factor", "numerator_kn", "denominator_kn"])
    for application in answer["applications"]:
        for place, crossing in enumerate(application["crossings"], start=1):
            for rung in crossing["rungs"]:
                for configuration, sense, result in rung.get("_rated", []):
                    if sense.needed:
                        out.writerow([application["reference"], place, crossing["structure"], rung["rungId"], configuration,
                                      sense.unit_id, sense.effect_id, sense.plane_id, sense.sense, result["passes"], result["rf"],
                                      result["k"], sense.numerator, result.get("load")])


def main():
    """Command line."""
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--print", action="store_true", dest="table", help="print a table, write nothing")
    parser.add_argument("--effects", action="store_true", help="print every effect as CSV, write nothing")
    arguments = parser.parse_args()
    answer = screen_demo()
    if arguments.effects:
        print_effects(answer)
        return
    if arguments.table:
        print_table(answer)
        return
    text = json.dumps(without_working(answer), indent=1, ensure_ascii=False) + "\n"
    (HERE / "demo_expected.json").write_text(text, encoding="utf-8")


if __name__ == "__main__":
    main()
