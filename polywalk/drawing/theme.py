"""Every colour, dash, marker and size, once.

Constraints follow the Okabe-Ito palette in order (Okabe & Ito, Color Universal Design, 2008); on white its light
colours are darkened until a line reaches 3:1 against the ground, and names are always written in the text colour.
Nothing is told by colour alone: constraints carry names or numbered tags, walks differ by dash and by step numbers,
special vertices by shape.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from functools import cached_property

from polywalk.drawing.view import Mode

CONSTRAINTS = {
    "light": ("#0072B2", "#C65300", "#00795A", "#9C4F7C", "#B07A00", "#444444", "#5F6600", "#3D94C8"),
    "dark": ("#56B4E9", "#F08A3C", "#2CC79B", "#E39BC3", "#E69F00", "#A8A8A8", "#F0E442", "#A9DCF8"),
    "grey": ("#101010", "#747474", "#444444", "#949494", "#1F1F1F", "#8A8A8A", "#464646", "#6A6A6A"),
}
WALKS = {
    "light": ("#16181D", "#A63A00", "#004E7C", "#6B2C63"),
    "dark": ("#FFFFFF", "#FFB27A", "#8FD0F5", "#F1B7DA"),
    "grey": ("#000000", "#3A3A3A", "#707070", "#000000"),
}
FONT = "DejaVu Sans, Verdana, sans-serif"
DASHES = ("solid", "dash", "dot", "dashdot")
WALK_DASHES = (*DASHES, "longdash", "longdashdot")


@dataclass(frozen=True)
class Style:
    """How a role looks; sizes and widths in pixels, symbols in words both painters know."""

    colour: str
    fill: str = ""
    opacity: float = 1.0
    width: float = 1.0
    dash: str = "solid"
    size: float = 0.0
    symbol: str = "circle"


@dataclass(frozen=True)
class Theme:
    """The grounds, greys and the style of every role in one mode."""

    mode: Mode
    paper: str
    text: str
    quiet: str
    grid: str
    face: str
    edge: str
    cut: str
    added: str

    def constraint(self, index: int) -> Style:
        """Constraint number ``index``; every four the dash changes too, and the two together repeat after 32."""
        dash = DASHES[(index // 4 + index // 16) % 4]
        return Style(CONSTRAINTS[self.mode][index % 8], width=1.8, dash=dash)

    def walk(self, index: int) -> Style:
        """Walk number ``index``: told apart by dash as well as colour; the two together repeat after twelve."""
        return Style(WALKS[self.mode][index % 4], width=2.6, dash=WALK_DASHES[index % 6])

    def style(self, role: str, index: int = 0) -> Style:
        """The style of a role, the only place a painter asks."""
        if role in {"constraint", "hatch", "conflict", "conflict line", "tag"}:
            base = self.constraint(index)
            if role == "hatch":
                return replace(base, width=0.9, dash="solid", opacity=0.75)
            if role == "conflict":
                return replace(base, width=0.0, fill=base.colour, opacity=0.22)
            if role == "conflict line":
                return replace(base, width=3.2, dash="solid")
            return replace(base, fill=self.paper, size=11.0)
        if role in {"walk", "phase 1", "walk rest", "step", "onward", "end", "moved", "stayed"}:
            base = self.walk(index)
            changes = {
                "walk": replace(base),
                "phase 1": replace(base, dash="dot", width=2.2),
                "walk rest": replace(base, opacity=0.25, width=1.6),
                "step": replace(base, fill=self.paper, size=15.0, width=1.2),
                "onward": replace(base, width=1.8),
                "end": replace(base, fill=self.paper, size=11.0, width=1.0),
                "moved": replace(base, fill=base.colour, size=6.0, width=1.0),
                "stayed": replace(base, fill=self.paper, size=9.0, width=1.6),
            }
            return changes[role]
        return self._fixed[role]

    @cached_property
    def _fixed(self) -> dict[str, Style]:
        """The styles of all roles that no index changes."""
        return self._body() | self._words() | self._bases() | self._versions()

    def _body(self) -> dict[str, Style]:
        """The region, its vertices, its objective, its frame."""
        return {
            "region": Style(self.edge, fill=self.face, opacity=1.0, width=0.0),
            "facet": Style(self.edge, fill=self.face, opacity=0.62, width=0.0),
            "rest": Style(self.quiet, fill=self.face, opacity=0.45, width=1.0, dash="dash"),
            "rest edge": Style(self.quiet, width=1.3, dash="dash"),
            "short": Style(self.text, width=1.6, dash="dot"),
            "edge": Style(self.edge, width=1.6),
            "hidden edge": Style(self.quiet, width=1.0, dash="dash"),
            "open edge": Style(self.edge, width=1.8, dash="dash"),
            "level": Style(self.quiet, fill=self.quiet, opacity=0.1, width=0.0),
            "level line": Style(self.quiet, width=1.3, dash="dashdot"),
            "objective": Style(self.quiet, width=3.4),
            "grid": Style(self.grid, width=0.8),
            "axis": Style(self.quiet, width=1.0),
            "vertex": Style(self.paper, fill=self.edge, width=1.0, size=8.0),
            "degenerate": Style(self.edge, width=1.8, size=21.0, symbol="ring"),
            "optimum": Style(self.paper, fill=self.text, width=1.0, size=14.0, symbol="diamond"),
            "optimal face": Style(self.text, width=4.5),
            "selected": Style(self.text, width=2.0, size=22.0, symbol="square ring"),
            "start": Style(self.text, width=2.0, size=13.0, symbol="square ring"),
            "back": Style(self.quiet, fill=self.face, opacity=0.9, width=0.0),
            "none": Style(self.text),
        }

    def _words(self) -> dict[str, Style]:
        """Texts, and what findings are marked with."""
        return {
            "stay": Style(self.text, fill=self.paper, width=1.0, size=11.0),
            "back tag": Style(self.quiet, fill=self.paper, width=1.0, size=11.0),
            "name": Style(self.text, size=11.0),
            "culprit": Style(self.text, size=11.0),
            "ends": Style(self.text, fill=self.paper, size=11.0, width=1.0),
            "note": Style(self.quiet, size=10.0),
            "tick": Style(self.quiet, size=10.0),
            "axis name": Style(self.text, size=11.0),
            "point": Style(self.text, size=11.0),
            "part": Style(self.text, fill=self.paper, size=12.0, width=1.0),
            "target": Style(self.text, size=12.0),
            "letter": Style(self.paper, width=0.0),
            "evidence name": Style(self.text, size=11.0),
            "evidence": Style(self.text, width=2.2, size=30.0, symbol="square ring"),
            "evidence line": Style(self.text, width=9.0, opacity=0.22),
            "evidence ray": Style(self.text, width=2.6),
        }

    def _bases(self) -> dict[str, Style]:
        """The bases of a vertex, and the curve of a value."""
        return {
            "basis": Style(self.edge, fill=self.paper, width=1.4, size=34.0),
            "optimal basis": Style(self.text, fill=self.text, width=1.4, size=34.0),
            "first basis": Style(self.text, width=2.0, size=44.0, symbol="square ring"),
            "basis name": Style(self.text, size=9.5),
            "optimal basis name": Style(self.paper, size=9.5),
            "exchange": Style(self.quiet, width=1.2, opacity=0.3),
            "pivot": Style(self.quiet, width=0.9),
            "faint pivot": Style(self.quiet, width=0.8, opacity=0.28),
            "exit": Style(self.text, width=1.3),
            "faint exit": Style(self.text, width=0.9, opacity=0.35),
            "other exit": Style(self.quiet, width=0.9, dash="dash"),
            "curve": Style(self.text, width=2.4),
            "breakpoint": Style(self.paper, fill=self.edge, width=1.0, size=9.0),
            "now": Style(self.paper, fill=self.text, width=1.0, size=14.0, symbol="diamond"),
            "beyond": Style(self.quiet, fill=self.quiet, opacity=0.16, width=0.0),
        }

    def _versions(self) -> dict[str, Style]:
        """Two versions of a model."""
        return {
            "cut off": Style(self.cut, fill=self.cut, opacity=0.16, width=0.0),
            "added": Style(self.added, fill=self.added, opacity=0.16, width=0.0),
            "old edge": Style(self.text, width=1.4, dash="dash"),
            "old edge on": Style(self.text, width=1.4, dash="dash"),
            "new edge": Style(self.edge, width=2.6),
            "new edge on": Style(self.edge, width=2.6),
            "old border": Style(self.quiet, width=1.2, dash="dash"),
            "lost": Style(self.text, width=2.2, size=10.0, symbol="cross"),
            "gained": Style(self.edge, fill=self.paper, width=2.0, size=10.0, symbol="square"),
            "old optimum": Style(self.text, width=2.0, size=17.0, symbol="diamond ring"),
        }


DEPTH = {
    role: depth
    for depth, roles in enumerate(
        (
            ("grid", "axis"),
            ("region", "back", "conflict", "beyond"),
            ("hidden edge",),
            ("level", "level line"),
            ("facet", "rest"),
            ("cut off", "added"),
            ("evidence line",),
            ("old border",),
            ("hatch", "constraint"),
            ("old edge", "old edge on"),
            ("new edge", "new edge on"),
            ("edge", "rest edge", "short", "open edge", "conflict line", "exchange", "letter"),
            ("pivot", "faint pivot", "exit", "faint exit", "other exit"),
            ("evidence ray", "optimal face", "objective"),
            ("walk rest",),
            ("phase 1", "walk", "onward", "curve"),
            ("first basis",),
            ("old optimum",),
            ("vertex", "lost", "gained", "basis", "optimal basis", "moved", "stayed", "breakpoint"),
            ("evidence", "degenerate", "optimum", "start", "selected", "now"),
            ("back tag",),
            (
                "evidence name",
                "culprit",
                "note",
                "tick",
                "axis name",
                "name",
                "tag",
                "point",
                "basis name",
                "optimal basis name",
                "target",
            ),
            ("stay", "step", "end", "ends", "part"),
        )
    )
    for role in roles
}
"""What is painted over what: later lines lie on top."""

THEMES = {
    "light": Theme("light", "#FFFFFF", "#16181D", "#6A6F7A", "#E3E4E8", "#E9E7E1", "#2F333B", "#B23A00", "#00679A"),
    "dark": Theme("dark", "#16181D", "#F2F2F0", "#A2A7B3", "#33363E", "#343841", "#D9DAD6", "#FFB27A", "#8FD0F5"),
    "grey": Theme("grey", "#FFFFFF", "#000000", "#666666", "#DDDDDD", "#EAEAEA", "#222222", "#222222", "#222222"),
}


def mixed(colour: str, other: str, share: float) -> str:
    """A colour moved towards another by a share from 0 to 1."""
    pairs = ((int(colour[k : k + 2], 16), int(other[k : k + 2], 16)) for k in (1, 3, 5))
    return "#" + "".join(f"{round(a + share * (b - a)):02X}" for a, b in pairs)
