from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from calcpack.errors import TableError
from calcpack.job import (
    BarLayout,
    ColumnRow,
    ForceRow,
    Termination,
    Transverse,
    match,
    read_columns,
    read_forces,
    read_stories,
    read_terminations,
)
from calcpack.job.schedules import COATINGS, KINDS, LOADS
from calcpack.units import convert

Put = Callable[..., Path]
Reader = Callable[[Path], object]


def problems_of(read: Reader, root: Path) -> list[tuple[str, str]]:
    """What was found wrong, and in which row (and column) of its file."""
    with pytest.raises(TableError, match=r"^inputs/\w+\.(csv|xlsx): \d+ problems?\n") as caught:
        read(root)
    return [(each.given, each.where.split(", ", 1)[1]) for each in caught.value.problems]


def remedies_of(read: Reader, root: Path) -> list[tuple[str, str]]:
    with pytest.raises(TableError, match=r"problems?\n") as caught:
        read(root)
    return [(each.allowed, each.remedy) for each in caught.value.problems]


# anchorage.csv

ANCHORAGE = "mark,kind,bar,f_c [psi],f_y [psi]"


def anchorage(*cells: str, more: str = "") -> str:
    """An anchorage.csv with further columns `more`, each row's further cells from `cells`."""
    header = f"{ANCHORAGE},{more}" if more else ANCHORAGE
    rows = [f"A{number},hook 90,#8,4000,60000,{cell}" for number, cell in enumerate(cells, 1)]
    return "\n".join([header, *rows]) + "\n"


def test_absent_tables_are_empty(job_root: Path) -> None:
    assert read_terminations(job_root) == ()
    assert read_columns(job_root) == ()
    assert read_forces(job_root) == ()


def test_termination_defaults(put: Put) -> None:
    (found,) = read_terminations(put("anchorage.csv", f"{ANCHORAGE}\nA1,straight tension,#8,4000,60000\n"))
    # The defaults are those of the job contract.
    assert found == Termination(
        mark="A1",
        kind="straight tension",
        bar=8,
        bar_text="#8",
        f_c=4000.0,
        f_y=60000.0,
        lamb=1.0,
        top=False,
        coating="none",
        c_b=None,
        clear_cover=None,
        clear_spacing=None,
        spacing=None,
        K_tr=0.0,
        side_cover=None,
        tail_cover=None,
        confining_ties=False,
        in_column_core=False,
        A_s_required=None,
        A_s_provided=None,
        lap_class=None,
        available=None,
        bundle=1,
        spliced=None,
        other_bar=None,
        bar_stress=None,
        spiral=False,
        M_n=None,
        V_u=None,
        l_a=None,
        confined_reaction=False,
        joint="",
        excess_exclusion="",
        member="",
        location="",
        source="",
        row=2,
        file="inputs/anchorage.csv",
    )
    assert found.where == "inputs/anchorage.csv, row 2"


def test_every_column_of_a_termination(put: Put) -> None:
    more = (
        "lambda,top,coating,c_b [in],clear_cover [in],clear_spacing [in],spacing [in],K_tr [in],side_cover [in],"
        "tail_cover [in],confining_ties,in_column_core,A_s_required [in^2],A_s_provided [in^2],lap_class,"
        "available [ft],member,location,source"
    )
    cells = '0.75,yes,epoxy,2,1.5,3,4,0.4,2.5,2.25,yes,1,1.2,1.58,B,3,B4,"grid C, level 2",S-301'
    (found,) = read_terminations(put("anchorage.csv", anchorage(cells, more=more)))
    assert (found.lamb, found.top, found.coating) == (0.75, True, "epoxy")
    assert (found.c_b, found.clear_cover, found.clear_spacing, found.spacing) == (2, 1.5, 3, 4)
    assert (found.K_tr, found.side_cover, found.tail_cover) == (0.4, 2.5, 2.25)
    assert (found.confining_ties, found.in_column_core) == (True, True)
    assert (found.A_s_required, found.A_s_provided, found.lap_class, found.available) == (1.2, 1.58, "B", 36)
    assert (found.member, found.location, found.source) == ("B4", "grid C, level 2", "S-301")


