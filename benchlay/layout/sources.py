"""Sources: what emits, with which lines, beam and polarization."""

from __future__ import annotations

from math import pi

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, ListOf, OneOf, Quantity, RecordForm, Words
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key, read_record
from benchlay.document.span import Span
from benchlay.layout._forms import ANGLE, POSITIVE, SHARE, WAVELENGTH, Ref, RefForm
from benchlay.layout.beam import BeamShape
from benchlay.layout.light import UNPOLARIZED, Emits, Line, LineKeys, Polarization, PolarizationForm
from benchlay.layout.stand import Place, Stand, check_one_place
from benchlay.named import NamedTuple

_FULL_ANGLE = Quantity(Dimension.ANGLE, above=0.0, at_most=pi)
_HALF_ANGLE = Quantity(Dimension.ANGLE, at_least=0.0, below=pi / 2)
_LINEWIDTH = Quantity(Dimension.FREQUENCY, above=0.0)


class FedBy(Record):
    """The far end of a fibre or port: where its light was coupled in.

    A source that states no power emits the share of what lands on the target at its
    wavelength; that light is booked at the target and emitted anew in a ledger of its own.
    """

    target: Ref = key(RefForm("an element"), meaning="the target the light was coupled in at")
    share: float = key(SHARE, default=1.0, meaning="share of the target's light that comes out")


class Body(Record):
    """An opaque body; the beam leaves from the middle of its front face."""

    length_mm: float = key(POSITIVE, name="length", meaning="along the beam")
    width_mm: float = key(POSITIVE, name="width", meaning="across, in plan")
    height_mm: float = key(POSITIVE, name="height", meaning="upright")


class SourceKeys(Emits, Place):
    """The keys of a source."""

    wavelength_nm: float | None = key(
        WAVELENGTH, default=None, name="wavelength", meaning="vacuum wavelength"
    )
    several: tuple[LineKeys, ...] | None = key(
        ListOf(RecordForm(LineKeys), min=1, max=100),
        default=None,
        name="lines",
        meaning="several wavelengths with their powers, instead of wavelength and power",
    )
    beam: BeamShape = key(RecordForm(BeamShape), meaning="the beam's shape")
    polarization: Polarization = key(
        PolarizationForm(), default=UNPOLARIZED, meaning="the state of polarization"
    )
    linewidth_hz: float | None = key(
        _LINEWIDTH,
        default=None,
        name="linewidth",
        meaning="full width at half maximum; gives the coherence length",
    )
    line_shape: str = key(
        Choice("gaussian", "lorentzian"),
        default="gaussian",
        name="line",
        meaning="shape of the line that linewidth states",
    )
    rear_leak_w: float = key(
        Quantity(Dimension.POWER, at_least=0.0),
        default=0.0,
        name="rear_leak",
        meaning="power that leaves backwards by the back of the body",
    )
    pointing_rad: float = key(
        _HALF_ANGLE, default=0.0, name="pointing", meaning="pointing uncertainty, half angle"
    )
    acceptance_rad: float | None = key(
        _FULL_ANGLE,
        default=None,
        name="acceptance",
        meaning="full angle within which light counts as coming back in; "
        "by default twice the divergence, at least 2 mrad",
    )
    fed_by: FedBy | None = key(
        RecordForm(FedBy), default=None, meaning="makes it the far end of a fibre or port"
    )
    body: Body | None = key(
        OneOf(Words({"none": None}), RecordForm(Body)),
        default=None,
        meaning="its opaque body; `none` for a bare exit",
    )
    heading_rad: float | None = key(
        ANGLE, default=None, name="heading", meaning="direction of the beam in plan"
    )

    def after_read(self, reader: Reader) -> None:
        """Hold the keys against each other."""
        check_one_place(self, reader, with_after=False)
        self._check_heading(reader)
        self._check_lines(reader)

    def _check_heading(self, reader: Reader) -> None:
        both = self.written("heading") and self.written("facing")
        if both or not (self.written("heading") or self.written("facing") or self.written("in")):
            reader.complain(
                self.span_of("facing"),
                "both heading and facing are given" if both else "nothing says where the beam goes",
                expected="either 'heading' (an angle) or 'facing' (an angle, a name or a point)",
                remedy="remove one of the two" if both else "add 'heading: 0'",
            )

    def _check_lines(self, reader: Reader) -> None:
        before = reader.failures
        if self.several is None:
            if self.wavelength_nm is None:
                reader.complain(
                    self.span,
                    "'wavelength' is missing",
                    expected="'wavelength' with 'power' or 'pulse', or 'lines'",
                    remedy="add 'wavelength: 532'",
                )
            if self.fed_by is None or self.power_w is not None or self.pulse is not None:
                self.check_power(reader)
        for name in ("wavelength", "power", "pulse") if self.several is not None else ():
            if self.written(name):
                reader.complain(
                    self.spans[name],
                    f"'lines' states every '{name}' itself",
                    expected=f"'lines' without '{name}'",
                    remedy=f"move '{name}' into 'lines'",
                )
        if reader.failures == before:
            self._check_wavelengths(reader)

    def _check_wavelengths(self, reader: Reader) -> None:
        first: dict[float, Line] = {}
        for line in self.lines():
            same = first.setdefault(line.wavelength_nm, line)
            if same is not line:
                reader.complain(
                    line.span,
                    f"two lines have the wavelength {line.wavelength_nm:g} nm; "
                    f"the other stands in line {same.span.line}",
                    expected="lines of different wavelengths",
                    remedy="put their powers together in one line",
                )
            self.beam.check_line(line.wavelength_nm, reader)

    def lines(self) -> tuple[Line, ...]:
        """Return what it emits, in the order of the file."""
        if self.several is not None:
            return tuple(k.line(k.wavelength_nm, k.span) for k in self.several)
        return (self.line(self.wavelength_nm or 0.0, self.span_of("wavelength")),)

    def stand(self) -> Stand:
        """Return its place, the heading as facing."""
        facing = self.facing if self.heading_rad is None else self.heading_rad
        shared = {name: getattr(self, name) for name in Place.KEYS}
        return Stand(**(shared | {"facing": facing}), span=self.span, spans=self.spans)


class Source(NamedTuple):
    """A source, ready to be placed; `spans` give the place of every key written."""

    name: str
    lines: tuple[Line, ...]
    beam: BeamShape
    polarization: Polarization
    linewidth_hz: float | None
    line_shape: str
    rear_leak_w: float
    pointing_rad: float
    acceptance_rad: float | None
    fed_by: FedBy | None
    body: Body | None
    stand: Stand
    span: Span
    spans: dict[str, Span]

    def emitted_w(self) -> float:
        """Return what it states to emit, its rear leak included, W."""
        return sum(line.power_w for line in self.lines) + self.rear_leak_w

    def fed(self) -> FedBy | None:
        """Return what gives it its power, where it states none itself."""
        stated = any(line.power_w > 0.0 or line.pulse is not None for line in self.lines)
        return None if stated or "power" in self.spans else self.fed_by


def read_source(name: Scalar, node: Node, reader: Reader) -> Source | None:
    """Read one entry of `sources`; None after problems."""
    keys = read_record(SourceKeys, node, reader)
    if keys is None:
        return None
    return Source(
        name.text,
        keys.lines(),
        keys.beam,
        keys.polarization,
        keys.linewidth_hz,
        keys.line_shape,
        keys.rear_leak_w,
        keys.pointing_rad,
        keys.acceptance_rad,
        keys.fed_by,
        keys.body,
        keys.stand(),
        name.span,
        dict(keys.spans),
    )
