"""Remarks of several units as one remark of their mean."""

from __future__ import annotations

from datetime import date
from decimal import Decimal

import pytest

from generator.language import Message, numeral, say, told
from generator.language.messages import spoken_by
from generator.metrics.assembly.means import mean_figures
from generator.records.figure import Figure, Grade


def remarks_of_the_mean(*remarks: tuple[str, ...]) -> tuple[str, ...]:
    units = [
        Figure("L1", f"u{place}", "ra", Decimal(80), Grade.COMPUTED, "method", remarks=texts)
        for place, texts in enumerate(remarks)
    ]
    (mean,) = mean_figures(units)
    return mean.remarks


@pytest.mark.parametrize(
    ("numbers", "text"),
    [
        (("4025", "4021", "4034"), "reference of Ra: Planckian 4021 to 4034 K"),
        (("4025", "4025", "4025"), "reference of Ra: Planckian 4025 K"),
        (("999", "1001", "1000"), "reference of Ra: Planckian 999 to 1001 K"),
    ],
)
def test_numbers_that_differ_become_a_range(numbers: tuple[str, ...], text: str) -> None:
    given = [(f"reference of Ra: Planckian {number} K",) for number in numbers]
    assert remarks_of_the_mean(*given) == (text,)


def test_only_what_varies_becomes_a_range() -> None:
    found = remarks_of_the_mean(("order 3 reaches 1.5 %",), ("order 3 reaches 2.5 %",), ())
    assert found == ("order 3 reaches 1.5 to 2.5 % (2 of 3 units)",)


def test_a_range_can_be_said_in_another_language() -> None:
    reaches = say("order {order} reaches {share} %")
    given = [
        (reaches.format(order=numeral("3"), share=numeral(share)),) for share in ("1.5", "2.5")
    ]
    (remark,) = remarks_of_the_mean(*given, ())
    assert remark == "order 3 reaches 1.5 to 2.5 % (2 of 3 units)"

    class Speaker:
        def pattern(self, message: Message) -> str:
            words = {"{low} to {high}": "{low}–{high}", reaches.singular: "{share} % bei {order}"}
            return words.get(message.singular, "{remark} [{count}/{total}]")

        def number(self, text: str) -> str:
            return text.replace(".", ",")

        def day(self, day: date) -> str:
            return day.isoformat()

    with spoken_by(Speaker()):
        assert told(remark) == "1,5–2,5 % bei 3 [2/3]"