def test_columns_beyond_the_contract(put: Put) -> None:
    more = (
        "bundle,spliced,other_bar,bar_stress,spiral,M_n [kip*ft],V_u [kip],l_a [in],confined_reaction,joint,"
        "excess_exclusion"
    )
    cells = "3,50%,#9,0.4,yes,200,80,0,yes,special,seismic"
    (found,) = read_terminations(put("anchorage.csv", anchorage(cells, more=more)))
    assert (found.bundle, found.spliced, found.other_bar, found.bar_stress, found.spiral) == (3, 0.5, 9, 0.4, True)
    assert (found.M_n, found.V_u, found.l_a) == (2_400_000.0, 80_000.0, 0.0)
    assert (found.confined_reaction, found.joint, found.excess_exclusion) == (True, "special", "seismic")


@pytest.mark.parametrize(
    ("text", "share"), [("50%", 0.5), ("50 %", 0.5), ("0.5", 0.5), (".25", 0.25), ("100%", 1.0), ("1", 1.0), ("0", 0.0)]
)
def test_a_share_is_written_in_per_cent_or_as_a_fraction(text: str, share: float, put: Put) -> None:
    assert read_terminations(put("anchorage.csv", anchorage(text, more="spliced")))[0].spliced == share


@pytest.mark.parametrize(
    ("column", "text", "remedy"),
    [
        ("spliced", "50", "above all of it: was this meant to be 50%?"),
        ("spliced", "101%", "above all of it: was this meant to be 101%?"),
        ("spliced", "half", "write 50% or 0.5"),
        ("bar_stress", "-0.4", "write 50% or 0.5"),
        ("bundle", "5", "a bundle holds up to four bars (25.6.1.1)"),
        ("bundle", "1.5", "a bundle holds up to four bars (25.6.1.1)"),
        ("other_bar", "9", "write the size as #8"),
    ],
)
def test_what_the_further_columns_refuse(column: str, text: str, remedy: str, put: Put) -> None:
    root = put("anchorage.csv", anchorage(text, more=column))
    assert [said for _, said in remedies_of(read_terminations, root)] == [remedy]


def test_the_exclusions_of_the_schedule_are_those_of_the_checks() -> None:
    from calcpack.job import schedules
    from calcpack.members import termination

    assert (schedules.KINDS, schedules.COATINGS, schedules.EXCLUSIONS) == (
        termination.KINDS,
        termination.COATINGS,
        termination.EXCLUSIONS,
    )


def test_the_kinds_and_coatings_of_the_contract(put: Put) -> None:
    rows = [f"{kind}-{coat},{kind},#11,4000,60000,{coat}" for kind in KINDS for coat in COATINGS]
    found = read_terminations(put("anchorage.csv", "\n".join([f"{ANCHORAGE},coating", *rows])))
    assert [f"{each.kind}-{each.coating}" for each in found] == [each.mark for each in found]
    # Those of the contract, and one more.
    assert KINDS[7:] == ("mechanical splice",)
    assert len(COATINGS) == 4


@pytest.mark.parametrize(
    "symbol", ["c_b", "clear_cover", "clear_spacing", "spacing", "side_cover", "tail_cover", "available"]
)
def test_lengths_are_positive(put: Put, symbol: str) -> None:
    text = anchorage("0", "-1", "0.001", more=f"{symbol} [in]")
    assert problems_of(read_terminations, put("anchorage.csv", text)) == [
        (f"{symbol} = '0'", f"row 2, column '{symbol} [in]'"),
        (f"{symbol} = '-1'", f"row 3, column '{symbol} [in]'"),
    ]


def test_no_transverse_reinforcement_is_a_k_tr_of_zero(put: Put) -> None:
    found = read_terminations(put("anchorage.csv", anchorage("0", "", "0.1", more="K_tr [in]")))
    assert [each.K_tr for each in found] == [0, 0, 0.1]
    problems = problems_of(read_terminations, put("anchorage.csv", anchorage("-0.1", more="K_tr [in]")))
    assert problems == [("K_tr = '-0.1'", "row 2, column 'K_tr [in]'")]


