"""Pages that scripts/bench measures against."""

from __future__ import annotations

import shutil
from pathlib import Path

ROOT = Path(__file__).resolve().parent.parent

PLAIN = """\
import { loadPyodide } from './pyodide.mjs';
const pyodide = await loadPyodide({ indexURL: new URL('./', import.meta.url).href });
await pyodide.loadPackage('numpy', { messageCallback() {} });
pyodide.runPython('import numpy');
document.documentElement.dataset.reference = 'ready';
"""


def build_reference(folder: Path) -> Path:
    """The plain page: Pyodide as released, numpy loaded and imported, nothing else."""
    shutil.copytree(ROOT / ".cache/runtime", folder / "assets")
    (folder / "assets/plain.js").write_text(PLAIN)
    (folder / "index.html").write_text(
        '<!doctype html><meta charset="utf-8"><title>Plain</title>'
        '<script type="module" src="assets/plain.js"></script>')
    return folder
