"""The base of benchlay's small immutable values: ``typing.NamedTuple``, quicker to define.

A plain check loads about a hundred and fifty such classes and makes instances of half of them.
The one of the standard library compiles a constructor and a forward reference a field for each,
which was a twelfth of a cold start. Here a constructor is made with the first instance, and classes
with as many fields share its code. For the type checker, and in all that it does, it is
`typing.NamedTuple`.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from typing import NamedTuple as NamedTuple
else:
    from collections import _tuplegetter as _getter
    from types import FunctionType

    class _Definition(type):
        """Turns the annotations of a class body into fields."""

        def __new__(cls, name, bases, body):
            if any(base.__base__ is tuple for base in bases):  # a class of `NamedTuple` itself
                fields = tuple(body.get("__annotations__", ()))
                defaults = {field: body[field] for field in fields if field in body}
                if tuple(defaults) != fields[len(fields) - len(defaults) :]:
                    message = f"{name}: a field without default follows one with a default"
                    raise TypeError(message)
                body.update({field: _getter(place, "") for place, field in enumerate(fields)})
                body |= {"_fields": fields, "_field_defaults": defaults, "__match_args__": fields}
            body.setdefault("__slots__", ())
            return super().__new__(cls, name, bases, body)

    _SPACE = {"_new": tuple.__new__, "__builtins__": {}}
    _compiled = {}  # a constructor by the number of fields

    def _constructor(owner):
        """Return a constructor: one compiled for so many fields, with the names of these."""
        count = len(owner._fields)
        if count not in _compiled:
            names = "".join(f"_{place}, " for place in range(count))
            _compiled[count] = eval(f"lambda _cls, {names}: _new(_cls, ({names}))", _SPACE).__code__
        code = _compiled[count].replace(co_name="__new__", co_varnames=("_cls", *owner._fields))
        made = FunctionType(code, _SPACE, "__new__", tuple(owner._field_defaults.values()))
        made.__qualname__ = f"{owner.__qualname__}.__new__"
        return made

    class NamedTuple(tuple, metaclass=_Definition):
        """Base of a class whose annotated names are the fields of a tuple."""

        __slots__ = ()

        def __new__(cls, *values, **named):
            """Give the class that defines the fields its constructor, and call it."""
            owner = next(one for one in cls.__mro__ if "_fields" in one.__dict__)
            made = _constructor(owner)
            owner.__new__ = staticmethod(made)
            return made(cls, *values, **named)

        @classmethod
        def _make(cls, values):
            """Return an instance with these values, in the order of the fields."""
            made = tuple.__new__(cls, values)
            if len(made) != len(cls._fields):
                message = f"expected {len(cls._fields)} values, got {len(made)}"
                raise TypeError(message)
            return made

        def _replace(self, /, **named):
            """Return a copy with these fields changed."""
            made = self._make(map(named.pop, self._fields, self))
            if named:
                message = f"{type(self).__name__} has no field {', '.join(sorted(named))}"
                raise ValueError(message)
            return made

        def _asdict(self):
            """Return the fields as a dictionary, in order."""
            return dict(zip(self._fields, self, strict=True))

        def __repr__(self):
            fields = ", ".join(f"{k}={v!r}" for k, v in zip(self._fields, self, strict=True))
            return f"{type(self).__name__}({fields})"

        def __getnewargs__(self):
            return tuple(self)
