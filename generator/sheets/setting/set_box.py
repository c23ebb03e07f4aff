"""What a box that is set by the sheets owes to the engine."""

from __future__ import annotations

from typing import Any

from weasyprint.formatting_structure import boxes

from generator.sheets.setting.structure import PageStructure

__all__ = ["SetBox"]


class SetBox(boxes.BlockReplacedBox):  # type: ignore[misc] # the library has no types
    """A block that the engine places and breaks, as it does with an image, and that is set here.

    Parameters
    ----------
    element
        The element it comes from.
    style
        Its style.
    """

    def __init__(self, element: Any, style: Any) -> None:
        super().__init__(element.tag, style, element, self)

    @property
    def longest(self) -> float:
        """Width that its content would take if it could [px]."""
        return 0.0

    def get_intrinsic_size(self, resolution: float, font_size: float) -> tuple[Any, Any, Any]:
        """Width, height and their ratio, as the engine asks an image for them."""
        del resolution, font_size
        return self.longest, None, None

    def lay_out(
        self, context: Any, bottom_space: float, start: int, around: Any, page_is_empty: bool
    ) -> Any:
        """Set as much as the page has room for.

        Parameters
        ----------
        context
            Layout context of the engine.
        bottom_space
            Room to be left at the bottom of the page [px].
        start
            The first line or row to be set.
        around
            The containing block.
        page_is_empty
            Whether something has to be set, whatever room there is.

        Returns
        -------
        tuple
            The box, where to go on, and what else the engine asks for.
        """
        raise NotImplementedError

    def paint(self, stream: Any) -> None:
        """Put what was set on a page of the engine."""
        raise NotImplementedError

    def tag(self, parent: Any, page: PageStructure) -> Any:
        """Build the structure below an element; ``None`` where the engine knows how to."""
        raise NotImplementedError

    @staticmethod
    def nowhere() -> Any:
        """Tell the engine that nothing fits."""
        return None, None, {"break": "any", "page": None}, [], False

    def placed(self, resume_at: Any, *, collapses: bool = False) -> Any:
        """Tell the engine what was set.

        Parameters
        ----------
        resume_at
            Where to go on; ``None`` where all of it is set.
        collapses
            Whether the margins above and below meet.
        """
        return self, resume_at, {"break": "any", "page": None}, [], collapses
