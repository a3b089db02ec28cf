"""Checks the oracle against itself by other ways: python3 tests/oracle/selfcheck.py

- a published-form Pratt truss, tests/reference/truss_pratt6_influence.csv;
- every demo truss by least complementary energy under joint equilibrium, against the stiffness method;
- extremes against a scan at steps of 1 cm and just beside each event;
- k of every rated effect of every crossing by trying it.
"""

import csv
import random
import sys

from liveload import FORWARD, REVERSE, Train, extremes
from rating import PASSES, Term
from screen import DEMO, HERE, read_catalogue, read_json, screen_demo
from truss import KN_PER_M2_PER_MPA, Truss, solve

STEP_M = 0.01
SEED = 20261201


def pratt_of_the_reference():
    """The six-panel Pratt truss of tests/reference/influence_lines.md."""
    nodes = [{"name": f"L{i}", "xM": 6.0 * i, "yM": 0.0} for i in range(7)]
    nodes += [{"name": f"U{i}", "xM": 6.0 * i, "yM": 8.0} for i in range(1, 6)]
    names = [f"L{i}L{i + 1}" for i in range(6)] + [f"U{i}U{i + 1}" for i in range(1, 5)]
    names += ["L0U1", "U5L6", "U1L2", "U2L3", "U4L3", "U5L4"] + [f"U{i}L{i}" for i in range(1, 6)]
    end = {"kind": "DECK_END_KIND_END_FLOOR_BEAM"}
    return Truss({"nodes": nodes,
                  "members": [{"name": n, "startNode": n[:2], "endNode": n[2:], "areaM2": 0.01, "elasticModulusMpa": 200000}
                              for n in names],
                  "supports": [{"name": "a", "node": "L0", "holdsHorizontal": True, "holdsVertical": True},
                               {"name": "b", "node": "L6", "holdsVertical": True}],
                  "deck": {"panelPoints": [f"L{i}" for i in range(7)], "start": end, "end": end}})


def check_reference():
    """Largest difference from the reference table."""
    lines, worst = pratt_of_the_reference().influence_lines(), 0.0
    with (HERE.parent / "reference" / "truss_pratt6_influence.csv").open(encoding="utf-8") as file:
        for row in csv.DictReader(file):
            x = 6.0 * int(row["unit_load_at_bottom_panel_point"])
            line = lines[row["member"]]
            value = max(line.at(x, False), line.at(x, True), key=abs)
            worst = max(worst, abs(value - float(row["axial_ordinate_tension_positive"])))
    return worst


def by_least_energy(truss, cases):
    """Member forces and reactions that balance each joint with the least strain energy."""
    keys = [m["name"] for m in truss.members] + truss.held_reactions()
    equations = [(node, axis) for node in truss.nodes for axis in (0, 1)]
    row_of = {e: i for i, e in enumerate(equations)}
    balance = [[0.0] * len(keys) for _ in equations]
    flexibility = []
    for j, member in enumerate(truss.members):
        c, s, length = truss._direction(member)
        flexibility.append(1e6 * length / (member["areaM2"] * member["elasticModulusMpa"] * KN_PER_M2_PER_MPA))
        for node, sign in ((member["startNode"], 1.0), (member["endNode"], -1.0)):
            balance[row_of[node, 0]][j] += sign * c
            balance[row_of[node, 1]][j] += sign * s
    for j, (support, letter) in enumerate(truss.held_reactions(), start=len(truss.members)):
        node = next(s["node"] for s in truss.supports if s["name"] == support)
        balance[row_of[node, 1 if letter == "v" else 0]][j] = 1.0
        flexibility.append(0.0)
    n, e = len(keys), len(equations)
    matrix = [[0.0] * (n + e) for _ in range(n + e)]
    for j in range(n):
        matrix[j][j] = flexibility[j]
        for i in range(e):
            matrix[j][n + i] = matrix[n + i][j] = balance[i][j]
    columns = []
    for case in cases:
        column = [0.0] * (n + e)
        for node, down in case.items():
            column[n + row_of[node, 1]] = down
        columns.append(column)
    return [dict(zip(keys, answer[:n])) for answer in solve(matrix, columns)]


