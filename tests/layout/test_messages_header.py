"""What is said of mistakes in header: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\ninclude: [parts/common.yaml]\n"),
        [
            (
                "b.yaml:2:10: error: include: not yet: other files are not read by this "
                "version\n"
                "  expected: a layout without 'include' here\n"
                "  to mend: remove 'include'"
            ),
        ],
        id="include",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nparts: {m: {kind: mirror}}\n"),
        [
            (
                "b.yaml:2:8: error: parts: not yet: parts are not put together by this version\n"
                "  expected: a layout without 'parts' here\n"
                "  to mend: remove 'parts'"
            ),
        ],
        id="parts",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nelement: {}\n"),
        [
            (
                "b.yaml:2:1: error: 'element' is not a key here\n"
                "  expected: the keys 'title', 'revision', 'bench', 'room', 'materials', "
                "'matched', 'cavities', 'limits', 'tolerances', 'accept', 'drawing', "
                "'revisions', 'include', 'parts', 'sources', 'elements', 'routes', 'enclosure' "
                "or 'states'\n"
                "  to mend: write 'elements', or remove the key"
            ),
        ],
        id="unknown",
    ),
    pytest.param(
        ("[1, 2]\n"),
        [
            (
                "b.yaml:1:1: error: a list of 2 is not what is read here\n"
                "  expected: a table with the keys 'title', 'revision', 'bench', 'room', "
                "'materials', 'matched', 'cavities', 'limits', 'tolerances', 'accept', "
                "'drawing', 'revisions', 'include' and 'parts'\n"
                "  to mend: write it in that form, such as {bench: {size: [25, 25]}}"
            ),
        ],
        id="a-list",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nsources: [1]\n"),
        [
            (
                "b.yaml:2:10: error: sources: a list of 1 is not what is read here\n"
                "  expected: a table of names, each with its keys\n"
                "  to mend: write it in that form, such as {NAME: {wavelength: 532}}"
            ),
        ],
        id="section",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
