"""From a description to a page: Jinja templates, escaping on, undefined names refused."""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

from generator.sheets.comparison_description import ComparisonSheet
from generator.sheets.lamp_description import LampSheet
from generator.sheets.tender_description import TenderDocument
from generator.sheets.themes import BASE, templates_folder
from generator.sheets.typeface import printable

if TYPE_CHECKING:
    from jinja2 import Environment, Template

__all__ = ["Sheet", "render_html", "render_paper"]

Sheet = LampSheet | ComparisonSheet | TenderDocument

_PAGES = {LampSheet: "lamp", ComparisonSheet: "comparison", TenderDocument: "tender"}


@cache
def _environment(
    theme: str, overrides: Path | None, finalize: Callable[[Any], Any] | None = None
) -> Environment:
    """The templates of the campaign over those of the theme over those that all themes share.

    ``base/...`` and ``theme/...`` name a template of that place even where it is overridden, so
    that an override may extend what it replaces. Templates of a campaign come from outside the
    program: they run in the sandbox.
    """
    from jinja2 import ChoiceLoader, FileSystemLoader, PrefixLoader, StrictUndefined
    from jinja2.sandbox import ImmutableSandboxedEnvironment

    base = FileSystemLoader(templates_folder() / BASE)
    own = FileSystemLoader([templates_folder() / theme, templates_folder() / BASE])
    campaign = [FileSystemLoader(overrides)] if overrides else []
    return ImmutableSandboxedEnvironment(
        loader=ChoiceLoader([*campaign, own, PrefixLoader({"base": base, "theme": own})]),
        autoescape=True,
        undefined=StrictUndefined,
        finalize=finalize,
        trim_blocks=True,
        lstrip_blocks=True,
    )


def _template(sheet: Sheet, ending: str, finalize: Callable[[Any], Any] | None = None) -> Template:
    environment = _environment(sheet.frame.theme, sheet.frame.overrides, finalize)
    return environment.get_template(f"{_PAGES[type(sheet)]}{ending}.html.j2")


def _printable(value: Any) -> Any:
    """Replace what the bundled typeface lacks; markup stays markup."""
    return type(value)(printable(value)) if isinstance(value, str) else value


def render_html(sheet: Sheet, *, asset_prefix: str) -> str:
    """Render the page of a sheet.

    Parameters
    ----------
    sheet
        The description.
    asset_prefix
        Path from the page to the folder of assets, ending in a slash: ``assets/`` for the
        comparison, ``../assets/`` for a lamp.

    Returns
    -------
    str
        A whole page; it asks for nothing but ``sheet.css`` and the faces under that prefix.
    """
    return _template(sheet, "").render(sheet=sheet, asset_prefix=asset_prefix)


def render_paper(sheet: Sheet, *, dense: bool = False) -> str:
    """Render the page that the PDF is made from.

    Parameters
    ----------
    sheet
        The description.
    dense
        Whether to set it closer, for want of room.
    """
    return _template(sheet, "_paper", _printable).render(sheet=sheet, dense=dense)
