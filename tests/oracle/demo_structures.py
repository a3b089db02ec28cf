"""The twelve bridges of the demo: place, cross-section, weights, steel, and the reserve they were built with.

Everything is invented: authority, roads, rivers, places, drawings. `reserve` multiplies the legal load in every lane when
members are sized; it is chosen so that the demo's vehicles meet bridges of unlike strength.
"""

from demo_sketches import (cantilever, deck_pratt_seated, howe, pratt, underslung_pratt, warren, warren_with_verticals)

OWNER = "Ossel Valley Roads Authority"
RIVETED, WELDED = "SYSTEM_KIND_RIVETED_TWO_PLANE", "SYSTEM_KIND_WELDED_TWO_PLANE"
CONCRETE, ASPHALT = 24.0, 22.5  # kN/m3


def day(year, month, number):
    """A date as files write it."""
    return {"year": year, "month": month, "day": number}


def place(road, km, order, *more):
    """Roads, and coordinates in the open ocean, far from any real road."""
    north = {"P14": -48.90, "P31": -48.75}[road]
    east = {"P14": -123.60, "P31": -123.30}[road]
    reference = {"road": road, "kilometrePointKm": km, "direction": "TRAVEL_DIRECTION_FORWARD", "relation": "CROSSING_RELATION_ON"}
    return {"latitudeDeg": round(north + 0.004 * order, 4), "longitudeDeg": round(east + 0.013 * km, 4), "roads": [reference, *more]}


def roadway(left, right, lanes, adtt, surface="SURFACE_STATE_SMOOTH"):
    """Kerbs, lanes and truck traffic (None: unknown)."""
    found = {"leftKerbM": left, "rightKerbM": right, "laneCount": lanes}
    if adtt is not None:
        found["adttOneDirection"] = adtt
    return {**found, "surface": surface}


def inspection(year, month, number, condition, months=24):
    """Last inspection."""
    return {"inspectedOn": day(year, month, number), "intervalMonths": months, "superstructureCondition": condition}


def through_clearance(height, width):
    """Clear height and width between the trusses."""
    return {"heightM": height, "widthM": width}


def open_above(reason, width):
    """No limit of height."""
    return {"noHeightLimit": {"reason": reason}, "widthM": width}


def slab(road, thickness, wearing):
    """Weights of slab and surfacing between the kerbs, each with its centre: kN/m at m."""
    width, centre = road["rightKerbM"] - road["leftKerbM"], (road["rightKerbM"] + road["leftKerbM"]) / 2
    return (CONCRETE * thickness * (width + 0.8), centre), (ASPHALT * wearing * width, centre)


def structure(number, title, units, planes, road, *, steel, floor, thickness, wearing, footway=None, condition_reduction=1.0, **more):
    """Puts a structure together. steel: kN/m of one truss; floor: kN/m of floor beams, stringers and bracing."""
    (left, y_left), (right, y_right) = sorted(planes.items(), key=lambda p: p[1])
    deck, surface = slab(road, thickness, wearing)

    def share(plane, y):
        along = (y - y_left) / (y_right - y_left)
        return along if plane == right else 1 - along

    system = more.pop("system", RIVETED)
    reduction = max(0.85, condition_reduction * (0.85 if system == WELDED else 0.9))
    found = {"id": number, "title": title, "owner": OWNER, "units": units, "planes": planes, "roadway": road, "share": share,
             "weights": {"truss_steel": steel, "floor_steel": floor, "deck": [deck] + ([footway] if footway else []),
                         "surface": [surface] if wearing else []},
             "system": system, "reduction": reduction, "given": reduction if more.get("factors_included") else 1.0,
             "drawing": f"Drawings of {number} of {more['built']}, sheet 3",
             "weights_source": f"Weights from the drawings of {number}, sheet 2, slab {thickness * 1000:.0f} mm, surfacing {wearing * 1000:.0f} mm"}
    return {**found, **more}


def two_howe_spans():
    """Two simple Howe spans with a metre between their bearing lines on the pier."""
    return [howe(8, 5.5, 7.0, title="Through Howe truss, 44 m"),
            howe(6, 5.0, 6.2, unit_id="span-2", title="Through Howe truss, 30 m", chainage=45.0)]


def two_continuous_spans():
    """Warren truss continuous over a pier."""
    supports = [{"name": "start", "node": "L0", "holdsHorizontal": True, "holdsVertical": True},
                {"name": "pier", "node": "L6", "holdsVertical": True}, {"name": "end", "node": "L12", "holdsVertical": True}]
    return warren_with_verticals(12, 7.0, 7.6, supports=supports, unit_id="spans-1-2",
                                 title="Through Warren truss with verticals, continuous, 42 m + 42 m")


