"""What a sheet says of how its figures came about: methods, conditions, rules, findings, use."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from decimal import Decimal

from generator.language import SEMICOLON, Passage, joined, told
from generator.language.speaking import in_language
from generator.quantities import QUANTITIES, quantity
from generator.records.assessment import Assessment
from generator.records.comparison import SheetContext
from generator.records.figure import Figure, Grade
from generator.records.finding import Finding
from generator.records.settings import Settings, UncertaintyRule
from generator.records.verdict import Basis, VerdictWord
from generator.sheets.description import Pair, RiskStatement
from generator.sheets.figure_text import figure_text, in_words, phrase
from generator.sheets.lamp_description import FindingText, MethodText, Statements, UseText
from generator.sheets.lamp_words import (
    AND_MORE,
    CONDITION_LABELS,
    DECISION_RULES,
    FOUND_ON,
    GRADE_FIGURES,
    GRADE_WORDS,
    LAW_READ,
    LIFE_BASES,
    SEVERITY_WORDS,
    UNCERTAINTY_NAMES,
    UNCERTAINTY_STATEMENT,
    USE_BASES,
    USE_LABELS,
)
from generator.sheets.number_format import date_words, exact_text, shown
from generator.sheets.risk_text import risk_statement
from generator.sheets.sheet_frame import source_text
from generator.sheets.shown_names import ShownNames
from generator.sheets.words import GROUP_HEADINGS

__all__ = ["finding_texts", "grade_texts", "method_texts", "statements_of", "use_texts"]

_HOURS = Decimal(1000)
_MOST_NAMED = 16
_MOST_LABELS = 6
_LONGEST_EDITION = 12
_HYPHEN_MINUS = re.compile(r"(?<![\w.])-(?=\d)")


def finding_texts(findings: Iterable[Finding], context: SheetContext) -> tuple[FindingText, ...]:
    """Write findings, the heaviest first.

    Parameters
    ----------
    findings
        Findings on one lamp.
    context
        Sources.
    """
    return tuple(
        FindingText(
            SEVERITY_WORDS[item.severity],
            item.title,
            _compared(item),
            item.explanation,
            _named_source(item.source, context),
        )
        for item in sorted(findings, key=lambda item: item.severity.rank)
    )


def _compared(finding: Finding) -> str:
    """What was compared; the lamp is named by the sheet already."""
    text = in_words(finding.compared, 0).removeprefix(told(FOUND_ON.format(lamp=finding.lamp_id)))
    plain = _HYPHEN_MINUS.sub("\u2212", text)
    return f"{plain[:1].upper()}{plain[1:]}"


def _named_source(text: str, context: SheetContext) -> str:
    """A source key with its clause, the key by the title of the document."""
    key, *clause = text.parts if isinstance(text, Passage) else text.split(", ", 1)
    known = context.sources.get(key)
    return joined(", ", (in_language(known.title, "en"), *clause)) if known else text


def method_texts(figures: Iterable[Figure], context: SheetContext) -> tuple[MethodText, ...]:
    """List the methods behind some figures, each once, in the order of the figures.

    Parameters
    ----------
    figures
        The figures shown.
    context
        Methods and sources.
    """
    behind: dict[str, list[str]] = {}
    for figure in figures:
        known = context.methods.get(figure.method)
        if known is not None and figure.value is not None:
            behind.setdefault(known.title, []).append(figure.quantity)
    titled = {item.title: item for item in context.methods.values()}
    return tuple(
        MethodText(
            title,
            titled[title].formula,
            joined(
                ", ",
                (
                    part
                    for part in (
                        source_text(
                            context.sources.get(titled[title].source), titled[title].source
                        ),
                        titled[title].clause,
                    )
                    if part
                ),
            ),
            _some(list(_labels(names))),
        )
        for title, names in behind.items()
    )


def _labels(names: Iterable[str]) -> Iterator[str]:
    """Symbols of quantities, or their names where there is no symbol; each once."""
    yield from dict.fromkeys(quantity(name).symbol or quantity(name).label for name in names)


def _some(labels: list[str]) -> str:
    """The first labels, and how many more there are."""
    named = joined(", ", labels[:_MOST_LABELS])
    left = len(labels) - _MOST_LABELS
    return AND_MORE.format(titles=named, count=left) if left > 0 else named


def grade_texts(figures: Iterable[Figure]) -> tuple[Pair, ...]:
    """Tell which figures rest on which evidence.

    Parameters
    ----------
    figures
        The figures shown.
    """
    by_grade: dict[Grade, list[str]] = {grade: [] for grade in Grade}
    for figure in figures:
        if figure.value is not None:
            by_grade[figure.grade].append(figure.quantity)
    return tuple(
        Pair(GRADE_WORDS[grade], GRADE_FIGURES.format(count=len(names), names=_listed(names)))
        for grade, names in by_grade.items()
        if names
    )


def _listed(names: list[str]) -> str:
    """Quantities by name; the groups of the catalogue where there are many."""
    if len(names) > _MOST_NAMED:
        groups = dict.fromkeys(quantity(name).group for name in names)
        return joined(", ", (GROUP_HEADINGS[group] for group in groups))
    return joined(", ", (quantity(name).label for name in names))


def statements_of(assessment: Assessment, lamp_id: str) -> Statements:
    """Write the conditions, and the statements on uncertainty, decision rule and law.

    Parameters
    ----------
    assessment
        Settings, date and law book.
    lamp_id
        The lamp.
    """
    settings = assessment.campaign.settings
    decision = settings.decision
    return Statements(
        laboratory=_labelled(_laboratory(settings)),
        conditions=_labelled(_conditions(assessment, lamp_id)),
        uncertainties=tuple(_stated(name, rule) for name, rule in settings.uncertainty.items()),
        uncertainty=UNCERTAINTY_STATEMENT,
        decision=DECISION_RULES[decision.rule].format(
            factor=exact_text(decision.guard_band_factor),
            probability=exact_text(decision.probability),
        ),
        law=LAW_READ.format(
            date=date_words(assessment.assessed_on), edition=assessment.law_book[:_LONGEST_EDITION]
        ),
        risks=_risks(assessment, lamp_id),
    )


def _risks(assessment: Assessment, lamp_id: str) -> RiskStatement | None:
    """Global risks of the clauses that one lamp was judged by."""
    judged = {
        item.clause
        for item in assessment.verdicts_of(lamp_id)
        if item.basis is Basis.DETERMINED and item.verdict is not VerdictWord.NOT_APPLICABLE
    }
    return risk_statement([item for item in assessment.risks if item.clause in judged])


def _stated(name: str, rule: UncertaintyRule) -> Pair:
    """One line of ``[uncertainty]``: a quantity, or a property of the spectrometer."""
    label, unit = UNCERTAINTY_NAMES.get(name, (name, ""))
    if name in QUANTITIES:
        label, unit = quantity(name).label, quantity(name).unit
    if rule.percent is not None:
        return Pair(label, f"{exact_text(rule.percent)}\u00a0%")
    return Pair(label, f"{exact_text(rule.absolute or Decimal(0))}\u00a0{unit}".rstrip("\u00a0"))


def _labelled(texts: dict[str, str]) -> tuple[Pair, ...]:
    """What is stated, under its label."""
    return tuple(Pair(CONDITION_LABELS[key], text) for key, text in texts.items() if text)


def _laboratory(settings: Settings) -> dict[str, str]:
    laboratory = settings.laboratory
    methods = laboratory.methods
    return {
        "laboratory": laboratory.name,
        "address": laboratory.address,
        "accreditation": laboratory.accreditation,
        "methods": methods if isinstance(methods, str) else joined(SEMICOLON, methods),
    }


def _conditions(assessment: Assessment, lamp_id: str) -> dict[str, str]:
    settings = assessment.campaign.settings
    supply = settings.supply
    volts = f"{exact_text(supply.voltage_v)}\u00a0V" if supply.voltage_v else ""
    hertz = f"{exact_text(supply.frequency_hz)}\u00a0Hz" if supply.frequency_hz else ""
    ambient = figure_text(
        assessment.figures.best(lamp_id, "ambient_temperature_c"), "ambient_temperature_c"
    )
    return {
        "supply": ", ".join(part for part in (volts, hertz) if part),
        "ambient": "" if ambient.missing else phrase(ambient),
        "purpose": settings.campaign.purpose,
    }


def use_texts(assessment: Assessment, lamp_id: str) -> tuple[UseText, ...]:
    """Answer what a lamp takes in a year: energy, money, carbon; empty without hours of use.

    Parameters
    ----------
    assessment
        Figures, and the campaign's way of use.
    lamp_id
        The lamp.
    """
    use = assessment.campaign.settings.use
    energy = _energy_kwh(assessment, lamp_id)
    if energy is None or use.hours_per_year is None:
        return ()
    power = phrase(figure_text(assessment.figures.best(lamp_id, "power_w"), "power_w"))
    hours = exact_text(use.hours_per_year)
    basis = USE_BASES["energy"].format(power=power, hours=hours)
    return (
        UseText(USE_LABELS["energy"], _short(energy), "kWh", basis),
        *_money(assessment.campaign.settings, energy),
        *_life_cycle(assessment, lamp_id),
        *_saving(assessment, lamp_id, energy),
    )


def _money(settings: Settings, energy: Decimal) -> Iterator[UseText]:
    use = settings.use
    if use.tariff_per_kwh is not None:
        currency = use.currency or ""
        rate = f"{exact_text(use.tariff_per_kwh)}\u00a0{currency}".strip()
        cost = shown(energy * use.tariff_per_kwh, 2)
        yield UseText(USE_LABELS["cost"], cost, currency, USE_BASES["cost"].format(tariff=rate))
    factors = {"location": use.location_based, "market": use.market_based}
    for kind, factor in factors.items():
        if factor is None:
            continue
        grams = f"{exact_text(factor.g_per_kwh)}\u00a0g"
        yield UseText(
            USE_LABELS[kind],
            _short(energy * factor.g_per_kwh / _HOURS),
            "kg CO\u2082e",
            USE_BASES[kind].format(factor=grams, source=factor.region),
        )


def _life_cycle(assessment: Assessment, lamp_id: str) -> Iterator[UseText]:
    """Life-cycle cost of the lots in which the lamp is offered."""
    lots = assessment.tender.lots if assessment.tender else ()
    for bid in (bid for lot in lots for bid in lot.bids if bid.bid.lamp_id == lamp_id):
        if bid.cost is not None:
            years, lamps = bid.cost.years, bid.cost.lamps
            yield UseText(
                USE_LABELS["life"].format(count=years),
                shown(bid.cost.total, 0),
                bid.cost.currency,
                LIFE_BASES[bid.cost.prices].format(count=lamps),
            )


def _saving(assessment: Assessment, lamp_id: str, energy: Decimal) -> Iterator[UseText]:
    baseline = assessment.campaign.settings.use.baseline_lamp
    before = _energy_kwh(assessment, baseline) if baseline else None
    if baseline is None or before is None or baseline == lamp_id:
        return
    power = phrase(figure_text(assessment.figures.best(baseline, "power_w"), "power_w"))
    model = ShownNames(assessment).lamp(assessment.campaign.lamp(baseline))
    basis = USE_BASES["saving"].format(lamp=model, power=power)
    yield UseText(USE_LABELS["saving"], _short(before - energy), "kWh", basis)


def _energy_kwh(assessment: Assessment, lamp_id: str) -> Decimal | None:
    """Energy of a year in use [kWh]: power times hours."""
    figure = assessment.figures.best(lamp_id, "power_w")
    hours = assessment.campaign.settings.use.hours_per_year
    if figure is None or figure.number is None or hours is None:
        return None
    return figure.number * hours / _HOURS


def _short(value: Decimal) -> str:
    """Three significant digits, which is what an estimate of use can hold."""
    return shown(value, max(2 - value.adjusted(), 0))
