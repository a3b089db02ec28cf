"""Checks that the demo's bridges are plausible: dead-load share of the capacity, and the legal vehicle in every lane.

    python3 tests/oracle/plausibility.py      prints a line per structure; fails where an unposted one is implausible
"""

import sys
from pathlib import Path

from liveload import FORWARD, REVERSE, row_arrangements

LEGAL_FACTOR = 1.45  # MBE Table 6A.4.4.2.3a-1, from memory, not recomputed
LEAST_SHARE, MOST_SHARE = 0.30, 0.70  # of factored dead load in the capacity of a main member
SLACK = 0.30  # a member with less dead load than this part of the greatest of its kind is no main member


def legal_arrangements(roadway, policy):
    """Centres of the legal vehicles side by side: 1 up to one in every lane.

    Where the roadway is too narrow for the policy's distances the vehicles stand in the middle of equal lanes.
    """
    width = policy.other_train.width
    clear = roadway["rightKerbM"] - roadway["leftKerbM"] - 2 * policy.lateral["kerbDistanceM"] - width
    fit = min(roadway["laneCount"] - 1, int(clear // (policy.lateral["tyreGapM"] + width)))
    found = [[centre, *others] for centre, others in row_arrangements(roadway, policy.lateral, width, width, fit)]
    lanes = roadway["laneCount"]
    if fit < lanes - 1:
        lane = (roadway["rightKerbM"] - roadway["leftKerbM"]) / lanes
        found.append([roadway["leftKerbM"] + (i + 0.5) * lane for i in range(lanes)])
    return found


def legal_rating(model, roadway, policy):
    """Least RF of the legal vehicle in every lane, with its effect."""
    impact = 1 + policy.other["allowance"]["constant"]
    least = (float("inf"), "")
    for rated in model.senses:
        if rated.missing or not rated.needed:
            continue
        high, low = model.extremes(rated.key, policy.other_train, (FORWARD, REVERSE))
        worst = 0.0
        for centres in legal_arrangements(roadway, policy):
            total = 0.0
            for y in centres:
                share = model.share(rated.plane_id, y)
                total += abs(share) * (high if share * rated.sign > 0 else -low)
            worst = max(worst, policy.presence[len(centres)] * LEGAL_FACTOR * impact * total)
        if worst > 0:
            least = min(least, (rated.numerator / worst, f"{rated.effect_id} {rated.plane_id} {rated.sense.lower()}"))
    return least


def dead_shares(model):
    """Factored dead load over capacity of chords, end posts and diagonals: main members, slack ones.

    Slack members have less than SLACK of the greatest dead load of their kind: diagonals near midspan, chord panels near
    a point of contraflexure.
    """
    nodes, found, peaks = model.truss.nodes, {}, {}
    members = {m["name"]: m for m in model.truss.members}
    for rated in model.senses:
        if isinstance(rated.key, tuple) or rated.numerator is None or rated.dead <= 0:
            continue
        a, b = members[rated.key]["startNode"], members[rated.key]["endNode"]
        if nodes[a][0] == nodes[b][0]:
            continue  # a vertical
        kind = "chord" if a[0] == b[0] else "web"
        peaks[kind] = max(peaks.get(kind, 0.0), rated.dead)
        found[rated.key, rated.plane_id] = (rated.dead / (rated.numerator + rated.dead), kind, rated.dead)
    main = {k: share for k, (share, kind, dead) in found.items() if dead >= SLACK * peaks[kind]}
    return main, {k: share for k, (share, _, _) in found.items() if k not in main}


def main():
    """Command line."""
    from rating import Policy, UnitModel
    from screen import DEMO, read_catalogue, read_json

    (policy_path,) = sorted((Path(DEMO) / "policies").glob("*.json"))
    policy = Policy(read_json(policy_path)["policy"])
    implausible = False
    for name, structure in read_catalogue(DEMO / "catalogue").items():
        for unit in structure["units"]:
            model = UnitModel(unit, structure, policy)
            factor, effect = legal_rating(model, structure["roadway"], policy)
            shares, slack = dead_shares(model)
            posted = structure["state"] != "STRUCTURE_STATE_OPEN"
            outside = {k: round(s, 2) for k, s in shares.items() if not LEAST_SHARE <= s <= MOST_SHARE}
            bad = model.faults or (not posted and factor < 1) or outside
            implausible |= bool(bad)
            print(f"{name[11:]:10} {unit['unitId']:8} span {model.truss.longest_span():5.1f} m  legal RF {factor:6.3f} ({effect})"
                  f"{' posted' if posted else ''}  dead share {min(shares.values()):.3f}-{max(shares.values()):.3f}"
                  f"  slack from {min(slack.values(), default=0):.2f}  {model.faults or ''}{outside or ''}")
    sys.exit(1 if implausible else 0)


if __name__ == "__main__":
    main()
