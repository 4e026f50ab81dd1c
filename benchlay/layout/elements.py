"""Elements: one table holds the keys of the kind and the keys that all kinds share."""

from __future__ import annotations

from collections.abc import Set as AbstractSet
from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import RecordForm, Text
from benchlay.document.nodes import Broken, Mapping, Node, Scalar
from benchlay.document.problems import Problems
from benchlay.document.record import key, read_record
from benchlay.document.span import Span
from benchlay.document.words import format_choices, nearest, quote
from benchlay.elements import KINDS, ElementKind
from benchlay.elements.mount import MOUNT, Mount
from benchlay.layout.materials import Withstands
from benchlay.layout.names import Later
from benchlay.layout.stand import Stand
from benchlay.named import NamedTuple


class Shared(Stand):
    """The keys that elements of every kind have."""

    mount: Any = key(MOUNT, default=None, meaning="what holds it; `none` for no box, post or foot")
    withstands: Withstands | None = key(RecordForm(Withstands), default=None, meaning="its rating")


_SHARED_FORMS = {k.name: k.form for k in Shared.KEYS.values()}
_STAND_NAMES = tuple(Stand.KEYS)
_COMMON = (*(k.name for k in Shared.KEYS.values()), "kind", "part")

_TABLE = Later("a table with 'kind' and the keys of that kind", "{kind: mirror}")
KIND = Text(40, what="a kind of element", sample="mirror")


class Element(NamedTuple):
    """An element, ready to be placed; `spans` give the place of every key written.

    `mount` is None where the layout says nothing; then the kind's default holds.
    """

    name: str
    kind: str
    record: ElementKind
    stand: Stand
    mount: Any
    withstands: Withstands | None
    span: Span
    spans: dict[str, Span]


def read_element(name: Scalar, node: Node, reader: Reader) -> Element | None:
    """Read one entry of `elements`; None after problems."""
    if not isinstance(node, Mapping):
        reader.refuse(node, _TABLE)
        return None
    cls = _kind(node, reader)
    if cls is None:
        return None
    if cls.PENDING is not None:
        _refuse_pending(cls, node, reader)
        return None
    record, shared = _read_both(cls, node, reader)
    if record is None or shared is None:
        return None
    if not all(fits(record, shared, reader) for fits in (_turns, _holds)):
        return None
    values = {attribute: getattr(shared, attribute) for attribute in _STAND_NAMES}
    stand = Stand(span=node.span, spans=shared.spans, **values)
    withstands = getattr(record, "withstands", None) or shared.withstands
    return Element(
        name.text, cls.KIND, record, stand, shared.mount, withstands, name.span, dict(shared.spans)
    )


def _holds(record: ElementKind, shared: Shared, reader: Reader) -> bool:
    """Refuse a mount that does not go round its optic, as far as that hangs on nothing else."""
    mount, before = shared.mount, reader.failures
    alone = type(record).geometry_on is ElementKind.geometry_on
    if isinstance(mount, Mount) and record.MOUNTED and alone:
        reader.path.append("mount")
        mount.refuse_within(record.geometry().extent, reader)
        reader.path.pop()
    return reader.failures == before


def _kind(node: Mapping, reader: Reader) -> type[ElementKind] | None:
    """Find the class of the kind, or say what is wrong with it."""
    if node.get("part") is not None:
        reader.complain(
            node.get("part") or node,
            "not yet: parts are not put together by this version",
            expected="a layout without 'part'",
            remedy="write the keys of the part here",
        )
        return None
    written = node.get("kind")
    if written is None:
        reader.complain(
            node,
            "'kind' is missing",
            expected=f"'kind' with one of {format_choices(KINDS)}",
            remedy="add 'kind: mirror', with the kind that is meant",
        )
        return None
    if not isinstance(written, Scalar):
        if not isinstance(written, Broken):
            reader.refuse(written, KIND)
        return None
    if written.text in KINDS:
        return KINDS[written.text]
    guess = nearest(written.text, KINDS)
    reader.complain(
        written,
        f"{quote(written.text)} is not a kind of element",
        expected=f"one of {format_choices(KINDS)}",
        remedy=f"write '{guess}'" if guess else "write the kind that comes nearest",
    )
    return None


def _read_both(
    cls: type[ElementKind], node: Mapping, reader: Reader
) -> tuple[ElementKind | None, Shared | None]:
    """Read the keys of the kind and the shared ones, each leaving the other's alone."""
    own = {k.name: k.form for k in cls.KEYS.values()}
    written = frozenset(node.names())
    twice = written.intersection(own, _SHARED_FORMS)
    shared_too = {n for n in twice if _means_shared(n, own[n], node)}
    others = [n for n in _COMMON if n not in own]
    record = read_record(cls, _leave_out(node, shared_too), reader, extra=others)
    strange = written.difference(_SHARED_FORMS)
    return record, read_record(Shared, _leave_out(node, twice - shared_too), reader, ignore=strange)


def _leave_out(node: Mapping, names: AbstractSet[str]) -> Mapping:
    if not names:
        return node
    return Mapping((pair for pair in node.pairs if pair[0].text not in names), node.span)


def _means_shared(name: str, own: Form[Any], node: Mapping) -> bool:
    """Tell which key is meant where the language has two of one name.

    `hole` is that of a mirror or of its post, `side` that of a cube or of a reflection: what
    is written under it tells them apart.
    """
    value, shared = node.get(name), _SHARED_FORMS[name]
    if value is None or not shared.takes(value):
        return False
    if not own.takes(value):
        return True
    trial = Reader(Problems())
    shared.read(value, trial)
    return trial.failures == 0


def _refuse_pending(cls: type[ElementKind], node: Mapping, reader: Reader) -> None:
    """Say that a kind is not acted on yet, and what else is wrong with its keys."""
    reader.complain(
        node.get("kind") or node,
        f"not yet: {cls.PENDING}",
        expected="a kind that this version traces",
        remedy="take the element out of the layout; nothing is computed as if it were not there",
    )
    _read_both(cls, node, reader)


def _turns(record: ElementKind, shared: Shared, reader: Reader) -> bool:
    """Refuse `turn` and `aim` where the front does not reflect what is meant to go on."""
    wrong = [n for n in ("turn", "aim") if shared.written(n) and not record.TURNS_FRONT]
    for name in wrong:
        reader.complain(
            shared.spans[name],
            f"'{name}' is for fronts that reflect the beam on; a {record.KIND} does not",
            expected="'incidence', 'facing', or 'sends' where the kind has it",
            remedy=f"write 'incidence: 0' or 'facing' instead of '{name}'",
        )
    fixed = [n for n in ("facing", "incidence", "pitch") if shared.written(n)]
    for name in fixed if record.leads_to() is not None else ():
        reader.complain(
            shared.spans[name],
            f"'{name}' turns an element, but a {record.KIND} lies along its own axis",
            expected="only where it begins, and 'to'",
            remedy=f"remove '{name}'",
        )
        wrong.append(name)
    return not wrong
