"""How wide a text is, without a plotting library: the advance widths of DejaVu Sans."""

from __future__ import annotations

WIDTHS = {
    275: "'",
    278: "ijl",
    295: "IJ",
    318: " ,.·‘’",
    337: "/:;\\|",
    352: "f",
    361: "-",
    390: "()[]",
    392: "t",
    401: "!²³",
    411: "r",
    460: '"',
    500: "*_`–°",
    518: "“”„",
    521: "s",
    525: "z",
    531: "?",
    550: "cç",
    557: "L",
    575: "F",
    579: "k",
    592: "vxy",
    603: "P",
    611: "TY",
    612: "oöø",
    613: "aäàå",
    615: "eéè",
    630: "ß",
    632: "E",
    634: "hnuüñ",
    635: "Sbdgpq",
    636: "$0123456789{}€£",
    656: "K",
    684: "AVÄ",
    685: "XZ",
    686: "B",
    695: "R",
    698: "C",
    732: "UÜ",
    748: "N",
    752: "H",
    770: "D",
    775: "G",
    780: "&",
    787: "OQÖ",
    818: "w",
    833: "∞",
    838: "#+<=>^~≤≥≈−×→",
    863: "M",
    950: "%",
    974: "m",
    982: "æ",
    989: "W",
    1000: "@—…",
}
"""Characters by their advance width in thousandths of the text's size, as matplotlib's copy of the font has them."""

USUAL, WIDE = 0.62, 1.05
"""Width of any other character as a share of the size: of one that the font has, and of one past the alphabets."""

BOLD = 1.13
"""How much wider bold letters are (measured over the alphabet)."""

_OF = {letter: width / 1000 for width, letters in WIDTHS.items() for letter in letters}


def width(text: str, size: float, bold: bool = False) -> float:
    """The width of one line of text, in the unit of its size."""
    plain = sum(_OF.get(letter, USUAL if ord(letter) < 0x2E80 else WIDE) for letter in text)
    return size * plain * (BOLD if bold else 1.0)


def clipped(text: str, size: float, room: float) -> str:
    """The text, or as much of it as there is room for and an ellipsis."""
    if width(text, size) <= room:
        return text
    kept = text
    while kept and width(f"{kept}…", size) > room:
        kept = kept[:-1]
    return f"{kept.rstrip()}…"


def lines_of(text: str, size: float, room: float, bold: bool = False) -> list[str]:
    """The text broken into lines that fit, at spaces where there are any."""
    lines, line = list[str](), ""
    for word in text.split(" "):
        longer = f"{line} {word}" if line else word
        if width(longer, size, bold) <= room:
            line = longer
            continue
        lines += [line] if line else []
        line = word
        while width(line, size, bold) > room:
            cut = next(k for k in range(len(line), 0, -1) if width(line[:k], size, bold) <= room or k == 1)
            lines.append(line[:cut])
            line = line[cut:]
    return [*lines, line] if line or not lines else lines
