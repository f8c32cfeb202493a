"""One tree of errors. Facts are attributes; the sentence is made only when somebody reads it."""

from __future__ import annotations

from collections.abc import Iterable


class ColdboxError(Exception):
    """Everything this tool says no with."""


class OutOfValidity(ColdboxError):
    """A method was asked for something outside the range it was published for."""

    def __init__(self, quantity: str, value: float, low: float, high: float, unit: str, method: str) -> None:
        self.quantity, self.value, self.low, self.high = quantity, value, low, high
        self.unit, self.method = unit, method
        super().__init__(quantity, value)

    def __str__(self) -> str:
        unit = f" {self.unit}" if self.unit else ""
        return (
            f"{self.method} holds for {self.quantity} from {self.low:g} to {self.high:g}{unit};"
            f" here it is {self.value:g}{unit}."
        )


class NoRoot(ColdboxError):
    """A bracket holds no root."""

    def __init__(self, what: str, low: float, high: float) -> None:
        self.what, self.low, self.high = what, low, high
        super().__init__(what)

    def __str__(self) -> str:
        return f"No {self.what} between {self.low:g} and {self.high:g}."


class UnitProblem(ColdboxError):
    """A text is not a value of the wanted kind: `found` is the text, `advice` says what would do."""

    def __init__(self, found: str, advice: str) -> None:
        self.found, self.advice = found, advice
        super().__init__(found)

    def __str__(self) -> str:
        return f'"{self.found}" {self.advice}'


class UnknownName(ColdboxError):
    """A table or library has no row of that name; `nearest` is the closest one it has, or None."""

    def __init__(self, table: str, name: str, nearest: str | None = None) -> None:
        self.table, self.name, self.nearest = table, name, nearest
        super().__init__(table, name)

    def __str__(self) -> str:
        hint = f' Nearest: "{self.nearest}".' if self.nearest else ""
        return f'There is no "{self.name}" among the {self.table}.{hint}'


class TableFault(ColdboxError):
    """A row of a built-in table lacks its source or breaks its bounds."""

    def __init__(self, table: str, row: str, fault: str) -> None:
        self.table, self.row, self.fault = table, row, fault
        super().__init__(table, row, fault)

    def __str__(self) -> str:
        return f"Table {self.table}, row {self.row}: {self.fault}"


class Problem:
    """One thing wrong in a file: where it is, and a sentence with what was found and what would do."""

    __slots__ = ("file", "line", "path", "text")

    def __init__(self, text: str, *, file: str = "", line: int | None = None, path: str = "") -> None:
        self.text, self.file, self.line, self.path = text, file, line, path

    def __eq__(self, other: object) -> bool:
        return isinstance(other, Problem) and str(self) == str(other)

    def __hash__(self) -> int:
        return hash(str(self))

    def __repr__(self) -> str:
        return f"Problem({str(self)!r})"

    def __str__(self) -> str:
        place = self.file if self.line is None else f"{self.file}:{self.line}"
        head = "  ".join(part for part in (place, self.path) if part)
        return f"{head}\n    {self.text}" if head else self.text


class BadProject(ColdboxError):
    """A project file that cannot be computed, with every problem found in it."""

    def __init__(self, problems: Iterable[Problem]) -> None:
        self.problems = tuple(problems)
        super().__init__(len(self.problems))

    def __str__(self) -> str:
        return "\n".join(str(problem) for problem in self.problems)


class FileTrouble(ColdboxError):
    """A file that could not be read or written: `file`, and the reason in words."""

    def __init__(self, file: str, reason: str) -> None:
        self.file, self.reason = file, reason
        super().__init__(file, reason)

    def __str__(self) -> str:
        return f"{self.file}: {self.reason}"


class Stopped(ColdboxError):
    """Long work was asked to stop."""

    def __str__(self) -> str:
        return "Stopped before the end."
