"""Audit: is an issue intact, does it follow from its data, is it complete, who signed it."""

from generator.audit.auditing import audit
from generator.audit.report import AuditFinding, AuditReport, SignatureFinding

__all__ = ["AuditFinding", "AuditReport", "SignatureFinding", "audit"]