def test_areas_come_in_pairs(put: Put) -> None:
    root = put("anchorage.csv", anchorage("1,2", "1,", ",2", ",", more="A_s_required [in^2],A_s_provided [in^2]"))
    assert problems_of(read_terminations, root) == [
        ("A_s_required without A_s_provided", "row 3"),
        ("A_s_provided without A_s_required", "row 4"),
    ]


def test_one_area_column_alone(put: Put) -> None:
    root = put("anchorage.csv", anchorage("1", "", more="A_s_required [in^2]"))
    assert problems_of(read_terminations, root) == [("A_s_required without A_s_provided", "row 2")]


def test_a_wrong_area_is_not_called_missing_too(put: Put) -> None:
    root = put("anchorage.csv", anchorage("1,x", more="A_s_required [in^2],A_s_provided [in^2]"))
    assert problems_of(read_terminations, root) == [("A_s_provided = 'x'", "row 2, column 'A_s_provided [in^2]'")]


def test_all_errors_of_anchorage_at_once(put: Put) -> None:
    rows = ["A1,hook 45,#8,4000,60000", "A1,headed,8,4000,60000", ",headed,#2,-1,x", "A4,headed,#8,,60000"]
    root = put("anchorage.csv", "\n".join([ANCHORAGE, *rows]))
    assert problems_of(read_terminations, root) == [
        ("kind = 'hook 45'", "row 2, column 'kind'"),
        ("bar = '8'", "row 3, column 'bar'"),
        ("mark is empty", "row 4, column 'mark'"),
        ("bar = '#2'", "row 4, column 'bar'"),
        ("f_c = '-1'", "row 4, column 'f_c [psi]'"),
        ("f_y = 'x'", "row 4, column 'f_y [psi]'"),
        ("f_c is empty", "row 5, column 'f_c [psi]'"),
        ("mark = 'A1'", "row 3"),
    ]


def test_what_anchorage_allows_is_said(put: Put) -> None:
    rows = ["A1,hook 45,8,4000,60000", "A2,headed,#12,4000,60000"]
    assert remedies_of(read_terminations, put("anchorage.csv", "\n".join([ANCHORAGE, *rows]))) == [
        (
            "'straight tension', 'hook 90', 'hook 180', 'headed', 'straight compression', 'lap tension', "
            "'lap compression' or 'mechanical splice'",
            "did you mean 'hook 90'?",
        ),
        ("a bar size, #3 to #11, #14 or #18", "write the size as #8"),
        ("a bar size, #3 to #11, #14 or #18", "#12 is not a bar of ASTM A615: #3 to #11, #14, #18"),
    ]


def test_control_characters_are_refused(put: Put) -> None:
    root = put("anchorage.csv", anchorage('"level\n2"', more="location"))
    assert problems_of(read_terminations, root) == [("location = 'level\\n2'", "row 2, column 'location'")]


# columns.csv

COLUMNS = "mark,shape,b [in],h [in],bars,ties,cover [in],f_c [psi],f_y [psi]"
C1 = "C1,rectangular,18,24,8-#9 (3x3),#3@12,1.5,4000,60000"
C2 = "C2,circular,,20,10-#8,#4 spiral@2.25,1.5,5000,60000"


