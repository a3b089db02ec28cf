"""Works through a list against a service that may be killed at any time, and notes every acknowledgement."""

import time

import grpc

from . import stubs

WAIT_S = 300


class CutOff(Exception):
    """The service went away."""


class Driver:
    """Sends each operation until it is acknowledged. What is in flight can be looked at from another thread."""

    def __init__(self, operations):
        self.operations = operations
        self.acknowledged = []
        self.calling = None
        self.sent = 0
        self.repeated = []
        self._etags = {}

    @property
    def left(self):
        return len(self.operations) - len(self.acknowledged)

    @property
    def left_of_first_import(self):
        """Operations until the first import is published, that one included."""
        publish = next(at for at, operation in enumerate(self.operations) if operation.label.startswith("publish"))
        return publish + 1 - len(self.acknowledged)

    @property
    def published(self):
        """Whether the first import is."""
        return self.left_of_first_import <= 0

    def repeat_last(self, service):
        """Sends what was acknowledged last once more, as a caller does whose answer was lost on its way; the answer must be the same.

        An answer about an import tells how far it is, and may rightly differ once what comes next was sent."""
        last = len(self.acknowledged) - 1
        if last < 0:
            return
        operation, noted = self.operations[last], self.acknowledged[last]
        if operation.versioned or not self.left or self.operations[last + 1].request is None:
            again = operation.read(self._call(service, operation))
            if again != noted:
                self.repeated.append(f"{operation.label}: acknowledged {noted}, and when sent again {again}")

    def run(self, service, after_call=None, in_call=None):
        """Goes on from where it is. `after_call` is called after each acknowledgement, `in_call` right after a request was sent."""
        while self.left:
            operation = self.operations[len(self.acknowledged)]
            self._note(operation, self._call(service, operation, in_call))
            if after_call:
                after_call()

    def wait_for_lines(self, service):
        """Waits until no line is left to be computed."""
        until = time.monotonic() + WAIT_S
        while True:
            try:
                backlog = service.maintenance.GetBacklog(stubs.maintenance.GetBacklogRequest(), timeout=60).backlog
            except grpc.RpcError as error:
                raise CutOff(error) from error
            if backlog.pending_count == 0:
                return backlog
            if backlog.failures or time.monotonic() > until:
                raise RuntimeError(f"the lines do not become ready: {backlog}")
            time.sleep(0.05)

    def _call(self, service, operation, in_call=None):
        self.calling = operation.label
        self.sent += 1
        try:
            call = operation.begin(service, self._etags)
            if in_call:
                in_call()
            return call.result()
        except grpc.RpcError as error:
            if error.code() != grpc.StatusCode.UNAVAILABLE:
                raise RuntimeError(f"{operation.label}: {error.code().name}: {error.details()}") from error
            raise CutOff(error) from error
        finally:
            self.calling = None

    def _note(self, operation, answer):
        noted = operation.read(answer)
        self.acknowledged.append(noted)
        if noted.etag:
            self._etags[noted.resource] = noted.etag
        elif operation.removes:
            self._etags.pop(noted.resource, None)
