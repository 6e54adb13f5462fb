"""What holds for every figure: stable bytes, real text, a sober palette, nothing set over anything else."""

from __future__ import annotations

import os
import re
import subprocess
import sys
from itertools import combinations
from pathlib import Path

import pytest
import typst
from gallery import GALLERY, plan
from svg_reading import crosses, overlap, root, shapes, texts

from calcpack import fonts
from calcpack.figures import drawing
from calcpack.figures.lettering import FAMILY

PALETTE = {drawing.INK, drawing.SOFT, drawing.GREY, drawing.PALE, drawing.PAPER, drawing.ACCENT}
every = pytest.mark.parametrize("name", GALLERY)


@every
def test_the_same_bytes_twice(name: str) -> None:
    assert GALLERY[name]() == GALLERY[name]()


def test_the_same_bytes_in_another_process() -> None:
    code = (
        "import hashlib; from gallery import GALLERY, plan;"
        "print(hashlib.sha256(''.join(make().svg for make in GALLERY.values()).encode()).hexdigest())"
    )
    folder = Path(__file__).parent
    runs = [
        subprocess.run(
            [sys.executable, "-c", code],
            capture_output=True,
            text=True,
            check=True,
            env=os.environ | {"PYTHONHASHSEED": seed, "TZ": zone, "PYTHONPATH": str(folder)},
        ).stdout
        for seed, zone in (("1", "UTC"), ("2", "Asia/Tokyo"))
    ]
    assert runs[0] == runs[1]


@every
def test_it_is_one_svg_element_of_its_stated_size(name: str) -> None:
    figure = GALLERY[name]()
    element = root(figure)
    assert element.tag == "{http://www.w3.org/2000/svg}svg"
    assert float(element.get("width", "").removesuffix("pt")) / 72 == pytest.approx(figure.width, abs=1e-3)
    assert float(element.get("height", "").removesuffix("pt")) / 72 == pytest.approx(figure.height, abs=1e-3)
    # Fits the text width of a letter page with a binding margin.
    assert figure.width < 6.9


@every
def test_it_can_stand_inside_a_page(name: str) -> None:
    svg = GALLERY[name]().svg
    assert svg.startswith("<svg ")
    assert not re.search(r'<style|<script|<image| id="| class="|href|url\(', svg)
    assert not re.search(r"\b20\d\d-\d\d-\d\d|Matplotlib", svg)


@every
def test_only_the_palette(name: str) -> None:
    svg = GALLERY[name]().svg
    assert set(re.findall(r"#[0-9a-fA-F]{3,8}\b(?=[;\"])", svg)) <= PALETTE
    assert not re.search(r"rgb\(|opacity|(?:fill|stroke): (?!none|#)[a-z]", svg)


@every
def test_the_lettering_is_text_in_the_shipped_face(name: str) -> None:
    figure = GALLERY[name]()
    families = set(re.findall(r"font-family: ([^;]+);", figure.svg))
    assert families == {", ".join(f"'{family}'" for family in FAMILY)}
    assert {ord(c) for text in texts(figure) for c in text.text} <= fonts.covered("IBM Plex Sans Condensed")
    # Subscripts are the only lettering under 7 pt.
    assert all(text.size >= 7 or len(text.text) <= 3 for text in texts(figure))


@every
def test_no_text_on_text(name: str) -> None:
    for one, other in combinations(texts(GALLERY[name]()), 2):
        if {one.size, other.size} == {7.5, 5.4}:
            continue  # a subscript hangs from its own symbol
        assert not overlap(one.box, other.box), f"{one.text!r} on {other.text!r}"


@every
def test_no_line_through_text(name: str) -> None:
    figure = GALLERY[name]()
    for shape in shapes(figure):
        if shape.part == "bubble" or "stroke: #" not in shape.style:
            continue
        for start, end in zip(shape.points, shape.points[1:], strict=False):
            for text in texts(figure):
                assert not crosses(start, end, text.box), f"{shape.part or 'a line'} through {text.text!r}"


