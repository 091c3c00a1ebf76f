"""Sweep files: from a path to a `Sweep`, whatever the format."""

import hashlib
import re
from pathlib import Path

from feedpoint.errors import SweepRefused, WrongUsage
from feedpoint.finding import Finding
from feedpoint.sweep.checks import magnitude_finding
from feedpoint.sweep.record import Sweep
from feedpoint.sweep.text import decoded, read_bytes
from feedpoint.sweep.touchstone import NetworkData, parse_touchstone

_TOUCHSTONE_NAME = re.compile(r".*\.(?:[szy](?P<ports>[1-9][0-9]?)p|ts)", re.IGNORECASE | re.DOTALL | re.ASCII)


def read_sweep(path: str | Path, *, port: int | None = None) -> Sweep:
    """
    Read a sweep file; the file is never changed.

    Parameters
    ----------
    path : str or Path
        A Touchstone file: ``.s1p``, ``.z1p``, ``.y1p``, ``.s2p`` ..., ``.ts``.
    port : int, optional
        Which port's reflection to take from a file with several (counts from 1). Without it port 1 is taken, with a
        finding.

    Raises
    ------
    SweepRefused
        If the file cannot be read or is no sweep; names file and line.
    WrongUsage
        If the file has no such port.
    """
    path = Path(path)
    content = read_bytes(path)
    network = parse_touchstone(decoded(content, str(path)), source=str(path), ports=ports_of_name(path))
    return _one_port(network, str(path), hashlib.sha256(content).hexdigest(), port)


def read_network(path: Path) -> NetworkData:
    """Read a Touchstone file with all of its ports; `SweepRefused` as in `read_sweep`."""
    return parse_touchstone(decoded(read_bytes(path), str(path)), source=str(path), ports=ports_of_name(path))


def ports_of_name(path: Path) -> int | None:
    """Return the number of ports that a Touchstone file's name states, None for ``.ts``."""
    match = _TOUCHSTONE_NAME.fullmatch(path.name)
    if match is None:
        raise SweepRefused(
            f"unknown kind of file {path.suffix or '(no ending)'!r}; expected a Touchstone file: .s1p, .z1p, .y1p, "
            ".s2p ... or .ts. Export the sweep as Touchstone.",
            source=str(path),
        )
    return int(match["ports"]) if match["ports"] else None


def _one_port(network: NetworkData, source: str, sha256: str, port: int | None) -> Sweep:
    ports = network.reference_ohm.size
    chosen = 1 if port is None else port
    if not 1 <= chosen <= ports:
        raise WrongUsage(f"there is no port {chosen}; the file has {ports}.", source=source)
    findings = list(network.findings)
    if port is None and ports > 1:
        message = f"{source}: the file has {ports} ports; the reflection of port 1 was taken. Choose with --port."
        findings.append(Finding("port-assumed", "note", message, {"port": 1, "ports": ports}))
    own = network.points._replace(values=network.points.values[:, chosen - 1, chosen - 1])
    findings += magnitude_finding(own, source)
    return Sweep(
        own.frequency_hz,
        own.values,
        float(network.reference_ohm[chosen - 1]),
        source,
        sha256,
        {**network.understood_as, "port": chosen},
        network.comments,
        tuple(findings),
    )
