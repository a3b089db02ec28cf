"""General arrangements of trusses, drawn joint by joint. Lower joints L0, L1, ...; upper joints U0, U1, ... at the same x."""

END_FLOOR_BEAM = {"kind": "DECK_END_KIND_END_FLOOR_BEAM"}


def seated(tip_m):
    """End stringers that reach to a seat on the abutment."""
    return {"kind": "DECK_END_KIND_SEATED_ON_ABUTMENT", "tipM": tip_m}


def overhanging(tip_m):
    """End stringers that overhang the end panel point."""
    return {"kind": "DECK_END_KIND_OVERHANGING_STRINGERS", "tipM": tip_m}


def joints(letter, first, last, panel, heights):
    """Joints of one chord; heights is a number or one value per joint."""
    count = last - first + 1
    ys = [heights] * count if isinstance(heights, (int, float)) else heights
    assert len(ys) == count
    return [{"name": f"{letter}{i}", "xM": round(i * panel, 3), "yM": y} for i, y in zip(range(first, last + 1), ys)]


def bar(a, b, role=None):
    """A member from a to b."""
    member = {"name": a + b, "startNode": a, "endNode": b}
    if role:
        member["role"] = role
    return member


def chord(letter, first, last, leave_out=()):
    """The panels of one chord."""
    return [bar(f"{letter}{i}", f"{letter}{i + 1}") for i in range(first, last) if i not in leave_out]


def verticals(first, last):
    """Verticals U–L."""
    return [bar(f"U{i}", f"L{i}") for i in range(first, last + 1)]


def end_posts(last):
    """End posts of a truss that carries its deck between inclined ends."""
    return [bar("L0", "U1", "endpost"), bar(f"U{last - 1}", f"L{last}", "endpost")]


def simple_supports(first, last):
    """A pin and a rocker."""
    return [{"name": "start", "node": first, "holdsHorizontal": True, "holdsVertical": True},
            {"name": "end", "node": last, "holdsVertical": True}]


def sketch(nodes, members, supports, points, start=END_FLOOR_BEAM, end=END_FLOOR_BEAM, unit_id="span-1", title="", chainage=0.0):
    """A truss unit before it has sections."""
    return {"unit_id": unit_id, "title": title, "start": chainage, "nodes": nodes, "members": members, "supports": supports,
            "deck": {"panelPoints": points, "start": start, "end": end}}


def through_frame(count, panel, heights):
    """Joints and chords of a through truss with inclined end posts."""
    nodes = joints("L", 0, count, panel, 0.0) + joints("U", 1, count - 1, panel, heights)
    return nodes, chord("L", 0, count) + chord("U", 1, count - 1) + end_posts(count)


def pratt(count, panel, heights, crossed=(), **names):
    """Through Pratt truss of an even number of panels; `crossed` panels have both diagonals."""
    nodes, members = through_frame(count, panel, heights)
    for i in range(1, count - 1):
        falling, rising = bar(f"U{i}", f"L{i + 1}"), bar(f"L{i}", f"U{i + 1}")
        members += [falling, rising] if i in crossed else [falling if i < count / 2 else rising]
    members += verticals(1, count - 1)
    return sketch(nodes, members, simple_supports("L0", f"L{count}"), [f"L{i}" for i in range(count + 1)], **names)


def howe(count, panel, heights, **names):
    """Through Howe truss of an even number of panels."""
    nodes, members = through_frame(count, panel, heights)
    for i in range(1, count - 1):
        members.append(bar(f"L{i}", f"U{i + 1}") if i < count / 2 else bar(f"U{i}", f"L{i + 1}"))
    members += verticals(1, count - 1)
    return sketch(nodes, members, simple_supports("L0", f"L{count}"), [f"L{i}" for i in range(count + 1)], **names)


def warren_with_verticals(count, panel, heights, supports=None, **names):
    """Through Warren truss with a vertical at each joint, even number of panels."""
    nodes, members = through_frame(count, panel, heights)
    for i in range(1, count - 1):
        members.append(bar(f"U{i}", f"L{i + 1}") if i % 2 else bar(f"L{i}", f"U{i + 1}"))
    members += verticals(1, count - 1)
    supports = supports or simple_supports("L0", f"L{count}")
    return sketch(nodes, members, supports, [f"L{i}" for i in range(count + 1)], **names)


def warren(count, panel, height, **names):
    """Through Warren truss without verticals: upper joint Ui stands half a panel before lower joint Li."""
    nodes = joints("L", 0, count, panel, 0.0)
    nodes += [{"name": f"U{i}", "xM": round((i - 0.5) * panel, 3), "yM": height} for i in range(1, count + 1)]
    members = chord("L", 0, count) + chord("U", 1, count)
    for i in range(1, count + 1):
        members += [bar(f"L{i - 1}", f"U{i}", "endpost" if i == 1 else None), bar(f"U{i}", f"L{i}", "endpost" if i == count else None)]
    return sketch(nodes, members, simple_supports("L0", f"L{count}"), [f"L{i}" for i in range(count + 1)], **names)


def deck_pratt_seated(count, panel, height, **names):
    """Deck Pratt truss on inclined end posts; the end stringers are seated on the abutments."""
    found = pratt(count, panel, height, **names)
    found["deck"] = {"panelPoints": [f"U{i}" for i in range(1, count)], "start": seated(0.0), "end": seated(round(count * panel, 3))}
    return found


def underslung_pratt(count, panel, depth, overhang, **names):
    """Deck truss hung below its bearings at U0 and Un; the stringers overhang both ends."""
    nodes = joints("U", 0, count, panel, 0.0) + joints("L", 1, count - 1, panel, -depth)
    members = chord("U", 0, count) + chord("L", 1, count - 1)
    members += [bar("U0", "L1", "diagonal"), bar(f"L{count - 1}", f"U{count}", "diagonal")]
    for i in range(1, count - 1):
        members.append(bar(f"U{i}", f"L{i + 1}") if i < count / 2 else bar(f"L{i}", f"U{i + 1}"))
    members += verticals(1, count - 1)
    return sketch(nodes, members, simple_supports("U0", f"U{count}"), [f"U{i}" for i in range(count + 1)],
                  start=overhanging(-overhang), end=overhanging(round(count * panel + overhang, 3)), **names)


def cantilever(panel, heights, **names):
    """Through cantilever: anchor spans of 5 panels, arms of 2, a suspended span of 4.

    The upper bars U7U8 and U10U11 are left out, which makes hinges of the lower joints L7 and L11.
    """
    nodes = joints("L", 0, 18, panel, 0.0) + joints("U", 1, 17, panel, heights)
    members = chord("L", 0, 18) + chord("U", 1, 17, leave_out=(7, 10)) + end_posts(18)
    left = [("U1", "L2"), ("U2", "L3"), ("L3", "U4"), ("L4", "U5"), ("U5", "L6"), ("U6", "L7"), ("L7", "U8"), ("U8", "L9")]
    for a, b in left:
        members.append(bar(a, b))
    for a, b in reversed(left):
        mirrored = [f"{b[0]}{18 - int(b[1:])}", f"{a[0]}{18 - int(a[1:])}"]
        members.append(bar(*mirrored))
    members += verticals(1, 17)
    supports = [{"name": "start", "node": "L0", "holdsVertical": True},
                {"name": "pier-1", "node": "L5", "holdsHorizontal": True, "holdsVertical": True},
                {"name": "pier-2", "node": "L13", "holdsVertical": True},
                {"name": "end", "node": "L18", "holdsVertical": True}]
    return sketch(nodes, members, supports, [f"L{i}" for i in range(19)], **names)