def test_columns_and_their_defaults(put: Put) -> None:
    first, second = read_columns(put("columns.csv", "\n".join([COLUMNS, C1, C2])))
    assert first == ColumnRow(
        mark="C1",
        shape="rectangular",
        b=18.0,
        h=24.0,
        bars=BarLayout(8, 9, 3, 3, "8-#9 (3x3)"),
        ties=Transverse("ties", 3, 12.0, "#3@12"),
        cover=1.5,
        f_c=4000.0,
        f_y=60000.0,
        f_yt=None,
        l_u=None,
        k_x=None,
        k_y=None,
        frame=None,
        lamb=1.0,
        aggregate=None,
        psi_x_bottom=None,
        psi_x_top=None,
        psi_y_bottom=None,
        psi_y_top=None,
        beta_dns=None,
        delta_s=None,
        story="",
        seismic="none",
        legs_x=2,
        legs_y=2,
        legs_stated=False,
        ties_beyond=None,
        group="",
        source="",
        row=2,
        file="inputs/columns.csv",
    )
    assert (second.shape, second.b, second.h, second.where) == ("circular", None, 20.0, "inputs/columns.csv, row 3")
    assert second.bars == BarLayout(10, 8, None, None, "10-#8")
    assert second.ties == Transverse("spiral", 4, 2.25, "#4 spiral@2.25")


def test_every_optional_column_of_the_schedule(put: Put) -> None:
    header = f"{COLUMNS},f_yt [psi],l_u [ft],k_x,k_y,frame,lambda,aggregate [in],source"
    rows = [f"{C1},40000,12,1.2,0.8,sway,0.85,0.75,S-201", f"{C2},,,,,,,,"]
    first, second = read_columns(put("columns.csv", "\n".join([header, *rows])))
    assert (first.f_yt, first.l_u, first.k_x, first.k_y, first.frame) == (40000, 144, 1.2, 0.8, "sway")
    assert (first.lamb, first.aggregate, first.source) == (0.85, 0.75, "S-201")
    assert (second.f_yt, second.l_u, second.k_x, second.k_y, second.frame) == (None, None, None, None, None)


def test_columns_of_frames_and_special_frames(put: Put) -> None:
    header = (
        f"{COLUMNS},psi_x_bottom,psi_x_top,psi_y_bottom,psi_y_top,beta_dns,delta_s,story,seismic,legs_x,legs_y,"
        "ties_beyond,group"
    )
    found = read_columns(put("columns.csv", f"{header}\n{C1},1,0.8,2,0,0.4,1.1,S2,special,3,4,#3@6,corner\n"))[0]
    assert (found.psi_x_bottom, found.psi_x_top, found.psi_y_bottom, found.psi_y_top) == (1, 0.8, 2, 0)
    assert (found.beta_dns, found.delta_s, found.story, found.seismic) == (0.4, 1.1, "S2", "special")
    assert (found.legs_x, found.legs_y, found.legs_stated, found.group) == (3, 4, True, "corner")
    assert found.ties_beyond == Transverse("ties", 3, 6.0, "#3@6")


@pytest.mark.parametrize(("cells", "legs"), [(",", (2, 2, False)), ("2,", (2, 2, True)), (",3", (2, 3, True))])
def test_legs_that_are_stated_are_told_from_those_that_are_not(
    put: Put, cells: str, legs: tuple[int, int, bool]
) -> None:
    (found,) = read_columns(put("columns.csv", f"{COLUMNS},legs_x,legs_y\n{C1},{cells}\n"))
    assert (found.legs_x, found.legs_y, found.legs_stated) == legs


def test_ties_beyond_are_in_the_unit_of_cover(put: Put) -> None:
    # published: NIST Special Publication 811 (2008), appendix B.8: 1 in = 25.4 mm.
    row = "C1,rectangular,18,24,8-#9 (3x3),#3@101.6,38.1,4000,60000,#3@152.4"
    (found,) = read_columns(put("columns.csv", f"{COLUMNS.replace('cover [in]', 'cover [mm]')},ties_beyond\n{row}\n"))
    assert found.ties_beyond is not None
    assert found.ties_beyond.spacing == pytest.approx(6.0, rel=1e-14)


