"""Saving keeps the hand's work: random changes to random places of the example files, and documents of odd forms."""

from __future__ import annotations

import copy
import tomllib
from pathlib import Path
from random import Random
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from test_line_map import Writer, documents

from coldbox.project import render
from coldbox.project.linemap import LineMap
from coldbox.project.matching import matched, same
from coldbox.project.revise import revised

ROOT = Path(__file__).parents[2]
EXAMPLES = sorted([*(ROOT / "projects").glob("*.toml"), *(Path(__file__).parent / "boxes").glob("*.toml")])
TEXTS = {path.stem: path.read_text("utf-8") for path in EXAMPLES}
NEW: list[Any] = [
    "9 m",
    "new",
    7,
    True,
    False,
    ["1 m", "2 m", "3 m"],
    [],
    {"k": "v"},
    [{"above": "4 °C"}],
    'a "b" \\ é',
]


def lines_lost(text: str, new: str) -> list[str]:
    """Lines of the old text that are not in the new one, each as often as it is missing."""
    left = new.splitlines(keepends=True)
    lost = []
    for line in text.splitlines(keepends=True):
        if line in left:
            left.remove(line)
        else:
            lost.append(line)
    return lost


def tables_in(value: Any) -> list[Any]:
    """Every table and list of a document, the document itself first."""
    inside = list(value.values()) if isinstance(value, dict) else value if isinstance(value, list) else []
    here = [value] if isinstance(value, (dict, list)) else []
    return here + [one for item in inside for one in tables_in(item)]


def edit(document: dict[str, Any], random: Random) -> None:
    """One change somewhere: another value, one more, one less, one twice, two in another order."""
    place = random.choice([one for one in tables_in(document) if one or isinstance(one, dict)])
    if isinstance(place, dict):
        act = random.choice(["set", "set", "remove", "add"]) if place else "add"
        if act == "add":
            place[random.choice(["notes", "wind", "colour", "spare", "bearing", "odd key"])] = new_value(random)
        elif act == "remove":
            del place[random.choice(list(place))]
        else:
            place[random.choice(list(place))] = new_value(random)
        return
    index = random.randrange(len(place))
    act = random.choice(["set", "remove", "twice", "swap", "insert"])
    if act == "remove":
        del place[index]
    elif act == "twice":
        place.insert(index + 1, copy.deepcopy(place[index]))
    elif act == "swap":
        place.append(place.pop(index))
    elif act == "insert":
        place.insert(index, {"name": "newcomer"} if isinstance(place[index], dict) else "1 m")
    elif isinstance(place[index], dict):
        place[index] = {**place[index], "notes": "seen"}
    else:
        place[index] = new_value(random)


def new_value(random: Random) -> Any:
    return copy.deepcopy(random.choice(NEW))


@settings(max_examples=250, deadline=None)
@given(st.sampled_from(sorted(TEXTS)), st.integers(0, 2**32), st.integers(1, 6), st.booleans())
def test_random_changes_read_back_and_keep_every_comment(name: str, seed: int, changes: int, windows: bool) -> None:
    text = TEXTS[name].replace("\n", "\r\n") if windows else TEXTS[name]
    before = tomllib.loads(text)
    after, random = copy.deepcopy(before), Random(seed)
    for _ in range(changes):
        edit(after, random)
    done = revised(text, before, after)
    assert same(tomllib.loads(done.text), after)
    assert done.kept_comments
    assert (
        ("\r\n" in done.text) == windows and done.text.count("\n") == done.text.count("\r\n") * windows or not windows
    )


