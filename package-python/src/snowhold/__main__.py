"""The command line: ``python -m snowhold [FILE] [--text]``.

Reads one question as JSON from FILE or standard input, prints the answer as JSON, or for people
with ``--text``. Exit status 2 and the errors on bad input.
"""

from __future__ import annotations

import argparse
import json
import sys
from pathlib import Path

from snowhold.engine import answer
from snowhold.report import text


def main(argv: list[str] | None = None) -> int:
    """Run the command line; returns the exit status."""
    parser = argparse.ArgumentParser(
        prog="snowhold",
        description="Will the edge hold? Reads a question as JSON, prints the answer.",
        epilog="An estimate: it does not replace the judgement of patrol, an instructor or local "
               "rules, and says nothing about avalanche danger.")
    parser.add_argument("file", nargs="?", default="-", help="JSON file; - or none: standard input")
    parser.add_argument("--text", action="store_true", help="print for people instead of JSON")
    options = parser.parse_args(argv)
    try:
        source = sys.stdin.read() if options.file == "-" else Path(options.file).read_text("utf-8")
        question = json.loads(source)
    except OSError as problem:
        return _refuse(options, "file", f"cannot be read: {problem.strerror}", "a readable file")
    except (ValueError, RecursionError) as problem:
        return _refuse(options, "question", f"is not JSON: {problem}", "one JSON object")
    reply = answer(question)
    print(text(question, reply) if options.text else json.dumps(reply, allow_nan=False))
    return 2 if "error" in reply else 0


def _refuse(options: argparse.Namespace, field: str, problem: str, allowed: str) -> int:
    reply = {"error": [{"field": field, "problem": problem, "allowed": allowed}]}
    print(text({}, reply) if options.text else json.dumps(reply))
    return 2


if __name__ == "__main__":
    sys.exit(main())
