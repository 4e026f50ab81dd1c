"""Every check's own examples are run, and its papers are complete."""

import re
import textwrap
from pathlib import Path

import pytest

import benchlay.checks
from benchlay.checks import CHECKS
from benchlay.findings import Finding

HEADINGS = ("Why it matters", "Fails", "Passes", "What it does not see", "Source")
CASE = re.compile(r"^(Fails|Passes)\n-+\n\.\. code-block:: yaml\n\n((?:   .*\n|\n)+)", re.MULTILINE)
MARK = re.compile(r"# <- ([\w-]+)")


def cases():
    for module in CHECKS:
        for heading, text in CASE.findall(module.__doc__):
            yield pytest.param(
                module, heading, textwrap.dedent(text), id=f"{module.NAME}-{heading}"
            )


@pytest.mark.parametrize(("module", "heading", "text"), list(cases()))
def test_example(module, heading, text, make_context):
    context = make_context(text)
    found = {
        (f.span and f.span.line, f.check)
        for variant in range(len(context.trace.scene.variants))
        for f in module.check(context, variant)
        if isinstance(f, Finding)
    }
    wanted = {
        (n, name)
        for n, line in enumerate(text.splitlines(), start=1)
        for name in MARK.findall(line)
    }
    assert found == wanted
    assert bool(wanted) == (heading == "Fails")


@pytest.mark.parametrize("module", CHECKS, ids=lambda m: m.NAME)
def test_papers_are_complete_and_in_order(module):
    first = module.__doc__.splitlines()[0]
    assert first.endswith(".")
    places = [module.__doc__.find(f"\n{h}\n---") for h in HEADINGS]
    assert -1 not in places
    assert places == sorted(places)
    assert [heading for heading, _ in CASE.findall(module.__doc__)] == ["Fails", "Passes"]


def test_every_file_is_registered():
    folder = Path(benchlay.checks.__file__).parent
    files = {p.stem for p in folder.glob("*.py") if not p.stem.startswith("_")}
    assert files == {m.__name__.rpartition(".")[2] for m in CHECKS}


def test_names_are_those_of_the_files_and_unique():
    assert len({m.NAME for m in CHECKS}) == len(CHECKS)
    for module in CHECKS:
        assert module.__name__.endswith(module.NAME.replace("-", "_"))
