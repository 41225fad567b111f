"""The package before numpy has come: the first verdict needs none, the rest says so."""

import builtins
import importlib
import json
import subprocess
import sys

import pytest

import snowhold


def test_a_turn_is_answered_without_importing_numpy():
    """In a fresh interpreter that has no numpy at all."""
    code = ("import sys, json; sys.modules['numpy'] = None; import snowhold; "
            "print(json.dumps(snowhold.answer({'ask': 'turn', 'pitch_deg': 15, 'speed_mps': 6, "
            "'sidecut_radius_m': 8})))")
    package = importlib.util.find_spec("snowhold").submodule_search_locations[0]
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True,
                          cwd=f"{package}/..")
    without = json.loads(done.stdout)
    whole = snowhold.answer({"ask": "turn", "pitch_deg": 15, "speed_mps": 6,
                             "sidecut_radius_m": 8})
    assert without["verdict"] == whole["verdict"]
    assert without["chance_holds"] is None
    assert without["lean_deg"] == pytest.approx(whole["lean_deg"], abs=1e-9)


def test_what_needs_numpy_says_so(monkeypatch):
    real = builtins.__import__

    def without_numpy(name, *rest, **more):
        if name == "numpy":
            raise ModuleNotFoundError("No module named 'numpy'", name="numpy")
        return real(name, *rest, **more)

    monkeypatch.setattr(builtins, "__import__", without_numpy)
    monkeypatch.setitem(sys.modules, "snowhold.compare", None)
    monkeypatch.delitem(sys.modules, "snowhold.compare")
    for module in [name for name in sys.modules if name.startswith("snowhold.")]:
        monkeypatch.delitem(sys.modules, module)
    engine = importlib.import_module("snowhold.engine")
    reply = engine.answer({"ask": "boards", "boards": []})
    assert "numpy" in reply["error"][0]["problem"]
