"""From influence lines to verdicts, by the rules of the rating library's README; written apart from it."""

from datetime import date

from liveload import (FORWARD, REVERSE, FactorRow, NoRoom, PermitFactor, Train, centreline_interval, extremes,
                      lateral_interval, places_beside, row_arrangements)
from truss import Truss

TIE = 1e-9  # relative; effects whose rating factors are closer than this govern together
MONTHS_OF_A_YEAR = 12
PASSES, FAILS, UNAVAILABLE, NOT_ASSESSED = "PASSES", "FAILS", "UNAVAILABLE", "NOT_ASSESSED"
VERDICT_ORDER = ["PASS", "PASS_WITH_CONDITIONS", "NOT_ASSESSED", "FAIL"]
SENSES_OF_MEMBER = (("TENSION", 1), ("COMPRESSION", -1))
SENSES_OF_VERTICAL = (("BEARING", 1), ("UPLIFT", -1))
SENSES_OF_HORIZONTAL = (("POSITIVE", 1), ("NEGATIVE", -1))


def to_date(message):
    """A date of a file."""
    return date(message["year"], message["month"], message["day"])


def add_months(day, months):
    """The same day of a later month, or its last day."""
    year, month = divmod(day.year * MONTHS_OF_A_YEAR + day.month - 1 + months, MONTHS_OF_A_YEAR)
    for last in (day.day, 30, 29, 28):
        try:
            return date(year, month + 1, last)
        except ValueError:
            continue
    raise ValueError(day)


class Policy:
    """The numbers of a policy file that the oracle uses."""

    def __init__(self, message):
        self.message = message
        weighing = message["weighingRule"]
        if weighing["tolerance"] != 0 or not weighing["relievingAxlesCount"]:
            raise NotImplementedError("the oracle knows no weighing tolerance")
        self.dead = {f["component"]: f for f in message["deadLoadFactors"]}
        self.rows = {r["rowId"]: r for r in message["liveLoadRows"]}
        self.rungs = message["rungs"]
        self.other = message["otherLaneLoad"]
        self.other_train = Train(self.other["vehicle"])
        self.same_lane = message["sameLaneLoad"]
        self.lateral = message["lateralRules"]
        self.presence = {p["lanesLoaded"]: p["factor"] for p in message["multiplePresence"]}
        self.standing = message["standingRules"]

    def row_for(self, rung, permit_kind):
        """Live-load row of a rung for a kind of permit, or None."""
        return next((self.rows[i] for i in rung["liveLoadRowIds"] if self.rows[i]["permitKind"] == permit_kind), None)

    def capacity(self, resistance, system, condition):
        """Capacity C of one resistance, kN, or the name of what is missing."""
        message = self.message
        if (resistance["method"], resistance["limitState"]) != (message["method"], message["limitState"]):
            return None
        if "factoredKn" in resistance:
            value = resistance["factoredKn"]
        else:
            value = resistance["nominalKn"] * resistance["resistanceFactor"]
        rules = message["capacityRules"]
        loss = resistance["includesMeasuredLoss"] and not rules.get("conditionFactorOnMeasuredLoss", False)
        phi_c = 1.0
        if not resistance["includesConditionFactor"] and not loss:
            bands = sorted(rules["conditionFactors"], key=lambda b: -b["fromRating"])
            phi_c = next(b["factor"] for b in bands if condition >= b["fromRating"])
        phi_s = 1.0
        if not resistance["includesSystemFactor"]:
            phi_s = next(f["factor"] for f in rules["systemFactors"] if f["system"] == system)
        return value * max(phi_c * phi_s, rules["factorFloor"])


class RatedSense:
    """One sense of one effect in one plane: numerator, and the line in that sense."""

    def __init__(self, unit_id, effect, plane, sense, sign, key):
        self.unit_id, self.effect_id, self.plane_id = unit_id, effect["effectId"], plane["planeId"]
        self.sense, self.sign, self.key = sense, sign, key
        self.numerator = None  # kN; None: not assessed
        self.dead = None  # factored dead load in this sense, kN
        self.element = ""
        self.missing = None
        self.needed = True


