"""A model as typed beside what a suspect makes of it."""

from base64 import b64decode
from io import BytesIO
from xml.etree import ElementTree

import pytest

import polywalk as pw
from polywalk.errors import DrawingError

MODEL = pw.scenarios.harbour_row("two decisions").with_rhs("harbour main", 100)
FOUND = pw.suspects(MODEL, forbidden=[(5, 95)])


def test_an_svg_holds_both_pictures_and_is_the_same_every_time(tmp_path):
    made = pw.before_after(MODEL, FOUND.found[0], tmp_path / "both.svg")
    again = pw.before_after(MODEL, FOUND.found[0], tmp_path / "again.svg")
    assert made.data == again.data == (tmp_path / "both.svg").read_bytes()
    images = list(ElementTree.fromstring(made.data))
    sides = [ElementTree.fromstring(b64decode(image.attrib["href"].partition(",")[2])) for image in images]
    assert [side.tag.rpartition("}")[2] for side in sides] == ["svg", "svg"]
    assert float(images[1].attrib["x"]) == float(images[0].attrib["width"])


def test_a_notebook_reads_what_is_typed_and_what_is_meant():
    shown = pw.before_after(MODEL, FOUND.reversible[0])._repr_svg_()
    sides = [b64decode(image.attrib["href"].partition(",")[2]).decode() for image in ElementTree.fromstring(shown)]
    assert "As typed" in sides[0]
    assert f"As meant: {FOUND.reversible[0].kind} in {FOUND.reversible[0].place}" in sides[1]
    gap = pw.before_after(MODEL, FOUND.missing[0])._repr_svg_()
    side = b64decode(ElementTree.fromstring(gap)[1].attrib["href"].partition(",")[2]).decode()
    assert f"With a {FOUND.missing[0].kind}" in side


def test_a_png_is_two_pictures_wide(tmp_path):
    from matplotlib.image import imread

    both = imread(BytesIO(pw.before_after(MODEL, FOUND.found[0], tmp_path / "both.png", mode="grey").data))
    one = imread(BytesIO(pw.picture(MODEL, tmp_path / "one.png", mode="grey").data))
    assert both.shape[1] == 2 * one.shape[1]


@pytest.mark.parametrize("name", ["both.pdf", "both.txt"])
def test_other_endings_are_refused(tmp_path, name):
    with pytest.raises(DrawingError, match="ending"):
        pw.before_after(MODEL, FOUND.found[0], tmp_path / name)