@every
def test_nothing_leaves_the_page(name: str) -> None:
    figure = GALLERY[name]()
    for left, low, right, high in [s.box for s in shapes(figure)] + [t.box for t in texts(figure)]:
        assert left >= -1e-3
        assert low >= -1e-3
        assert right <= figure.width + 1e-3
        assert high <= figure.height + 1e-3


@every
def test_line_weights(name: str) -> None:
    for shape in shapes(GALLERY[name]()):
        if shape.part == "outline":
            assert shape.weight == 0.9
        if shape.part == "dimension":
            assert shape.weight == 0.35
        if shape.part in {"bar", "tie"} and "stroke: #" in shape.style:
            assert shape.weight >= 0.7


@every
def test_the_alternative_text_is_a_sentence_with_numbers(name: str) -> None:
    figure = GALLERY[name]()
    assert re.fullmatch(r"[A-Z].{40,}\.", figure.alt)
    assert len(re.findall(r"\d", figure.alt)) >= 4
    assert root(figure).get("aria-label") == figure.alt
    assert root(figure).get("role") == "img"
    assert figure.caption
    assert not figure.caption.endswith(".")


@every
def test_the_scale_is_stated(name: str) -> None:
    assert any(re.fullmatch(r"Scale 1 in = \d+ (in|ft)", text.text) for text in texts(GALLERY[name]()))


def test_all_of_them_go_into_a_pdf_a(tmp_path: Path) -> None:
    lines = ['#set document(title: "Figures")']
    for number, make in enumerate(GALLERY.values()):
        figure = make()
        (tmp_path / f"{number}.svg").write_text(figure.svg, encoding="utf-8")
        lines.append(f'#image("{number}.svg", width: {figure.width}in, alt: "a")')
    (tmp_path / "page.typ").write_text("\n".join(lines), encoding="utf-8")
    paths = {"font_paths": [str(fonts.folder())], "ignore_system_fonts": True}
    pdf = typst.compile(str(tmp_path / "page.typ"), pdf_standards=["a-3b"], timestamp=0, **paths)
    names = set(re.findall(rb"/FontName ?/[A-Z]{6}\+([\w-]+)", pdf))
    assert names == {b"IBMPlexSansCond-Regular", b"IBMPlexSansCond-SemiBold"}


def test_a_mark_in_another_script_is_shown_by_another_face(tmp_path: Path) -> None:
    figure = plan(columns={"Ж-1 ψ": (0, 0)}, sizes={}, emphasis=())
    assert "Ж-1 ψ" in {text.text for text in texts(figure)}
    (tmp_path / "a.svg").write_text(figure.svg, encoding="utf-8")
    (tmp_path / "a.typ").write_text('#set document(title: "a")\n#image("a.svg", alt: "a")')
    paths = {"font_paths": [str(fonts.folder())], "ignore_system_fonts": True}
    pdf = typst.compile(str(tmp_path / "a.typ"), pdf_standards=["a-3b"], timestamp=0, **paths)
    assert len(set(re.findall(rb"/FontName ?/[A-Z]{6}\+([\w-]+)", pdf))) > 2


@pytest.mark.parametrize("mark", ["<C&1>", 'C"1', "C$1$", "C\\1"])
def test_marks_are_never_read_as_markup(mark: str) -> None:
    figure = plan(columns={mark: (0, 0)}, sizes={}, emphasis=())
    assert mark in {text.text for text in texts(figure)}
    assert mark in str(root(figure).get("aria-label"))


def test_a_notebook_shows_it() -> None:
    figure = GALLERY["circular"]()
    assert figure._repr_svg_() == figure.svg


def test_the_pen_of_another_figure_changes_nothing() -> None:
    import matplotlib as mpl

    plain = GALLERY["hook 90"]()
    with mpl.rc_context({"svg.fonttype": "path", "font.size": 30, "lines.linewidth": 9, "savefig.dpi": 300}):
        assert GALLERY["hook 90"]() == plain
