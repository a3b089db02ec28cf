"""Writes the demo's catalogue: twelve invented truss bridges, sized as an office of their time would have.

    python3 tests/oracle/demo_generate.py     writes policies, catalogue and applications under deploy/demo

Each member gets the smallest section of a coarse grid that carries its factored dead load and `reserve` times the legal
load in every lane. Dead load comes from weights per metre through the same analysis as the influence lines. Nothing here
is a real bridge.
"""

import json
import math
from pathlib import Path

from demo_applications import APPLICATIONS
from demo_structures import STRUCTURES
from liveload import FORWARD, REVERSE, Train, extremes
from plausibility import legal_arrangements
from rating import Policy
from truss import Truss

HERE = Path(__file__).resolve().parent
DEMO = HERE.parent.parent / "deploy" / "demo"
ELASTIC_MODULUS_MPA = 200000
TENSION_FACTOR = COMPRESSION_FACTOR = 0.95
ENDS_FIXITY = 0.75  # K of members riveted at both ends, LRFD 4.6.2.5
MOST_SLENDER = 125  # KL/r
RIVET_KN = 66.8  # factored, 7/8 in rivet in single shear, 25 ksi on 0.601 in2
LEGAL_FACTOR, LEGAL_IMPACT = 1.45, 1.33
ROUNDS = 6
MEMORY = "from memory, not recomputed"
ROLES = {"chord": (1.15, 32), "endpost": (1.15, 32), "diagonal": (0.85, 40), "vertical": (0.85, 40)}  # r / sqrt(A), least cm2


def sectioned(cm2):
    """Next section of the grid, cm2."""
    step = 2 if cm2 < 60 else 5 if cm2 < 150 else 10
    return math.ceil(cm2 / step - 1e-9) * step


def column_kn(cm2, radius_m, length_m, yield_mpa, k=ENDS_FIXITY):
    """Nominal compression resistance, kN; LRFD 6.9.4.1 with Q = 1."""
    yield_kn = cm2 * yield_mpa / 10
    euler_kn = math.pi ** 2 * ELASTIC_MODULUS_MPA * cm2 / 10 / (k * length_m / radius_m) ** 2
    ratio = yield_kn / euler_kn
    return 0.658 ** ratio * yield_kn if ratio <= 1 / 0.44 else 0.877 * euler_kn


def role_of(member, nodes):
    """chord, endpost, diagonal or vertical."""
    a, b = member["startNode"], member["endNode"]
    if a[0] == b[0]:
        return "chord"
    if nodes[a][0] == nodes[b][0]:
        return "vertical"
    return member.get("role", "diagonal")


def radius_of(role, cm2, length_m):
    """Radius of gyration of a built-up section, m, to the millimetre; long members were laced deep enough."""
    return round(max(ROLES[role][0] * math.sqrt(cm2 / 1e4), ENDS_FIXITY * length_m / MOST_SLENDER), 3)


