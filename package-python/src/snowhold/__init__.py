"""Snowhold: will a snowboard's edge hold on this pitch, at this speed, on this snow?

One door: :func:`snowhold.answer` takes a question (a plain dict) and returns an answer (a plain
dict), both JSON-able. Every figure is an estimate from a published model; it does not replace the
judgement of patrol, an instructor or local rules, and says nothing about avalanche danger.
"""

from snowhold.engine import answer

__all__ = ["answer"]
__version__ = "0.1.0"
