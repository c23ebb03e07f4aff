"""From a description to a page: Jinja templates, escaping on, undefined names refused."""

from __future__ import annotations

import re
from collections.abc import Callable
from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING, Any

from generator.language import say, say_as, say_counted, told
from generator.language.quotations import MARKS
from generator.language.speaking import speaking
from generator.sheets.comparison_description import ComparisonSheet
from generator.sheets.lamp_description import LampSheet
from generator.sheets.language_of_parts import with_languages
from generator.sheets.page_place import PagePlace
from generator.sheets.tender_description import TenderDocument
from generator.sheets.themes import BASE, templates_folder
from generator.sheets.typeface import printable

if TYPE_CHECKING:
    from jinja2 import Environment, Template

__all__ = ["Sheet", "render_html", "render_paper"]

Sheet = LampSheet | ComparisonSheet | TenderDocument

_AT_ROOT = PagePlace("")
_BETWEEN_MARKS = re.compile(f"[^{MARKS}]+")
_PAGES = {LampSheet: "lamp", ComparisonSheet: "comparison", TenderDocument: "tender"}


@cache
def _environment(
    theme: str,
    overrides: Path | None,
    own_files: tuple[str, ...],
    finalize: Callable[[Any], Any],
) -> Environment:
    """The templates of the campaign over those of the theme over those that all themes share.

    ``base/...`` and ``theme/...`` name a template of that place even where it is overridden, so
    that an override may extend what it replaces. Where a campaign brings templates of its own,
    which come from outside the program, all of them run in the sandbox. Their names are part of
    the key, so that one which is added while somebody watches the folder is seen.
    """
    del own_files
    from jinja2 import ChoiceLoader, Environment, FileSystemLoader, PrefixLoader, StrictUndefined
    from jinja2.sandbox import ImmutableSandboxedEnvironment

    base = FileSystemLoader(templates_folder() / BASE)
    own = FileSystemLoader([templates_folder() / theme, templates_folder() / BASE])
    campaign = [FileSystemLoader(overrides)] if overrides else []
    kind = ImmutableSandboxedEnvironment if overrides else Environment
    environment = kind(
        loader=ChoiceLoader([*campaign, own, PrefixLoader({"base": base, "theme": own})]),
        autoescape=True,
        undefined=StrictUndefined,
        finalize=finalize,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.globals.update(say=say, say_as=say_as, say_counted=say_counted)
    return environment


def _template(sheet: Sheet, ending: str, finalize: Callable[[Any], Any]) -> Template:
    overrides = sheet.frame.overrides
    own_files = tuple(sorted(path.name for path in overrides.iterdir())) if overrides else ()
    environment = _environment(sheet.frame.theme, overrides, own_files, finalize)
    return environment.get_template(f"{_PAGES[type(sheet)]}{ending}.html.j2")


def _told(value: Any) -> Any:
    """Say messages in the language that is being spoken; markup stays markup."""
    return told(value) if isinstance(value, str) else value


def _printable(value: Any) -> Any:
    """Say messages, and replace what the bundled typeface lacks; markup stays markup."""
    said = _told(value)
    if not isinstance(said, str) or (said.isascii() and said.isprintable()):
        return said
    return type(said)(_BETWEEN_MARKS.sub(lambda found: printable(found[0]), said))


def render_html(sheet: Sheet, place: PagePlace = _AT_ROOT) -> str:
    """Render the page of a sheet.

    Parameters
    ----------
    sheet
        The description.
    place
        Where the page lies in the issue; at its root by default.

    Returns
    -------
    str
        A whole page; it asks for nothing but what lies in the ``assets`` of the issue.
    """
    with speaking(sheet.frame.language):
        return with_languages(_template(sheet, "", _told).render(sheet=sheet, place=place))


def render_paper(sheet: Sheet, *, dense: bool = False) -> str:
    """Render the page that the PDF is made from.

    Parameters
    ----------
    sheet
        The description.
    dense
        Whether to set it closer, for want of room.
    """
    with speaking(sheet.frame.language):
        page = _template(sheet, "_paper", _printable).render(sheet=sheet, dense=dense)
        return with_languages(page)
