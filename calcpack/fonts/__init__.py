"""The type faces calcpack sets its pages in, shipped with it: all under the SIL Open Font License 1.1.

IBM Plex Sans Condensed sets the apparatus and the figures, Libertinus Serif the text (inside Typst; shipped for the
browser), STIX Two Math the formulas, Noto Emoji pictographs in quoted text. ``SOURCES.txt`` says where each
file came from. In Typst, and in an SVG that Typst draws, Plex is ``"IBM Plex Sans"`` at ``stretch: 75%``.
"""

from __future__ import annotations

import csv
from base64 import b64encode
from dataclasses import dataclass
from functools import cache
from pathlib import Path

__all__ = ["FALLBACK", "FAMILIES", "WebFont", "covered", "css", "folder", "matplotlib_face", "web_fonts"]

_FOLDER = Path(__file__).resolve().parent

# Named after the text face in Typst's font list: left to itself, Typst gives up on some rare characters.
FALLBACK = ("STIX Two Math", "Noto Emoji", "DejaVu Sans Mono")
FAMILIES = ("IBM Plex Sans Condensed", "Libertinus Serif", *FALLBACK)


@dataclass(frozen=True)
class WebFont:
    """One face for the browser.

    Attributes
    ----------
    family : CSS family name
    weight : CSS weight, 400 or 600
    style : ``normal`` or ``italic``
    path : the woff2 file
    """

    family: str
    weight: int
    style: str
    path: Path


_WEB = (
    ("IBM Plex Sans Condensed", 400, "normal", "IBMPlexSansCondensed-Regular"),
    ("IBM Plex Sans Condensed", 400, "italic", "IBMPlexSansCondensed-Italic"),
    ("IBM Plex Sans Condensed", 600, "normal", "IBMPlexSansCondensed-SemiBold"),
    ("Libertinus Serif", 400, "normal", "LibertinusSerif-Regular"),
    ("Libertinus Serif", 400, "italic", "LibertinusSerif-Italic"),
    ("Libertinus Serif", 600, "normal", "LibertinusSerif-SemiBold"),
    ("STIX Two Math", 400, "normal", "STIXTwoMath-Regular"),
)


def folder() -> Path:
    """The folder of the TTF files, for Typst's ``font_paths``."""
    return _FOLDER


def web_fonts() -> tuple[WebFont, ...]:
    """The faces an HTML page embeds, in a fixed order; pictographs are left to the reader's system."""
    return tuple(WebFont(family, weight, style, _FOLDER / f"{name}.woff2") for family, weight, style, name in _WEB)


@cache
def css() -> str:
    """``@font-face`` rules with the faces as data URIs: a page that holds them needs no other file."""
    return "\n".join(_rule(font) for font in web_fonts()) + "\n"


def _rule(font: WebFont) -> str:
    data = b64encode(font.path.read_bytes()).decode("ascii")
    return (
        f'@font-face {{ font-family: "{font.family}"; font-style: {font.style}; font-weight: {font.weight}; '
        f'src: url(data:font/woff2;base64,{data}) format("woff2"); }}'
    )


def matplotlib_face(weight: int = 400) -> Path:
    """The TTF of IBM Plex Sans Condensed in a weight, 400 or 600, for measuring and drawing figures."""
    return _FOLDER / f"IBMPlexSansCondensed-{'SemiBold' if weight >= 600 else 'Regular'}.ttf"


@cache
def covered(family: str = "") -> frozenset[int]:
    """The code points that `family`, or by default any face of a printed page, has a glyph for.

    A PDF/A page with a missing glyph is refused, so text from outside is held against this set first.

    Raises
    ------
    KeyError : `family` is not one of `FAMILIES`
    """
    ranges = _coverage()
    chosen = (family,) if family else FAMILIES
    return frozenset(point for name in chosen for span in ranges[name] for point in span)


@cache
def _coverage() -> dict[str, list[range]]:
    table: dict[str, list[range]] = {name: [] for name in FAMILIES}
    with (_FOLDER / "coverage.csv").open(encoding="ascii", newline="") as file:
        for row in csv.DictReader(file):
            table[row["family"]].append(range(int(row["first"], 16), int(row["last"], 16) + 1))
    return table
