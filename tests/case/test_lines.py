"""The scanner against texts whose lines are known, and against another TOML writer."""

import tomlkit
from hypothesis import given, settings
from hypothesis import strategies as st

from combustor.case.lines import line_index, line_of

TEXT = '''\
title = "a # b = c"  # comment = no
[one]
a = 1
"quoted key" = 'x'
b.c.d = 2
[one.two]  # [three]
list = [
  "first",  # ]
  { x = 1, y = [2,
    3] },

  3,
]
long = """
key = 1
[table]
""quotes"" \\""" still
"""
after = 1
[[rows]]
name = "r0"
[rows.sub]
z = 1
[[rows]]
name = "r1"
[[rows.inner]]
w = 1
[[rows.inner]]
w = 2
'''


def test_every_place_of_a_hand_numbered_text() -> None:
    lines = line_index(TEXT)
    expected = {
        ("title",): 1,
        ("one",): 2,
        ("one", "a"): 3,
        ("one", "quoted key"): 4,
        ("one", "b"): 5,
        ("one", "b", "c", "d"): 5,
        ("one", "two"): 6,
        ("one", "two", "list"): 7,
        ("one", "two", "list", 0): 8,
        ("one", "two", "list", 1, "x"): 9,
        ("one", "two", "list", 1, "y"): 9,
        ("one", "two", "list", 1, "y", 1): 10,
        ("one", "two", "list", 2): 12,
        ("one", "two", "long"): 14,
        ("one", "two", "after"): 19,
        ("rows",): 20,
        ("rows", 0): 20,
        ("rows", 0, "name"): 21,
        ("rows", 0, "sub", "z"): 23,
        ("rows", 1): 24,
        ("rows", 1, "name"): 25,
        ("rows", 1, "inner", 0, "w"): 27,
        ("rows", 1, "inner", 1, "w"): 29,
    }
    assert {path: lines.get(path) for path in expected} == expected
    assert ("key",) not in lines
    assert ("table",) not in lines


def test_windows_line_ends_count_once() -> None:
    assert line_index("a = 1\r\n\r\nb = 2\r\n")[("b",)] == 3


def test_a_missing_key_is_placed_at_its_table() -> None:
    lines = line_index("[a]\nx = 1\n[[b]]\ny = 1\n")
    assert line_of(lines, ("b", 0, "missing")) == 3
    assert line_of(lines, ("c", "d")) is None


KEYS = st.text("abcXYZ09_- .\"'é", min_size=1, max_size=8)
LEAVES = st.one_of(st.integers(-99, 99), st.text("ab\"'\\\n#=[]{},", max_size=12), st.booleans())
TREES = st.dictionaries(
    KEYS,
    st.recursive(
        LEAVES,
        lambda inner: st.one_of(
            st.lists(inner, max_size=3), st.dictionaries(KEYS, inner, max_size=3)
        ),
        max_leaves=10,
    ),
    max_size=4,
)


def leaves(node: object, path: tuple[str | int, ...] = ()):
    if isinstance(node, dict):
        for key, value in node.items():
            yield (*path, key)
            yield from leaves(value, (*path, key))
    elif isinstance(node, list):
        for index, value in enumerate(node):
            yield (*path, index)
            yield from leaves(value, (*path, index))


@settings(derandomize=True, max_examples=150, deadline=None)
@given(TREES)
def test_every_key_of_a_generated_text_is_found_on_a_line_that_holds_it(tree: dict) -> None:
    text = tomlkit.dumps(tree)
    lines = line_index(text)
    rows = text.split("\n")
    for path in leaves(tree):
        assert path in lines
        if isinstance(path[-1], str):
            bare = "".join(c for c in path[-1] if c.isalnum())
            assert bare in "".join(c for c in rows[lines[path] - 1] if c.isalnum())
