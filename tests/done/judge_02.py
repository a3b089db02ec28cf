"""Judges the promises of tests/done/02."""

import re
import sys

from promises import CATALOGUE, DATA, FIGURES, GATE, SERVICE, Promise, all_held, gate

KILLS, IN_FLIGHT = 30, 20
REVISIONS_PER_SECOND, OVERLAPPING = 200, 500
STRUCTURES = 100_000
FAULT = "snapshot taken before the version is read"


def kills():
    p = Promise(f"{KILLS} kills of the process group while 2,000 structures are imported and computed, at least {IN_FLIGHT} with work in flight: same catalogue, versions and line bytes as "
                "undisturbed; all acknowledged is there; retries made nothing twice")
    p.script("kills")
    p.least("kills", KILLS, "kills")
    p.least("kills.in_flight", IN_FLIGHT, "with work in flight")
    p.least("kills.line_blobs", 1, "line blobs equal")
    p.seen(f"kills: {KILLS} kills")
    lines = re.findall(r"(?m)^kill +\d+ - .*: (?:in flight|idle)$", GATE)
    p.needs(f"{len(lines)} kills told in the log", len(lines) >= KILLS)
    return p


def current():
    p = Promise(f"at least {REVISIONS_PER_SECOND} revisions a second flip the verdict of a route that is screened: {OVERLAPPING} calls at least overlap a commit, each names one version, "
                "not older than the newest before the call, and has its verdict; the build with a stale snapshot fails")
    p.tests(SERVICE + "Currency.", CATALOGUE + "Snapshots.")
    p.least("currency.revisions_per_second", REVISIONS_PER_SECOND, "revisions a second")
    p.least("currency.calls_overlapping_a_commit", OVERLAPPING, "calls overlapped a commit")
    p.least("currency.answers_judged", OVERLAPPING, "answers judged")
    red = re.search(rf"(?m)^{re.escape(FAULT)}\tred\t(.+)$", GATE)
    p.needs(f"seeded fault \"{FAULT}\": not red", red, f"{FAULT}: red, {red[1]}" if red else None)
    return p


def keys():
    p = Promise("the key changes with each single change of an input and with no change of another field; renaming recomputes nothing; another order gives the same lines under the same names")
    p.tests(SERVICE + "Lines.KeyEnumerationTests.", SERVICE + "Lines.RenamingTests.", SERVICE + "Lines.GoldenLinesTests.", CATALOGUE + "Lines.")
    p.count("lines.key_enumeration[fields of the contract]", 1, "fields enumerated")
    p.count("lines.key_enumeration[changes]", 1, "changes")
    p.count("lines.key_enumeration[changes of the key]", 1, "changed the key")
    p.count("lines.key_enumeration[changes without change of the key]", 1, "left it")
    return p


def line_bytes():
    p = Promise("line bytes are equal with AVX-512 off, with AVX2 off and with neither off")
    p.script("line_bytes")
    p.least("line_bytes.blobs", 300, "blobs")
    p.least("line_bytes.settings", 3, "settings")
    p.told("line_bytes.machine", "this machine:")
    p.seen("lines, AVX-512 switched off: the service's own words say that it took effect", "lines, AVX2 switched off: the service's own words say that it took effect")
    return p


def damage():
    p = Promise("a flipped bit in every region of a line blob, of the segment file and of a database page is noticed and never used")
    p.tests(CATALOGUE + "Lines.", CATALOGUE + "Snapshots.", DATA)
    p.count("lines.blob_flips[{}]", 1, "flips in line blobs")
    p.count("segment.flips[{}]", 1, "in segment files")
    p.count("store.page_flips[{}]", 1, "in database pages")
    p.script("damage")
    p.script("trouble")
    return p


def large():
    p = Promise(f"{STRUCTURES:,} small structures import with a progress bar; a break resumes; the second import of the same files makes no version")
    p.script("large_import")
    p.least("large_import.structures", STRUCTURES, "structures")
    p.least("large_import.items_per_second", 1, "a second, break and kill included")
    p.least("large_import.seconds", 0, "s")
    p.least("large_import.again_seconds", 0, "s the second time")
    p.told("large_import.service_largest_memory_mb", "largest memory of the service, MB:")
    p.seen("terminal: a bar with items done, rate and time left", "large import: it goes on where it was broken off", "large import: the same files again make no version",
           "large import, broken off: lines of progress with rate and time left")
    return p


def gates():
    p = Promise("dotnet test and .ci/run pass")
    gate(p)
    told = [value for key, value in FIGURES if key == "seeded-faults"]
    p.said.append(f"seeded faults {'; '.join(told) or 'not run'}")
    return p


if __name__ == "__main__":
    sys.exit(0 if all_held((kills, current, keys, line_bytes, damage, large, gates)) else 1)
