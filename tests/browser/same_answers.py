"""Asks the browser's engine and the one here the same questions, and compares."""

import json
import math
import random
import sys
from importlib import import_module

import snowhold
from snowhold.engine import TOPICS
from snowhold.question import Choice, Flag, Items, Number, Record

# Drives the worker's own file, as the page's engine.js does.
ASK_ALL = """async ([url, questions, wanted]) => {
    const worker = new Worker(url, { type: 'module' });
    const answers = [];
    await new Promise((resolve, reject) => {
        worker.onerror = reject;
        worker.onmessage = ({ data }) => {
            if (data.state === 'failed') reject(new Error(data.message));
            if (data.failure) reject(new Error(data.failure));
            if (data.state === wanted) {
                questions.forEach((question, id) => worker.postMessage({ id, question }));
            }
            if ('answer' in data) answers[data.id] = data.answer;
            if (data.id === questions.length - 1) resolve();
        };
    });
    worker.terminate();
    return answers;
}"""


def questions(count):
    """Turns over the whole range of what may be asked, the same ones each time."""
    rng = random.Random(20131)
    made = []
    for _ in range(count):
        question = {
            "ask": "turn",
            "pitch_deg": rng.uniform(0, 50),
            "speed_mps": rng.uniform(0, 40),
            "sidecut_radius_m": rng.uniform(3, 40),
        }
        if rng.random() < 0.7:  # speeds that people ride
            question["speed_mps"] = rng.uniform(2, 12)
            question["pitch_deg"] = rng.uniform(0, 30)
        if rng.random() < 0.5:
            question |= {"snow": rng.choice(["F", "4F", "1F", "P", "K", "I"]),
                         "angulation_deg": rng.uniform(0, 20),
                         "rider_mass_kg": rng.uniform(30, 120)}
        if rng.random() < 0.3:
            question["phase_deg"] = rng.uniform(0, 180)
        if rng.random() < 0.3:
            question["line_radius_m"] = rng.uniform(5, 40)
        made.append(question)
    made.append({"ask": "turn", "pitch_deg": -1, "speed_mps": "fast"})
    return made


def any_questions(count):
    """Questions of every topic, made from its fields: any value that is allowed, some left out.

    Every second one has what belongs together as on a real board or hill; most others are errors.
    """
    rng = random.Random(6289)
    made = []
    for topic, module in TOPICS.items():
        fields = import_module(module).FIELDS
        for number in range(count):
            question = {**_record(fields, rng), "ask": topic}
            if number % 2:
                question |= _real(topic, rng)
                for name in ("widths", "fall_at_m", "pitch_deg" if topic == "run" else ""):
                    question.pop(name, None)
            made.append(question)
    return made


def _real(topic, rng):
    """Fields that fit each other."""
    match topic:
        case "board":
            return _real_board(rng)
        case "boards":
            return {"boards": [_real_board(rng) for _ in range(2)]}
        case "run" | "pitch":
            return {"legs": [{"pitch_deg": rng.uniform(0, 35), "length_m": rng.uniform(5, 200)}
                             for _ in range(rng.randint(1, 4))]}
    return {}


def _real_board(rng):
    waist_m = rng.uniform(0.235, 0.265)
    return {"waist_m": waist_m, "nose_m": waist_m + rng.uniform(0.035, 0.05),
            "tail_m": waist_m + rng.uniform(0.035, 0.05), "effective_edge_m": rng.uniform(1.0, 1.3)}


def _record(fields, rng):
    return {name: _value(field, rng) for name, field in fields.items()
            if repr(field.default) == "required" or rng.random() < 0.3}


def _value(field, rng):
    if getattr(field, "null", False) and rng.random() < 0.2:
        return None
    match field:
        case Number(whole=True):
            return rng.randint(math.ceil(field.low), min(int(field.high), int(field.low) + 500))
        case Number():
            return rng.uniform(field.low, field.high)
        case Choice():
            return rng.choice(field.words)
        case Flag():
            return rng.random() < 0.5
        case Record():
            return _record(field.fields, rng)
        case Items():
            count = rng.randint(field.low, min(field.high, field.low + 2))
            return [_value(field.of, rng) for _ in range(count)]
    raise TypeError(f"no values for {field}")


def differences(a, b, path="answer"):
    """Where two answers differ by more than 1e-12 (relative, or absolute below 1).

    A solver's residual is left out: it is itself nothing but rounding.
    """
    if isinstance(a, dict) and isinstance(b, dict) and a.keys() == b.keys():
        return [d for key in a if key != "residual"
                for d in differences(a[key], b[key], f"{path}.{key}")]
    if isinstance(a, list) and isinstance(b, list) and len(a) == len(b):
        return [d for i, (x, y) in enumerate(zip(a, b, strict=True))
                for d in differences(x, y, f"{path}[{i}]")]
    numbers = (int, float)
    if isinstance(a, numbers) and isinstance(b, numbers) and not isinstance(a, bool):
        same = math.isclose(a, b, rel_tol=1e-12, abs_tol=1e-12)
    else:
        same = a == b
    return [] if same else [f"{path}: {a!r} here, {b!r} in the browser"]


def check_alike(page, asked, stage, monkeypatch):
    """The browser, before or after numpy has joined, answers as CPython here without it or with."""
    replies = page.evaluate(ASK_ALL, [page.workers[0].url, [json.dumps(q) for q in asked], stage])
    with monkeypatch.context() as patch:
        if stage == "ready":
            patch.setitem(sys.modules, "numpy", None)
        wrong = [(question, found) for question, reply in zip(asked, replies, strict=True)
                 if (found := differences(snowhold.answer(question), json.loads(reply)))]
    assert wrong == []