@pytest.mark.parametrize(
    ("column", "cell", "given"),
    [
        ("psi_x_top", "-0.1", "psi_x_top = '-0.1'"),
        ("beta_dns", "-1", "beta_dns = '-1'"),
        ("delta_s", "0.99", "delta_s = '0.99'"),
        ("seismic", "yes", "seismic = 'yes'"),
        ("legs_x", "1", "legs_x = '1'"),
        ("legs_y", "2.5", "legs_y = '2.5'"),
        ("ties_beyond", "#3", "ties_beyond = '#3'"),
    ],
)
def test_one_mistake_in_the_columns_of_frames(put: Put, column: str, cell: str, given: str) -> None:
    root = put("columns.csv", f"{COLUMNS},{column}\n{C1},{cell}\n")
    assert problems_of(read_columns, root) == [(given, f"row 2, column '{column}'")]


STORIES = "story,combination,sum_P_u [kip],V_us [kip],Delta_o [in],l_c [ft],sum_P_c [kip]"


def test_stories(put: Put) -> None:
    one, two = read_stories(
        put("stories.csv", f"{STORIES}\nS2,,1000,40,0.5,10.5,\nS2,4: 1.2D+W,900,45,0.4,10.5,9000\n")
    )
    assert (one.story, one.combination, one.sum_P_u, one.V_us, one.sum_P_c) == ("S2", "", 1e6, 40e3, None)
    assert (one.Delta_o, one.l_c, one.source, one.where) == (0.5, 126, "", "inputs/stories.csv, row 2")
    assert (two.combination, two.sum_P_c) == ("4: 1.2D+W", 9e6)


def test_no_stories(put: Put) -> None:
    assert read_stories(put("columns.csv", f"{COLUMNS}\n{C1}\n")) == ()


def test_mistakes_in_stories(put: Put) -> None:
    rows = "S2,,1000,40,0.5,10.5,\nS2,,1000,40,0.5,10.5,\n,,1000,0,0.5,10.5,\n"
    assert problems_of(read_stories, put("stories.csv", f"{STORIES}\n{rows}")) == [
        ("story is empty", "row 4, column 'story'"),
        ("V_us = '0'", "row 4, column 'V_us [kip]'"),
        ("story 'S2' twice for one combination", "row 3"),
    ]


def test_a_schedule_of_circular_columns_needs_no_b(put: Put) -> None:
    root = put("columns.csv", f"{COLUMNS.replace('b [in],', '')}\n{C2.replace('circular,,', 'circular,')}\n")
    assert read_columns(root)[0].b is None


def test_tie_spacing_is_in_the_unit_of_cover(put: Put) -> None:
    # published: NIST Special Publication 811 (2008), appendix B.8: 1 in = 25.4 mm.
    row = "C1,rectangular,18,24,8-#9 (3x3),#3@254,38.1,4000,60000"
    (found,) = read_columns(put("columns.csv", f"{COLUMNS.replace('cover [in]', 'cover [mm]')}\n{row}\n"))
    assert (found.ties.spacing, found.cover) == pytest.approx((10, 1.5), rel=1e-14)
    assert found.ties.text == "#3@254"


@pytest.mark.parametrize(
    ("old", "new", "given", "where"),
    [
        (C1, C1.replace("18,24", ",24"), "b is empty", "row 2"),
        (C2, C2.replace("circular,,", "circular,20,"), "b is given", "row 3"),
        (C1, C1.replace(" (3x3)", ""), "bars = '8-#9'", "row 2"),
        (C2, C2.replace("10-#8", "10-#8 (3x4)"), "bars = '10-#8 (3x4)'", "row 3"),
        (C1, C1.replace("8-#9", "9-#9"), "bars = '9-#9 (3x3)'", "row 2, column 'bars'"),
        (C1, C1.replace("#3@12", "3@12"), "ties = '3@12'", "row 2, column 'ties'"),
        (C1, C1.replace("rectangular", "square"), "shape = 'square'", "row 2, column 'shape'"),
        (C1, C1.replace(",24,", ",,"), "h is empty", "row 2, column 'h [in]'"),
        (C1, C1.replace("18,24", "0,24"), "b = '0'", "row 2, column 'b [in]'"),
        (C1, C1.replace("1.5", "0"), "cover = '0'", "row 2, column 'cover [in]'"),
        (C2, C2.replace("C2", "C1"), "mark = 'C1'", "row 3"),
    ],
)
def test_one_mistake_in_the_schedule(put: Put, old: str, new: str, given: str, where: str) -> None:
    root = put("columns.csv", "\n".join([COLUMNS, C1, C2]).replace(old, new))
    assert problems_of(read_columns, root) == [(given, where)]


