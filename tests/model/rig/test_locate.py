"""Lines of keys in a TOML text."""

import tomllib

from hypothesis import given
from hypothesis import strategies as st

from model.rig.locate import line_of, locate
from tests.model.rig import samples

TEXT = '''\
# comment with [brackets] and "quotes
top = 1
"quoted key" = "a # no comment" # a comment
dotted . "inner.part" = 'x'
[table]
long = """
[not_a_table]
key = "value" \\"""
end"""
raw = \'\'\'
[[neither]]
\'\'\'\'
list = [
    1, # one
    [2, 3],
    { a = 1, b = { c = 2 } },
    "]",
]
[[row]]
name = "first"
[row.sub]
key = 1
[[row.deep]]
x = 1
[[row.deep]]
x = 2
[[row]]
inline = { p = 1, q.r = "}" }
[[row.deep]]
x = 3
[ "a b" . c ]
when = 2026-09-16 08:00:00
last = true'''


def test_every_kind_of_place() -> None:
    assert tomllib.loads(TEXT)
    expected = {
        ("top",): 2,
        ("quoted key",): 3,
        ("dotted",): 4,
        ("dotted", "inner.part"): 4,
        ("table",): 5,
        ("table", "long"): 6,
        ("table", "raw"): 10,
        ("table", "list"): 13,
        ("table", "list", 0): 14,
        ("table", "list", 1): 15,
        ("table", "list", 1, 1): 15,
        ("table", "list", 2, "b", "c"): 16,
        ("table", "list", 3): 17,
        ("row",): 19,
        ("row", 0): 19,
        ("row", 0, "name"): 20,
        ("row", 0, "sub"): 21,
        ("row", 0, "sub", "key"): 22,
        ("row", 0, "deep", 0, "x"): 24,
        ("row", 0, "deep", 1): 25,
        ("row", 0, "deep", 1, "x"): 26,
        ("row", 1): 27,
        ("row", 1, "inline", "q", "r"): 28,
        ("row", 1, "deep", 0, "x"): 30,
        ("a b", "c"): 31,
        ("a b", "c", "when"): 32,
        ("a b", "c", "last"): 33,
    }
    lines = locate(TEXT)
    assert {loc: lines.get(loc) for loc in expected} == expected
    assert ("table", "key") not in lines
    assert ("not_a_table",) not in lines
    assert ("neither",) not in lines


def test_what_is_missing_has_the_line_of_what_it_belongs_to() -> None:
    assert line_of(TEXT, ("row", 1, "name")) == 27
    assert line_of(TEXT, ("row", 5, "name")) == 19
    assert line_of(TEXT, ("nothing", "at", "all")) == 1


def places(value: object, loc: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    inner = value.items() if isinstance(value, dict) else enumerate(value) if isinstance(value, list) else ()
    return [place for key, part in inner for place in ((*loc, key), *places(part, (*loc, key)))]


def test_every_place_of_the_samples_is_found() -> None:
    for text in (samples.RIG, samples.LIMITS, samples.STICK):
        lines = locate(text)
        assert set(places(tomllib.loads(text))) <= set(lines)
        rows = text.split("\n")
        for loc, line in lines.items():
            key = next(part for part in reversed(loc) if isinstance(part, str))
            assert key in rows[line - 1] or isinstance(loc[-1], int)


KEYS = st.sampled_from(["a", "b-c", '"d e"', "'f.g'", '"h\\"\\u0041"'])
VALUES = st.recursive(
    st.sampled_from(["1", '"x"', "'y'", "1.5", "true", "2026-09-16", '"""a\n"b"""', "'''\n]'''", '"#"', '"\\\\"']),
    lambda inner: (
        st.lists(inner, max_size=3).map(lambda values: "[" + ", \n # ]\n".join(values) + "]")
        | st.dictionaries(KEYS, inner.filter(lambda v: "\n" not in v), max_size=2).map(
            lambda table: "{" + ", ".join(f"{key} = {value}" for key, value in table.items()) + "}"
        )
    ),
    max_leaves=6,
)


@given(st.lists(st.tuples(st.sampled_from(["", "[t]\n", "[[r]]\n", "[r.s]\n", "[[r.q]]\n"]), KEYS, VALUES), max_size=6))
def test_any_text_the_parser_takes_is_scanned(parts: list[tuple[str, str, str]]) -> None:
    text = "".join(f"{header}{key} = {value}\n" for header, key, value in parts)
    try:
        data = tomllib.loads(text)
    except tomllib.TOMLDecodeError:
        return
    assert set(places(data)) == set(locate(text))
