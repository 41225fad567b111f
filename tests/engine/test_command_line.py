"""``python -m snowhold``: JSON in, JSON out, words on request, exit 2 on bad input."""

import io
import json
import os
import subprocess
import sys

import pytest

import snowhold
from snowhold.__main__ import main

QUESTION = {"ask": "turn", "pitch_deg": 15, "speed_mps": 6, "sidecut_radius_m": 8}


def run(capsys, monkeypatch, stdin, *argv):
    monkeypatch.setattr("sys.stdin", io.StringIO(stdin))
    status = main(list(argv))
    return status, capsys.readouterr().out


def test_json_both_ways(capsys, monkeypatch):
    status, out = run(capsys, monkeypatch, json.dumps(QUESTION))
    assert status == 0
    assert json.loads(out) == snowhold.answer(QUESTION)


def test_as_a_program_from_a_file(tmp_path):
    file = tmp_path / "question.json"
    file.write_text(json.dumps(QUESTION))
    done = subprocess.run([sys.executable, "-m", "snowhold", str(file)], capture_output=True,
                          text=True, check=True,
                          env={**os.environ, "PYTHONPATH": os.pathsep.join(sys.path)})
    assert json.loads(done.stdout) == snowhold.answer(QUESTION)


@pytest.mark.parametrize(("fields", "words"), [
    ({}, ["km/h", "margin", "Closed stays closed"]),
    ({"speed_mps": 12}, ["Too fast to carve", "Tightest line that holds"]),
    ({"speed_mps": 2}, ["Too slow to carve"]),
    ({"snow": "I"}, ["Washes out", "shears"]),
    ({"pitch_deg": 40}, ["No speed carves", "avalanche bulletin"]),
    ({"pitch_deg": 40, "snow": "F"}, ["No line holds"]),
])
def test_words_for_people(capsys, monkeypatch, fields, words):
    status, out = run(capsys, monkeypatch, json.dumps({**QUESTION, **fields}), "--text")
    assert status == 0
    for word in words:
        assert word in out


@pytest.mark.parametrize("question", [
    {"ask": "window", "pitch_deg": 15, "speed_mps": 6, "sidecut_radius_m": 8},
    {"ask": "reference"},
    {"ask": "pitch", "legs": [{"pitch_deg": 20, "length_m": 50}]},
    {"ask": "board", "nose_m": 0.3, "waist_m": 0.25, "tail_m": 0.3, "effective_edge_m": 1.2},
    {"ask": "stiffness", "supports_m": 1, "load_kg": 10, "sag_m": 0.01},
])
def test_every_topic_has_words(capsys, monkeypatch, question):
    status, out = run(capsys, monkeypatch, json.dumps(question), "--text")
    assert status == 0
    assert out.count("\n") >= 2
    assert "Closed stays closed" in out


@pytest.mark.parametrize("stdin", ["", "{", "[" * 100_000, '{"ask": "turn", "pitch_deg": 75}',
                                   '{"ask": "turn", "pitch_deg": NaN}', "[]"])
@pytest.mark.parametrize("flags", [[], ["--text"]])
def test_bad_input_exits_2_and_says_why(capsys, monkeypatch, stdin, flags):
    status, out = run(capsys, monkeypatch, stdin, *flags)
    assert status == 2
    if flags:
        assert "allowed" in out
    else:
        assert json.loads(out)["error"][0]["field"]


def test_a_missing_file(capsys, monkeypatch, tmp_path):
    status, out = run(capsys, monkeypatch, "", str(tmp_path / "none.json"))
    assert status == 2
    assert "cannot be read" in json.loads(out)["error"][0]["problem"]
