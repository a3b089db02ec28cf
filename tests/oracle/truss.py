"""Plane pin-jointed trusses: unit-load analysis by the stiffness method, and influence lines of the deck.

Units: m, kN, MPa. Tension +, reactions + upwards and towards increasing chainage. Standard library only.
"""

from bisect import bisect_left, bisect_right

KN_PER_M2_PER_MPA = 1000.0
SMALLEST_PIVOT_RATIO = 1e-11  # of the largest diagonal term; below it the model is a mechanism
ZERO_ORDINATE = 1e-9  # effect per kN; ordinates below it are rounding and count as 0
SAME_PLACE_M = 1e-9  # two chainages closer than this are the same place


class Mechanism(Exception):
    """The truss cannot stand."""


def solve(matrix, columns):
    """Solves matrix · x = each column by elimination with row pivoting; the inputs are kept."""
    n = len(matrix)
    rows = [list(matrix[i]) + [column[i] for column in columns] for i in range(n)]
    scale = max((abs(matrix[i][i]) for i in range(n)), default=1.0)
    for p in range(n):
        best = max(range(p, n), key=lambda r: abs(rows[r][p]))
        if abs(rows[best][p]) < SMALLEST_PIVOT_RATIO * scale:
            raise Mechanism(f"no stiffness in unknown {p}")
        rows[p], rows[best] = rows[best], rows[p]
        pivot = rows[p]
        for r in range(p + 1, n):
            factor = rows[r][p] / pivot[p]
            if factor != 0.0:
                row = rows[r]
                for c in range(p, len(row)):
                    row[c] -= factor * pivot[c]
    answers = []
    for k in range(len(columns)):
        x = [0.0] * n
        for i in range(n - 1, -1, -1):
            x[i] = (rows[i][n + k] - sum(rows[i][j] * x[j] for j in range(i + 1, n))) / rows[i][i]
        answers.append(x)
    return answers


class Truss:
    """One plane of a truss unit, from the `truss` message of a catalogue file."""

    def __init__(self, message):
        self.nodes = {n["name"]: (n["xM"], n["yM"]) for n in message["nodes"]}
        self.members = message["members"]
        self.supports = message["supports"]
        self.deck = message["deck"]
        names = list(self.nodes)
        self._dof = {name: (2 * i, 2 * i + 1) for i, name in enumerate(names)}
        self._held = set()
        for support in self.supports:
            dx, dy = self._dof[support["node"]]
            if support.get("holdsHorizontal"):
                self._held.add(dx)
            if support.get("holdsVertical"):
                self._held.add(dy)

    def _direction(self, member):
        (x1, y1), (x2, y2) = self.nodes[member["startNode"]], self.nodes[member["endNode"]]
        length = ((x2 - x1) ** 2 + (y2 - y1) ** 2) ** 0.5
        return (x2 - x1) / length, (y2 - y1) / length, length

    def length(self, member):
        """Length of a member, m."""
        return self._direction(member)[2]

    def analyse(self, load_cases):
        """Member forces and reactions of each load case.

        A load case maps node -> downward load, kN. The answer per case: ({member: axial kN}, {(support, 'v'|'h'): kN}).
        """
        size = 2 * len(self.nodes)
        stiffness = [[0.0] * size for _ in range(size)]
        for member in self.members:
            c, s, length = self._direction(member)
            ea_over_l = member["areaM2"] * member["elasticModulusMpa"] * KN_PER_M2_PER_MPA / length
            pattern = list(zip(self._dof[member["startNode"]] + self._dof[member["endNode"]], (-c, -s, c, s)))
            for i, a in pattern:
                for j, b in pattern:
                    stiffness[i][j] += ea_over_l * a * b
        free = [d for d in range(size) if d not in self._held]
        loads = []
        for case in load_cases:
            vector = [0.0] * size
            for node, down in case.items():
                vector[self._dof[node][1]] -= down
            loads.append(vector)
        reduced = [[stiffness[i][j] for j in free] for i in free]
        moves = solve(reduced, [[vector[i] for i in free] for vector in loads])
        results = []
        for vector, move in zip(loads, moves):
            u = [0.0] * size
            for d, value in zip(free, move):
                u[d] = value
            forces = {}
            at_joint = list(vector)
            for member in self.members:
                c, s, length = self._direction(member)
                i, j = self._dof[member["startNode"]], self._dof[member["endNode"]]
                stretch = c * (u[j[0]] - u[i[0]]) + s * (u[j[1]] - u[i[1]])
                force = member["areaM2"] * member["elasticModulusMpa"] * KN_PER_M2_PER_MPA * stretch / length
                forces[member["name"]] = force
                at_joint[i[0]] += force * c
                at_joint[i[1]] += force * s
                at_joint[j[0]] -= force * c
                at_joint[j[1]] -= force * s
            residual = max((abs(at_joint[d]) for d in free), default=0.0)
            if residual > 1e-7 * max(1.0, max(abs(v) for v in vector)):
                raise Mechanism(f"joint equilibrium is missed by {residual} kN")
            reactions = {}
            for support in self.supports:
                dx, dy = self._dof[support["node"]]
                if support.get("holdsHorizontal"):
                    reactions[support["name"], "h"] = -at_joint[dx]
                if support.get("holdsVertical"):
                    reactions[support["name"], "v"] = -at_joint[dy]
            results.append((forces, reactions))
        return results

    def held_reactions(self):
        """Keys of the held reactions: (support, 'v' or 'h')."""
        keys = []
        for support in self.supports:
            if support.get("holdsVertical"):
                keys.append((support["name"], "v"))
            if support.get("holdsHorizontal"):
                keys.append((support["name"], "h"))
        return keys

    def _bearing_places(self):
        return sorted({self.nodes[s["node"]][0] for s in self.supports if s.get("holdsVertical")})

    def longest_span(self):
        """Longest distance between successive vertically held joints, m."""
        places = self._bearing_places()
        return max(b - a for a, b in zip(places, places[1:]))

    def bearing_places(self):
        """Places of the vertically held joints, ascending, m from the unit's datum."""
        return self._bearing_places()

    def is_interior(self, support_name):
        """Whether the support is neither the first nor the last that holds its joint vertically."""
        places = self._bearing_places()
        x = next(self.nodes[s["node"]][0] for s in self.supports if s["name"] == support_name)
        return places[0] < x < places[-1]

    def deck_ends(self):
        """Places at which the deck begins and ends, m from the unit's datum."""
        points = self.deck["panelPoints"]
        ends = []
        for side, node in (("start", points[0]), ("end", points[-1])):
            end = self.deck[side]
            ends.append(self.nodes[node][0] if end["kind"] == "DECK_END_KIND_END_FLOOR_BEAM" else end["tipM"])
        return tuple(ends)

    def influence_lines(self, start_chainage=0.0):
        """Influence lines of all members and held reactions: {key: Line}; a member's key is its name."""
        points = self.deck["panelPoints"]
        xs = [self.nodes[p][0] for p in points]
        results = self.analyse([{p: 1.0} for p in points])
        ordinates = {m["name"]: [forces[m["name"]] for forces, _ in results] for m in self.members}
        for key in self.held_reactions():
            ordinates[key] = [reactions[key] for _, reactions in results]
        return {key: self._line(xs, values, start_chainage) for key, values in ordinates.items()}

    def _line(self, xs, values, start_chainage):
        values = [0.0 if abs(v) < ZERO_ORDINATE else v for v in values]
        inner = list(zip(xs, values))
        first, last = self._end_point("start", inner), self._end_point("end", inner[::-1])
        stations = ([first] if first else []) + inner + ([last] if last else [])
        before = [v for _, v in stations]
        after = list(before)
        before[0], after[-1] = 0.0, 0.0
        return Line([start_chainage + x for x, _ in stations], before, after)

    def _end_point(self, side, inner):
        end = self.deck[side]
        kind = end["kind"]
        if kind == "DECK_END_KIND_END_FLOOR_BEAM":
            return None
        tip = end["tipM"]
        if kind == "DECK_END_KIND_SEATED_ON_ABUTMENT":
            return tip, 0.0
        if kind == "DECK_END_KIND_OVERHANGING_STRINGERS":  # the end stringer is a lever on the first two panel points
            (x0, v0), (x1, v1) = inner[0], inner[1]
            return tip, v0 + (v1 - v0) * (tip - x0) / (x1 - x0)
        raise ValueError(f"deck end {kind}")


