"""Tables on sheets: every row is on one of them, and all can be read."""

from pathlib import Path

import pytest

from benchlay import pipeline
from benchlay.sheets.drafting import title_fields
from benchlay.sheets.shop.listing import listing, pages
from benchlay.sheets.shop.parts_list import parts_list
from benchlay.sheets.shop.rows import Heading, Rows
from benchlay.sheets.shop.setting_out import setting_out

ROOT = Path(__file__).parents[3]
BENCHES = sorted((ROOT / "layouts").glob("*.yaml"))


@pytest.mark.parametrize("bench", BENCHES, ids=lambda b: b.stem)
def test_tables_of_every_bench_can_be_read(bench, legible):
    placed = pipeline.place(pipeline.read(bench))
    for rows in (setting_out(placed), parts_list(placed.base)):
        fields = title_fields(placed.base.layout, rows.title)
        for part in pages(rows, placed.base.layout):
            legible(listing(rows, part, rows.name, placed.base.layout, fields))


def test_a_long_table_goes_on_to_further_sheets(words_of):
    layout = pipeline.read(BENCHES[0]).as_drawn
    many = tuple((f"item-{n}", float(n)) for n in range(300))
    rows = Rows("long", "Long", (Heading("name", 40.0), Heading("x", 20.0, "mm")), many)
    parts = pages(rows, layout)
    assert [row[0] for part in parts for row in part] == [row[0] for row in many]
    assert len(parts) > 3
    fields = title_fields(layout, "Long")
    said = [w for part in parts for w in words_of(listing(rows, part, "l", layout, fields))]
    assert {row[0] for row in many} <= set(said)
    assert not [w for w in said if w.startswith("... and")]
