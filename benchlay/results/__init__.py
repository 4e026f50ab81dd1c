"""From a trace to results as plain data: what `report.model` holds and every form writes."""
