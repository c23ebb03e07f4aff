"""Templates and themes: where they lie, their colours, and the files a page needs beside it."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from functools import cache
from pathlib import Path
from types import MappingProxyType

from generator.errors import Problem, SheetError

__all__ = [
    "BASE",
    "FACES",
    "font_bytes",
    "palette",
    "paper_style",
    "site_assets",
    "templates_folder",
    "theme_overrides",
    "theme_problems",
    "themes",
]

BASE = "base"
FACES = ("sheet-regular.ttf", "sheet-semibold.ttf", "sheet-condensed.ttf")

_PARTS_OF_LAMP = 4
"""How many of the shared style sheets a lamp's page uses; those of many lamps come after."""

_TOKEN = re.compile(r"--([a-z-]+):\s*(#[0-9a-f]{6});")
_VARIABLE = re.compile(r"var\(--([a-z-]+)\)")
_ROOT = re.compile(r":root\s*\{([^}]*)\}")


@cache
def templates_folder() -> Path:
    """Give the folder of the templates: in the installed package, else beside it."""
    package = Path(__file__).resolve().parents[1]
    for folder in (package / "templates", package.parent / "templates"):
        if (folder / BASE).is_dir():
            return folder
    raise SheetError(f"the templates are missing: no folder {BASE!r} beside {package.name!r}")


def themes() -> tuple[str, ...]:
    """List the themes, sorted."""
    found = (entry for entry in templates_folder().iterdir() if (entry / "tokens.css").is_file())
    return tuple(sorted(entry.name for entry in found))


def _text(*parts: str) -> str:
    return templates_folder().joinpath(*parts).read_text(encoding="utf-8")


def _own_text(overrides: Path | None, name: str) -> str:
    """A file of the campaign's own folder; empty where it has none."""
    path = overrides / name if overrides else None
    return path.read_text(encoding="utf-8") if path and path.is_file() else ""


@cache
def _tokens(theme: str) -> str:
    if theme not in themes():
        raise SheetError(f"no theme is called {theme!r}; there are: {', '.join(themes())}")
    return _text(theme, "tokens.css")


def palette(theme: str, overrides: Path | None = None) -> Mapping[str, str]:
    """Give the colours of a theme on paper: the first ``:root`` block of its tokens.

    Parameters
    ----------
    theme
        Folder of the theme.
    overrides
        Folder of the campaign; the colours in its ``tokens.css`` take the place of those of
        the same name.

    Raises
    ------
    SheetError
        If there is no such theme, or its tokens have no ``:root`` block.
    """
    block = _ROOT.search(_tokens(theme))
    if block is None:
        raise SheetError(f"tokens.css of the theme {theme!r} has no :root block")
    own = _ROOT.search(_own_text(overrides, "tokens.css"))
    colours = dict(_TOKEN.findall(block[1]))
    return MappingProxyType(colours | dict(_TOKEN.findall(own[1] if own else "")))


@cache
def font_bytes(face: str) -> bytes:
    """Give one of the bundled faces."""
    return templates_folder().joinpath(BASE, "fonts", face).read_bytes()


def _last_styles(theme: str, overrides: Path | None) -> str:
    """Rules of the theme, then those of the campaign."""
    own = templates_folder() / theme / "theme.css"
    rules = own.read_text(encoding="utf-8") if own.is_file() else ""
    return f"{rules}\n{_own_text(overrides, 'theme.css')}"


def _role_style(theme: str) -> str:
    """Rules by which the classes of a drawing take the colours of the page."""
    roles = palette(theme)
    return "".join(
        f".s-{role}{{stroke:var(--{role})}}.f-{role}{{fill:var(--{role})}}\n" for role in roles
    )


def paper_style(theme: str, overrides: Path | None = None, *, of_lamp: bool = False) -> str:
    """Give the style sheet of the PDF; faces are named ``asset:/fonts/...``.

    Colours are written out: paper has one set of them, and the engine resolves a variable anew
    for every element.

    Parameters
    ----------
    theme
        Folder of the theme.
    overrides
        Folder of the campaign with tokens and rules of its own; ``None`` where it has none.
    of_lamp
        Whether to leave out the rules that only pages of many lamps use: the engine tries every
        rule on every element.
    """
    colours, parts = palette(theme, overrides), _styles("paper")
    shared = parts[:_PARTS_OF_LAMP] if of_lamp else parts
    style = "\n".join((_text(BASE, "fonts.css"), *shared, _last_styles(theme, overrides)))
    written = _VARIABLE.sub(lambda found: colours.get(found[1], found[0]), style)
    return written.replace('url("fonts/', 'url("asset:/fonts/')


def _styles(medium: str) -> tuple[str, ...]:
    """The rules that all themes share, for ``screen`` or ``paper``."""
    names = (
        "sheet.css",
        f"{medium}.css",
        "lamp.css",
        f"lamp_{medium}.css",
        f"comparison_{medium}.css",
        f"tender_{medium}.css",
    )
    return tuple(_text(BASE, name) for name in names)


def site_assets(theme: str, overrides: Path | None = None) -> Mapping[str, bytes]:
    """Give the files that the pages of a theme need, by path inside the folder of assets.

    Parameters
    ----------
    theme
        Folder of the theme.
    overrides
        Folder of the campaign with tokens and rules of its own; ``None`` where it has none.
    """
    tokens = (_tokens(theme), _own_text(overrides, "tokens.css"))
    parts = (_text(BASE, "fonts.css"), *tokens, *_styles("screen"), _role_style(theme))
    style = "\n".join((*parts, _last_styles(theme, overrides)))
    fonts = {f"fonts/{face}": font_bytes(face) for face in FACES}
    licence = _text(BASE, "fonts", "OFL.txt").encode()
    return {"sheet.css": style.encode(), **fonts, "fonts/OFL.txt": licence, **_scripts()}


@cache
def _scripts() -> Mapping[str, bytes]:
    """The scripts of the comparison, by path inside the folder of assets."""
    folder = templates_folder() / BASE / "scripts"
    return {f"scripts/{path.name}": path.read_bytes() for path in sorted(folder.glob("*.js"))}


def theme_overrides(campaign: Path, theme: str) -> Path | None:
    """Find the folder in which a campaign changes a theme: ``templates/<theme>``.

    Parameters
    ----------
    campaign
        The campaign folder.
    theme
        Theme of the campaign.

    Returns
    -------
    pathlib.Path or None
        The folder, whole path; ``None`` where there is none.
    """
    folder = campaign.resolve() / "templates" / theme
    return folder if folder.is_dir() else None


def theme_problems(name: object) -> Iterator[Problem]:
    """What is wrong with the theme that a campaign asks for.

    Parameters
    ----------
    name
        ``sheet.theme`` as it stands in ``campaign.toml``; anything but text is left to the
        settings model.

    Yields
    ------
    Problem
        One where there is no such theme.
    """
    if isinstance(name, str) and name not in themes():
        expected = f"one of {', '.join(themes())}"
        yield Problem(
            "error", "campaign.toml", None, "sheet.theme", name, expected, "There is no such theme."
        )
