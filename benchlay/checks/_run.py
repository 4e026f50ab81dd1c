"""Runs checks in every state; what crashes or cannot be evaluated is said, never passed over."""

from __future__ import annotations

from collections.abc import Sequence

from benchlay.checks._check import Check, Context, Run, Unevaluated
from benchlay.findings import Finding, Severity, identify


def run_checks(context: Context, checks: Sequence[Check]) -> tuple[list[Finding], list[Run]]:
    """Run checks in every state.

    Returns
    -------
    findings : list of Finding
        With their ids, check by check, each in the order of the states.
    runs : list of Run
        One entry a check and state.
    """
    findings: list[Finding] = []
    runs: list[Run] = []
    for check in checks:
        for variant, state in enumerate(context.trace.scene.variants):
            found, reason = _one(check, context, variant)
            findings += [finding._replace(state=state) for finding in found]
            runs.append(Run(check.NAME, state, reason is None, reason))
    return identify(findings), runs


def _one(check: Check, context: Context, variant: int) -> tuple[list[Finding], str | None]:
    """Return what a check finds in a state, and why it could not be evaluated (wholly)."""
    found: list[Finding] = []
    reasons: list[str] = []
    try:
        for item in check.check(context, variant):
            if isinstance(item, Unevaluated):
                reasons.append(item.reason)
                found.append(_not_evaluated(check.NAME, item))
            else:
                found.append(item)
    except Exception as error:  # a fault of ours must not hide what other checks find
        reason = f"the check itself failed ({type(error).__name__}: {error})"
        reasons.append(reason)
        found.append(_not_evaluated(check.NAME, Unevaluated(reason, "report this as a fault")))
    return found, "; ".join(dict.fromkeys(reasons)) or None


def _not_evaluated(name: str, item: Unevaluated) -> Finding:
    # What could not be judged has to count as the larger hazard: it fails.
    return Finding(
        check=name,
        severity=Severity.FAIL,
        message=f"not evaluated: {item.reason}",
        expected=f"a layout on which '{name}' can be evaluated; this is no pass",
        remedy=item.remedy,
        element=item.element,
        span=item.span,
        key=("not evaluated", item.reason),
    )
