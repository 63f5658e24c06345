"""Without a widget front end: nbconvert to HTML shows the picture and the tables."""

from __future__ import annotations

from html.parser import HTMLParser

import nbformat
from nbclient import NotebookClient
from nbconvert import HTMLExporter

CELL = "import polywalk as pw\npw.explore(pw.scenarios.harbour_row(), vertex=10)"


class Seen(HTMLParser):
    """Alternative texts of images, and captions."""

    def __init__(self) -> None:
        super().__init__()
        self.images: list[dict[str, str | None]] = []
        self.words: list[str] = []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        if tag == "img":
            self.images.append(dict(attrs))

    def handle_data(self, data: str) -> None:
        self.words.append(data)


def test_nbconvert_shows_picture_and_tables() -> None:
    book = nbformat.v4.new_notebook(cells=[nbformat.v4.new_code_cell(CELL)])
    NotebookClient(book, timeout=120, kernel_name="python3", store_widget_state=False).execute()
    page, _ = HTMLExporter().from_notebook_node(book)
    seen = Seen()
    seen.feed(page)
    pictures = [image for image in seen.images if image["alt"] == "picture of the region"]
    assert len(pictures) == 1
    assert (pictures[0]["src"] or "").startswith("data:image/svg+xml;base64,")
    text = " ".join(seen.words)
    for told in ("optimum 292 at", "slack at V10", "makes V10 degenerate", "V12", "4 constraints meet at V10"):
        assert told in text
    output = book.cells[0].outputs[0]
    assert len(nbformat.writes(book)) < 1_000_000
    assert "0x" not in output["data"]["text/plain"]
