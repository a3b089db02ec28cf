"""The demo's vehicles and applications; written by demo_generate.py. Axle lists are round figures of common practice."""


def axles(loads, gaps, gauge, lines):
    """Axles from loads (kN) and the gap to the axle in front (m); gauge and wheel lines alike or one value per axle."""
    offset, found = 0.0, []
    for i, load in enumerate(loads):
        offset += gaps[i - 1] if i else 0.0
        found.append({"loadKn": load, "offsetM": round(offset, 3), "gaugeM": gauge[i] if isinstance(gauge, list) else gauge,
                      "wheelLines": lines[i] if isinstance(lines, list) else lines})
    return found


def configuration(name, title, train_title, axle_list, over_tyres, width, height, legs=()):
    """One state of travel."""
    found = {"configurationId": name, "title": title,
             "loading": {"axleTrains": [{"title": train_title, "axles": axle_list, "widthOverTyresM": over_tyres}]},
             "overallWidthM": width, "overallHeightM": height}
    if legs:
        found["legIds"] = list(legs)
    return found


def thirteen_axles():
    """Tractor with tridem drive, jeep, trailer and booster of three axles each."""
    gaps = [4.6, 1.4, 1.4, 4.2, 1.4, 1.4, 11.0, 1.4, 1.4, 4.3, 1.4, 1.4]
    return axles([70.0] + [88.0] * 12, gaps, [2.1] + [2.4] * 12, [2] + [4] * 12)


def nineteen_axles():
    """Tractor of three axles and sixteen dual-lane lines in four groups."""
    gaps = [4.8, 1.4, 4.4, 1.5, 1.5, 1.5, 3.9, 1.5, 1.5, 1.5, 12.5, 1.5, 1.5, 1.5, 3.9, 1.5, 1.5, 1.5]
    return axles([70.0, 85.0, 85.0] + [120.0] * 16, gaps, [2.1, 1.9, 1.9] + [4.3] * 16, [2, 4, 4] + [8] * 16)


def nine_axles(steer, drive, trailer):
    """Tractor with tandem drive, jeep of three axles, lowbed with three."""
    gaps = [4.5, 1.35, 4.3, 1.4, 1.4, 10.6, 1.4, 1.4]
    return axles([steer, drive, drive] + [trailer] * 6, gaps, [2.1] + [1.9] * 8, [2] + [4] * 8)


def five_axles():
    """Tractor with tandem drive and a semi-trailer with two axles, 46 t."""
    return axles([67.0, 96.0, 96.0, 96.0, 96.0], [3.6, 1.35, 6.65, 1.35], [2.1] + [1.9] * 4, [2] + [4] * 4)


FORWARD, REVERSE = "TRAVEL_DIRECTION_FORWARD", "TRAVEL_DIRECTION_REVERSE"


def on(number, direction=None, leg=None):
    """A crossing over a structure."""
    return crossing(number, "CROSSING_RELATION_ON", direction, leg)


def under(number, leg=None):
    """A crossing beneath a structure."""
    return crossing(number, "CROSSING_RELATION_UNDER", None, leg)


def crossing(number, relation, direction, leg):
    """A crossing."""
    found = {"structure": "structures/" + number, "relation": relation}
    if direction:
        found["direction"] = direction
    if leg:
        found["legId"] = leg
    return found


def application(reference, title, kind, first, last, trips, configurations, crossings):
    """An application."""
    def day(d):
        return {"year": d[0], "month": d[1], "day": d[2]}
    return {"schema": "permitscreen/application/1", "application": {
        "reference": reference, "title": title, "permitKind": "PERMIT_KIND_" + kind, "travelFrom": day(first), "travelTo": day(last),
        "trips": trips, "configurations": configurations, "route": {"crossingList": {"crossings": crossings}}}}


APPLICATIONS = {
    "01-reactor-vessel-13-axles.json": application(
        "2027-0011", "Reactor vessel on 13 axles, 115 t, one trip along road P14", "SPECIAL_SINGLE_TRIP",
        (2027, 1, 12), (2027, 1, 16), 1,
        [configuration("loaded", "Loaded", "13-axle combination", thirteen_axles(), 3.05, 4.2, 4.45)],
        [on(f"P14-{km}", FORWARD) for km in ("0032", "0087", "0145", "0190", "0236", "0310", "0388")]),
    "02-transformer-19-axles.json": application(
        "2027-0014", "Transformer on a 19-axle dual-lane trailer, 220 t, one trip from road P14 to the end of road P31",
        "SPECIAL_SINGLE_TRIP", (2027, 1, 19), (2027, 1, 30), 1,
        [configuration("loaded", "Loaded", "19-axle dual-lane combination", nineteen_axles(), 4.9, 5.2, 4.85)],
        [on("P14-0087", REVERSE), on("P14-0032", REVERSE)]
        + [on(f"P31-{km}", FORWARD) for km in ("0021", "0074", "0118", "0163", "0202")]),
    "03-excavator-9-axles.json": application(
        "2027-0018", "Excavator on a 9-axle lowbed, 75 t out, 27 t back, twelve trips", "SPECIAL_MULTIPLE_TRIPS",
        (2027, 1, 4), (2027, 3, 31), 12,
        [configuration("loaded", "Loaded, outwards", "9-axle lowbed, loaded", nine_axles(60.0, 85.0, 84.0), 2.6, 3.6, 4.3, ["out"]),
         configuration("empty", "Empty, on the way back", "9-axle lowbed, empty", nine_axles(54.0, 42.0, 21.0), 2.6, 2.75, 3.3, ["back"])],
        [on("P14-0145", REVERSE, "out")]
        + [on(f"P31-{km}", FORWARD, "out") for km in ("0074", "0118", "0163", "0202")]
        + [on(f"P31-{km}", REVERSE, "back") for km in ("0202", "0163", "0118")]),
    "04-timber-5-axles-annual.json": application(
        "2027-0023", "Timber combination of 46 t, 5 axles, annual permit for the whole of road P14", "ROUTINE",
        (2027, 1, 1), (2027, 12, 31), 400,
        [configuration("loaded", "Loaded", "5-axle combination", five_axles(), 2.5, 2.55, 4.0)],
        [on(f"P14-{km}") for km in ("0032", "0087", "0145", "0190", "0236")] + [under("P31-0118")]
        + [on(f"P14-{km}") for km in ("0310", "0388")]),
}
