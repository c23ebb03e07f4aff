"""What the gate collects for one bid: reasons, questions, checks passed."""

from __future__ import annotations

from dataclasses import dataclass, field

from generator.records.tender import Eligibility, Outcome, Question, Reason

__all__ = ["GateFindings"]


@dataclass(slots=True)
class GateFindings:
    """Reasons, questions and passed checks as the gate comes upon them."""

    reasons: list[Reason] = field(default_factory=list)
    questions: list[Question] = field(default_factory=list)
    passed: list[str] = field(default_factory=list)

    def exclude(self, clause: str, title: str, text: str, source: str) -> None:
        """Note a reason for which the bid is not admissible."""
        self.reasons.append(Reason(clause, title, text, source))

    def ask(self, clause: str, title: str, text: str, particulars: str = "") -> None:
        """Note a question to the bidder."""
        self.questions.append(Question(clause, title, text, particulars))

    def hold(self, clause: str) -> None:
        """Note a check that was passed."""
        self.passed.append(clause)

    def result(self) -> Eligibility:
        """The outcome: a reason weighs more than a question."""
        if self.reasons:
            outcome = Outcome.NOT_ADMISSIBLE
        elif self.questions:
            outcome = Outcome.TO_CLARIFY
        else:
            outcome = Outcome.ADMISSIBLE
        return Eligibility(outcome, tuple(self.reasons), tuple(self.questions), tuple(self.passed))