class UnitModel:
    """A truss unit, ready to be rated."""

    def __init__(self, unit, structure, policy):
        self.unit_id = unit["unitId"]
        message = unit["truss"]
        if message.get("skewDeg"):
            raise NotImplementedError("the oracle knows no skew")
        if any(m.get("tensionOnly") or m.get("eyebars") for m in message["members"]):
            raise NotImplementedError("the oracle knows no tension-only members")
        self.truss = Truss(message)
        self.start = unit.get("startChainageM", 0.0)
        self.lines = self.truss.influence_lines(self.start)
        self.planes = {p["planeId"]: p for p in message["planes"]}
        if len(self.planes) != 2:
            raise NotImplementedError("the oracle knows two planes")
        a, b = sorted(self.planes.values(), key=lambda p: p["lateralM"])
        self._spacing = b["lateralM"] - a["lateralM"]
        self._left, self._right = a, b
        start, end = self.truss.deck_ends()
        self.deck_length = end - start
        self.faults = []
        self.senses = []
        self.not_rated = []
        self._read_effects(unit, message, structure, policy)
        self._extremes = {}

    def share(self, plane_id, y):
        """Share of a plane in a load at y."""
        if plane_id == self._right["planeId"]:
            return (y - self._left["lateralM"]) / self._spacing
        return (self._right["lateralM"] - y) / self._spacing

    def _read_effects(self, unit, message, structure, policy):
        listed = set()
        for effect in unit["effects"]:
            key, senses = self._key(effect)
            for plane_id in effect["planeIds"]:
                if (key, plane_id) in listed:
                    raise ValueError(f"{effect['effectId']} {plane_id} stands twice")
                listed.add((key, plane_id))
                can_lift = senses is SENSES_OF_VERTICAL and self.lines[key].smallest() < 0
                if "notRated" in effect:
                    self.not_rated.append((effect["effectId"], plane_id))
                    if can_lift:
                        self.faults.append(f"{effect['effectId']} {plane_id} can lift and is not rated")
                    continue
                for sense, sign in senses:
                    rated = RatedSense(self.unit_id, effect, self.planes[plane_id], sense, sign, key)
                    self._numerator(rated, effect["rated"], message, structure, policy)
                    self.senses.append(rated)
        wanted = [m["name"] for m in message["members"]] + self.truss.held_reactions()
        for key in wanted:
            for plane_id in self.planes:
                if (key, plane_id) not in listed:
                    self.faults.append(f"{key} {plane_id} is not listed")

    @staticmethod
    def _key(effect):
        if "axialMember" in effect:
            return effect["axialMember"], SENSES_OF_MEMBER
        reaction = effect["reaction"]
        if reaction["component"] == "REACTION_COMPONENT_VERTICAL":
            return (reaction["support"], "v"), SENSES_OF_VERTICAL
        return (reaction["support"], "h"), SENSES_OF_HORIZONTAL

    def _numerator(self, rated, data, message, structure, policy):
        dead = 0.0
        stated = {d["component"]: d for d in data.get("deadLoads", [])}
        for component, factor in policy.dead.items():
            if component not in stated:
                if factor.get("required"):
                    rated.missing = f"dead load {component}"
                    return
                continue
            entry = stated[component]
            load = 0.0 if "none" in entry else entry["forceKn"] * rated.sign
            dead += (factor["adverse"] if load > 0 else factor["relieving"]) * load
        system = data.get("system", message["system"])
        condition = data.get("conditionRating", structure["inspection"]["superstructureCondition"])
        capacities = []
        for resistance in data.get("resistances", []):
            if resistance["sense"] == "EFFECT_SENSE_" + rated.sense:
                capacity = policy.capacity(resistance, system, condition)
                if capacity is not None:
                    capacities.append((capacity, resistance.get("element", "")))
        if rated.sense == "UPLIFT" and data.get("noHoldDown"):
            capacities.append((0.0, ""))
        line = self.lines[rated.key]
        reach = line.largest() if rated.sign > 0 else -line.smallest()
        if not capacities:
            if reach > 0 or dead > 0:
                rated.missing = f"resistance {rated.sense}"
            else:
                rated.needed = False
            return
        capacity, rated.element = min(capacities)
        rated.numerator = capacity - dead
        rated.dead = dead

    def extremes(self, key, train, directions):
        """Largest and smallest effect of a train on the line of this key; remembered."""
        place = (key, id(train), directions)
        if place not in self._extremes:
            self._extremes[place] = extremes(self.lines[key], train, directions)
        return self._extremes[place]

    def same_lane_applies(self, key, rule, sign):
        """Whether the uniform load in the permit's lane acts on the part of this sign of this effect's line."""
        if self.truss.longest_span() > rule["forSpansOverM"]:
            return True
        if not rule.get("forHoggingAndInteriorReactions", False):
            return False
        if isinstance(key, tuple) and key[1] == "v" and self.truss.is_interior(key[0]):
            return True
        bearings = [self.start + x for x in self.truss.bearing_places()]
        return self.lines[key].loads_neighbours(sign, bearings)


