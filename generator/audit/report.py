"""What an audit says: findings by part, the digests and signatures it rests on."""

from __future__ import annotations

from dataclasses import asdict, dataclass
from typing import Any, Literal

__all__ = ["PARTS", "AuditFinding", "AuditReport", "SignatureFinding"]

PARTS = ("integrity", "derivation", "completeness", "signature", "redaction")

Level = Literal["failure", "note"]


@dataclass(frozen=True, slots=True)
class AuditFinding:
    """One thing found.

    Parameters
    ----------
    part
        One of :data:`PARTS`.
    level
        ``failure``: the audit fails; ``note``: to be known.
    subject
        File, figure, verdict or item.
    message
        What is the matter with it.
    """

    part: str
    level: Level
    subject: str
    message: str

    def __str__(self) -> str:
        return f"{self.level}: {self.part}: {self.subject}: {self.message}"


@dataclass(frozen=True, slots=True)
class SignatureFinding:
    """One signature, verified.

    Parameters
    ----------
    file
        The file that was signed.
    signer
        Subject of the certificate.
    issuer, serial
        Issuer and serial number of the certificate.
    valid_from, valid_to
        Validity of the certificate, ISO 8601.
    signed_at
        Time that the signer states, or empty.
    intact
        Whether what was signed is what is there now.
    changed_afterwards
        Whether something was added after the signature.
    trusted
        Whether the certificate leads to one the auditor trusts; ``None`` where none was named.
    """

    file: str
    signer: str
    issuer: str
    serial: str
    valid_from: str
    valid_to: str
    signed_at: str
    intact: bool
    changed_afterwards: bool
    trusted: bool | None

    @property
    def text(self) -> str:
        """Signer, certificate and state in one phrase."""
        word = "intact" if self.intact else "BROKEN"
        added = ", changed afterwards" if self.changed_afterwards else ", unchanged since"
        trust = {None: "not asked", True: "trusted", False: "NOT trusted"}[self.trusted]
        return (
            f"signed by {self.signer} (issuer {self.issuer}, serial {self.serial}, "
            f"valid {self.valid_from} to {self.valid_to}): {word}{added}, certificate {trust}"
        )


@dataclass(frozen=True, slots=True)
class AuditReport:
    """The outcome of one audit.

    Parameters
    ----------
    subject
        What was audited, as it was named.
    kind
        ``folder``, ``archive`` or ``document``.
    facts
        What the issue says of itself: edition, campaign, date, versions, digest.
    checked
        What was compared -> how many.
    findings
        Failures and notes.
    signatures
        Signatures found.
    """

    subject: str
    kind: str
    facts: dict[str, Any]
    checked: dict[str, int]
    findings: tuple[AuditFinding, ...]
    signatures: tuple[SignatureFinding, ...] = ()

    @property
    def failures(self) -> tuple[AuditFinding, ...]:
        """Findings that fail the audit."""
        return tuple(item for item in self.findings if item.level == "failure")

    @property
    def passed(self) -> bool:
        """Whether nothing failed."""
        return not self.failures

    def as_json(self) -> dict[str, Any]:
        """The report as plain values."""
        return {
            "subject": self.subject,
            "kind": self.kind,
            "passed": self.passed,
            "facts": self.facts,
            "checked": self.checked,
            "findings": [asdict(item) for item in self.findings],
            "signatures": [asdict(item) for item in self.signatures],
        }
