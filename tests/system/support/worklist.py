"""A work list for the records, always the same: an import in pieces, single revisions, a policy through its states, another import. Each request
has its id and its content from the beginning, so that it can be sent again after the service was killed."""

import functools
import json
import random
import uuid
from dataclasses import dataclass, field

from . import fleet, stubs
from .program import DEMO, POLICY

ACTOR = "test of kills"
IMPORTED = 2000
IN_A_PIECE = 200
REVISED_AGAIN = range(1000, 1300)
PATIENCE_S = 120
_SEED = 20261201
_POLICY = "policies/under-test"


@dataclass(frozen=True)
class Acknowledged:
    """What an answer promised."""

    resource: str
    version: int
    etag: str = ""
    more: tuple = ()


@dataclass
class Operation:
    """One writing call."""

    label: str
    resource: str
    method: callable  # service -> stub
    build: callable  # service, etags by resource -> request; called once
    read: callable  # answer -> Acknowledged
    revises: bool = True  # makes a revision of `resource`
    removes: bool = False
    versioned: bool = True  # makes a catalogue version
    request: object = field(default=None)

    def begin(self, service, etags):
        """Sends the request, the same one at every try."""
        if self.request is None:
            self.request = self.build(service, etags)
        return self.method(service).future(self.request, metadata=stubs.writing(ACTOR), timeout=PATIENCE_S)


def _id(text):
    return str(uuid.uuid5(uuid.NAMESPACE_URL, f"permitscreen-test/{text}"))


def _message(index, revision=0, new_truss=False):
    return stubs.from_json(fleet.structure(index, revision, new_truss), stubs.Structure())


@functools.lru_cache(maxsize=None)
def _pieces(name, indices, revision):
    """Requests that stage structures; from the second import every other structure has a new truss."""
    found = []
    for at, start in enumerate(range(0, len(indices), IN_A_PIECE)):
        piece = stubs.imports.StageImportPieceRequest(name=name, piece_index=at)
        piece.structures.extend(_message(i, revision, revision > 0 and i % 2 == 0) for i in indices[start:start + IN_A_PIECE])
        found.append(piece)
    return found


def _importing(import_id, indices, revision, reason):
    name = f"imports/{import_id}"
    pieces = _pieces(name, tuple(indices), revision)
    begin = stubs.imports.CreateImportRequest(import_id=import_id, source_fingerprint=f"fleet, revision {revision}", change_reason=reason)
    publish = stubs.imports.PublishImportRequest(name=name, piece_count=len(pieces))

    def progress(answer):
        told = getattr(answer, "import")
        counts = (told.base_version, told.next_piece_index, told.staged_count, told.refused_count, told.added_count, told.revised_count, told.unchanged_count)
        return Acknowledged(told.name, told.published_version, more=(told.state, *counts))

    yield Operation(f"begin {import_id}", name, lambda s: s.imports.CreateImport, lambda *_: begin, progress, revises=False, versioned=False)
    for at, piece in enumerate(pieces):
        yield Operation(f"stage piece {at} of {import_id}", name, lambda s: s.imports.StageImportPiece, lambda *_, p=piece: p, progress, revises=False, versioned=False)
    yield Operation(f"publish {import_id}", name, lambda s: s.imports.PublishImport, lambda *_: publish, progress, revises=False)


def _etag(service, etags, name):
    """The etag that a change rests on: as acknowledged, or else as read."""
    return etags.get(name) or service.catalogue.GetStructure(stubs.catalogue.GetStructureRequest(name=name), timeout=PATIENCE_S).structure.etag


def _structure_read(answer):
    return Acknowledged(answer.structure.name, answer.structure.catalogue_version, answer.structure.etag)


def _update(number, index, revision, new_truss):
    def build(service, etags):
        request = stubs.catalogue.UpdateStructureRequest(
            structure=_message(index, revision, new_truss), request_id=_id(f"update {number}"), change_reason=f"revision {revision} of the test")
        request.structure.etag = _etag(service, etags, fleet.name(index))
        return request

    return Operation(f"update {fleet.name(index)}", fleet.name(index), lambda s: s.catalogue.UpdateStructure, build, _structure_read)


def _create(number, index, revision):
    request = stubs.catalogue.CreateStructureRequest(
        structure=_message(index, revision), structure_id=fleet.name(index).split("/")[1], request_id=_id(f"create {number}"), change_reason="a structure more")
    return Operation(f"create {fleet.name(index)}", fleet.name(index), lambda s: s.catalogue.CreateStructure, lambda *_: request, _structure_read)


