"""Tables: plain text without object ids, HTML with every name escaped, pandas with exact numbers."""

from fractions import Fraction
from html.parser import HTMLParser

import pytest

from polywalk.table import Shown, Table, cell

THIRD = Fraction(123456789, 1234567)
EVIL = '<script>alert("x")</script> & co'


def sample():
    return Table(
        f"title {EVIL}",
        ("name", f"point {EVIL}"),
        ((EVIL, (Fraction(1, 2), THIRD)), ("plain", THIRD)),
        (f"note {EVIL}",),
    )


class Tags(HTMLParser):
    def __init__(self, text):
        super().__init__()
        self.opened, self.closed, self.data, self.attributes = [], [], [], []
        self.feed(text)
        self.close()

    def handle_starttag(self, tag, attrs):
        self.opened.append(tag)
        self.attributes += attrs

    def handle_endtag(self, tag):
        self.closed.append(tag)

    def handle_data(self, data):
        self.data.append(data)


def test_plain_text():
    table = Table(
        "plans", ("plan", "cost", "best"), (("a", Fraction(9, 2), True), ("long name", None, False)), ("note",)
    )
    assert str(table) == repr(table) == "plans\nplan       cost  best\na          4.5   yes\nlong name        no\nnote"
    assert str(Table("nothing", (), ())) == "nothing"
    assert str(Table("empty", ("a", "b"), ())) == "empty\na  b"


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (None, ""),
        (True, "yes"),
        (3, "3"),
        (Fraction(1, 3), "1/3"),
        (("pump lower", "grid"), "pump lower, grid"),
        ((Fraction(1, 2), Fraction(3)), "(0.5, 3)"),
        ((), ""),
        (THIRD, "≈100"),
    ],
)
def test_cells(value, text):
    assert cell(value) == text


def test_every_text_is_escaped_in_html():
    page = Tags(sample()._repr_html_())
    assert "script" not in page.opened
    assert sorted(page.opened) == sorted(page.closed)
    assert set(page.opened) == {"table", "caption", "thead", "tbody", "tr", "th", "td", "div"}
    assert page.data.count(EVIL) == 1
    assert f"title {EVIL}" in page.data
    assert f"point {EVIL}" in page.data
    assert f"note {EVIL}" in page.data


def test_rounded_numbers_show_the_exact_one_on_hover():
    page = Tags(sample()._repr_html_())
    assert [value for name, value in page.attributes if name == "title"] == [
        "(0.5, 123456789/1234567)",
        "123456789/1234567",
    ]
    assert ("scope", "col") in page.attributes


def test_rows_that_do_not_fit_their_headings_are_no_table():
    with pytest.raises((ValueError, IndexError)):
        str(Table("t", ("a", "b"), (("only one",),)))


def test_frame_keeps_exact_numbers():
    frame = sample().frame()
    assert list(frame.columns) == ["name", f"point {EVIL}"]
    assert frame.iloc[1, 1] == THIRD
    assert type(frame.iloc[1, 1]) is Fraction
    assert Table("empty", ("a",), ()).frame().shape == (0, 1)


def test_shown_shows_its_table():
    class Result(Shown):
        def table(self):
            return sample()

    result = Result()
    assert str(result) == repr(result) == str(sample())
    assert result._repr_html_() == sample()._repr_html_()
    assert result.frame().equals(sample().frame())
    with pytest.raises(NotImplementedError):
        Shown().table()


def test_markdown_keeps_every_name_as_text():
    table = Table(
        "a | b", ("name", "cost"), (("x|y <img src=x> @you #7 $z$ `c` _u_\nnext", THIRD), ("", None)), ("1*2",)
    )
    title, blank, head, rule, first, second, gap, note = table.markdown().split("\n")
    assert (title, blank, gap, note) == ("**a &#124; b**", "", "", "1&#42;2")
    assert (head, rule, second) == ("| name | cost |", "| :--- | ---: |", "|  |  |")
    assert first.count("|") == 3
    assert not set("<>@#$`_*") & set(first.replace("&#", ""))
    assert "next" in first


def test_markdown_of_a_table_without_columns_and_of_a_result():
    assert Table("nothing", (), ()).markdown() == "**nothing**"
    assert Table("none yet", ("a",), ()).markdown() == "**none yet**\n\n| a |\n| :--- |"

    class Result(Shown):
        def table(self):
            return Table("plans", ("plan",), (("a",),))

    assert Result().markdown() == "**plans**\n\n| plan |\n| :--- |\n| a |"
