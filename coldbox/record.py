"""Frozen records, read by type checkers as frozen keyword-only dataclasses.

Why not `dataclasses`: making forty of them takes 30 ms at every start, a third of what `coldbox load` may take in
all. This base generates no code, so a class costs microseconds.
"""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any, ClassVar, Self, dataclass_transform


@dataclass_transform(frozen_default=True, kw_only_default=True, eq_default=True)
class Record:
    """A frozen bag of named fields: its annotations, in order; a class attribute is a field's default."""

    _names: ClassVar[tuple[str, ...]] = ()
    _defaults: ClassVar[dict[str, Any]] = {}
    _known: ClassVar[frozenset[str]] = frozenset()

    def __init_subclass__(cls) -> None:
        own = [name for name in cls.__dict__.get("__annotations__", {}) if not name.startswith("_")]
        cls._names = (*cls._names, *(name for name in own if name not in cls._names))
        cls._defaults = {
            **cls._defaults,
            **{name: cls.__dict__[name] for name in own if name in cls.__dict__},
        }
        cls._known = frozenset(cls._names)

    def __init__(self, **values: Any) -> None:
        mine = self.__dict__  # filled in place: this runs some hundred times for each account
        mine.update(self._defaults)
        mine.update(values)
        if mine.keys() != self._known:
            missing = [name for name in self._names if name not in mine]
            unknown = [name for name in mine if name not in self._names]
            raise TypeError(f"{type(self).__name__}: missing {missing}, unknown {unknown}")

    def __setattr__(self, name: str, value: object) -> None:
        raise AttributeError(f"{type(self).__name__} is frozen: make another with replace({name}=…)")

    __delattr__ = None  # type: ignore[assignment]

    def __iter__(self) -> Iterator[tuple[str, Any]]:
        """Pairs of field name and value, in order."""
        return ((name, self.__dict__[name]) for name in self._names)

    def __eq__(self, other: object) -> bool:
        return type(self) is type(other) and self.__dict__ == other.__dict__

    def __hash__(self) -> int:
        return hash(tuple([self.__dict__[name] for name in self._names]))

    def __repr__(self) -> str:
        return f"{type(self).__name__}({', '.join(f'{name}={value!r}' for name, value in self)})"

    def replace(self, **changes: Any) -> Self:
        """The same record with some fields changed."""
        return type(self)(**{**self.__dict__, **changes})

    @classmethod
    def names(cls) -> tuple[str, ...]:
        """The names of the fields, in order."""
        return cls._names