def _delete(number, index):
    name = fleet.name(index)

    def build(service, etags):
        return stubs.catalogue.DeleteStructureRequest(name=name, etag=_etag(service, etags, name), request_id=_id(f"delete {number}"), change_reason="taken down")

    return Operation(f"delete {name}", name, lambda s: s.catalogue.DeleteStructure, build, lambda a: Acknowledged(name, a.catalogue_version), revises=False, removes=True)


def _document(version, title):
    policy = json.loads((DEMO / "policies" / f"{POLICY.split('/')[1]}.json").read_text(encoding="utf-8"))["policy"]
    policy.update(name=_POLICY, title=title, documentVersion=version, demonstration=False)
    return stubs.from_json(policy, stubs.Policy())


def _policy_steps():
    """Two documents of a policy: written, revised, confirmed, put in force, withdrawn, followed."""
    def read(answer):
        policy = answer.policy
        return Acknowledged(f"{policy.name}@{policy.document_version}", policy.catalogue_version, policy.etag)

    def step(method, version, make):
        name = f"{_POLICY}@{version}"

        def build(_, etags):
            request = make(name, etags.get(name, ""))
            request.request_id = _id(f"{method} {version}")
            request.change_reason = f"{method} for the test"
            return request

        return Operation(f"{method} {name}", name, lambda s: getattr(s.policies, method), build, read)

    def update(_, etag):
        policy = _document(1, "Revised before it was confirmed")
        policy.etag = etag
        return p.UpdatePolicyRequest(policy=policy)

    def confirm(name, etag):
        request = p.ConfirmPolicyRequest(name=name, etag=etag)
        request.confirmation.person, request.confirmation.reference = "A. Person", "decision 1 of the test"
        request.confirmation.confirmed_on.year, request.confirmation.confirmed_on.month, request.confirmation.confirmed_on.day = 2026, 11, 1
        return request

    def enact(name, etag):
        request = p.EnactPolicyRequest(name=name, etag=etag)
        request.in_force_from.year, request.in_force_from.month, request.in_force_from.day = 2026, 12, 1
        return request

    p = stubs.policy
    return [
        step("CreatePolicy", 1, lambda *_: p.CreatePolicyRequest(policy=_document(1, "First"))),
        step("UpdatePolicy", 1, update),
        step("ConfirmPolicy", 1, confirm),
        step("EnactPolicy", 1, enact),
        step("CreatePolicy", 2, lambda *_: p.CreatePolicyRequest(policy=_document(2, "Second"))),
        step("ConfirmPolicy", 2, confirm),
        step("WithdrawPolicy", 1, lambda name, etag: p.WithdrawPolicyRequest(name=name, etag=etag)),
        step("EnactPolicy", 2, enact),
    ]


def _singles():
    """Sixty revisions, some creations and deletions, a structure that comes back, and the policy between them; in an order that is drawn."""
    draw = random.Random(_SEED)
    revised = draw.sample(range(1000), 45)
    indices = revised + draw.sample(revised, 15)
    rounds = {}
    updates = []
    for number, index in enumerate(indices):
        rounds[index] = rounds.get(index, 0) + 1
        updates.append(_update(number, index, rounds[index], new_truss=number % 3 == 0))
    gone = draw.sample([i for i in range(1400, IMPORTED) if not fleet.shares_truss(i)], 5)
    groups = [updates, _policy_steps()]
    groups += [[_create(i, IMPORTED + i, 1)] for i in range(8)]
    groups += [[_delete(i, index)] for i, index in enumerate(gone)]
    groups[-1].append(_create("again", gone[-1], 3))
    order = [at for at, group in enumerate(groups) for _ in group]
    draw.shuffle(order)
    queues = [iter(group) for group in groups]
    return [next(queues[at]) for at in order]


def make():
    """A fresh work list."""
    return [
        *_importing("first", range(IMPORTED), 0, "the whole fleet"),
        *_singles(),
        *_importing("second", REVISED_AGAIN, 9, "three hundred measured again"),
    ]


def revisions_wanted(operations):
    """How many revisions each structure or document has at the end, counted from the list itself."""
    wanted = {fleet.name(i): 1 for i in range(IMPORTED)}
    for operation in operations:
        if operation.revises:
            wanted[operation.resource] = wanted.get(operation.resource, 0) + 1
    for index in REVISED_AGAIN:
        wanted[fleet.name(index)] += 1
    return wanted
