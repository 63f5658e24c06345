"""The sheet: complete, self-contained, safe with any name, the same bytes again; for every kind of model."""

import re
import subprocess
import sys
from base64 import b64decode, b64encode
from dataclasses import replace
from hashlib import sha256
from html.parser import HTMLParser
from pathlib import Path

import pytest
from zoo import ZOO

import polywalk as pw
from polywalk.drawing import View
from polywalk.scenarios import VARIANTS, harbour_row, klee_minty
from polywalk.sheets import SECTIONS
from polywalk.sheets.legend import MEANINGS, UNSAID, roles
from polywalk.sheets.markup import table
from polywalk.sheets.overview import CAUTION
from polywalk.table import Table

README = Path(pw.__file__).parents[1] / "README.md"
NASTY = "<img src=x onerror=alert(1)>"
NAMES = [NASTY, "</script><script>alert(1)</script>", "\"quoted\" 'twice'", "$\\frac{1}{0}$ & more", "🚢 harbour"]
NAMES += ["x" * 200, "tab\tand \x07 bell", "\u202eturned"]
PLOTLY = re.compile(r"<script>/\*\*\n\* plotly.*?</script>", re.DOTALL)
"""The longest script, which no test of names has to read."""

QUICK = ["summary", "picture", "legend", "model", "vertices", "findings"]


class Page(HTMLParser):
    """What a reader of the page gets: elements, attributes, and the text outside scripts and styles."""

    def __init__(self, html: str) -> None:
        super().__init__()
        self.tags: list[str] = []
        self.attributes: list[tuple[str, str | None]] = []
        self.text, self.codes, self._open = "", [], ""  # type: str, list[str], str
        self.feed(
            re.sub(
                r"<script>[^<]*(plotly\.js v|\* plotly).*?</script>",
                "<script></script>",
                html,
                count=1,
                flags=re.DOTALL,
            )
        )
        self.close()

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append(tag)
        self.attributes += attrs
        self._open = tag

    def handle_endtag(self, tag: str) -> None:
        self._open = ""

    def handle_data(self, data: str) -> None:
        if self._open in {"script", "style"}:
            self.codes.append(data)
        else:
            self.text += data


def named(name: str) -> pw.Model:
    """Harbour Row in the plane with a name on everything that can have one."""
    model = harbour_row("two decisions")
    first = replace(model.constraints[0], name=name, origin=name)
    variables = (name, *model.variables[1:])
    return replace(
        model, name=name, variables=variables, constraints=(first, *model.constraints[1:]), units=((name, "MW"),)
    )


@pytest.mark.parametrize("variant", VARIANTS)
def test_every_section_of_every_variant_says_something(variant: str) -> None:
    html = pw.sheet(harbour_row(variant), date="2026-01-31", author="A. Nalyst").html
    page = Page(html)
    assert page.tags.count("h2") == len(SECTIONS) - 1  # all but the change
    assert "A. Nalyst" in page.text
    assert CAUTION in page.text
    assert 'maximize = "23*pump' in page.text
    assert page.tags.count("h1") == page.tags.count("title") == 1
    assert ("lang", "en") in page.attributes
    assert all(value for key, value in page.attributes if key in {"alt", "aria-label", "aria-labelledby"})
    ids = [value for key, value in page.attributes if key == "id"]
    assert len(ids) == len(set(ids))
    assert {value for key, value in page.attributes if key == "aria-labelledby"} <= set(ids)


def test_the_caution_is_that_of_the_readme() -> None:
    assert CAUTION in " ".join(README.read_text(encoding="utf-8").split())
    assert CAUTION not in pw.sheet(klee_minty(3), sections=["summary"]).html
    assert CAUTION in pw.sheet(klee_minty(3), sections=["summary"], equipment=True).html
    assert CAUTION not in pw.sheet(harbour_row(), sections=["summary"], equipment=False).html


