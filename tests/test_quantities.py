"""The catalogue of quantities: every label is a message, loops share a pattern."""

from __future__ import annotations

from generator.language import Message
from generator.quantities import QUANTITIES

WORDED_UNITS = {"steps"}
"""Units that are words and not symbols."""


def test_every_label_and_every_worded_unit_is_a_message() -> None:
    for item in QUANTITIES.values():
        assert isinstance(item.label, Message)
        assert isinstance(item.unit, Message) is (item.unit in WORDED_UNITS)
        data = (item.name, item.symbol, item.group, item.source)
        assert not any(isinstance(text, Message) for text in data)


def test_labels_of_a_series_share_a_pattern() -> None:
    labels = [QUANTITIES[f"r{number}"].label for number in range(1, 16)]
    assert labels[8] == "special colour rendering index R9"
    assert len({label.singular for label in labels if isinstance(label, Message)}) == 1
    assert len(set(labels)) == 15