def spots(document: Any, path: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    """The path of every plain value."""
    items = document.items() if isinstance(document, dict) else enumerate(document)
    found = []
    for part, inside in items:
        below = (*path, part)
        found += spots(inside, below) if isinstance(inside, (dict, list)) else [below]
    return found


@settings(max_examples=150, deadline=None)
@given(st.sampled_from(sorted(TEXTS)), st.data())
def test_a_changed_value_touches_its_own_line_and_no_other(name: str, data: st.DataObject) -> None:
    text = TEXTS[name]
    before = tomllib.loads(text)
    after = copy.deepcopy(before)
    paths = data.draw(st.lists(st.sampled_from(spots(before)), min_size=1, max_size=4, unique=True))
    for path in paths:
        place: Any = after
        for part in path[:-1]:
            place = place[part]
        place[path[-1]] = data.draw(st.sampled_from(["7 m", 3, True, "a much longer text than what was there before"]))
    done = revised(text, before, after)
    assert same(tomllib.loads(done.text), after)
    assert len(done.text.splitlines()) == len(text.splitlines())
    lost = lines_lost(text, done.text)
    assert len(lost) <= len(paths)
    for old, new in zip(text.splitlines(), done.text.splitlines(), strict=True):
        assert old.partition("  #")[2] == new.partition("  #")[2] or " #" in new
        assert old == new or f"{old}\n" in lost


def places(document: Any, path: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    """The path of everything in a document."""
    items = (
        document.items() if isinstance(document, dict) else enumerate(document) if isinstance(document, list) else ()
    )
    return [one for part, inside in items for one in ((*path, part), *places(inside, (*path, part)))]


def lines_of(text: str, path: tuple[str | int, ...]) -> list[str]:
    """The lines that say something of a path; of one with a header, with the comments right above and below."""
    lines, spots_of = [*text.splitlines(keepends=True), ""], LineMap(text)
    headed = spots_of.spots[path][0] == spots_of.spots[path][1]
    found = []
    for key, (begin, start, end) in spots_of.spots.items():
        if key[: len(path)] == path:
            first, last = spots_of.line_at(begin) - 1, spots_of.line_at(end)
            while begin == start and lines[first - 1].startswith("#"):
                first -= 1
            while headed and lines[last].startswith("#"):
                last += 1
            found += lines[first:last]
    return found


def line_around(text: str, path: tuple[str | int, ...]) -> list[str]:
    """The line of a list or table that is written within one line; nothing of one that has lines of its own."""
    begin, _, end = LineMap(text).spots.get(path, (0, 0, len(text)))
    header = text.startswith("[", begin) and text[begin - 1 : begin] == "\n"
    whole = text[text.rfind("\n", 0, begin) + 1 : text.find("\n", end) + 1]
    return [] if header or whole.count("\n") > 1 else [whole]


@settings(max_examples=200, deadline=None)
@given(st.sampled_from(sorted(TEXTS)), st.integers(0, 2**32), st.sampled_from(["set", "remove", "add"]))
def test_one_change_leaves_every_line_but_its_own(name: str, seed: int, act: str) -> None:
    text, random = TEXTS[name], Random(seed)
    before = tomllib.loads(text)
    after = copy.deepcopy(before)
    path = random.choice(places(before))
    place: Any = after
    for part in path[:-1]:
        place = place[part]
    last: Any = path[-1]
    if act == "set":
        in_blocks = isinstance(last, int) and place is after.get(path[0])
        place[last] = new_value(random)
        own = lines_of(text, path[:-1] if in_blocks else path)
    elif act == "remove":
        own = lines_of(text, path)
        del place[last]
    else:
        own = line_around(text, path[:-1])
        if isinstance(place, dict):
            place["notes"] = "seen"
        else:
            place.insert(last, copy.deepcopy(place[last]))
    done = revised(text, before, after)
    assert same(tomllib.loads(done.text), after)
    assert {line for line in lines_lost(text, done.text) if line.strip()} <= set(own)


@settings(max_examples=150, deadline=None)
@given(st.sampled_from(sorted(TEXTS)), st.data())
def test_a_table_that_goes_takes_its_own_lines_only(name: str, data: st.DataObject) -> None:
    text = TEXTS[name]
    before = tomllib.loads(text)
    after = copy.deepcopy(before)
    key = data.draw(st.sampled_from([key for key in before if isinstance(before[key], (dict, list))]))
    del after[key]
    done = revised(text, before, after)
    assert done.kept_comments
    cut, inside = [], False
    for line in text.splitlines(keepends=True):
        if line.startswith("["):
            inside = line.strip("[ \n").startswith(key) and line.strip("[ \n")[len(key)] in ".] "
        if not inside and line.strip():
            cut.append(line)
    kept = [line for line in done.text.splitlines(keepends=True) if line.strip()]
    assert [line for line in cut if not line.startswith("#")] == [line for line in kept if not line.startswith("#")]


@pytest.mark.parametrize("name", sorted(TEXTS))
def test_there_and_back_is_the_text_as_it_was(name: str) -> None:
    """A value changed and changed back, a block added and removed again: not a byte differs."""
    text = TEXTS[name]
    before = tomllib.loads(text)
    after = copy.deepcopy(before)
    after["box"]["temperature"] = "-30.25 °C"
    after.setdefault("doors", []).append({"name": "another", "width": "2 m"})
    after.setdefault("spreads", {})["foam"] = "3 %"
    there = revised(text, before, after)
    back = revised(there.text, after, before)
    assert back.text == text


@settings(max_examples=100, deadline=None)
@given(st.integers(0, 2**32), documents, documents)
def test_any_two_documents(seed: int, before: dict[str, Any], after: dict[str, Any]) -> None:
    """Of forms that no project has: dotted, quoted and empty keys, empty tables, lists in lists."""
    writer = Writer(seed)
    writer.document(before)
    mixed = {**before, **dict(list(after.items())[:2])}
    for target in (after, mixed, {}):
        assert same(tomllib.loads(revised(writer.out, before, target).text), target)
    assert same(tomllib.loads(render.document(after)), after)


@settings(max_examples=200, deadline=None)
@given(st.lists(st.integers(0, 4), max_size=7), st.lists(st.integers(0, 4), max_size=7))
def test_matching_keeps_both_orders_and_leaves_nothing_out(was: list[int], now: list[int]) -> None:
    rows = matched(was, now)
    assert [old for old, _ in rows if old is not None] == list(range(len(was)))
    assert [new for _, new in rows if new is not None] == list(range(len(now)))
    assert (None, None) not in rows


HAND = """\
# What this file is about

format = 1

[box]            # the room
length = "3 m"   # front to back

# measured twice
width = "4 m"

# the big one
[[doors]]
name = "main"

[[doors]]
name = "side"    # seldom used

[outage]
events = [
  { at = "16:00", what = "door open" },   # somebody looks in
  # and then
  { at = "20:00", what = "pack in" },
]
# the end
"""


def hand(after: dict[str, Any]) -> str:
    done = revised(HAND, tomllib.loads(HAND), after)
    assert done.kept_comments and same(tomllib.loads(done.text), after)
    return done.text


def test_a_comment_stays_in_its_column() -> None:
    after = tomllib.loads(HAND)
    after["box"]["length"] = "3.25 m"
    assert hand(after) == HAND.replace('"3 m"   #', '"3.25 m" #')


def test_new_keys_stand_where_the_key_list_has_them() -> None:
    after = tomllib.loads(HAND)
    after["name"] = "Shed"
    after["box"]["height"] = "2 m"
    after["doors"][0]["width"] = "1 m"
    after["outage"]["at"] = "14:00"
    assert hand(after) == (
        HAND.replace("format = 1\n", 'format = 1\nname = "Shed"\n')
        .replace('width = "4 m"\n', 'width = "4 m"\nheight = "2 m"\n')
        .replace('"main"\n', '"main"\nwidth = "1 m"\n')
        .replace("[outage]\n", '[outage]\nat = "14:00"\n')
    )


def test_things_come_and_go_whole() -> None:
    after = tomllib.loads(HAND)
    after["doors"] = [after["doors"][1], {"name": "hatch"}]
    assert hand(after) == HAND.replace('# the big one\n[[doors]]\nname = "main"\n\n', "").replace(
        "# seldom used\n", '# seldom used\n\n[[doors]]\nname = "hatch"\n'
    )


def test_a_thing_put_elsewhere_takes_its_comments_along() -> None:
    after = tomllib.loads(HAND)
    after["doors"].reverse()
    text = hand(after)
    assert text.index("# seldom used") < text.index('# the big one\n[[doors]]\nname = "main"\n')
    after["doors"].insert(0, after["doors"][0])
    assert hand(after).count("# seldom used") == 1, "one of two is a copy"


def test_items_in_a_list_of_lines() -> None:
    after = tomllib.loads(HAND)
    events = after["outage"]["events"]
    events.append({"at": "22:00", "what": "power on"})
    assert hand(after) == HAND.replace('"pack in" },\n', '"pack in" },\n  { at = "22:00", what = "power on" },\n')
    del events[0]
    assert "somebody" not in hand(after) and "  # and then\n" in hand(after)
    after = tomllib.loads(HAND)
    events = after["outage"]["events"]
    del events[1]
    assert hand(after) == HAND.replace('  { at = "20:00", what = "pack in" },\n', "")
    events.append({"at": "22:00"})
    events.append({"at": "23:00"})
    text = hand(after)
    del events[1]
    assert revised(text, tomllib.loads(text), after).text.count("# and then\n") == 1
    events[:] = []
    assert "events = []" in hand(after)


def test_items_in_one_line_keep_their_spacing() -> None:
    text = "a = [1,2, 3]  # few\nb = { c = 1, d = [2] }\n"
    for now, said in [
        ({"a": [2, 3]}, "a = [2, 3]"),
        ({"a": [1, 2]}, "a = [1,2]"),
        ({"a": [1, 3]}, "a = [1, 3]"),
        ({"a": [3]}, "a = [3]"),
        ({"a": [0, 1, 2, 3]}, "a = [0, 1,2, 3]"),
        ({"a": [1, 2, 3, 4]}, "a = [1,2, 3, 4]"),
        ({"b": {"d": [2]}}, "b = { d = [2] }"),
        ({"b": {"c": 1}}, "b = { c = 1 }"),
        ({"b": {"c": 1, "d": [2, 5], "e": "x"}}, 'b = { c = 1, d = [2, 5], e = "x" }'),
    ]:
        before = tomllib.loads(text)
        done = revised(text, before, {**before, **now})
        assert said in done.text and done.kept_comments, done.text


def test_comments_between_items_outlive_their_neighbours() -> None:
    text = "a = [\n  1,\n  # on two\n  2,  # two\n  # on three\n  3\n  # the end\n]\n"
    for now in ([1, 3], [1], [3], [1, 2], [1, 2, 3, 4], [9, 1, 2, 3]):
        done = revised(text, {"a": [1, 2, 3]}, {"a": now})
        assert done.kept_comments
        for comment in ("# on two", "# on three", "# the end"):
            assert done.text.count(comment) == 1, done.text


def test_new_tables_stand_where_the_key_list_has_them_in_the_manner_of_the_file() -> None:
    after = tomllib.loads(HAND)
    after["site"] = {"month": "July", "latitude": "55°"}
    after["lots"] = [{"name": "cod", "limits": [{"above": "-12 °C"}]}]
    assert hand(after) == HAND.replace(
        "[box] ",
        '[site]\nlatitude = "55°"\nmonth = "July"\n\n[box] ',
    ).replace(
        "# seldom used\n",
        '# seldom used\n\n[[lots]]\nname = "cod"\nlimits = [{ above = "-12 °C" }]\n',
    )
    tight = 'format = 1\n[box]\nlength = "3 m"\n[machine]\nfans = 3'
    before = tomllib.loads(tight)
    after = {**before, "doors": [{"name": "a"}], "money": {"years": 3}}
    assert revised(tight, before, after).text == (
        'format = 1\n[box]\nlength = "3 m"\n[[doors]]\nname = "a"\n[machine]\nfans = 3\n[money]\nyears = 3\n'
    )


def test_what_is_no_toml_is_written_anew_and_says_so() -> None:
    done = revised("box = # nothing\n", {}, {"format": 1})
    assert done.text == "format = 1\n"
    assert not done.kept_comments


def test_true_is_not_one() -> None:
    assert revised("a = 1 # one\n", {"a": 1}, {"a": True}).text == "a = true # one\n"
    assert not same({"a": 1}, {"a": 1.0})


@pytest.mark.parametrize("name", sorted(TEXTS))
def test_a_new_file_has_things_in_blocks(name: str) -> None:
    document = tomllib.loads(TEXTS[name])
    text = render.document(document)
    assert same(tomllib.loads(text), document)
    assert text.count("[[doors]]") == len(document.get("doors", ()))
    assert text.count("[[trip.legs]]") == len(document.get("trip", {}).get("legs", ()))
    order = [line.strip("[]").partition(".")[0] for line in text.splitlines() if line.startswith("[")]
    assert order == render.in_order((), order)