STRUCTURES = [
    structure(
        "P14-0032", "Upper Ossel Bridge",
        [pratt(6, 6.0, 7.5, title="Through Pratt truss, 36 m")],
        {"north": -4.7, "south": 4.7}, roadway(-4.15, 4.15, 2, 850),
        steel=5.2, floor=7.5, thickness=0.18, wearing=0.06,
        place=place("P14", 3.2, 0), clearanceOn=through_clearance(5.05, 8.7), inspection=inspection(2025, 7, 17, 6),
        bearings="the inspection of 2025 shows rockers upright and clean", connections=("diagonal",),
        built=1958, yield_mpa=228, reserve={"all": 1.9}),
    structure(
        "P14-0087", "Linnow Brook Bridge",
        [warren_with_verticals(6, 4.0, 2.7, title="Half-through Warren truss (pony), 24 m")],
        {"north": -3.3, "south": 3.3}, roadway(-2.75, 2.75, 1, 210, "SURFACE_STATE_MINOR_DEVIATIONS"),
        steel=3.2, floor=5.0, thickness=0.17, wearing=0.05,
        place=place("P14", 8.7, 1), clearanceOn=open_above("half-through truss, open above", 6.0),
        inspection=inspection(2026, 4, 21, 6), bearings="the inspection of 2026 shows the sliding plates free to move",
        built=1941, yield_mpa=228, reserve={"all": 1.12}),
    structure(
        "P14-0145", "Thrane Gorge Bridge",
        [pratt(8, 7.0, [7.0, 8.6, 9.6, 10.0, 9.6, 8.6, 7.0], title="Through Parker truss, 56 m")],
        {"upstream": 0.0, "downstream": 9.6}, roadway(0.5, 8.0, 2, 850),
        steel=7.5, floor=8.5, thickness=0.19, wearing=0.07, footway=(4.6, 8.75),
        place=place("P14", 14.5, 2), clearanceOn=through_clearance(4.85, 7.7), inspection=inspection(2026, 5, 6, 6),
        bearings="the inspection of 2026 shows rollers free to move", connections=("diagonal",), connection_level=0.92,
        built=1949, yield_mpa=228, reserve={"all": 1.58}),
    structure(
        "P14-0190", "Hobbin Mill Bridge",
        [pratt(6, 5.0, 6.4, title="Through Pratt truss, 30 m")],
        {"north": -3.7, "south": 3.7}, roadway(-3.0, 3.0, 2, 850, "SURFACE_STATE_ROUGH"),
        steel=4.2, floor=5.5, thickness=0.17, wearing=0.05, condition_reduction=0.95,
        place=place("P14", 19.0, 3), state="STRUCTURE_STATE_POSTED",
        postedLimits=[{"grossKn": 255.0, "sign": "26 t"}],
        clearanceOn=through_clearance(4.6, 6.4), inspection=inspection(2026, 8, 19, 5, months=12),
        bearings="the inspection of 2026 shows frozen rockers, repair ordered",
        loss={("south", "L1L2"): 0.20, ("south", "L2L3"): 0.16, ("south", "L3L4"): 0.16, ("south", "U1L2"): 0.12,
              ("south", "U2L2"): 0.10},
        loss_source="thickness survey of August 2026",
        condition={("south", "L1L2"): 4, ("south", "L2L3"): 4, ("south", "L3L4"): 5, ("south", "U1L2"): 5,
                   ("south", "U2L2"): 5},
        built=1928, yield_mpa=207, reserve={"all": 1.02}),
    structure(
        "P14-0236", "Marl Reach Bridge",
        [two_continuous_spans()],
        {"north": -4.4, "south": 4.4}, roadway(-3.75, 3.75, 2, 850),
        steel=5.5, floor=7.5, thickness=0.17, wearing=0.05, system=WELDED,
        place=place("P14", 23.6, 4), clearanceOn=through_clearance(5.1, 8.0), inspection=inspection(2025, 9, 30, 7),
        bearings="the inspection of 2025 shows pot bearings without leaks", rated_bearings=("pier",), bearing_reserve=1.1,
        built=1964, yield_mpa=248, factored=True, panels_per_splice=1, reserve={"all": 1.24}),
    structure(
        "P14-0310", "Quillmoor Viaduct",
        [deck_pratt_seated(8, 5.0, 6.0, title="Deck Pratt truss, 40 m, end stringers seated on the abutments")],
        {"north": -2.9, "south": 2.9}, roadway(-3.8, 3.8, 2, None),
        steel=5.0, floor=6.0, thickness=0.18, wearing=0.06,
        place=place("P14", 31.0, 5), clearanceOn=open_above("deck truss, nothing above the roadway", 7.6),
        inspection=inspection(2024, 9, 11, 6), bearings="the inspection of 2024 could not reach them",
        built=1951, yield_mpa=228, reserve={"all": 1.6}),
    structure(
        "P14-0388", "Tallow Weir Bridge",
        two_howe_spans(),
        {"north": -3.1, "south": 3.1}, roadway(-2.5, 2.5, 1, 640),
        steel=4.0, floor=5.5, thickness=0.17, wearing=0.05, condition_reduction=0.95,
        place=place("P14", 38.8, 6), clearanceOn=through_clearance(4.7, 5.4), inspection=inspection(2026, 3, 3, 5),
        bearings="the inspection of 2026 shows rust but no loss", built=1934, yield_mpa=207, panels_per_splice=1, reserve={"all": 1.03}),
    structure(
        "P31-0021", "Grey Ash Bridge",
        [pratt(6, 7.0, 8.0, crossed=(1, 2, 3, 4), title="Through truss with crossed diagonals, 42 m")],
        {"left": -4.6, "right": 4.6}, roadway(-3.9, 3.9, 2, 1900),
        steel=6.0, floor=7.5, thickness=0.18, wearing=0.06,
        place=place("P31", 2.1, 0), clearanceOn=through_clearance(5.15, 8.1), inspection=inspection(2025, 7, 8, 6),
        bearings="the inspection of 2025 shows rockers upright", dead_not_on_record=("U2L3", "L2U3"),
        built=1941, yield_mpa=228, reserve={"all": 1.9}),
    structure(
        "P31-0074", "Sallow Narrows Bridge",
        [cantilever(7.0, [7.5, 7.8, 8.4, 9.6, 11.4, 9.4, 8.0, 8.0, 8.0, 8.0, 8.0, 9.4, 11.4, 9.6, 8.4, 7.8, 7.5],
                    unit_id="spans-1-3", title="Through cantilever truss, 35 m + 56 m + 35 m, suspended span 28 m")],
        {"left": -4.8, "right": 4.8}, roadway(-4.05, 4.05, 2, 1900),
        steel=7.0, floor=8.0, thickness=0.18, wearing=0.06,
        place=place("P31", 7.4, 1), clearanceOn=through_clearance(5.2, 8.6), inspection=inspection(2026, 6, 24, 6),
        bearings="the inspection of 2026 shows rockers free to move", hold_down={"start": 900.0, "end": 900.0},
        connections=("diagonal",), built=1953, yield_mpa=228, panels_per_splice=1, reserve={"all": 1.5, "diagonal": 1.6}),
    structure(
        "P31-0118", "Fallow Cut Bridge",
        [underslung_pratt(6, 5.0, 4.8, 1.2, title="Underslung deck Pratt truss, 30 m, overhanging stringers")],
        {"left": -2.7, "right": 2.7}, roadway(-3.95, 3.95, 2, 1900),
        steel=4.2, floor=5.5, thickness=0.18, wearing=0.06,
        place=place("P31", 11.8, 2, {"road": "P14", "kilometrePointKm": 27.4, "direction": "TRAVEL_DIRECTION_FORWARD",
                                     "relation": "CROSSING_RELATION_UNDER"}),
        clearanceOn=open_above("deck truss, nothing above the roadway", 7.9), clearanceUnder=through_clearance(4.75, 9.0),
        inspection=inspection(2026, 9, 9, 7), bearings="the inspection of 2026 shows rockers upright",
        built=1955, yield_mpa=228, panels_per_splice=1, reserve={"all": 1.4, "diagonal": 1.55}),
    structure(
        "P31-0163", "Great Marl Bridge",
        [pratt(12, 7.6, [8.6, 11.0, 12.7, 13.9, 14.6, 14.8, 14.6, 13.9, 12.7, 11.0, 8.6], title="Through Parker truss, 91.2 m")],
        {"left": -4.9, "right": 4.9}, roadway(-4.2, 4.2, 2, 1900),
        steel=10.5, floor=8.0, thickness=0.15, wearing=0.04,
        place=place("P31", 16.3, 3), clearanceOn=through_clearance(5.1, 8.9), inspection=inspection(2025, 10, 14, 6),
        bearings="the inspection of 2025 shows rollers free to move", connections=("diagonal", "endpost"),
        built=1956, yield_mpa=228, reserve={"all": 1.27}),
    structure(
        "P31-0202", "Pennywater Bridge",
        [warren(8, 6.0, 6.6, title="Through Warren truss, 48 m")],
        {"left": -4.75, "right": 4.75}, roadway(-4.25, 3.2, 2, 1900),
        steel=6.5, floor=7.5, thickness=0.18, wearing=0.06, footway=(4.2, 3.95), condition_reduction=0.95,
        place=place("P31", 20.2, 4), clearanceOn=through_clearance(4.55, 7.6), inspection=inspection(2026, 2, 12, 5),
        bearings="the inspection of 2026 shows rockers upright", factors_included=True,
        built=1939, yield_mpa=228, panels_per_splice=1, reserve={"all": 1.55}),
]
