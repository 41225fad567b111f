"""Reading a question: every field checked against what is allowed, every fault named at once.

A question is a plain dict. A *spec* says which fields it may have; :func:`read` returns the values
with defaults filled in, or raises :class:`BadQuestion` with one entry for each bad field. Nothing
is clamped and nothing is guessed.
"""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any


class _Required:
    """Marks a field without a default."""

    def __repr__(self) -> str:
        return "required"


REQUIRED = _Required()


class BadQuestion(Exception):
    """A question that cannot be answered.

    ``faults`` is a list of ``{"field", "problem", "allowed"}``, one for each bad field.
    """

    def __init__(self, faults: list[dict[str, str]]) -> None:
        super().__init__("; ".join(f"{f['field']}: {f['problem']}" for f in faults))
        self.faults = faults


class _Fault(Exception):
    """What is wrong with one value; :func:`read` adds the field's name and what is allowed."""


@dataclass(frozen=True)
class Number:
    """A finite number from ``low`` to ``high``, both included, in ``unit``.

    ``default`` is used where the field is left out; ``null`` allows null. ``whole`` asks for a
    whole number; ``above_low`` leaves ``low`` itself out.
    """

    low: float
    high: float
    unit: str
    default: float | _Required | None = REQUIRED
    null: bool = False
    whole: bool = False
    above_low: bool = False

    def allowed(self) -> str:
        kind = "a whole number" if self.whole else "a number"
        span = f"above {self.low:g} up to" if self.above_low else f"from {self.low:g} to"
        text = f"{kind} {span} {self.high:g}"
        if self.unit:
            text += f" {self.unit}"
        return text + (", or null" if self.null else "")

    def check(self, value: Any, path: str) -> float | int | None:
        if value is None and self.null:
            return None
        if isinstance(value, bool) or not isinstance(value, (int, float)):
            raise _Fault(f"{_shown(value)} is not a number")
        try:
            number = float(value)
        except OverflowError:
            raise _Fault("is too large to be a number here") from None
        if not math.isfinite(number):
            raise _Fault(f"{number} is not a finite number")
        if self.whole and number != math.floor(number):
            raise _Fault(f"{number:g} is not a whole number")
        if number < self.low or (self.above_low and number == self.low):
            raise _Fault(f"{number:g} is too small")
        if number > self.high:
            raise _Fault(f"{number:g} is too large")
        return int(number) if self.whole else number


@dataclass(frozen=True)
class Choice:
    """One of a few words."""

    words: tuple[str, ...]
    default: str | _Required | None = REQUIRED
    null: bool = False

    def allowed(self) -> str:
        return "one of " + ", ".join(self.words) + (", or null" if self.null else "")

    def check(self, value: Any, path: str) -> str | None:
        if value is None and self.null:
            return None
        if not isinstance(value, str) or value not in self.words:
            raise _Fault(f"{_shown(value)} is not one of the words")
        return value


@dataclass(frozen=True)
class Flag:
    """True or false."""

    default: bool | _Required | None = REQUIRED

    def allowed(self) -> str:
        return "true or false"

    def check(self, value: Any, path: str) -> bool:
        if not isinstance(value, bool):
            raise _Fault(f"{_shown(value)} is neither true nor false")
        return value


@dataclass(frozen=True)
class Record:
    """A dict with fields of its own; ``default`` ``{}`` fills in the fields' own defaults."""

    fields: Mapping[str, Field]
    default: Mapping[str, Any] | _Required | None = REQUIRED
    null: bool = False

    def allowed(self) -> str:
        text = "an object with " + ", ".join(self.fields)
        return text + (", or null" if self.null else "")

    def check(self, value: Any, path: str) -> dict[str, Any] | None:
        if value is None and self.null:
            return None
        if not isinstance(value, Mapping):
            raise _Fault(f"{_shown(value)} is not an object")
        return read(value, self.fields, path)


@dataclass(frozen=True)
class Items:
    """A list of ``low`` to ``high`` entries, each checked against ``of``."""

    of: Field
    low: int
    high: int
    default: list[Any] | _Required | None = REQUIRED
    null: bool = False

    def allowed(self) -> str:
        text = f"a list of {self.low} to {self.high} entries, each {self.of.allowed()}"
        return text + (", or null" if self.null else "")

    def check(self, value: Any, path: str) -> list[Any] | None:
        if value is None and self.null:
            return None
        if not isinstance(value, (list, tuple)):
            raise _Fault(f"{_shown(value)} is not a list")
        if not self.low <= len(value) <= self.high:
            raise _Fault(f"has {len(value)} entries")
        values: list[Any] = []
        faults: list[dict[str, str]] = []
        for index, entry in enumerate(value):
            _check_into(values, self.of, entry, f"{path}[{index}]", faults)
        if faults:
            raise BadQuestion(faults)
        return values


Field = Number | Choice | Flag | Record | Items


def read(question: Any, fields: Mapping[str, Field], path: str = "") -> dict[str, Any]:
    """The question's values, checked, with the defaults of the fields that it leaves out.

    ``path`` is the name of the field that holds this question, for nested ones. Raises
    :class:`BadQuestion` naming every bad field: ``legs[1].pitch_deg`` and the like.
    """
    prefix = f"{path}." if path else ""
    if not isinstance(question, Mapping):
        raise BadQuestion([_fault(path or "question", f"{_shown(question)} is not an object",
                                  "an object with " + ", ".join(fields))])
    values: dict[str, Any] = {}
    faults: list[dict[str, str]] = []
    for key in question:
        if key not in fields:
            faults.append(_fault(f"{prefix}{key if isinstance(key, str) else _shown(key)}"[:100],
                                 "is not a field of this question",
                                 "one of " + ", ".join(fields)))
    for name, field in fields.items():
        if name in question:
            checked: list[Any] = []
            _check_into(checked, field, question[name], prefix + name, faults)
            values.update((name, value) for value in checked)
        elif isinstance(field.default, _Required):
            faults.append(_fault(prefix + name, "is missing", field.allowed()))
        elif isinstance(field, Record) and field.default is not None:
            values[name] = read(field.default, field.fields, prefix + name)
        else:
            values[name] = field.default
    if faults:
        raise BadQuestion(faults)
    return values


def _check_into(checked: list[Any], field: Field, value: Any, path: str,
                faults: list[dict[str, str]]) -> None:
    """Check one value; append it to ``checked``, or what is wrong with it to ``faults``."""
    try:
        checked.append(field.check(value, path))
    except BadQuestion as nested:
        faults.extend(nested.faults)
    except _Fault as problem:
        faults.append(_fault(path, str(problem), field.allowed()))


def _fault(field: str, problem: str, allowed: str) -> dict[str, str]:
    return {"field": field, "problem": problem, "allowed": allowed}


def _shown(value: Any) -> str:
    """A value as an error message shows it: short, whatever it was."""
    if value is None:
        return "null"
    if isinstance(value, str):
        return repr(value[:40])
    if isinstance(value, (bool, int, float)):
        return repr(value)[:40]
    if isinstance(value, Mapping):
        return "an object"
    return "a list" if isinstance(value, (list, tuple)) else "this value"
