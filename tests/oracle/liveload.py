"""Moving loads: exact extremes, places across the roadway, live-load factors by weight over length."""

from itertools import accumulate

FORWARD, REVERSE = 1, -1


class Train:
    """Axles of one vehicle from the lead axle backwards; loads kN, offsets m, width over tyres m."""

    def __init__(self, message):
        self.loads, self.offsets = [], []
        for i, axle in enumerate(message["axles"]):
            for unread in ("gapRange", "lateralOffsetM", "omittedWhereRelieving"):
                if axle.get(unread):
                    raise NotImplementedError(f"the oracle reads no {unread}")
            place = axle["offsetM"] if "offsetM" in axle else (self.offsets[-1] + axle["gapM"] if i else 0.0)
            self.loads.append(axle["loadKn"])
            self.offsets.append(place)
        self.width = message["widthOverTyresM"]

    def weight_over_length(self, deck_length):
        """Weight over length, kN/m, of the whole vehicle and of each run of axles that the deck can hold."""
        n, sums = len(self.loads), [0.0, *accumulate(self.loads)]
        found = []
        for i in range(n):
            for j in range(i + 1, n):
                length = self.offsets[j] - self.offsets[i]
                whole = i == 0 and j == n - 1
                if length > 0 and (whole or length <= deck_length):
                    found.append((sums[j + 1] - sums[i]) / length)
        return found


def extremes(line, train, directions):
    """Largest (>= 0) and smallest (<= 0) effect of the whole train over all positions, one-sided limits included.

    Between two events (an axle at a breakpoint) the effect is straight, so the events are enough.
    """
    largest = smallest = 0.0
    for direction in directions:
        for x in line.xs:
            for offset in train.offsets:
                places = [x + direction * (offset - other) for other in train.offsets]
                for just_after in (False, True):
                    total = sum(load * line.at(place, just_after) for load, place in zip(train.loads, places))
                    largest, smallest = max(largest, total), min(smallest, total)
    return largest, smallest


class NoRoom(Exception):
    """The vehicle does not fit between the kerbs."""


def lateral_interval(roadway, rules, width):
    """Where the vehicle's centre may be: (from, to), m."""
    reach = rules["kerbDistanceM"] + width / 2
    low, high = roadway["leftKerbM"] + reach, roadway["rightKerbM"] - reach
    if low > high:
        raise NoRoom
    return low, high


def centreline_interval(roadway, rules, width, tolerance):
    """Where the centre may be when the vehicle keeps to the roadway's centreline."""
    low, high = lateral_interval(roadway, rules, width)
    middle = (roadway["leftKerbM"] + roadway["rightKerbM"]) / 2
    return max(low, middle - tolerance), min(high, middle + tolerance)


def places_beside(roadway, rules, width, other_width):
    """Number of other vehicles for which there is room and a lane."""
    clear = roadway["rightKerbM"] - roadway["leftKerbM"] - 2 * rules["kerbDistanceM"] - width
    return min(roadway["laneCount"] - 1, int(clear // (rules["tyreGapM"] + other_width)))


def row_arrangements(roadway, rules, width, other_width, most_others):
    """All arrangements in a row: (centre of the permit, [centres of the others]).

    0 to most_others of them, the permit at each place of the row, each split into a part packed against the left kerb
    and a part packed against the right one.
    """
    kerb, gap = rules["kerbDistanceM"], rules["tyreGapM"]
    found = []
    for others in range(most_others + 1):
        for place in range(others + 1):
            widths = [other_width] * others
            widths.insert(place, width)
            for split in range(others + 2):
                centres = [0.0] * (others + 1)
                edge = roadway["leftKerbM"] + kerb
                for i in range(split):
                    centres[i] = edge + widths[i] / 2
                    edge += widths[i] + gap
                edge = roadway["rightKerbM"] - kerb
                for i in range(others, split - 1, -1):
                    centres[i] = edge - widths[i] / 2
                    edge -= widths[i] + gap
                found.append((centres[place], centres[:place] + centres[place + 1:]))
    return found


class FactorRow:
    """A row of live-load factors at the truck traffic of one structure (None: unknown)."""

    def __init__(self, message, adtt):
        counts = sorted({f.get("adttOneDirection", 0.0) for f in message["factors"]})
        self._tables = [sorted((f.get("upToGvwOverLengthKnPerM", float("inf")), f["factor"])
                               for f in message["factors"] if f.get("adttOneDirection", 0.0) == count) for count in counts]
        self._counts, self._adtt = counts, adtt
        self.boundaries = sorted({b for table in self._tables for b, _ in table if b != float("inf")})

    def factor(self, intensity):
        """Factor at a weight over length, kN/m."""
        values = [next(f for bound, f in table if intensity <= bound) for table in self._tables]
        if self._adtt is None:
            return max(values)
        counts = self._counts
        if self._adtt <= counts[0]:
            return values[0]
        for i in range(1, len(counts)):
            if self._adtt <= counts[i]:
                t = (self._adtt - counts[i - 1]) / (counts[i] - counts[i - 1])
                return values[i - 1] + t * (values[i] - values[i - 1])
        return values[-1]


class PermitFactor:
    """The factor of one vehicle on one deck, as a step function of the factor k on its axle loads."""

    def __init__(self, row, intensities):
        self._row, self._intensities = row, intensities
        steps = sorted({b / w for b in row.boundaries for w in intensities})
        edges = [0.0, *steps, float("inf")]
        self.pieces = [(low, high, self._at(high if high != float("inf") else low + 1.0)) for low, high in zip(edges, edges[1:])]

    def _at(self, k):
        # a boundary value belongs to the class below it: at k = b/w exactly, rounding must not push it over
        return max(self._row.factor(k * w * (1 - 1e-14)) for w in self._intensities)

    def at_one(self):
        """Factor for the loads as they are."""
        return max(self._row.factor(w) for w in self._intensities) if self._intensities else self._row.factor(float("inf"))
