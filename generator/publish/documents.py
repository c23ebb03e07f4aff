"""Rendering many PDF documents in child processes, so that a native crash is a named failure."""

from __future__ import annotations

import os
import signal
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import FIRST_COMPLETED, Future, ProcessPoolExecutor, wait
from concurrent.futures.process import BrokenProcessPool
from multiprocessing import get_context
from typing import TypeVar

from generator.errors import SheetError

__all__ = ["in_processes", "processors"]

Task = TypeVar("Task")
Result = TypeVar("Result")


def processors() -> int:
    """Number of processors this process may use."""
    if hasattr(os, "sched_getaffinity"):
        return len(os.sched_getaffinity(0))
    return os.cpu_count() or 1


def in_processes(
    render: Callable[[Task], Result], tasks: Sequence[tuple[str, Task]], jobs: int
) -> Iterator[tuple[str, Result]]:
    """Render every task in a child process; give each result as it is ready.

    Each worker is a process of its own, made new (not forked) and used for one task after
    another. One that dies takes only its own document with it, and that document is named.

    Parameters
    ----------
    render
        Function of one task, importable by name.
    tasks
        Name and task of every document.
    jobs
        Number of processes.

    Yields
    ------
    tuple
        Name and result, in the order of completion.

    Raises
    ------
    SheetError
        After the other documents are done, naming every document that failed and why.
    """
    waiting = list(reversed(tasks))
    failures: list[str] = []
    workers = [_worker() for _ in range(max(1, min(jobs, len(tasks))))]
    idle = list(range(len(workers)))
    running: dict[Future[Result], tuple[str, int]] = {}
    try:
        while waiting or running:
            while idle and waiting:
                name, task = waiting.pop()
                place = idle.pop()
                running[workers[place].submit(render, task)] = (name, place)
            done, _ = wait(running, return_when=FIRST_COMPLETED)
            for future in done:
                name, place = running.pop(future)
                idle.append(place)
                try:
                    yield name, future.result()
                except BrokenProcessPool:
                    failures.append(f"{name}: the PDF engine crashed")
                    workers[place].shutdown()
                    workers[place] = _worker()
                except SheetError as error:
                    failures.append(f"{name}: {error}")
    finally:
        for worker in workers:
            worker.shutdown(cancel_futures=True)
    if failures:
        raise SheetError("\n".join(sorted(failures)))


def _worker() -> ProcessPoolExecutor:
    """A process of its own, which leaves an interruption by the user to its parent."""
    return ProcessPoolExecutor(
        max_workers=1,
        mp_context=get_context("spawn"),
        initializer=signal.signal,
        initargs=(signal.SIGINT, signal.SIG_IGN),
    )
