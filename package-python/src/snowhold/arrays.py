"""Numpy where it is there.

On a phone the package is loaded before numpy, and answers without it; when numpy has arrived the
same formulas run on arrays.
"""

from __future__ import annotations

from typing import Any


def numpy_or_none() -> Any:
    """The numpy module, or None where it is not (or not yet) installed."""
    try:
        import numpy
    except ImportError:
        return None
    return numpy