def test_what_the_schedule_allows_is_said(put: Put) -> None:
    rows = [
        C1.replace("18,24", ",24"),
        C2.replace("circular,,", "circular,20,"),
        C1.replace("C1", "C3").replace("8-", "9-"),
    ]
    assert remedies_of(read_columns, put("columns.csv", "\n".join([COLUMNS, *rows]))) == [
        (
            "bars and layout, e.g. '8-#9 (3x3)' or '10-#8'",
            "3x3 makes 8 bars, not 9: corners count in both faces",
        ),
        ("the width of a rectangular column", "fill in b, the side along x"),
        ("no b for a circular column", "clear b: h is the diameter"),
    ]


def test_units_and_columns_of_the_schedule(put: Put) -> None:
    header = COLUMNS.replace("h [in]", "h").replace("f_c [psi]", "f_c [in]").replace("cover [in]", "covr [in]")
    assert problems_of(read_columns, put("columns.csv", f"{header}\n{C1}\n")) == [
        ("column 'h' has no unit", "row 1"),
        ("unknown column 'covr [in]'", "row 1"),
        ("column 'f_c [in]' (length)", "row 1"),
        ("column 'cover [in]' is missing", "row 1"),
    ]


def test_xlsx_reads_as_csv_does(put: Put, put_xlsx: Put) -> None:
    texts = read_columns(put("columns.csv", "\n".join([COLUMNS, C1, C2])))
    (put("columns.csv", "") / "inputs" / "columns.csv").unlink()
    rows = [
        COLUMNS.split(","),
        ["C1", "rectangular", 18, 24.0, "8-#9 (3x3)", "#3@12", 1.5, 4000, "60,000"],
        ["C2", "circular", None, 20, "10-#8", "#4 spiral@2.25", 1.5, 5000, 60000],
    ]
    cells = read_columns(put_xlsx("columns.xlsx", rows))
    assert [vars(each) | {"file": ""} for each in cells] == [vars(each) | {"file": ""} for each in texts]
    assert cells[1].where == "inputs/columns.xlsx, row 3"


def test_xlsx_errors_are_those_of_csv_and_its_own(put_xlsx: Put) -> None:
    rows = [
        [*COLUMNS.split(","), "colour"],
        ["C1", "rectangular", "=9*2", "#REF!", "8-#9 (3x3)", "#3@12", True, "four"],
        ["C2", "circular", None, 20, "10-#8", "#4 spiral@2.25", 1.5, 5000, 60000, None, "note"],
    ]
    assert problems_of(read_columns, put_xlsx("columns.xlsx", rows)) == [
        ("unknown column 'colour'", "row 1"),
        ("b = =9*2", "row 2, column 'b [in]'"),
        ("h = #REF!", "row 2, column 'h [in]'"),
        ("cover = 'yes'", "row 2, column 'cover [in]'"),
        ("f_c = 'four'", "row 2, column 'f_c [psi]'"),
        ("f_y is empty", "row 2, column 'f_y [psi]'"),
        ("11 cells", "row 3"),
    ]


LENGTHS, STRESSES = st.sampled_from(["in", "ft", "mm"]), st.sampled_from(["psi", "ksi", "MPa"])


