"""Fixed words of the comparison and of its controls, in one place for a translation."""

from __future__ import annotations

from collections.abc import Mapping

__all__ = ["CHOSEN_COLUMNS", "CONTROL_WORDS", "PRICE", "QUESTIONS", "SHORT_LABELS"]

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
    PRICE: "unit price",
    QUESTIONS: "questions open",
    "energy_efficiency_class": "energy class",
    "cct_k": "colour temperature",
    "duv": "distance from the locus",
    "ra": "colour rendering",
    "r9": "deep red",
    "percent_flicker": "percent flicker",
    "svm": "stroboscopic effect",
    "pst_lm": "visible flicker",
    "thd_current_percent": "distortion of the current",
    "efficacy_lm_per_w": "luminous efficacy",
}
"""Column -> heading, where the name of the catalogue is too long for a column."""

CONTROL_WORDS: Mapping[str, str] = {
    "controls": "Choose what is shown",
    "search": "Find",
    "search_hint": "Model, bidder or lamp id",
    "verdict": "Verdict",
    "verdict_any": "any",
    "verdict_clean": "no clause failed",
    "verdict_fail": "fails a clause",
    "verdict_inconclusive": "inconclusive somewhere",
    "verdict_not_measured": "not measured somewhere",
    "bidder": "Bidder",
    "bidder_any": "any",
    "reference": "Difference from",
    "reference_none": "no lamp: show values",
    "columns": "Columns",
    "columns_all": "All columns",
    "columns_few": "The usual columns",
    "ranges": "Ranges",
    "range_figure": "Figure",
    "range_low": "at least",
    "range_high": "at most",
    "range_add": "Add the range",
    "range_remove": "Remove the range",
    "download": "Download as CSV",
    "copy_csv": "Copy as CSV",
    "link": "Copy a link to this view",
    "reset": "Show everything",
    "copied": "Copied.",
    "copy_failed": "The browser did not allow copying.",
    "shown": "{shown} of {all} lamps shown.",
    "shown_first": "{shown} of {all} lamps match; the first {first} stand here.",
    "show_more": "Show 50 more",
    "show_all": "Show all {count}",
    "nothing": "No lamp matches. Widen a filter, or show everything.",
    "compare": "Set {model} side by side",
    "compare_short": "side by side",
    "side_heading": "Side by side",
    "side_caption": "The lamps chosen, figure by figure",
    "side_figure": "Figure",
    "side_remove": "Take {model} out",
    "side_clear": "Take all out",
    "side_full": "Six lamps are side by side already; take one out first.",
    "side_lamps": "{count} lamps side by side.",
    "sorted": "Sorted by {column}, {way}.",
    "ascending": "lowest first",
    "descending": "highest first",
    "difference_legend": (
        "Every number is the difference from {model}; \u2248 marks one that is smaller than the "
        "two expanded uncertainties together."
    ),
    "scatter_x": "Across",
    "scatter_y": "Up",
    "scatter_note": "{x} against {y}; {count} lamps.",
    "spectra_heading": "Spectra of the lamps side by side",
    "spectra_scale": "share of the peak, %",
    "wavelength": "wavelength, nm",
    "none": "none",
    "lamp": "Lamp",
    "verdicts": "Verdicts",
}
"""Words that the controls and the scripts show; braces stand for what is put in."""
