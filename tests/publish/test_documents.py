"""Documents are rendered in processes of their own; a crash is a named failure."""

from __future__ import annotations

import math
import os

import pytest

from generator.errors import SheetError
from generator.publish.documents import in_processes, processors


def test_every_task_gives_its_result() -> None:
    tasks = [(str(number), float(number)) for number in range(9)]
    assert dict(in_processes(math.sqrt, tasks, jobs=2)) == {
        str(number): math.sqrt(number) for number in range(9)
    }


def test_no_task_needs_no_process() -> None:
    assert list(in_processes(math.sqrt, [], jobs=2)) == []


def test_a_crash_names_its_document_and_spares_the_others() -> None:
    done = []

    def drain() -> None:
        tasks = [("one", "0"), ("two", "1"), ("three", "0")]
        for name, _ in in_processes(leave_if_asked, tasks, jobs=1):
            done.append(name)

    with pytest.raises(SheetError, match=r"^two: the PDF engine crashed$"):
        drain()
    assert done == ["one", "three"]


def leave_if_asked(asked: str) -> str:
    if asked == "1":
        os._exit(11)
    return asked


def test_processors_is_at_least_one() -> None:
    assert processors() >= 1