@settings(deadline=None)
@given(st.tuples(*[LENGTHS] * 3), st.tuples(*[STRESSES] * 2), st.floats(1, 100), st.floats(1e3, 1e5))
def test_the_schedule_in_any_units_is_the_same(
    tmp_path_factory: pytest.TempPathFactory,
    lengths: tuple[str, ...],
    stresses: tuple[str, ...],
    size: float,
    strength: float,
) -> None:
    root = tmp_path_factory.mktemp("job")
    (root / "inputs").mkdir()
    b, h, cover = (convert(size, unit) for unit in lengths)
    f_c, f_y = (convert(strength, unit) for unit in stresses)
    spacing = f"{convert(size, lengths[2]):.17f}"
    header = "mark,shape,b [{}],h [{}],cover [{}],f_c [{}],f_y [{}],bars,ties".format(*lengths, *stresses)
    text = f"{header}\nC1,rectangular,{b!r},{h!r},{cover!r},{f_c!r},{f_y!r},4-#8 (2x2),#3@{spacing}\n"
    (root / "inputs" / "columns.csv").write_text(text, encoding="utf-8")
    (row,) = read_columns(root)
    assert (row.b, row.h, row.cover, row.ties.spacing) == pytest.approx((size,) * 4, rel=1e-12)
    assert (row.f_c, row.f_y) == pytest.approx((strength,) * 2, rel=1e-12)


# forces.csv

FORCES = "mark,combination,P [kip],Mx [kip*ft],My [kip*ft]"
F1 = "C1,1.2D+1.6L,400,50,-20"


def test_forces(put: Put) -> None:
    (found,) = read_forces(put("forces.csv", f"{FORCES}\n{F1}\n"))
    assert found == ForceRow(
        mark="C1",
        combination="1.2D+1.6L",
        load=None,
        case="",
        P=400000.0,
        Mx=600000.0,
        My=-240000.0,
        Mx_bottom=None,
        Mx_top=None,
        My_bottom=None,
        My_top=None,
        Vx=0.0,
        Vy=0.0,
        T=0.0,
        row=2,
        file="inputs/forces.csv",
    )


def test_shears_and_torsion(put: Put) -> None:
    (found,) = read_forces(put("forces.csv", f"{FORCES},Vx [kip],Vy [lb],T [lb*in]\n{F1},-3,4,5\n"))
    assert (found.Vx, found.Vy, found.T) == (-3000, 4, 5)


def test_unfactored_loads(put: Put) -> None:
    rows = [f"C1,{load},1,0,0" for load in LOADS]
    found = read_forces(put("forces.csv", "\n".join([FORCES.replace("combination", "load"), *rows])))
    assert [each.load for each in found] == ["D", "L", "Lr", "S", "R", "W", "E", "H", "F", "T"]
    assert {each.combination for each in found} == {None}


def test_a_load_that_is_none(put: Put) -> None:
    root = put("forces.csv", f"{FORCES.replace('combination', 'load')}\nC1,LR,1,0,0\n")
    assert problems_of(read_forces, root) == [("load = 'LR'", "row 2, column 'load'")]
    assert remedies_of(read_forces, root)[0][1] == "did you mean 'Lr'?"


def test_combination_and_load_exclude_each_other(put: Put) -> None:
    both = put("forces.csv", f"{FORCES},load\n{F1},D\n")
    assert problems_of(read_forces, both) == [("columns 'combination' and 'load'", "row 1")]
    neither = put("forces.csv", "mark,P [kip],Mx [kip*ft],My [kip*ft]\nC1,1,0,0\n")
    assert problems_of(read_forces, neither) == [("neither column 'combination' nor 'load'", "row 1")]


@pytest.mark.parametrize("name", ["combination", "load"])
def test_every_row_names_its_combination_or_load(put: Put, name: str) -> None:
    root = put("forces.csv", f"{FORCES.replace('combination', name)}\nC1,,1,0,0\n")
    assert problems_of(read_forces, root) == [(f"{name} is empty", "row 2")]


ENDS = "mark,combination,P [kip],Mx_bottom [kip*ft],Mx_top [kip*ft],My_bottom [kip*ft],My_top [kip*ft]"


def test_end_moments(put: Put) -> None:
    (found,) = read_forces(put("forces.csv", f"{ENDS}\nC1,1.4D,400,10,-20,0,30\n"))
    assert (found.Mx, found.My) == (None, None)
    assert (found.Mx_bottom, found.Mx_top, found.My_bottom, found.My_top) == (120000, -240000, 0, 360000)


