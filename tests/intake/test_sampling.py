from __future__ import annotations

import numpy as np
import pytest
from numpy.typing import NDArray

from generator.intake.sampling import rounding_of_times, sampling_rate_hz
from generator.intake.tables.number_table import NumberTable, read_number_table
from generator.intake.tables.problem_list import ProblemList


def _table(times: list[str]) -> NumberTable:
    table = read_number_table("\n".join(["time_s", *times, ""]), ProblemList("light.csv"))
    assert table is not None
    return table


def _printed(rate_hz: float, samples: int, form: str) -> list[str]:
    return [form % (i / rate_hz) for i in range(samples)]


EVEN = [
    (20_000, 2_000, "%.5f"),
    (30_000, 3_000, "%.6f"),
    (30_000, 3_000, "%.5f"),
    (44_100, 4_410, "%.5f"),
    (10_000, 2_000, "%.4f"),
    (2_000, 20_000, "%.6g"),
    (50_000, 5_000, "%.9e"),
    (30_000, 3_000, "%.17g"),
]


@pytest.mark.parametrize(("rate_hz", "samples", "form"), EVEN)
def test_rounded_times_of_an_even_record_are_even(rate_hz: float, samples: int, form: str) -> None:
    problems = ProblemList("light.csv")
    found = sampling_rate_hz(_table(_printed(rate_hz, samples, form)), problems)
    assert problems.problems == ()
    # The last time is off by at most half the last printed digit, which is at most 5e-5 s here.
    assert found == pytest.approx(rate_hz, rel=1.1e-4)


@pytest.mark.parametrize(("rate_hz", "samples", "form"), EVEN)
@pytest.mark.parametrize("share", [0.1, 0.5, 0.98])
def test_a_lost_sample_is_found_where_it_is_lost(
    rate_hz: float, samples: int, form: str, share: float
) -> None:
    times = _printed(rate_hz, samples, form)
    lost = int(share * samples)
    del times[lost]
    problems = ProblemList("light.csv")
    assert sampling_rate_hz(_table(times), problems) is None
    assert [p.row for p in problems.problems] == [lost + 2]


@pytest.mark.parametrize(("jitter", "even"), [(0.009, True), (0.011, False)])
def test_jitter_of_one_percent_of_the_step_is_the_limit(jitter: float, even: bool) -> None:
    times = np.arange(400) / 1000.0 + 0.000123456789
    times[200:] += jitter / 1000
    problems = ProblemList("light.csv")
    found = sampling_rate_hz(_table([f"{t:.12f}" for t in times]), problems)
    assert (found is not None) is even
    assert [p.row for p in problems.problems] == ([] if even else [202])


def test_a_rate_that_drifts_by_a_sample_is_refused() -> None:
    steps = np.where(np.arange(5000) < 2500, 1.0, 1.005) / 20_000
    problems = ProblemList("light.csv")
    assert sampling_rate_hz(_table([f"{t:.12f}" for t in np.cumsum(steps)]), problems) is None
    assert problems.errors == 1


def test_times_rounded_to_more_than_half_a_step_are_refused() -> None:
    problems = ProblemList("light.csv")
    assert sampling_rate_hz(_table(_printed(9_000, 1_000, "%.4f")), problems) is None
    assert "rounded too coarsely" in problems.problems[0].message


def test_too_few_samples() -> None:
    problems = ProblemList("light.csv")
    assert sampling_rate_hz(_table(_printed(1000, 99, "%.3f")), problems) is None
    assert sampling_rate_hz(_table(_printed(1000, 100, "%.3f")), problems) is not None
    assert problems.errors == 1


@pytest.mark.parametrize(
    ("times", "steps"),
    [
        ([0.0, 0.00003, 0.00007, 0.00013], [1e-5] * 4),
        ([0.5, 1.5, 12.5], [0.1] * 3),
        ([0.123456, 1.23457, 12.3457], [1e-6, 1e-5, 1e-4]),
    ],
)
def test_the_rounding_of_printed_times(times: list[float], steps: list[float]) -> None:
    found: NDArray[np.float64] = rounding_of_times(np.array(times))
    np.testing.assert_allclose(found, steps, rtol=1e-9)
