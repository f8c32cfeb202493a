"""A method that does not hold for this box, told as a problem of the input that asked for it."""

from __future__ import annotations

from types import TracebackType

from coldbox.errors import BadProject, OutOfValidity, Problem
from coldbox.project.model import Project


class about:
    """`with about(project, "box.films", "Write …"):` turns an OutOfValidity inside into a BadProject.

    paths: keys that may have asked for it; the first that somebody wrote is named, with its line, else the first.
    advice: what would do. quantity: only a refusal of this quantity is turned; None: every one.
    """

    def __init__(
        self, project: Project, paths: str | tuple[str, ...], advice: str, quantity: str | None = None
    ) -> None:
        self._project, self._advice, self._quantity = project, advice, quantity
        self._paths = (paths,) if isinstance(paths, str) else paths

    def __enter__(self) -> None:
        return None

    def __exit__(self, kind: object, error: BaseException | None, trace: TracebackType | None) -> None:
        if not isinstance(error, OutOfValidity) or self._quantity not in (None, error.quantity):
            return
        origins = self._project.origins
        written = (path for path in self._paths if path in origins and origins[path].kind in ("typed", "option"))
        path = next(written, self._paths[0])
        origin = origins.get(path)
        option = origin is not None and origin.kind == "option"
        raise BadProject(
            [
                Problem(
                    f"{error} {self._advice}",
                    file="--set" if option else self._project.file,
                    line=None if origin is None or option else origin.line,
                    path=path,
                )
            ]
        ) from error