class Term:
    """One arrangement: m · (γ · (k · axle + uniform) + others), kN."""

    def __init__(self, presence, axle, uniform, others):
        self.presence, self.axle, self.uniform, self.others = presence, axle, uniform, others

    def value(self, gamma):
        return self.presence * (gamma * (self.axle + self.uniform) + self.others)

    def largest_k(self, gamma, numerator):
        """Largest k that passes with this γ; below 0 if none does."""
        rest = numerator / self.presence - self.others - gamma * self.uniform
        if self.axle > 0:
            return rest / (gamma * self.axle)
        return float("inf") if rest >= 0 else -1.0


def largest_axle_factor(terms, factor, numerator, passes):
    """k: from 1 upwards while every value passes, or the largest passing value below 1 (0 if none)."""
    if numerator < 0:
        return 0.0
    if not any(t.axle > 0 for t in terms):
        return None
    pieces = factor.pieces
    at_one = next(i for i, (low, high, _) in enumerate(pieces) if low < 1.0 <= high)
    limits = [min(t.largest_k(gamma, numerator) for t in terms) for _, _, gamma in pieces]
    if passes:
        for i in range(at_one, len(pieces)):
            low, high, _ = pieces[i]
            if i > at_one and limits[i] <= low:
                return low
            if limits[i] < high:
                return max(limits[i], 1.0)
        raise AssertionError("k has no bound")
    for i in range(at_one, -1, -1):
        low, high, _ = pieces[i]
        k = min(limits[i], high)
        if k > low:
            return k
    return 0.0


def rate_sense(model, rated, setting):
    """RF, k and pass of one effect and sense. setting: see `rate_rung`."""
    policy, rung, train, directions = setting["policy"], setting["rung"], setting["train"], setting["directions"]
    line = model.lines[rated.key]
    high, low = model.extremes(rated.key, train, directions)
    both = (FORWARD, REVERSE)
    other_high, other_low = model.extremes(rated.key, policy.other_train, both)
    uniform_here = {up: rung.get("sameLaneLoaded") and model.same_lane_applies(rated.key, policy.same_lane, up) for up in (1, -1)}
    positive, negative = line.areas()
    impact, other_impact = 1 + rung["allowance"]["constant"], 1 + policy.other["allowance"]["constant"]

    def in_sense(share, up, down):
        along = up if share * rated.sign > 0 else -down
        return abs(share) * along

    terms = []
    for centre, others in setting["arrangements"]:
        share = model.share(rated.plane_id, centre)
        uniform = policy.same_lane["loadKnPerM"] * in_sense(share, positive, negative) if uniform_here[1 if share * rated.sign > 0 else -1] else 0.0
        beside = sum(policy.other["liveLoadFactor"] * other_impact
                     * in_sense(model.share(rated.plane_id, y), other_high, other_low) for y in others)
        terms.append(Term(policy.presence[1 + len(others)], impact * in_sense(share, high, low), uniform, beside))
    factor = setting["factors"][model.unit_id]
    load = max(t.value(factor.at_one()) for t in terms)
    numerator = rated.numerator
    if not rated.needed:
        if load > 0:
            raise NotImplementedError("a sense without a resistance is loaded by a vehicle outside the planes")
        return {"passes": True, "rf": None, "k": None}
    passes = numerator >= 0 and load <= numerator
    if numerator < 0:
        return {"passes": False, "rf": None, "k": 0.0, "dead": True}
    return {"passes": passes, "rf": numerator / load if load > 0 else None,
            "k": largest_axle_factor(terms, factor, numerator, passes), "numerator": numerator,
            "load": load, "terms": terms, "factor": factor}