def test_rows_with_one_moment_and_rows_with_end_moments(put: Put) -> None:
    text = f"{ENDS},Mx [kip*ft],My [kip*ft]\nC1,a,1,10,20,,,,30\nC2,a,1,,,,,1,2\n"
    first, second = read_forces(put("forces.csv", text))
    assert (first.Mx, first.Mx_top, first.My, first.My_top) == (None, 240000, 360000, None)
    assert (second.Mx, second.Mx_top, second.My, second.My_top) == (12000, None, 24000, None)


@pytest.mark.parametrize(
    ("cells", "given"),
    [
        ("10,20,30", "Mx and Mx_bottom and Mx_top given"),
        ("10,20,", "Mx and Mx_bottom given"),
        (",20,", "Mx_bottom given"),
        (",,20", "Mx_top given"),
        (",,", "no moment given"),
    ],
)
def test_a_moment_given_by_halves_or_twice(put: Put, cells: str, given: str) -> None:
    header = "mark,combination,P [kip],My [kip*ft],Mx [kip*ft],Mx_bottom [kip*ft],Mx_top [kip*ft]"
    root = put("forces.csv", f"{header}\nC1,a,1,0,{cells}\n")
    assert problems_of(read_forces, root) == [(given, "row 2")]
    assert remedies_of(read_forces, root) == [("Mx, or Mx_bottom and Mx_top", "give the one or the other")]


def test_missing_moment_columns(put: Put) -> None:
    root = put("forces.csv", "mark,combination,P [kip]\nC1,a,1\n")
    assert problems_of(read_forces, root) == [
        ("column 'Mx [kip*ft]' is missing", "row 1"),
        ("column 'My [kip*ft]' is missing", "row 1"),
    ]


def test_a_wrong_moment_is_not_called_missing_too(put: Put) -> None:
    root = put("forces.csv", f"{FORCES}\nC1,a,x,y,0\n")
    assert problems_of(read_forces, root) == [
        ("P = 'x'", "row 2, column 'P [kip]'"),
        ("Mx = 'y'", "row 2, column 'Mx [kip*ft]'"),
    ]


def test_forces_without_rows(put: Put) -> None:
    assert problems_of(read_forces, put("forces.csv", f"{FORCES}\n,,,,\n")) == [("no row below the header", "row 1")]


# marks

FORCES_OF = {"C1": F1, "C2": F1.replace("C1", "C2"), "C01": F1.replace("C1", "C01")}


def both_tables(put: Put, *marks: str) -> tuple[tuple[ColumnRow, ...], tuple[ForceRow, ...]]:
    put("columns.csv", "\n".join([COLUMNS, C1, C2]))
    root = put("forces.csv", "\n".join([FORCES, *(FORCES_OF[mark] for mark in marks)]))
    return read_columns(root), read_forces(root)


def test_marks_that_match(put: Put) -> None:
    match(*both_tables(put, "C1", "C2", "C1"))


def test_marks_that_do_not(put: Put) -> None:
    columns, forces = both_tables(put, "C1", "C01", "C01")
    with pytest.raises(TableError, match=r"marks of columns and forces: 2 problems") as caught:
        match(columns, forces)
    assert [(each.given, each.allowed, each.remedy, each.where) for each in caught.value.problems] == [
        ("mark = 'C01'", "a mark of inputs/columns", "did you mean 'C1'?", "inputs/forces.csv, row 3"),
        ("mark = 'C2'", "a mark of inputs/forces", "add it there or remove it here", "inputs/columns.csv, row 3"),
    ]


def test_no_forces_means_nothing_to_match(put: Put) -> None:
    match(read_columns(put("columns.csv", f"{COLUMNS}\n{C1}\n")), ())


def test_forces_without_a_schedule(put: Put) -> None:
    forces = read_forces(put("forces.csv", f"{FORCES}\n{F1}\n"))
    with pytest.raises(TableError, match=r"mark = 'C1'  a mark of inputs/columns: add it there or remove it here"):
        match((), forces)
