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
             "drawing": f"Drawings of {number}, sheet 3",
             "weights_source": f"Weights from the drawings of {number}, sheet 2, slab {thickness * 1000:.0f} mm, surfacing {wearing * 1000:.0f} mm"}
    return {**found, **more}


STRUCTURES = [
    structure(
        "P14-0032", "Upper Ossel Bridge",
        [pratt(6, 6.0, 7.5, title="Through Pratt truss, 36 m")],
        {"north": -4.7, "south": 4.7}, roadway(-4.15, 4.15, 2, 850),
        steel=5.2, floor=7.5, thickness=0.18, wearing=0.06,
        place=place("P14", 3.2, 0), clearanceOn=through_clearance(5.05, 8.7), inspection=inspection(2025, 6, 17, 6),
        bearings="the inspection of 2025 shows rockers upright and clean", connections=("diagonal",),
        reserve={"all": 1.9}, **{"yield": 228}),
    structure(
        "P14-0087", "Linnow Brook Bridge",
        [warren_with_verticals(6, 4.0, 2.7, title="Half-through Warren truss (pony), 24 m")],
        {"north": -3.3, "south": 3.3}, roadway(-2.75, 2.75, 1, 210, "SURFACE_STATE_MINOR_DEVIATIONS"),
        steel=3.2, floor=5.0, thickness=0.17, wearing=0.05,
        place=place("P14", 8.7, 1), clearanceOn=open_above("half-through truss, open above", 6.0),
        inspection=inspection(2026, 4, 21, 6), bearings="sliding plates, the inspection of 2026 shows free movement",
        reserve={"all": 1.9}, **{"yield": 228}),
]
