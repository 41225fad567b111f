"""The one door: a question in, an answer out."""

from __future__ import annotations

import importlib
from collections.abc import Mapping
from typing import Any

from snowhold.question import BadQuestion, Choice

TOPICS = {
    "turn": "snowhold.turn",
    "window": "snowhold.window",
    "run": "snowhold.run",
    "pitch": "snowhold.pitch",
    "reference": "snowhold.reference",
    "board": "snowhold.board",
    "boards": "snowhold.compare",
    "stiffness": "snowhold.stiffness",
}
"""What can be asked, and the module whose ``answer(question)`` answers it. Modules are imported
when first asked for: the first verdict on a phone waits only for what it needs."""


def answer(question: Any) -> dict[str, Any]:
    """Answer one question.

    ``question`` is a JSON-able dict whose ``ask`` names the topic; its other keys, with their
    units, ranges and defaults, are in the topic module's ``FIELDS``. The answer is a JSON-able
    dict of finite numbers, strings, booleans, nulls, lists and dicts. A question with bad fields
    is answered by ``{"error": [{"field", "problem", "allowed"}, …]}``, every bad field at once. So
    is a topic that needs numpy where that is not (or not yet) installed.
    """
    try:
        return _topic(question).answer(question)  # type: ignore[no-any-return]
    except BadQuestion as bad:
        return {"error": bad.faults}
    except ModuleNotFoundError as missing:
        if missing.name != "numpy":
            raise
        return {"error": [{"field": "ask", "problem": "needs numpy, which is not here yet",
                           "allowed": "this question once numpy is installed or has loaded"}]}


def _topic(question: Any) -> Any:
    """The module that answers this question; raises :class:`BadQuestion` if there is none."""
    ask = Choice(tuple(TOPICS))
    if not isinstance(question, Mapping):
        raise BadQuestion([{"field": "question", "problem": "is not an object",
                            "allowed": f'an object whose "ask" is {ask.allowed()}'}])
    asked = question.get("ask")
    if not isinstance(asked, str) or asked not in TOPICS:
        problem = "is missing" if "ask" not in question else "is not a known topic"
        raise BadQuestion([{"field": "ask", "problem": problem, "allowed": ask.allowed()}])
    return importlib.import_module(TOPICS[asked])
