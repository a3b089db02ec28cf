"""Bits flipped in the files of the records, a service started on them: the answer is the undamaged one or a clear error, never another.

Every bit of every page is tried by the unit tests; here real files and a real service, one bit a region.
"""

import random
import struct
import tempfile
from concurrent.futures import ThreadPoolExecutor

from support import checks, figures, records, stubs
from support.program import free_port, recording
from support.undamaged import Undamaged, answers, flip, flip_in_file, other, said, stop, wait_for_lines

SEED = 20261201
PAGE = 4096
PAGES = 14
AT_ONCE = 2
BAD_INPUT = 2
CLEAR = ("DATA_LOSS", "UNAVAILABLE")
NOTICED = ("refused at the start", "told by an error", "found by verification, and not used before")


def blob_regions(blob):
    """Regions of a blob, by the layout that LineBlob writes: name, first byte, bytes."""
    text = struct.unpack_from("<i", blob, 12)[0]
    at = 16 + text
    found = [("mark", 0, 8), ("format", 8, 4), ("length of the version", 12, 4), ("version", 16, text), ("key", at, 32)]
    found += [("residual", at + 32, 8), ("equilibrium", at + 40, 8), ("correction", at + 48, 8), ("members", at + 56, 4), ("supports", at + 60, 4)]
    line = at + 64
    points = struct.unpack_from("<i", blob, line)[0]
    found += [("points of a line", line, 4), ("slope", line + 4, 8), ("places", line + 12, 8 * points)]
    found += [("ordinates before", line + 12 + 8 * points, 8 * points), ("ordinates after", line + 12 + 16 * points, 8 * points)]
    rest = line + 12 + 24 * points
    return found + [("other lines", rest, len(blob) - 32 - rest), ("checksum", len(blob) - 32, 32)]


def segment_regions(data):
    """Regions of a segment file, by the layout that SegmentFile writes."""
    found = [("mark", 0, 8), ("format", 8, 4), ("timeline", 12, 16), ("version", 28, 8)]
    end = len(data) - 44
    state = 36
    block = struct.unpack_from("<i", data, end)[0]
    assert block == 0, "the end mark is not where it is expected"
    header = next(h for h in range(state, 200) if 0 < struct.unpack_from("<i", data, h)[0] == end - h - 36)
    found += [("state", state, header - 48 - state), ("numbers of items", header - 48, 16), ("checksum of the header", header - 32, 32)]
    found += [("length of a block", header, 4), ("checksum of a block", header + 4, 32)]
    payload = header + 36
    third = (end - payload) // 3
    found += [(f"content, part {part}", payload + (part - 1) * third, third) for part in (1, 2, 3)]
    return found + [("end mark", end, 4), ("number of revisions", end + 4, 8), ("checksum of the end", end + 12, 32)]


def damages_of_lines(undamaged, draw):
    """Rounds of damage: key -> (what, bytes). Each round damages each truss's blob in another way."""
    kinds = [name for name, _, _ in blob_regions(next(iter(undamaged.lines.values())))] + ["cut short", "empty", "another truss's"]
    keys = sorted(undamaged.lines)
    rounds = []
    for start in range(0, len(kinds), len(keys)):
        batch = {}
        for key, kind in zip(keys, kinds[start:start + len(keys)]):
            blob = undamaged.lines[key]
            regions = {name: (at, size) for name, at, size in blob_regions(blob)}
            if kind in regions:
                at, size = regions[kind]
                batch[key] = (kind, flip(blob, at + draw.randrange(size), draw.randrange(8)))
            else:
                stranger = undamaged.lines[keys[(keys.index(key) + 1) % len(keys)]]
                batch[key] = (kind, {"cut short": blob[:-5], "empty": b"", "another truss's": stranger}[kind])
        rounds.append(batch)
    return rounds


def lines(check, undamaged):
    rounds = damages_of_lines(undamaged, random.Random(SEED))
    count = 0
    for batch in rounds:
        for running in (False, True):
            with undamaged.copy() as folder:
                file = folder / records.LINES
                change = [(blob, key) for key, (_, blob) in batch.items()]
                if not running:
                    changed = [records.change(file, "UPDATE lines SET blob = ? WHERE key = ?", *c) for c in change]
                port = free_port()
                with recording(port, folder) as service, stubs.Service(port) as client:
                    service.wait_until_ready()
                    if running:
                        changed = [records.change(file, "UPDATE lines SET blob = ? WHERE key = ?", *c) for c in change]
                    found = answers(client, undamaged.structures)
                    backlog = wait_for_lines(client)
                    stop(service)
                what = f"a line's {', '.join(kind for kind, _ in batch.values())}"
                when = "while the service runs" if running else "before it starts"
                check.equal(f"damage {when}: every blob was changed", [1] * len(batch), changed)
                check.none(f"damage {when}: {what}: every answer is the undamaged one", other(undamaged.answers, found))
                check.equal(f"damage {when}: the backlog counts the blobs found damaged", len(batch), backlog.damaged_count)
                check.that(f"damage {when}: the blobs are computed anew, byte for byte", records.lines(folder) == undamaged.lines)
                count += len(batch)
    figures.note("damage.line_blobs", count)