def check_trusses(catalogue):
    """Largest difference between the two analyses, kN per kN."""
    worst = 0.0
    for structure in catalogue.values():
        for unit in structure["units"]:
            truss = Truss(unit["truss"])
            cases = [{p: 1.0} for p in truss.deck["panelPoints"]]
            for (forces, reactions), other in zip(truss.analyse(cases), by_least_energy(truss, cases)):
                worst = max(worst, max(abs(value - other[key]) for key, value in {**forces, **reactions}.items()))
    return worst


def check_extremes(catalogue, trains):
    """Largest excess of a scan over the exact extremes, and largest shortfall of the scan, relative."""
    excess = shortfall = 0.0
    draw = random.Random(SEED)
    for structure in catalogue.values():
        unit = draw.choice(structure["units"])
        lines = Truss(unit["truss"]).influence_lines(unit["startChainageM"])
        for key in draw.sample(sorted(lines, key=str), 6):
            line, train = lines[key], draw.choice(trains)
            high, low = extremes(line, train, (FORWARD, REVERSE))
            seen_high = seen_low = 0.0
            reach = train.offsets[-1]
            for direction in (FORWARD, REVERSE):
                places = [line.xs[0] - reach + i * STEP_M for i in range(int((line.xs[-1] - line.xs[0] + 2 * reach) / STEP_M) + 2)]
                places += [x + direction * o + d for x in line.xs for o in train.offsets for d in (-1e-7, 1e-7)]
                for lead in places:
                    total = sum(p * line.at(lead - direction * o, False) for p, o in zip(train.loads, train.offsets))
                    seen_high, seen_low = max(seen_high, total), min(seen_low, total)
            size = max(high, -low, 1.0)
            excess = max(excess, (seen_high - high) / size, (low - seen_low) / size)
            shortfall = max(shortfall, (high - seen_high) / size, (seen_low - low) / size)
    return excess, shortfall


def check_axle_factors(answer):
    """Number of k values tried; each passes at k and fails a little above (or reaches no passing value below 1)."""
    tried = 0
    for application in answer["applications"]:
        for crossing in application["crossings"]:
            for rung in crossing["rungs"]:
                for _, sense, result in rung.get("_rated", []):
                    if result["k"] is None or result.get("dead"):
                        continue
                    terms, factor, k = result["terms"], result["factor"], result["k"]

                    def load(at):
                        gamma = next(g for low, high, g in factor.pieces if low < at <= high) if at > 0 else factor.pieces[0][2]
                        return max(Term(t.presence, at * t.axle, t.uniform, t.others).value(gamma) for t in terms)
                    numerator = result["numerator"]
                    if k > 0:
                        assert load(k * (1 - 1e-9)) <= numerator * (1 + 1e-9), (sense.effect_id, k)
                    assert load(k * (1 + 1e-7) + 1e-9) > numerator, (sense.effect_id, k)
                    between = [1 + i / 50 * (k - 1) for i in range(51)] if k > 1 else [k + i / 50 * (1 - k) for i in range(1, 51)]
                    wanted = all(load(x * (1 - 1e-9)) <= numerator * (1 + 1e-9) for x in between) if k > 1 else True
                    assert wanted and result["passes"] == (k >= 1), (sense.effect_id, k)
                    if k < 1:
                        assert all(load(x * (1 + 1e-9)) > numerator for x in between), (sense.effect_id, k)
                    tried += 1
                if rung["outcome"] == PASSES:
                    assert rung["ratingFactor"] >= 1
    return tried


def main():
    """Command line."""
    catalogue = read_catalogue(DEMO / "catalogue")
    reference, trusses = check_reference(), check_trusses(catalogue)
    trains = [Train(c["loading"]["axleTrains"][0]) for path in sorted((DEMO / "applications").glob("*.json"))
              for c in read_json(path)["application"]["configurations"]]
    excess, shortfall = check_extremes(catalogue, trains)
    tried = check_axle_factors(screen_demo())
    print(f"reference Pratt truss      largest difference {reference:.1e} (printed to 1e-6)")
    print(f"stiffness / least energy   largest difference {trusses:.1e} per unit load")
    print(f"scan over exact extremes   largest excess {excess:.1e}, largest shortfall {shortfall:.1e}, relative (seed {SEED})")
    print(f"k values tried             {tried}")
    sys.exit(0 if reference < 6e-7 and trusses < 1e-8 and excess < 1e-9 and shortfall < 1e-4 else 1)


if __name__ == "__main__":
    main()
