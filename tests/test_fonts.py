"""The shipped type faces: complete, licensed, and able to show what `covered` promises."""

from __future__ import annotations

import base64
import re
import subprocess
import sys
from functools import cache
from pathlib import Path

import pytest
import typst
from fontTools.ttLib import TTFont

from calcpack import fonts

FOLDER = fonts.folder()
PLEX = ("IBMPlexSansCondensed-Regular.ttf", "IBMPlexSansCondensed-SemiBold.ttf", "IBMPlexSansCondensed-Italic.ttf")
# How Typst names the families of the files (it takes "Condensed" as a stretch); from the OpenType name tables.
IN_TYPST = {"IBM Plex Sans Condensed": "IBM Plex Sans"}


def points(name: str) -> set[int]:
    """The code points of a shipped TTF, less control characters and private use."""
    every = TTFont(FOLDER / name).getBestCmap()
    return {c for c in every if c >= 0x20 and not 0x7F <= c < 0xA0 and not 0xE000 <= c <= 0xF8FF and c < 0xF0000}


def compile_pdf(source: str) -> bytes:
    """A PDF/A-3b from the shipped faces only; a missing glyph is refused there."""
    return typst.compile(
        source.encode(),
        font_paths=[str(FOLDER)],
        ignore_system_fonts=True,
        format="pdf",
        pdf_standards=["a-3b"],
        timestamp=0,
    )


def shown(characters: set[int] | frozenset[int], families: tuple[str, ...], more: str = "") -> bytes:
    """A page with all `characters` in the first of `families` that has each, and no other face."""
    listed = ", ".join(f'"{name}"' for name in families)
    body = " ".join(f"\\u{{{c:x}}}" for c in sorted(characters))
    return compile_pdf(f"#set text(font: ({listed},), fallback: false{more})\n{body}")


def test_the_table_holds_what_the_files_hold() -> None:
    assert fonts.covered("IBM Plex Sans Condensed") == set.intersection(*(points(name) for name in PLEX))
    assert fonts.covered("STIX Two Math") == points("STIXTwoMath-Regular.ttf")
    assert fonts.covered("Noto Emoji") == points("NotoEmoji-Regular.ttf")


@pytest.mark.parametrize("family", fonts.FAMILIES)
def test_typst_shows_every_code_point_of_a_family(family: str) -> None:
    stretch = ", stretch: 75%" if family in IN_TYPST else ""
    assert shown(fonts.covered(family), (IN_TYPST.get(family, family),), stretch).startswith(b"%PDF")


@pytest.mark.parametrize("more", [", weight: 600", ', style: "italic"'])
def test_typst_has_the_serif_in_every_style_of_the_browser(more: str) -> None:
    assert shown(fonts.covered("Libertinus Serif"), ("Libertinus Serif",), more).startswith(b"%PDF")


def test_one_font_list_shows_everything_covered() -> None:
    assert shown(fonts.covered(), ("Libertinus Serif", "IBM Plex Sans", *fonts.FALLBACK)).startswith(b"%PDF")


def test_typst_refuses_what_is_not_covered() -> None:
    han = 0x4E2D
    assert han not in fonts.covered()
    with pytest.raises(typst.TypstError, match="could not be displayed"):
        shown({0x41, han}, ("Libertinus Serif", "IBM Plex Sans", *fonts.FALLBACK))


def test_covered_is_the_union_of_the_families() -> None:
    assert fonts.covered() == frozenset().union(*(fonts.covered(name) for name in fonts.FAMILIES))
    # An accented name, the marks of a review and a pictograph: each in some face, none in all of them.
    assert {ord(c) for c in "Łódź Ångström ✓ ✗ ☐ ⚠ 😀 ℓ ′ ″ √ ≤ × ½"} <= fonts.covered()
    assert ord("✗") not in fonts.covered("IBM Plex Sans Condensed")


def test_an_unknown_family_is_refused() -> None:
    with pytest.raises(KeyError, match="Comic"):
        fonts.covered("Comic")


def test_the_math_face_is_complete() -> None:
    face = TTFont(FOLDER / "STIXTwoMath-Regular.ttf")
    assert "MATH" in face
    # ℓ, prime, root, ceiling, psi, lambda, italic a, italic alpha, italic Phi: Unicode code charts.
    assert {0x2113, 0x2032, 0x221A, 0x2308, 0x3C8, 0x3BB, 0x1D44E, 0x1D6FC, 0x1D6F7} <= set(face.getBestCmap())
    variants = face["MATH"].table.MathVariants.VertGlyphConstruction
    assert len(variants) > 50