def test_the_policy_allows_what_the_page_holds_and_nothing_else() -> None:
    html = pw.sheet(harbour_row("two decisions"), sections=["picture", "source"]).html
    policy = re.search(r'http-equiv="Content-Security-Policy" content="([^"]*)"', html)[1].replace("&#x27;", "'")
    assert policy.startswith("default-src 'none'; ")
    assert "unsafe" not in policy
    assert "img-src data:;" in policy
    scripts = re.findall(r"<script>(.*?)</script>", html, re.DOTALL)
    styles = re.findall(r"<style>(.*?)</style>", html, re.DOTALL)
    assert len(scripts) == 3
    assert sum("Plotly" in script and len(script) > 1_000_000 for script in scripts) == 1
    for code in (*scripts, *styles):
        assert f"'sha256-{b64encode(sha256(code.encode()).digest()).decode()}'" in policy
    page = Page(html)
    assert not [key for key, _ in page.attributes if key == "style" or key.startswith("on")]
    links = [value for key, value in page.attributes if key in {"src", "href"}]
    assert all(value.startswith(("data:image/svg+xml;base64,", "#")) for value in links)


def test_the_same_bytes_but_for_the_date() -> None:
    code = "import polywalk as pw, sys; sys.stdout.write(pw.sheet(pw.scenarios.harbour_row(), date='{}').html)"
    runs = [
        subprocess.run([sys.executable, "-c", code.format(date)], capture_output=True, check=True, timeout=120).stdout
        for date in ("2026-01-31", "2026-02-28")
    ]
    assert runs[0] != runs[1]
    assert runs[0].replace(b"<time>2026-01-31</time>", b"") == runs[1].replace(b"<time>2026-02-28</time>", b"")


@pytest.mark.parametrize("name", NAMES)
def test_a_name_stays_text_everywhere(name: str) -> None:
    model = named(name)
    change = pw.difference(model, model.without("quay pipe"))
    html = pw.sheet(change, title=name, author=name, date=name).html
    page, plain = Page(html), Page(pw.sheet(harbour_row("two decisions")).html)
    assert page.tags.count("img") == plain.tags.count("img") + 1  # the picture of the change
    assert page.tags.count("script") == plain.tags.count("script") + 1  # its data
    assert not [key for key, _ in page.attributes if key.startswith("on")]
    shown = name.replace("\x07", "\ufffd")
    assert shown in page.text
    assert "\x07" not in html
    for picture in re.findall(r"data:image/svg\+xml;base64,([^\"]*)", html):
        assert b"<img" not in b64decode(picture)


@pytest.mark.parametrize("name", ZOO)
def test_every_kind_of_model_has_a_sheet(name: str) -> None:
    model, facts = ZOO[name]
    page = Page(pw.sheet(model, sections=QUICK).html)
    assert page.tags.count("h2") == len(QUICK)
    if facts.get("status") == "empty":
        assert "No plan satisfies every constraint" in page.text


@pytest.mark.parametrize("variant", VARIANTS)
def test_the_legend_explains_every_mark(variant: str) -> None:
    model = harbour_row(variant)
    walks = () if variant == "infeasible" else (pw.walk(model), pw.walk(model, rule="bland"))
    drawn = pw.drawing.scene(model, View(walks=walks, findings=pw.review(model).findings))
    told = {row.role for part in drawn.key for row in part.rows}
    assert not set(roles(drawn)) - told - set(MEANINGS) - UNSAID


def test_findings_set_aside_keep_their_reasons() -> None:
    model = harbour_row()
    review = pw.review(model).accept("degenerate-vertex", because="V10 is not optimal & never used")
    page = Page(pw.sheet(model, review=review, sections=["findings", "summary"]).html)
    assert "Set aside because: V10 is not optimal & never used" in page.text
    assert "1 finding set aside with a reason" in page.text
    with pytest.raises(pw.PolywalkError, match="another model"):
        pw.sheet(harbour_row("tied"), review=review)