class Line:
    """An influence line: straight between breakpoints, zero outside, with one-sided values at each breakpoint."""

    def __init__(self, xs, before, after):
        self.xs, self.before, self.after = xs, before, after

    def at(self, x, just_after):
        """Ordinate just before or just after x."""
        i = bisect_left(self.xs, x - SAME_PLACE_M)
        if i < len(self.xs) and abs(self.xs[i] - x) <= SAME_PLACE_M:
            return self.after[i] if just_after else self.before[i]
        i = bisect_right(self.xs, x)
        if i == 0 or i == len(self.xs):
            return 0.0
        x0, x1 = self.xs[i - 1], self.xs[i]
        return self.after[i - 1] + (self.before[i] - self.after[i - 1]) * (x - x0) / (x1 - x0)

    def largest(self):
        """Largest ordinate, at least 0."""
        return max(0.0, *self.before, *self.after)

    def smallest(self):
        """Smallest ordinate, at most 0."""
        return min(0.0, *self.before, *self.after)

    def loads_neighbours(self, sign, bearings):
        """Whether the part of this sign lies in two spans beside each other, as that of a hogging moment does."""
        loaded = []
        for start, end in zip(bearings, bearings[1:]):
            loaded.append(any(
                sign * (self.after[i] + self.before[i + 1]) > 2e-9 and min(self.xs[i + 1], end) - max(self.xs[i], start) > SAME_PLACE_M
                or self._crossing_inside(i, sign, start, end)
                for i in range(len(self.xs) - 1)))
        return any(a and b for a, b in zip(loaded, loaded[1:]))

    def _crossing_inside(self, i, sign, start, end):
        """Whether a stretch that changes its sign has a part of this sign in a span."""
        a, b = sign * self.after[i], sign * self.before[i + 1]
        if not (a > 1e-9 and b < -1e-9 or a < -1e-9 and b > 1e-9):
            return False
        zero = self.xs[i] + (self.xs[i + 1] - self.xs[i]) * a / (a - b)
        left, right = (self.xs[i], zero) if a > 0 else (zero, self.xs[i + 1])
        return min(right, end) - max(left, start) > SAME_PLACE_M

    def areas(self):
        """Areas where the line is positive and where it is negative: (>= 0, <= 0), m."""
        positive = negative = 0.0
        for i in range(len(self.xs) - 1):
            a, b, width = self.after[i], self.before[i + 1], self.xs[i + 1] - self.xs[i]
            if a >= 0 and b >= 0:
                positive += (a + b) / 2 * width
            elif a <= 0 and b <= 0:
                negative += (a + b) / 2 * width
            else:
                zero = width * a / (a - b)
                left, right = a * zero / 2, b * (width - zero) / 2
                positive += max(left, 0) + max(right, 0)
                negative += min(left, 0) + min(right, 0)
        return positive, negative
