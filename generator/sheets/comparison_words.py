"""Fixed words of the comparison and of its controls, in one place for a translation."""

from __future__ import annotations

from collections.abc import Mapping

from generator.language import say, say_as, told

__all__ = [
    "CHOSEN_COLUMNS",
    "CONTROL_WORDS",
    "PRICE",
    "QUESTIONS",
    "SHORT_LABELS",
    "control_words",
]

PRICE, QUESTIONS = "unit_price", "questions"
"""Columns that are no quantities of the catalogue: what the bidder asks, and what is asked back."""

CHOSEN_COLUMNS = frozenset(
    {
        PRICE,
        QUESTIONS,
        "energy_efficiency_class",
        "luminous_flux_lm",
        "efficacy_lm_per_w",
        "cct_k",
        "ra",
        "percent_flicker",
    }
)
"""Columns shown at first where columns can be chosen."""

SHORT_LABELS: Mapping[str, str] = {
    PRICE: say("unit price"),
    QUESTIONS: say("questions open"),
    "energy_efficiency_class": say("energy class"),
    "cct_k": say("colour temperature"),
    "duv": say("distance from the locus"),
    "ra": say("colour rendering"),
    "r9": say("deep red"),
    "percent_flicker": say("percent flicker"),
    "svm": say("stroboscopic effect"),
    "pst_lm": say("visible flicker"),
    "thd_current_percent": say("distortion of the current"),
    "efficacy_lm_per_w": say("luminous efficacy"),
}
"""Column -> heading, where the name of the catalogue is too long for a column."""

CONTROL_WORDS: Mapping[str, str] = {
    "controls": say("Choose what is shown"),
    "search": say_as("search field", "Find"),
    "search_hint": say("Model, bidder or lamp id"),
    "verdict": say("Verdict"),
    "verdict_any": say_as("verdict", "any"),
    "verdict_clean": say("no clause failed"),
    "verdict_fail": say("fails a clause"),
    "verdict_inconclusive": say("inconclusive somewhere"),
    "verdict_not_measured": say("not measured somewhere"),
    "bidder": say("Bidder"),
    "bidder_any": say_as("bidder", "any"),
    "reference": say("Difference from"),
    "reference_none": say("no lamp: show values"),
    "columns": say_as("table", "Columns"),
    "columns_all": say("All columns"),
    "columns_few": say("The usual columns"),
    "ranges": say("Ranges"),
    "range_figure": say_as("quantity", "Figure"),
    "range_low": say_as("range", "at least"),
    "range_high": say_as("range", "at most"),
    "range_add": say("Add the range"),
    "range_remove": say("Remove the range: {range}"),
    "range_unread": say("\u201c{text}\u201d is no number, or can be read in two ways."),
    "range_reversed": say("The lower end is above the upper end."),
    "range_from": say("{column} at least {low}"),
    "range_to": say("{column} at most {high}"),
    "range_between": say("{column} at least {low}, at most {high}"),
    "download": say("Download as CSV"),
    "copy_csv": say("Copy as CSV"),
    "link": say("Copy a link to this view"),
    "reset": say("Show everything"),
    "copied": say("Copied."),
    "copy_failed": say("The browser did not allow copying."),
    "shown": say("{shown} of {all} lamps shown."),
    "shown_first": say("{shown} of {all} lamps match; the first {first} stand here."),
    "show_more": say("Show 50 more"),
    "show_all": say("Show all {count}"),
    "nothing": say("No lamp matches. Widen a filter, or show everything."),
    "compare": say("Set {model} side by side"),
    "compare_short": say("side by side"),
    "side_heading": say("Side by side"),
    "side_caption": say("The lamps chosen, figure by figure"),
    "side_figure": say_as("quantity", "Figure"),
    "side_remove": say("Take {model} out"),
    "side_clear": say("Take all out"),
    "side_full": say("Six lamps are side by side already; take one out first."),
    "side_lamps": say("Side by side: {count}."),
    "sorted": say("Sorted by {column}, {way}."),
    "ascending": say("lowest first"),
    "descending": say("highest first"),
    "difference_legend": say(
        "Every number is the difference from {model}; \u2248 marks one that is smaller than the "
        "two expanded uncertainties together."
    ),
    "scatter_x": say_as("axis", "Across"),
    "scatter_y": say_as("axis", "Up"),
    "scatter_note": say("{up} against {across}; lamps drawn: {count}."),
    "spectra_heading": say("Spectra of the lamps side by side"),
    "spectra_title": say("Spectra of {models}"),
    "spectra_scale": say("share of the peak, %"),
    "wavelength": say("wavelength, nm"),
    "with_unit": say("{label}, {unit}"),
    "none": say_as("number", "none"),
    "lamp": say("Lamp"),
    "verdicts": say("Verdicts"),
}
"""Words that the controls and the scripts show; braces stand for what is put in."""


def control_words() -> dict[str, str]:
    """Say the words of the controls in the language that is being spoken."""
    return {key: told(words) for key, words in CONTROL_WORDS.items()}
