"""What panels and lids take beside what they withstand."""

from __future__ import annotations

from collections.abc import Sequence

from benchlay.checks import Context
from benchlay.faults.guards import Budget, budgets, loads_of
from benchlay.report.details import PanelLoad


def panels_of_states(context: Context, states: Sequence[str]) -> tuple[PanelLoad, ...]:
    """Return the budgets of all panels and lids over states as they are."""
    variants = context.trace.scene.variants
    cases = [(name, None, loads_of(context, variants.index(name))) for name in states]
    return panel_rows(budgets(context.layout(0), cases))


def panel_rows(found: Sequence[Budget]) -> tuple[PanelLoad, ...]:
    """Return budgets as they are reported."""
    return tuple(map(_row, found))


def _row(budget: Budget) -> PanelLoad:
    by_irradiance = budget.unit == "W/cm2"
    withstands = budget.limit if by_irradiance else None
    worst = budget.worst
    if worst is None:
        return PanelLoad(
            budget.sheet[1],
            None,
            None,
            withstands,
            None,
            limit=budget.limit,
            unit=budget.unit,
            rated_s=budget.rated_s,
            sheet=budget.sheet[0],
            reason=budget.reason,
        )
    load = worst.load
    return PanelLoad(
        budget.sheet[1],
        load.irradiance_w_m2 * 1e-4,
        worst.state,
        withstands,
        budget.margin,
        "state" if worst.fault is None else "fault",
        worst.fault,
        budget.value,
        budget.limit,
        budget.unit,
        load.exposure_s,
        budget.rated_s,
        load.source,
        load.wavelength_nm,
        load.left,
        budget.margin is not None,
        budget.reason,
        budget.sheet[0],
    )