def rate_rung(models, structure, policy, rung, permit_kind, trains, adtt, directions):
    """Outcome of one rung over all configurations (id -> train)."""
    result = {"rungId": rung["rungId"], "outcome": None, "reasons": [], "ratingFactor": None, "largestAxleFactor": None,
              "governing": []}

    def end(outcome, reason):
        result["outcome"] = outcome
        result["reasons"].append(reason)
        return result

    row = policy.row_for(rung, permit_kind)
    if row is None:
        return end(UNAVAILABLE, "NO_FACTOR_FOR_PERMIT_KIND")
    roadway = structure["roadway"]
    rated, missing = [], [fault for m in models for fault in m.faults]
    for configuration_id, train in trains.items():
        try:
            if rung["lateralPlace"] == "LATERAL_PLACE_CENTRELINE":
                if rung.get("otherLanesLoaded"):
                    raise NotImplementedError("other lanes on a centreline rung")
                places = centreline_interval(roadway, policy.lateral, train.width, rung["centrelineToleranceM"])
                arrangements = [(y, []) for y in places]
            elif rung.get("otherLanesLoaded"):
                lateral_interval(roadway, policy.lateral, train.width)
                most = places_beside(roadway, policy.lateral, train.width, policy.other_train.width)
                if most < 1:
                    return end(UNAVAILABLE, "NO_LANE_BESIDE")
                arrangements = row_arrangements(roadway, policy.lateral, train.width, policy.other_train.width, most)
            else:
                arrangements = [(y, []) for y in lateral_interval(roadway, policy.lateral, train.width)]
        except NoRoom:
            return end(FAILS, "NO_ROOM_ON_ROADWAY")
        factors = {m.unit_id: PermitFactor(FactorRow(row, adtt), train.weight_over_length(m.deck_length)) for m in models}
        setting = {"policy": policy, "rung": rung, "train": train, "directions": directions, "arrangements": arrangements,
                   "factors": factors}
        for model in models:
            for sense in model.senses:
                if sense.missing:
                    missing.append(f"{sense.effect_id} {sense.plane_id}: {sense.missing}")
                    continue
                rated.append((configuration_id, sense, rate_sense(model, sense, setting)))
    summarise(result, rated, missing)
    return result


def summarise(result, rated, missing):
    """Outcome, least RF and k, and the governing effects of a rung."""
    failing = [r for _, _, r in rated if not r["passes"]]
    if failing:
        result["outcome"] = FAILS
        if any(r.get("dead") for r in failing):
            result["reasons"].append("DEAD_LOAD_EXCEEDS_CAPACITY")
        if any(not r.get("dead") for r in failing):
            result["reasons"].append("OVERLOADED")
    if missing:
        result["reasons"].append("DATA_MISSING")
        result["missing"] = sorted(set(missing))
    if result["outcome"] is None:
        result["outcome"] = NOT_ASSESSED if missing else PASSES
    factors = [r["rf"] for _, _, r in rated if r["rf"] is not None]
    result["ratingFactor"] = min(factors, default=None)
    result["largestAxleFactor"] = min((r["k"] for _, _, r in rated if r["k"] is not None), default=None)
    dead = [(c, s, r) for c, s, r in rated if r.get("dead")]
    least = dead or [(c, s, r) for c, s, r in rated if r["rf"] is not None and r["rf"] <= result["ratingFactor"] * (1 + TIE)]
    for configuration_id, sense, _ in least:
        governing = {"configurationId": configuration_id, "unitId": sense.unit_id, "effectId": sense.effect_id,
                     "planeId": sense.plane_id, "sense": "EFFECT_SENSE_" + sense.sense, "element": sense.element}
        if governing not in result["governing"]:
            result["governing"].append(governing)
    result["_rated"] = rated


def clearance_reasons(clearance, configurations, standing):
    """Reasons of fit: (FAIL reasons, NOT_ASSESSED reasons)."""
    fails, unknown = [], []
    clearance = clearance or {}
    for reason, none, key, margin, size in (("HEIGHT", "noHeightLimit", "heightM", "heightMarginM", "overallHeightM"),
                                            ("WIDTH", "noWidthLimit", "widthM", "widthMarginM", "overallWidthM")):
        if none in clearance:
            continue
        if key not in clearance:
            unknown.append("DATA_MISSING")
        elif any(not clearance[key] - standing[margin] >= c[size] for c in configurations):
            fails.append(reason)
    return fails, unknown


