"""Functions of numbers that take arrays as well.

The tables are branches, so they are written for one point. Arrays of arguments broadcast
as numpy's do; each *distinct* set of arguments is looked up once, which is what arrays of
beams need: many rays, few wavelengths and durations. Numbers alone never load numpy.
"""

from __future__ import annotations

from functools import wraps
from typing import TYPE_CHECKING, cast

if TYPE_CHECKING:
    # Only a type checker needs the shapes of these; a plain check must not pay for them.
    from collections.abc import Callable, Sequence
    from typing import Any, Generic, ParamSpec, Protocol, TypeAlias, TypeVar

    import numpy as np
    from numpy.typing import ArrayLike, NDArray

    Floats: TypeAlias = NDArray[np.float64]
    Words: TypeAlias = NDArray[np.str_]

    _Given = ParamSpec("_Given")
    _One = TypeVar("_One", covariant=True)
    _Many = TypeVar("_Many", covariant=True)

    class Broadcast(Protocol, Generic[_Given, _One, _Many]):
        """A function of numbers that gives arrays for arrays.

        For a type checker it is the function of numbers; arrays go in by `over`, which is
        the same call.
        """

        def __call__(self, *args: _Given.args, **kwargs: _Given.kwargs) -> _One:
            """Return what the function gives for these numbers; arrays for arrays."""

        def over(self, *args: ArrayLike, **kwargs: ArrayLike | None) -> _Many:
            """Return the same for arguments of which any may be arrays."""


def broadcast(function: Callable[_Given, float]) -> Broadcast[_Given, float, Floats]:
    """Let a function of numbers that returns one take arrays; the result is an array.

    Examples
    --------
    >>> @broadcast
    ... def twice(x: float) -> float:
    ...     return 2.0 * x
    >>> twice(2.0), twice([1.0, 2.0]).tolist(), twice.over(3.0).tolist()
    (4.0, [2.0, 4.0], 6.0)
    """
    return _broadcast(function, _numbers)


def broadcast_as(
    kind: Callable[..., _Many],
) -> Callable[[Callable[_Given, _One]], Broadcast[_Given, _One, _Many]]:
    """Let a function that returns a named tuple take arrays; `kind` is that of arrays.

    `kind` is called with one array (or tuple of sentences) a field that it names, by name.
    """

    def decorate(function: Callable[_Given, _One]) -> Broadcast[_Given, _One, _Many]:
        def gather(results: Sequence[Any], place: NDArray[np.intp]) -> _Many:
            fields = kind._fields  # type: ignore[attr-defined]  # kinds are named tuples
            return kind(**{name: _field(results, name, place) for name in fields})

        return _broadcast(function, gather)

    return decorate


def _broadcast(
    function: Callable[_Given, _One],
    gather: Callable[[Sequence[Any], NDArray[np.intp]], _Many],
) -> Broadcast[_Given, _One, _Many]:
    def over(*args: object, **kwargs: object) -> _Many:
        named = {**{str(i): value for i, value in enumerate(args)}, **kwargs}
        rows, place = _distinct({n: v for n, v in named.items() if not _is_fixed(v)})

        def result(row: dict[str, float]) -> _One:
            mixed = {**named, **row}
            by_place = [mixed.pop(str(i)) for i in range(len(args))]
            return cast("Callable[..., _One]", function)(*by_place, **mixed)

        return gather([result(row) for row in rows], place)

    @wraps(function)
    def call(*args: _Given.args, **kwargs: _Given.kwargs) -> _One | _Many:
        if any(map(_is_array, args)) or any(map(_is_array, kwargs.values())):
            return over(*args, **kwargs)
        return function(*args, **kwargs)

    call.over = over  # type: ignore[attr-defined]  # functions may carry attributes
    return cast("Broadcast[_Given, _One, _Many]", call)


def _is_array(value: object) -> bool:
    return hasattr(value, "__len__") and not isinstance(value, str)


def _is_fixed(value: object) -> bool:
    return value is None or isinstance(value, str)


def _distinct(named: dict[str, Any]) -> tuple[list[dict[str, float]], NDArray[np.intp]]:
    """Return the distinct sets of arguments, and which of them stands at each place."""
    import numpy as np

    columns = np.broadcast_arrays(*[np.asarray(v, dtype=np.float64) for v in named.values()])
    shape = columns[0].shape
    table = np.stack([column.ravel() for column in columns], axis=1)
    rows, place = np.unique(table, axis=0, return_inverse=True)
    return (
        [dict(zip(named, row, strict=True)) for row in rows.tolist()],
        place.reshape(shape),
    )


def _numbers(results: Sequence[float], place: NDArray[np.intp]) -> Floats:
    import numpy as np

    return np.asarray(np.array(results, dtype=np.float64)[place])


def _field(results: Sequence[Any], name: str, place: NDArray[np.intp]) -> object:
    """Gather one field; what does not exist is NaN, or no word; notes are told once each."""
    import numpy as np

    values = [getattr(result, name, None) for result in results]
    if any(isinstance(value, tuple) for value in values):
        return tuple(dict.fromkeys(note for value in values for note in value or ()))
    if any(isinstance(value, str) for value in values):
        return np.asarray(np.array([value or "" for value in values])[place])
    numbers = [np.nan if value is None else value for value in values]
    return np.asarray(np.array(numbers, dtype=np.float64)[place])
