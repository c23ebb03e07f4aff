"""Withholding: a figure that must not be given holds not-a-number, and the reason beside it."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

__all__ = ["withheld"]

Array = NDArray[np.float64]


def withheld(
    values: Array, *rules: tuple[NDArray[np.bool_] | bool, str]
) -> tuple[Array, tuple[str, ...]]:
    """Values with the forbidden ones blanked, and one reason per series.

    Parameters
    ----------
    values
        Figures, in any unit (series,).
    rules
        Pairs of condition (series,) and reason; the first that holds for a series wins.

    Returns
    -------
    tuple
        The values, not-a-number where a rule holds (series,), and the reasons; empty text
        where the value stands.
    """
    texts = np.full(values.shape, "", dtype=object)
    for condition, text in reversed(rules):
        texts[np.broadcast_to(condition, values.shape)] = text
    return np.where(texts != "", np.nan, values), tuple(texts.tolist())