class UnitDesign:
    """One truss unit on its way from a sketch to sections."""

    def __init__(self, sketch, structure, policy):
        self.sketch, self.structure, self.policy = sketch, structure, policy
        self.sections = {m["name"]: 100.0 for m in sketch["members"]}
        nodes = {n["name"]: (n["xM"], n["yM"]) for n in sketch["nodes"]}
        self.roles = {m["name"]: role_of(m, nodes) for m in sketch["members"]}
        self.nodes = nodes
        for _ in range(ROUNDS):
            self.analyse()
            before = dict(self.sections)
            self.size()
            if before == self.sections:
                break
        self.analyse()

    def message_members(self):
        """Members as the catalogue writes them."""
        return [{"name": m["name"], "startNode": m["startNode"], "endNode": m["endNode"],
                 "areaM2": round(self.sections[m["name"]] / 1e4, 5), "elasticModulusMpa": ELASTIC_MODULUS_MPA}
                for m in self.sketch["members"]]

    def analyse(self):
        """Lines and dead load of the present sections."""
        self.truss = Truss({**self.sketch, "members": self.message_members()})
        self.lines = self.truss.influence_lines(self.sketch["start"])
        self.steel = self._steel_forces()
        self.dead = {key: {p: self._dead(key, p) for p in self.structure["planes"]} for key in self.lines}

    def _steel_forces(self):
        """Effect of 1 kN/m of truss steel, half of it on each chord's joints."""
        case = {}
        for chord in "LU":
            xs = sorted((x, name) for name, (x, _) in self.nodes.items() if name[0] == chord)
            for i, (x, name) in enumerate(xs):
                left = (x - xs[i - 1][0]) / 2 if i else 0.0
                right = (xs[i + 1][0] - x) / 2 if i + 1 < len(xs) else 0.0
                case[name] = (left + right) / 2
        forces, reactions = self.truss.analyse([case])[0]
        return {**forces, **reactions}

    def _dead(self, key, plane):
        weights = self.structure["weights"]
        share = self.structure["share"]
        full = sum(self.lines[key].areas())
        deck = weights["floor_steel"] / 2 + sum(w * share(plane, y) for w, y in weights["deck"])
        surface = sum(w * share(plane, y) for w, y in weights["surface"])
        dc = full * deck + self.steel[key] * weights["truss_steel"]
        return {"DC": round(dc, 1) + 0.0, "DW": round(full * surface, 1) + 0.0}

    def legal(self, key, plane):
        """Factored legal load in every lane: (largest, smallest)."""
        high, low = extremes(self.lines[key], self.policy.other_train, (FORWARD, REVERSE))
        most, least = 0.0, 0.0
        for centres in legal_arrangements(self.structure["roadway"], self.policy):
            presence = self.policy.presence[len(centres)]
            shares = [self.structure["share"](plane, y) for y in centres]
            up = sum(s * high if s > 0 else s * low for s in shares)
            down = sum(s * low if s > 0 else s * high for s in shares)
            most, least = max(most, presence * up), min(least, presence * down)
        return LEGAL_FACTOR * LEGAL_IMPACT * most, LEGAL_FACTOR * LEGAL_IMPACT * least

    def demand(self, key, plane):
        """Factored demand: (tension or bearing, compression or uplift), kN, each >= 0."""
        reserve = self.structure["reserve"].get(self.roles.get(key, "reaction"), self.structure["reserve"]["all"])
        reserve = self.structure["reserve"].get(key, reserve)
        high, low = self.legal(key, plane)
        return self._in_sense(key, plane, 1, reserve * high), self._in_sense(key, plane, -1, -reserve * low)

    def _in_sense(self, key, plane, sign, live):
        total = live
        for component, load in self.dead[key][plane].items():
            factor = self.policy.dead["DEAD_LOAD_COMPONENT_" + component]
            total += sign * load * (factor["adverse"] if sign * load > 0 else factor["relieving"])
        return max(0.0, total)

    def size(self):
        """Smallest sections; alike in both planes, in mirrored members and in pairs of chord panels."""
        reduction = self.structure["reduction"]
        needed = {}
        for member in self.sketch["members"]:
            name, role = member["name"], self.roles[member["name"]]
            length = self.truss.length(member)
            tension = max(self.demand(name, p)[0] for p in self.structure["planes"]) / reduction
            pressure = max(self.demand(name, p)[1] for p in self.structure["planes"]) / reduction
            cm2 = sectioned(max(ROLES[role][1], tension / TENSION_FACTOR * 10 / self.structure["yield_mpa"]))
            while COMPRESSION_FACTOR * column_kn(cm2, radius_of(role, cm2, length), length, self.structure["yield_mpa"]) < pressure:
                cm2 = sectioned(cm2 + 0.1)
            needed[name] = cm2
        for group in self._groups():
            largest = max(needed[name] for name in group)
            for name in group:
                self.sections[name] = largest

    def _groups(self):
        middle = (min(x for x, _ in self.nodes.values()) + max(x for x, _ in self.nodes.values())) / 2
        groups = {}
        for member in self.sketch["members"]:
            name, role = member["name"], self.roles[member["name"]]
            (x1, y1), (x2, y2) = self.nodes[member["startNode"]], self.nodes[member["endNode"]]
            offset = abs((x1 + x2) / 2 - middle)
            if role == "chord":
                letter = member["startNode"][0]
                panel = min(int(member["startNode"][1:]), int(member["endNode"][1:]))
                count = max(int(n[1:]) for n in self.nodes if n[0] == letter) + min(int(n[1:]) for n in self.nodes if n[0] == letter)
                groups.setdefault((letter, min(panel, count - 1 - panel) // self.structure.get("panels_per_splice", 2)), []).append(name)
            else:
                rising = (y2 - y1) * (x2 - x1) * ((x1 + x2) / 2 - middle)
                sign = 0 if role == "vertical" else 1 if rising > 1e-9 else -1 if rising < -1e-9 else 0
                groups.setdefault((role, round(offset, 3), sign), []).append(name)
        return groups.values()


def resistance(sense, kn, structure, *, factored=False, factor=None, element=None, loss=False, source=None, included=False):
    """A resistance as the catalogue writes it."""
    message = {"sense": "EFFECT_SENSE_" + sense, "method": "RATING_METHOD_LRFR", "limitState": "LIMIT_STATE_STRENGTH",
               "level": "RATING_LEVEL_PERMIT"}
    if factored:
        message["factoredKn"] = round(kn, 1)
    else:
        message["nominalKn"] = round(kn, 1)
        message["resistanceFactor"] = factor
    message["includesConditionFactor"] = included
    message["includesSystemFactor"] = included
    message["includesMeasuredLoss"] = loss
    message["element"] = element or "member"
    message["source"] = {"reference": source or structure["drawing"], "status": MEMORY}
    return message


def member_effects(design, member):
    """Effects of one member: one for both planes where the data are equal, else one for each."""
    structure, name = design.structure, member["name"]
    by_plane = {}
    for plane in structure["planes"]:
        rated = {"resistances": member_resistances(design, member, plane), "deadLoads": dead_loads(design, name, plane)}
        if (plane, name) in structure.get("condition", {}):
            rated["conditionRating"] = structure["condition"][plane, name]
        by_plane[plane] = rated
    planes = list(structure["planes"])
    if all(by_plane[p] == by_plane[planes[0]] for p in planes):
        return [{"effectId": name, "planeIds": planes, "axialMember": name, "rated": by_plane[planes[0]]}]
    return [{"effectId": f"{name}-{p}", "planeIds": [p], "axialMember": name, "rated": by_plane[p]} for p in planes]


def dead_loads(design, key, plane):
    """Dead loads of an effect in one plane; what is not on record is left out."""
    structure = design.structure
    if key in structure.get("dead_not_on_record", ()):
        return [{"component": "DEAD_LOAD_COMPONENT_DW", "forceKn": design.dead[key][plane]["DW"],
                 "source": {"reference": structure["weights_source"], "status": MEMORY}}]
    return [{"component": "DEAD_LOAD_COMPONENT_" + c, "forceKn": load,
             "source": {"reference": structure["weights_source"], "status": MEMORY}} for c, load in design.dead[key][plane].items()]


def member_resistances(design, member, plane):
    """Tension and compression resistances where the member needs them, and its connection where it is on record."""
    structure, name, role = design.structure, member["name"], design.roles[member["name"]]
    cm2, loss = design.sections[name], structure.get("loss", {}).get((plane, name), 0.0)
    line, dead = design.lines[name], sum(design.dead[name][plane].values())
    length = design.truss.length(member)
    radius = radius_of(role, cm2, length)
    sound = cm2 * (1 - loss)
    source = structure["drawing"]
    note = f"{cm2:.0f} cm2, F_y {structure['yield_mpa']} MPa"
    if loss:
        note += f", {loss:.0%} of the area lost ({structure['loss_source']})"
    found = []
    wants_tension = line.largest() > 0 or dead > 0
    wants_pressure = line.smallest() < 0 or dead < 0
    if not (wants_tension or wants_pressure):
        wants_tension = wants_pressure = True
    extra = {"loss": loss > 0, "included": structure.get("factors_included", False), "factored": structure.get("factored", False)}
    if wants_tension:
        value = sound * structure["yield_mpa"] / 10
        found.append(resistance("TENSION", value * (TENSION_FACTOR if extra["factored"] else 1) * structure["given"], structure,
                                factor=TENSION_FACTOR, source=f"{source}; {note}; LRFD 6.8.2.1", **extra))
        if role in structure.get("connections", ()):
            rivets = 2 * math.ceil(structure.get("connection_level", 0.98) * TENSION_FACTOR * cm2 * structure["yield_mpa"] / 10 / RIVET_KN / 2)
            found.append(resistance("TENSION", rivets * RIVET_KN, structure, factored=True, element="connection",
                                    source=f"{source}; {rivets} rivets of 7/8 in, single shear; MBE 6A.6.12.5.1"))
    if wants_pressure:
        value = column_kn(sound, radius, length, structure["yield_mpa"])
        found.append(resistance("COMPRESSION", value * (COMPRESSION_FACTOR if extra["factored"] else 1) * structure["given"], structure,
                                factor=COMPRESSION_FACTOR,
                                source=f"{source}; {note}, KL/r {ENDS_FIXITY * length / radius:.0f}; LRFD 6.9.4.1", **extra))
    return found


def reaction_effects(design):
    """Held reactions: not rated, but for vertical ones that can lift or that the sketch wants rated."""
    structure, effects = design.structure, []
    planes = list(structure["planes"])
    for support, letter in design.truss.held_reactions():
        key = (support, letter)
        effect = {"effectId": f"{support}-{'vertical' if letter == 'v' else 'horizontal'}", "planeIds": planes,
                  "reaction": {"support": support,
                               "component": "REACTION_COMPONENT_" + ("VERTICAL" if letter == "v" else "HORIZONTAL")}}
        lifts = letter == "v" and design.lines[key].smallest() < 0
        if letter == "h":
            effect["notRated"] = {"reason": "horizontal reaction not rated: screening places no horizontal load"}
        elif not lifts and support not in structure.get("rated_bearings", ()):
            effect["notRated"] = {"reason": f"bearings not rated: {structure['bearings']}"}
        else:
            effects += rated_reaction(design, effect, key, lifts)
            continue
        effects.append(effect)
    return effects


def rated_reaction(design, effect, key, lifts):
    """A rated vertical reaction, one effect for each plane where the dead loads differ."""
    structure, found = design.structure, []
    planes = list(structure["planes"])
    capacity = 50 * math.ceil(max(design.demand(key, p)[0] for p in planes) * structure.get("bearing_reserve", 1.15) / 50)
    for plane in planes:
        rated = {"resistances": [resistance("BEARING", capacity, structure, factored=True, element="bearing", included=True,
                                            source=f"{structure['drawing']}; line bearing on the rocker")],
                 "deadLoads": dead_loads(design, key, plane)}
        hold_down = structure.get("hold_down", {}).get(key[0])
        if lifts and hold_down:
            rated["resistances"].append(resistance("UPLIFT", hold_down, structure, factored=True, element="hold-down", included=True,
                                                   source=f"{structure['drawing']}; four anchor bars of 2 in"))
        elif lifts:
            rated["noHoldDown"] = True
        found.append((plane, rated))
    if all(r == found[0][1] for _, r in found):
        return [{**effect, "rated": found[0][1]}]
    return [{**effect, "effectId": f"{effect['effectId']}-{p}", "planeIds": [p], "rated": r} for p, r in found]


def unit_message(design):
    """The unit as the catalogue writes it."""
    sketch, structure = design.sketch, design.structure
    effects = [e for m in sketch["members"] for e in member_effects(design, m)] + reaction_effects(design)
    return {"unitId": sketch["unit_id"], "title": sketch["title"], "startChainageM": sketch["start"],
            "truss": {"nodes": sketch["nodes"], "members": design.message_members(), "supports": sketch["supports"],
                      "deck": sketch["deck"],
                      "planes": [{"planeId": p, "lateralM": y} for p, y in structure["planes"].items()],
                      "system": structure["system"]},
            "effects": effects}


def structure_message(structure, policy):
    """A whole structure as the catalogue writes it."""
    message = {"name": "structures/" + structure["id"], "title": structure["title"], "owner": structure["owner"],
               "place": structure["place"], "state": structure.get("state", "STRUCTURE_STATE_OPEN")}
    for key in ("postedLimits", "clearanceOn", "clearanceUnder", "roadway", "inspection"):
        if key in structure:
            message[key] = structure[key]
    message["units"] = [unit_message(UnitDesign(sketch, structure, policy)) for sketch in structure["units"]]
    return message


def compact_json(node, indent=0, width=150):
    """JSON with every object that fits on one line written on one line."""
    flat = json.dumps(node, ensure_ascii=False)
    if len(flat) + indent <= width or not isinstance(node, (dict, list)):
        return flat
    pad = " " * (indent + 2)
    if isinstance(node, dict):
        parts = [f"{pad}{json.dumps(k)}: {compact_json(v, indent + 2, width)}" for k, v in node.items()]
        return "{\n" + ",\n".join(parts) + "\n" + " " * indent + "}"
    return "[\n" + ",\n".join(pad + compact_json(v, indent + 2, width) for v in node) + "\n" + " " * indent + "]"


def write_policy():
    """Copies the built-in policy under the demo's name, marked as a demonstration; returns its text."""
    text = (DEMO.parent / "policies" / "lrfr-permit-2013.json").read_text(encoding="utf-8")
    for old, new in (('"policies/lrfr-permit-2013"', '"policies/ossel-demo"'), ('"title": "LRFR', '"title": "Demonstration only: LRFR'),
                     ('"state": "POLICY_STATE_DRAFT",', '"state": "POLICY_STATE_DRAFT",\n    "demonstration": true,')):
        assert text.count(old) == 1, old
        text = text.replace(old, new)
    (DEMO / "policies" / "ossel-demo.json").write_text(text, encoding="utf-8")
    return text


def main():
    """Writes the policy, one file per structure and one per application."""
    policy = Policy(json.loads(write_policy())["policy"])
    folder = DEMO / "catalogue"
    folder.mkdir(parents=True, exist_ok=True)
    for structure in STRUCTURES:
        file = {"schema": "permitscreen/catalogue/1", "structures": [structure_message(structure, policy)]}
        path = folder / (structure["id"].lower() + ".json")
        path.write_text(compact_json(file) + "\n", encoding="utf-8")
    for name, file in APPLICATIONS.items():
        (DEMO / "applications" / name).write_text(compact_json(file) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
