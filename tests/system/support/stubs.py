"""Python stubs made from the protos by the distribution's protoc, and readers of rich errors. Nothing of the product's own code is used."""

import os
import subprocess
import sys
import tempfile
from pathlib import Path

from .program import ROOT

_FOLDER = tempfile.TemporaryDirectory(prefix="permitscreen-stubs-")  # pylint: disable=consider-using-with
_OUT = Path(_FOLDER.name)


def _common_protos():
    """google/rpc as the package carries it that the product's own build restores."""
    version = (ROOT / "Directory.Packages.props").read_text(encoding="utf-8").split('"Google.Api.CommonProtos" Version="')[1].split('"')[0]
    packages = os.environ.get("NUGET_PACKAGES") or subprocess.run(
        ["dotnet", "nuget", "locals", "global-packages", "--list"], capture_output=True, text=True, check=True).stdout.split(": ", 1)[1].strip()
    return Path(packages) / "google.api.commonprotos" / version / "content" / "protos"


def _make():
    protos = ROOT / "protos"
    third = protos / "third_party"
    common = _common_protos()
    files = [str(p.relative_to(protos)) for p in sorted((protos / "permitscreen").rglob("*.proto"))]
    files += [str(p.relative_to(third)) for p in sorted(third.rglob("*.proto"))]
    files += ["google/rpc/status.proto", "google/rpc/error_details.proto"]
    plugin = subprocess.run(["which", "grpc_python_plugin"], capture_output=True, text=True, check=True).stdout.strip()
    subprocess.run(
        ["protoc", f"-I{protos}", f"-I{third}", f"-I{common}", f"--python_out={_OUT}", f"--grpc_python_out={_OUT}",
         f"--plugin=protoc-gen-grpc_python={plugin}", *files], check=True)
    sys.path.insert(0, str(_OUT))


_make()

# pylint: disable=wrong-import-position,import-error
import grpc  # noqa: E402
from google.protobuf import json_format  # noqa: E402
from google.rpc import error_details_pb2, status_pb2  # noqa: E402
from permitscreen.v1 import catalogue_service_pb2 as catalogue  # noqa: E402,F401
from permitscreen.v1 import catalogue_service_pb2_grpc, history_service_pb2_grpc, import_service_pb2_grpc  # noqa: E402
from permitscreen.v1 import history_service_pb2 as history  # noqa: E402,F401
from permitscreen.v1 import import_service_pb2 as imports  # noqa: E402,F401
from permitscreen.v1 import maintenance_service_pb2 as maintenance  # noqa: E402,F401
from permitscreen.v1 import maintenance_service_pb2_grpc, policy_service_pb2_grpc, screening_service_pb2_grpc  # noqa: E402
from permitscreen.v1 import policy_service_pb2 as policy  # noqa: E402,F401
from permitscreen.v1 import screening_service_pb2 as screening  # noqa: E402
from permitscreen.v1.policy_pb2 import Policy  # noqa: E402,F401
from permitscreen.v1.structure_pb2 import Structure  # noqa: E402,F401


class Service:
    """Stubs of all services at one address."""

    def __init__(self, port):
        self.channel = grpc.insecure_channel(f"127.0.0.1:{port}", options=[("grpc.max_receive_message_length", 64 * 1024 * 1024)])
        self.catalogue = catalogue_service_pb2_grpc.CatalogueServiceStub(self.channel)
        self.policies = policy_service_pb2_grpc.PolicyServiceStub(self.channel)
        self.screening = screening_service_pb2_grpc.ScreeningServiceStub(self.channel)
        self.imports = import_service_pb2_grpc.ImportServiceStub(self.channel)
        self.history = history_service_pb2_grpc.HistoryServiceStub(self.channel)
        self.maintenance = maintenance_service_pb2_grpc.MaintenanceServiceStub(self.channel)
        # grpc.health.v1.Health/Check with an empty request; its answer is one field, the status: 1 SERVING, 2 NOT_SERVING.
        self._health = self.channel.unary_unary("/grpc.health.v1.Health/Check")

    def __enter__(self):
        return self

    def __exit__(self, *_):
        self.channel.close()

    def health(self, timeout=10):
        """SERVING, NOT_SERVING, or the code of an error."""
        try:
            answer = self._health(b"", timeout=timeout, wait_for_ready=True)
        except grpc.RpcError as error:
            return error.code().name
        return {b"\x08\x01": "SERVING", b"\x08\x02": "NOT_SERVING"}.get(answer, repr(answer))


def request(application, policy_name, as_of, **more):
    """A request to screen, from JSON, in the FULL view where nothing else is said."""
    year, month, day = map(int, as_of.split("-"))
    whole = {"application": application, "policy": policy_name, "asOfDate": {"year": year, "month": month, "day": day}, "view": "SCREENING_VIEW_FULL", **more}
    return json_format.ParseDict(whole, screening.ScreenApplicationRequest())


def as_json(message):
    return json_format.MessageToDict(message)


def from_json(value, message):
    """A message from the contract's JSON."""
    return json_format.ParseDict(value, message)


def writing(actor):
    """Metadata of a call that changes records: who makes the change."""
    return (("x-permitscreen-actor", actor),)


def refused(call):
    """The error of a call that must fail; None where it answers."""
    try:
        call()
    except grpc.RpcError as error:
        return error
    return None


def details(error, kind):
    """A google.rpc detail of an error, read from grpc-status-details-bin; None where there is none."""
    for key, value in error.trailing_metadata() or ():
        if key == "grpc-status-details-bin":
            status = status_pb2.Status.FromString(value)
            for detail in status.details:
                if detail.Is(kind.DESCRIPTOR):
                    found = kind()
                    detail.Unpack(found)
                    return found
    return None


BadRequest = error_details_pb2.BadRequest
ResourceInfo = error_details_pb2.ResourceInfo
PreconditionFailure = error_details_pb2.PreconditionFailure