def verified(check, undamaged):
    """VerifyRecords finds a damaged line, puts it on the backlog, and is content afterwards."""
    key, blob = sorted(undamaged.lines.items())[0]
    with undamaged.copy() as folder:
        records.change(folder / records.LINES, "UPDATE lines SET blob = ? WHERE key = ?", flip(blob, len(blob) // 2, 3), key)
        port = free_port()
        with recording(port, folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            results = []
            for _ in range(2):
                *_, last = client.history.VerifyRecords(stubs.history.VerifyRecordsRequest(), timeout=120)
                results.append((last.result.sound, last.result.problem_count))
                wait_for_lines(client)
            check.equal("verification: a damaged line is a problem once, and is mended", [(False, 1), (True, 0)], results)
            stop(service)
        check.that("verification: the mended line has the undamaged bytes", records.lines(folder) == undamaged.lines)


def _segment_case(undamaged, name, damage):
    with undamaged.copy() as folder:
        path = folder / records.SEGMENT
        path.write_bytes(damage(path.read_bytes()))
        port = free_port()
        with recording(port, folder) as service, stubs.Service(port) as client:
            service.wait_until_ready()
            wrong = other(undamaged.answers, answers(client, undamaged.structures))
            told = said(service, r"segment file .* is not used: .*written anew")
            stop(service)
        return name, wrong, told, path.read_bytes() == (undamaged.folder / records.SEGMENT).read_bytes()


def segment(check, undamaged):
    draw = random.Random(SEED)
    data = (undamaged.folder / records.SEGMENT).read_bytes()
    cases = []
    for name, at, size in segment_regions(data):
        place, bit = at + draw.randrange(size), draw.randrange(8)
        cases.append((name, lambda d, p=place, b=bit: flip(d, p, b)))
    cases += [("end cut off", lambda d: d[:-7]), ("all but nothing", lambda d: d[:5])]
    with ThreadPoolExecutor(AT_ONCE) as pool:
        for name, wrong, told, rebuilt in pool.map(lambda c: _segment_case(undamaged, *c), cases):
            check.none(f"segment file, {name}: every answer is the undamaged one", wrong)
            check.that(f"segment file, {name}: the log says that it is not used and written anew", told)
            check.that(f"segment file, {name}: it is whole again afterwards", rebuilt)
    figures.note("damage.segment_regions", len(cases))


def _page_case(undamaged, page, at, bit, with_segment):
    """How a service fares on a damaged page: a word of NOTICED or "no content there", or what is wrong."""
    with undamaged.copy() as folder:
        flip_in_file(folder / records.CATALOGUE, page * PAGE + at, bit)
        harmless = records.content(folder / records.CATALOGUE) == records.content(undamaged.folder / records.CATALOGUE)
        if not with_segment:
            (folder / records.SEGMENT).unlink()
        port = free_port()
        with recording(port, folder) as service:
            if not service.becomes_ready():
                code = service.wait()
                clear = code == BAD_INPUT and records.CATALOGUE in service.output and "damaged" in service.output and "   at PermitScreen" not in service.output
                return "refused at the start" if clear else f"exit code {code}: {service.output[-500:]}"
            with stubs.Service(port) as client:
                found = answers(client, undamaged.structures)
                if wrong := other(undamaged.answers, found, CLEAR):
                    return "; ".join(wrong)
                if other(undamaged.answers, found):
                    return "told by an error"
                *_, last = client.history.VerifyRecords(stubs.history.VerifyRecordsRequest(), timeout=120)
                if not last.result.sound:
                    return "found by verification, and not used before"
                return "no content there" if harmless else "content changed, and nobody noticed"


def pages(check, undamaged):
    draw = random.Random(SEED)
    count = (undamaged.folder / records.CATALOGUE).stat().st_size // PAGE
    drawn = [0, *sorted(draw.sample(range(1, count), min(PAGES, count) - 1))]
    data = (undamaged.folder / records.CATALOGUE).read_bytes()
    cases = []
    for page in drawn:
        # Where there are only zeros there is mostly no content; of the first page, its head.
        used = [at for at in range(100 if page == 0 else PAGE) if data[page * PAGE + at]]
        cases.append((page, draw.choice(used), draw.randrange(8), len(cases) % 2 == 0))
    outcomes = {}
    with ThreadPoolExecutor(AT_ONCE) as pool:
        for (page, at, bit, _), outcome in zip(cases, pool.map(lambda c: _page_case(undamaged, *c), cases)):
            outcomes[outcome] = outcomes.get(outcome, 0) + 1
            good = outcome in NOTICED or outcome == "no content there"
            check.that(f"database, bit {bit} of byte {at} of page {page + 1} of {count}: {outcome if good else 'not noticed, or an unclear end'}", good, outcome)
    noticed = sum(outcomes.get(word, 0) for word in NOTICED)
    check.that("database: damage is noticed", noticed > 0, outcomes)
    figures.note("damage.pages", len(cases))
    figures.note("damage.pages_noticed", noticed)


def everything(check):
    with tempfile.TemporaryDirectory(prefix="permitscreen-damage-") as folder:
        undamaged = Undamaged(folder)
        check.that("damage: the demo's records answer", not [a for a in undamaged.answers.values() if a.isupper()], undamaged.answers)
        check.all((lines, verified, segment, pages), undamaged)


if __name__ == "__main__":
    checks.run(everything)
