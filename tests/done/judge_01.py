"""Judges the promises of tests/done/01."""

import re
import sys

from promises import FIGURES, MECHANICS, SERVICE, Promise, all_held, gate, text

LONG = sys.argv[2] == "long"
PAIRS = 20_000 if LONG else 300


def two_commands():
    p = Promise("README's run command builds, starts, screens, prints and leaves the service answering; dotnet test and .ci/run pass")
    p.script("README's command in the fresh clone", text("readme.log"))
    gate(p)
    return p


def ordinates():
    p = Promise("ordinates agree with closed forms within 1e-9 and with a finite element solver within 1e-5")
    p.tests(MECHANICS + "Trusses.ClosedFormTests.", MECHANICS + "Trusses.ReferencePrattTests.", MECHANICS + "Trusses.CcxTests.")
    p.worst("mechanics.closed_form[{}].worst", 1e-9, "closed forms, worst")
    p.worst("mechanics.ccx[{}].worst_share_of_largest", 1e-5, "CalculiX, worst share of the largest ordinate")
    return p


def extremes():
    p = Promise(f"{PAIRS:,} random pairs: exact extremes bound a 1 mm scan; position reproduces; decimal arithmetic and the plain path agree; symmetries hold; a common factor divides RF")
    p.tests(MECHANICS + "Extremes.RandomPairsTests.", MECHANICS + "Extremes.DecimalOracleTests.", MECHANICS + "Extremes.SymmetryTests.A_mirrored_line",
            MECHANICS + "Extremes.SymmetryTests.Responses_of_two_groups_of_axles_add_up", MECHANICS + "Extremes.SymmetryTests.A_combination_of_lines",
            MECHANICS + "Extremes.SymmetryTests.Reactions_balance", SERVICE + "Properties.LoadTests.A_common_factor")
    p.count("mechanics.pairs.count", PAIRS, "pairs")
    p.worst("mechanics.pairs.scan_above_exact.worst_relative", 1e-9, "scan above exact")
    p.worst("mechanics.pairs.exact_above_scan.worst_share_of_half_step", 1, "exact above scan, share of half a step")
    p.worst("mechanics.pairs.position_reproduces.worst_relative", 1e-12, "position reproduces within")
    p.count("mechanics.decimal_oracle.pairs", 200, "pairs in decimal arithmetic")
    p.worst("mechanics.decimal_oracle.worst_relative", 1e-12, "worst")
    p.count("mechanics.pairs.fast_equals_plain.compared", 1, "comparisons of fast and plain path equal to the bit")
    p.seen(*(f"python: axle loads times {times} divide the RF of 21 rungs by it within 1e-12" for times in (0.5, 1.25, 3)))
    p.said.append("RF divided by 3 common factors on 21 rungs within 1e-12")
    return p


def mutated():
    p = Promise("10,000 mutated trusses are refused by name or solved accurately; there is no third outcome")
    p.tests(MECHANICS + "Trusses.MutatedTrussTests.")
    p.count("mechanics.mutated[{}]", 10_000, "trusses")
    p.count("mechanics.mutated[solved]", 1, "solved")
    p.worst("mechanics.mutated.worst_equilibrium", 1e-9, "joints balance within")
    return p


def deletion():
    p = Promise("no optional field, deleted, makes a verdict better")
    p.tests(SERVICE + "Deletion.")
    told = [value for key, value in FIGURES if key == "deletion"]
    p.needs("figure deletion: missing", told, "; ".join(told))
    return p


def seeded():
    p = Promise("seeded faults, nine at least, each turn a test red")
    told = [value for key, value in FIGURES if key == "seeded-faults"]
    all_red = re.fullmatch(r"(\d+) of (\d+) red", told[0]) if len(told) == 1 else None
    p.needs(f"figure seeded-faults: {told or 'missing'}", all_red and all_red[1] == all_red[2] and int(all_red[1]) >= 9, "; ".join(told) or "not run")
    return p


def clients():
    p = Promise("clients in other languages screen, read BadRequest details and meet the deadline")
    for script in ("reflection", "python_client", "node_client"):
        p.script(script)
    p.seen("reflection: screens application 01", "reflection: its BadRequest details name every field at once", "python: the details tell of axles[0].load_kn",
           "python: a deadline of 2 s on a route of 10,000 crossings is exceeded, and no verdict comes", "python: a call that is cancelled ends as CANCELLED")
    return p


if __name__ == "__main__":
    held = all_held((two_commands, ordinates, extremes, mutated, deletion, seeded, clients))
    print("n/a\ta newcomer screens a truss of their own\tsee the closing note")
    sys.exit(0 if held else 1)
