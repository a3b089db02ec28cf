"""A fleet of small structures, the same for the same seed: simple trusses of two to four panels that differ in span, height and areas."""

import json
import random

SCHEMA = "permitscreen/catalogue/1"
IN_A_FILE = 1000
SEED = 1

# Panels: upper joints by panel point, and members as pairs of joints. All are simply supported and statically determinate.
_SHAPES = {
    2: (["U1"], ["L0L1", "L1L2", "L0U1", "U1L2", "L1U1"]),
    3: (["U1", "U2"], ["L0L1", "L1L2", "L2L3", "L0U1", "U1U2", "U2L3", "L1U1", "L2U2", "U1L2"]),
    4: (["U1", "U2", "U3"], ["L0L1", "L1L2", "L2L3", "L3L4", "L0U1", "U1U2", "U2U3", "U3L4", "L1U1", "L2U2", "L3U3", "U1L2", "L2U3"]),
}
_SHARES = (7, 2, 1)  # of trusses with 2, 3 and 4 panels
_BEARINGS = "bearings inspected, sound; no uplift possible on a simple span"
_SOURCE = {"reference": "invented for tests", "status": "not a real member"}


def name(index):
    return f"structures/F-{index:06d}"


def shares_truss(index):
    """One structure in ten stands on another's drawings."""
    return index % 10 == 9


def different_trusses(count):
    """How many trusses the first `count` structures have."""
    return sum(1 for index in range(count) if not shares_truss(index))


def _random(index, revision, seed):
    return random.Random(f"{seed}/{index}/{revision}")


def _truss(index, revision, seed):
    """Truss and the ids of its members; numbers to the millimetre and the square centimetre."""
    draw = _random(index, revision, seed)
    panels = draw.choices(list(_SHAPES), _SHARES)[0]
    upper, members = _SHAPES[panels]
    panel = draw.randint(2500, 6500) / 1000
    height = draw.randint(2500, 7000) / 1000
    areas = {kind: draw.randint(40, 240) / 10_000 for kind in ("LL", "LU", "UU")}
    x = {f"L{i}": round(i * panel, 3) for i in range(panels + 1)}
    nodes = [{"name": n, "xM": at, "yM": 0} for n, at in x.items()]
    nodes += [{"name": n, "xM": x["L" + n[1:]], "yM": height} for n in upper]
    bars = [
        {"name": m, "startNode": m[:2], "endNode": m[2:], "areaM2": areas["".join(sorted(m[0] + m[2]))], "elasticModulusMpa": 200000}
        for m in members
    ]
    end = f"L{panels}"
    beam = {"kind": "DECK_END_KIND_END_FLOOR_BEAM"}
    return {
        "nodes": nodes,
        "members": bars,
        "supports": [{"name": "start", "node": "L0", "holdsHorizontal": True, "holdsVertical": True}, {"name": "end", "node": end, "holdsVertical": True}],
        "deck": {"panelPoints": list(x), "start": beam, "end": beam},
        "planes": [{"planeId": "left", "lateralM": -4.5}, {"planeId": "right", "lateralM": 4.5}],
        "system": "SYSTEM_KIND_RIVETED_TWO_PLANE",
    }, members


def _rated(member, nominal):
    lower = member[0] == member[2] == "L"
    return {
        "effectId": member,
        "planeIds": ["left", "right"],
        "axialMember": member,
        "rated": {
            "resistances": [{
                "sense": "EFFECT_SENSE_TENSION" if lower else "EFFECT_SENSE_COMPRESSION",
                "method": "RATING_METHOD_LRFR",
                "limitState": "LIMIT_STATE_STRENGTH",
                "level": "RATING_LEVEL_NONE",
                "nominalKn": nominal,
                "resistanceFactor": 0.95,
                "includesConditionFactor": False,
                "includesSystemFactor": False,
                "includesMeasuredLoss": False,
                "element": "member",
                "source": _SOURCE,
            }],
            "deadLoads": [
                {"component": "DEAD_LOAD_COMPONENT_DC", "forceKn": 50 if lower else -60},
                {"component": "DEAD_LOAD_COMPONENT_DW", "forceKn": 10 if lower else -12},
            ],
        },
    }


def _effects(members, draw):
    """The lower chord and the end posts are rated; of the rest it is said that they are not."""
    both = ["left", "right"]
    effects = []
    for member in members:
        if member[0] == member[2] == "L" or member[:2] == "L0" or member == members[len(members) // 2 + 1]:
            effects.append(_rated(member, draw.randint(1500, 6000)))
        else:
            effects.append({"effectId": member, "planeIds": both, "axialMember": member, "notRated": {"reason": "stronger than its neighbours, by inspection"}})
    for support, components in (("start", ("VERTICAL", "HORIZONTAL")), ("end", ("VERTICAL",))):
        for component in components:
            effects.append({
                "effectId": f"{support}-{component.lower()}",
                "planeIds": both,
                "reaction": {"support": support, "component": f"REACTION_COMPONENT_{component}"},
                "notRated": {"reason": _BEARINGS},
            })
    return effects


def structure(index, revision=0, new_truss=False, seed=SEED):
    """A structure as the contract's JSON. A later revision has other resistances, and another truss only where that is asked for."""
    model = index - 5 if shares_truss(index) else index
    truss, members = _truss(model, revision if new_truss else 0, seed)
    draw = _random(index, f"content {revision}", seed)
    return {
        "name": name(index),
        "title": f"Span {index:,} over brook {draw.randint(1, 999)}",
        "owner": "Example authority",
        "state": "STRUCTURE_STATE_OPEN",
        "clearanceOn": {"heightM": 6.0, "noWidthLimit": {"reason": "no obstacle between the kerbs"}},
        "roadway": {"leftKerbM": -4.0, "rightKerbM": 4.0, "laneCount": 2, "surface": "SURFACE_STATE_SMOOTH"},
        "inspection": {"inspectedOn": {"year": 2026, "month": draw.randint(1, 9), "day": draw.randint(1, 28)}, "intervalMonths": 24, "superstructureCondition": 7},
        "units": [{"unitId": "span-1", "title": "Span", "startChainageM": 0.0, "truss": truss, "effects": _effects(members, draw)}],
    }


def write(folder, count, first=0, seed=SEED, in_a_file=IN_A_FILE):
    """Writes structures as files of up to a thousand; returns the files."""
    folder.mkdir(parents=True, exist_ok=True)
    files = []
    for start in range(first, first + count, in_a_file):
        path = folder / f"fleet-{start:06d}.json"
        with path.open("w", encoding="utf-8") as out:
            out.write(f'{{"schema": "{SCHEMA}", "structures": [\n')
            stop = min(start + in_a_file, first + count)
            for index in range(start, stop):
                out.write(json.dumps(structure(index, seed=seed), separators=(",", ":")))
                out.write(",\n" if index + 1 < stop else "\n")
            out.write("]}\n")
        files.append(path)
    return files
