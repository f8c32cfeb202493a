"""A new project file: from an example, from another project, or the least that computes."""

from __future__ import annotations

import re
from difflib import get_close_matches
from pathlib import Path

from coldbox.errors import FileTrouble
from coldbox.project import store

LEAST = """\
format = 1
name = "{name}"
units = "SI"

# The least that computes. Every key: coldbox sources --fields
[box]
length = "3 m"                                  # front to back
width = "4 m"                                   # along the front, where the door is
height = "2.4 m"
temperature = "4 °C"
construction = "pir80"                          # of the shop library, or your own under [constructions]
neighbour = "room"                              # 24 °C, 50 %; "outdoors" wants a [site] with a place

# [[doors]]
# width = "0.9 m"
# height = "2 m"
# passages = "10/h"

# [[lots]]
# product = "milk"
# arrives = "200 kg/day"
# arrival_temperature = "8 °C"
"""

_NAME_LINE = re.compile(r'^name\s*=\s*("[^"\n]*"|\'[^\'\n]*\')', re.MULTILINE)


def create(name: str, like: str | None, folder: Path | None = None) -> Path:
    """Write NAME.toml into projects/ (or here, where there is none) and return its path.

    Raises FileTrouble for a name that is no plain name, a file that is already there, an unknown example.
    """
    stem = name.removesuffix(".toml")
    if not re.fullmatch(r"[\w][\w .-]{0,63}", stem) or stem != stem.strip():
        raise FileTrouble(name, "is no plain name. Use letters, digits, spaces, - and _, at most 64 of them.")
    here = folder or (Path("projects") if Path("projects").is_dir() else Path())
    path = here / f"{stem}.toml"
    if path.exists():
        raise FileTrouble(str(path), "is already there. Choose another name.")
    text = LEAST.format(name=stem) if like is None else _named(store.read_text(_found(like, here)), stem)
    store.write_text(path, text)
    return path


def examples() -> Path:
    """The folder of the examples that come with the program."""
    return Path(__file__).resolve().parents[2] / "projects"


def _found(like: str, here: Path) -> Path:
    """The file that `--like` means: a path, a project of this folder, or an example."""
    stem = like.removesuffix(".toml")
    for path in (Path(like), here / f"{stem}.toml", examples() / f"{stem}.toml"):
        if path.suffix == ".toml" and path.is_file():
            return path
    known = sorted({path.stem for folder in (here, examples()) for path in folder.glob("*.toml")})
    near = get_close_matches(stem, known, 1)
    hint = f' Nearest: "{near[0]}".' if near else ""
    raise FileTrouble(like, f"is no project and no example.{hint} There are: {', '.join(known)}.")


def _named(text: str, name: str) -> str:
    """The text with its own name in place of the one it came with."""
    line = f'name = "{name}"'
    renamed, count = _NAME_LINE.subn(line, text, count=1)
    return renamed if count else re.sub(r"^(format\s*=.*)$", rf"\1\n{line}", text, count=1, flags=re.MULTILINE)
