"""From records to figures and curves: pure functions on arrays, whole batches at a time."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from generator.metrics.assembly import figures_of
    from generator.metrics.curves import curves_of

__all__ = ["curves_of", "figures_of"]


def __getattr__(name: str) -> Any:
    """Import the assembly only when it is asked for: single metrics need not wait for it."""
    if name == "figures_of":
        from generator.metrics.assembly import figures_of

        return figures_of
    if name == "curves_of":
        from generator.metrics.curves import curves_of

        return curves_of
    raise AttributeError(name)
