"""Where a page lies in an issue: the way to its root, and to itself in other languages."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from generator.language.speaking import language_name

__all__ = ["LanguageLink", "PagePlace", "page_place", "tree_of"]


@dataclass(frozen=True, slots=True)
class LanguageLink:
    """A page in one language.

    Parameters
    ----------
    tag, name
        Language, by tag and by its own name.
    address
        Way from the page to it; empty for the page itself.
    """

    tag: str
    name: str
    address: str


@dataclass(frozen=True, slots=True)
class PagePlace:
    """Where a page lies.

    Parameters
    ----------
    root
        Way from the page to the root of the issue, where assets and data lie: empty there, else
        ending in a slash.
    languages
        The page in every language of the issue; empty where there is one.
    """

    root: str
    languages: tuple[LanguageLink, ...] = ()


def tree_of(language: str, languages: Sequence[str]) -> str:
    """Give the folder of a language's tree inside the issue.

    Parameters
    ----------
    language
        Tag of the language.
    languages
        Languages of the issue; the tree of the first is the root of the issue.

    Returns
    -------
    str
        Empty for the first, else the tag and a slash.
    """
    return "" if language == languages[0] else f"{language}/"


def page_place(name: str, language: str, languages: Sequence[str]) -> PagePlace:
    """Place a page.

    Parameters
    ----------
    name
        Path of the page inside the tree of its language, for instance ``lamps/L-01.html``.
    language
        Tag of its language.
    languages
        Languages of the issue, the first one at its root.
    """
    tree = tree_of(language, languages)
    root = "../" * (tree + name).count("/")
    links = tuple(
        LanguageLink(
            tag,
            language_name(tag),
            "" if tag == language else f"{root}{tree_of(tag, languages)}{name}",
        )
        for tag in languages
    )
    return PagePlace(root, links if len(links) > 1 else ())
