"""What every table of ``campaign.toml`` is made of: exact numbers, closed tables, named keys."""

from __future__ import annotations

from decimal import Decimal
from typing import Annotated, Any

from pydantic import BaseModel, BeforeValidator, ConfigDict, Field
from pydantic_core import PydanticCustomError

__all__ = ["WRONG_KEY", "NonNegative", "Number", "Positive", "Table", "exact", "wrong_key"]

WRONG_KEY = "wrong_key"
"""Type of an error that several keys of one table make together; it names one of them."""


def exact(value: Any) -> Any:
    """Take a TOML number by its text, so that 0.1 is one tenth; text is no number."""
    if isinstance(value, bool | str):
        raise ValueError("a number")  # noqa: TRY004 - pydantic turns ValueError into a problem
    return Decimal(repr(value)) if isinstance(value, float) else value


_LARGEST = Decimal(10) ** 12

Number = Annotated[
    Decimal, BeforeValidator(exact), Field(allow_inf_nan=False, ge=-_LARGEST, le=_LARGEST)
]
NonNegative = Annotated[Number, Field(ge=0)]
Positive = Annotated[Number, Field(gt=0)]


class Table(BaseModel):
    """A table of which every key is known; it does not change."""

    model_config = ConfigDict(extra="forbid", frozen=True, strict=False)


def wrong_key(key: str, expected: str) -> PydanticCustomError:
    """The error of a table whose keys do not go together.

    Parameters
    ----------
    key
        The key to name.
    expected
        What should stand there.
    """
    return PydanticCustomError(WRONG_KEY, "{expected}", {"key": key, "expected": expected})