def test_a_prime_grows_at_script_size() -> None:
    face = TTFont(FOLDER / "STIXTwoMath-Regular.ttf")
    assert "ssty" in {record.FeatureTag for record in face["GSUB"].table.FeatureList.FeatureRecord}
    name = face.getBestCmap()[0x2032]
    large, small = face["glyf"][f"{name}.st"], face["glyf"][name]
    assert (large.yMax - large.yMin) / (small.yMax - small.yMin) == pytest.approx(1.5, abs=0.01)


@cache
def families_in_typst() -> frozenset[tuple[str, str, int, float]]:
    """Family, style, weight and stretch of the shipped files, as Typst reads them."""
    found = typst.Fonts(include_system_fonts=False, include_embedded_fonts=False, font_paths=[str(FOLDER)]).fonts()
    return frozenset((face.family, face.style, face.weight, round(face.stretch, 2)) for face in found)


def test_typst_finds_the_faces_under_these_names() -> None:
    assert families_in_typst() == {
        ("IBM Plex Sans", "normal", 400, 0.75),
        ("IBM Plex Sans", "italic", 400, 0.75),
        ("IBM Plex Sans", "normal", 600, 0.75),
        ("STIX Two Math", "normal", 400, 1.0),
        ("Noto Emoji", "normal", 400, 1.0),
    }


def test_an_svg_is_set_in_plex(tmp_path: Path) -> None:
    svg = (
        '<svg xmlns="http://www.w3.org/2000/svg" width="90pt" height="20pt"><text x="2" y="15" style="font-size: 9px; '
        "font-family: 'IBM Plex Sans Condensed', 'IBM Plex Sans'\">8-#9</text></svg>"
    )
    (tmp_path / "a.svg").write_text(svg)
    (tmp_path / "a.typ").write_text('#image("a.svg", alt: "a")')
    pdf = typst.compile(str(tmp_path / "a.typ"), font_paths=[str(FOLDER)], ignore_system_fonts=True)
    assert re.findall(rb"/FontName ?/[A-Z]{6}\+([\w-]+)", pdf) == [b"IBMPlexSansCond-Regular"]


def test_every_web_font_is_a_woff2_of_its_family() -> None:
    for font in fonts.web_fonts():
        assert font.path.read_bytes()[:4] == b"wOF2"
        assert font.path.name.startswith(font.family.replace(" ", ""))
    keys = [(font.family, font.weight, font.style) for font in fonts.web_fonts()]
    assert len(set(keys)) == len(keys) == len(list(FOLDER.glob("*.woff2")))


def test_the_css_embeds_the_files_themselves() -> None:
    blocks = re.findall(r'font-family: "([^"]+)".*?base64,([A-Za-z0-9+/=]+)\)', fonts.css())
    assert [family for family, _ in blocks] == [font.family for font in fonts.web_fonts()]
    assert [base64.b64decode(data) for _, data in blocks] == [font.path.read_bytes() for font in fonts.web_fonts()]
    assert "http" not in re.sub(r"base64,[^)]*", "", fonts.css())


def test_every_face_has_its_licence_beside_it() -> None:
    texts = {path.name: path.read_text(encoding="utf-8") for path in FOLDER.glob("OFL-*.txt")}
    assert len(texts) == 4
    assert all("SIL OPEN FONT LICENSE Version 1.1" in text and "Copyright" in text for text in texts.values())
    sources = (FOLDER / "SOURCES.txt").read_text(encoding="utf-8")
    assert all(name in sources for name in texts)
    stems = {path.stem.split("-")[0] for path in FOLDER.iterdir() if path.suffix in {".ttf", ".woff2"}}
    assert all(stem in sources for stem in stems)


def test_the_folder_stays_small() -> None:
    # The limit this project set itself for what a checkout and a wheel carry.
    assert sum(path.stat().st_size for path in FOLDER.iterdir() if path.is_file()) < 4_000_000


def test_faces_for_figures() -> None:
    assert fonts.matplotlib_face().name == "IBMPlexSansCondensed-Regular.ttf"
    assert fonts.matplotlib_face(599).name == "IBMPlexSansCondensed-Regular.ttf"
    assert fonts.matplotlib_face(600).name == "IBMPlexSansCondensed-SemiBold.ttf"


def test_reading_the_coverage_needs_no_font_library() -> None:
    code = "import sys; from calcpack import fonts; fonts.covered(); fonts.css(); print('fontTools' in sys.modules)"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert done.stdout.strip() == "False"