def test_sections_are_chosen_by_name() -> None:
    page = Page(pw.sheet(harbour_row(), sections=["source", "model"]).html)
    assert page.tags.count("h2") == 2
    assert sum(map(len, page.codes)) < 20_000  # plotly.js is not there
    with pytest.raises(pw.PolywalkError, match="no section 'pictures'"):
        pw.sheet(harbour_row(), sections=["pictures"])
    with pytest.raises(pw.PolywalkError, match="A4 or Letter"):
        pw.sheet(harbour_row(), paper="A5")  # type: ignore[arg-type]
    assert "size: letter portrait" in pw.sheet(harbour_row(), sections=["model"], paper="Letter").html


def test_the_toml_on_the_sheet_gives_the_model_back(tmp_path: Path) -> None:
    model = named(NASTY).with_rhs("quay pipe", "123456789/1234567")
    page = Page(pw.sheet(model, sections=["source"]).html)
    source = page.text[page.text.index("name =") : page.text.index("Made with polywalk")]
    (tmp_path / "model.toml").write_text(source, encoding="utf-8")
    assert pw.from_toml(tmp_path / "model.toml") == model


def test_a_file_is_replaced_whole_or_not_at_all(tmp_path: Path) -> None:
    target = tmp_path / "review.html"
    target.write_text("kept")
    with pytest.raises(pw.PolywalkError):
        pw.sheet(harbour_row(), target, View(axes=("boiler",)))
    assert target.read_text() == "kept"
    found = pw.sheet(harbour_row(), target, sections=["model"])
    assert target.read_text(encoding="utf-8") == found.html
    assert repr(found) == "design-review sheet (0.0 MB, review.html)"
    assert [path.name for path in tmp_path.iterdir()] == ["review.html"]


REFUSED = [("review.pdf", "ending in .html"), ("none/a.html", "does not exist"), ("folder.html", "a folder")]


@pytest.mark.parametrize(("path", "said"), REFUSED)
def test_a_path_that_cannot_be_written_is_refused(path: str, said: str, tmp_path: Path) -> None:
    (tmp_path / "folder.html").mkdir()
    with pytest.raises(pw.PolywalkError, match=said):
        pw.sheet(harbour_row(), tmp_path / path, sections=["model"])


def test_a_file_system_that_refuses_leaves_nothing_behind(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    def refuse(*_: object) -> None:
        raise PermissionError(13, "Permission denied")

    monkeypatch.setattr("polywalk.drawing.writing.os.replace", refuse)
    with pytest.raises(pw.PolywalkError, match="could not be written"):
        pw.sheet(harbour_row(), tmp_path / "review.html", sections=["model"])
    assert list(tmp_path.iterdir()) == []


def test_a_model_of_many_variables_shows_its_first_three() -> None:
    page = Page(pw.sheet(klee_minty(5), sections=["picture", "vertices"]).html)
    assert "V31" in page.text
    assert page.tags.count("img") == 1


def test_one_repair_is_told_once_with_both_its_plans() -> None:
    html = pw.sheet(harbour_row("infeasible"), date="", sections=["findings"]).html
    assert "relaxing town contract by 2" not in html  # the title of the second finding about the same change
    (entry,) = [part for part in html.split('<div class="finding">') if "lowering town contract by 2" in part]
    assert "pump = 4, chips = 4, tank = 4" in entry
    assert "The same change is the least in all" in entry
    assert "pump = 5, chips = 7, tank = 0" in entry
    assert "single-repair: " in entry
    assert "least-repair: " in entry


def test_another_least_repair_keeps_its_own_entry() -> None:
    rows = {"low": "x >= 4", "high": "x <= 1", "near": "y <= 1", "far": "y >= 4"}  # two conflicts apart
    model = pw.from_algebra(minimize="x", constraints=rows)
    codes = [item.code for item in pw.review(model).findings]
    html = pw.sheet(model, date="", sections=["findings"]).html
    assert "least-repair" in codes
    assert html.count('<div class="finding">') == len(codes)
    assert "The same change" not in html


def test_heads_of_numbers_and_infinity_stand_above_and_among_numbers() -> None:
    found = Table("t", ("name", "price"), (("a", 3), ("b", "∞")))
    html = table(found)
    assert html.count('class="number"') == 3
    assert '<div class="wide short">' in html
    assert '<div class="wide">' in table(Table("t", ("n",), tuple((k,) for k in range(50))))
