"""Starts the service for node_client.mjs, whose checks and counts are printed as they are."""

import subprocess
import sys
from pathlib import Path

from support.program import free_port, serving

if __name__ == "__main__":
    port = free_port()
    with serving(port) as service:
        service.wait_until_ready()
        sys.exit(subprocess.run(["node", Path(__file__).with_suffix(".mjs"), f"127.0.0.1:{port}"], timeout=120, check=False).returncode)