def standing_reasons(structure, standing, as_of):
    """Reasons of standing: (FAIL reasons, NOT_ASSESSED reasons)."""
    if structure.get("datedRestrictions") or structure.get("engineerOverride"):
        raise NotImplementedError("the oracle knows no dated restrictions and no overrides")
    fails, unknown = [], []
    state = structure["state"].removeprefix("STRUCTURE_STATE_")
    if state in ("CLOSED", "POSTED"):
        fails.append(state)
    if state in ("SHORED", "TEMPORARY"):
        unknown.append("STANDING")
    inspection = structure["inspection"]
    if (standing["poorCondition"] != "DOUBT_RULE_FLAG"
            and inspection["superstructureCondition"] <= standing["poorUpToRating"]):
        unknown.append("POOR_CONDITION")
    due = add_months(to_date(inspection["inspectedOn"]), inspection["intervalMonths"])
    if standing["overdueInspection"] != "DOUBT_RULE_FLAG" and due < as_of:
        unknown.append("INSPECTION_OVERDUE")
    return fails, unknown


def ladder_verdict(policy, rungs):
    """(verdict, rung id, reasons) of the ladder alone."""
    for i, rung in enumerate(rungs):
        if rung["outcome"] == PASSES:
            return ("PASS" if i == 0 else "PASS_WITH_CONDITIONS"), rung["rungId"], []
    reasons = []
    for rung in rungs:
        if rung["outcome"] in (FAILS, NOT_ASSESSED):
            reasons += [r for r in rung["reasons"] if r not in reasons]
    if any(r["outcome"] == NOT_ASSESSED for r in rungs):
        return "NOT_ASSESSED", "", reasons
    return "FAIL", "", reasons or ["NO_RUNG_AVAILABLE"]


def screen_crossing(structure, models, policy, application, crossing, as_of, trains):
    """Result of one crossing. trains: configuration id -> Train, for the whole application."""
    legs = crossing.get("legId", "")
    configurations = [c for c in application["configurations"] if not c.get("legIds") or legs in c["legIds"]]
    result = {"structure": structure["name"], "relation": crossing["relation"], "legId": legs, "verdict": None, "rungId": "",
              "ladderVerdict": None, "ladderRungId": "", "reasons": [], "rungs": []}
    verdicts = []
    if crossing["relation"] == "CROSSING_RELATION_UNDER":
        fails, unknown = clearance_reasons(structure.get("clearanceUnder"), configurations, policy.standing)
        verdicts.append("PASS")
    else:
        directions = {"TRAVEL_DIRECTION_FORWARD": (FORWARD,), "TRAVEL_DIRECTION_REVERSE": (REVERSE,)}.get(
            crossing.get("direction"), (FORWARD, REVERSE))
        adtt = structure["roadway"].get("adttOneDirection")
        result["rungs"] = [rate_rung(models, structure, policy, rung, application["permitKind"],
                                     {c["configurationId"]: trains[c["configurationId"]] for c in configurations}, adtt, directions)
                           for rung in policy.rungs]
        verdict, result["ladderRungId"], reasons = ladder_verdict(policy, result["rungs"])
        result["ladderVerdict"] = verdict
        result["reasons"] += reasons
        verdicts.append(verdict)
        fails, unknown = clearance_reasons(structure.get("clearanceOn"), configurations, policy.standing)
        more_fails, more_unknown = standing_reasons(structure, policy.standing, as_of)
        fails, unknown = more_fails + fails, more_unknown + unknown
    verdicts += ["FAIL"] * len(fails) + ["NOT_ASSESSED"] * len(unknown)
    result["reasons"] += [r for r in fails + unknown if r not in result["reasons"]]
    result["verdict"] = max(verdicts, key=VERDICT_ORDER.index)
    if result["verdict"] in ("PASS", "PASS_WITH_CONDITIONS"):
        result["rungId"] = result["ladderRungId"]
    return result
