"""The commands as a user types them: what they print, where, and the exit status."""

from __future__ import annotations

import errno
import json
import os
import pty
import re
import subprocess
import sys
from importlib import metadata
from pathlib import Path
from typing import Any

import pytest
from job_samples import ANCHORAGE, GIVENS, JOB, calcpack, given, issued_demo, make_job, opening

from calcpack import cli
from calcpack.package import build

COMMANDS = ("check", "draft", "issue", "trace")
SHEET = {"1.ipynb": [opening("X-1"), given("a", "1 in")]}


def stamps(folder: Path) -> list[tuple[str, int]]:
    return sorted((str(path), path.stat().st_mtime_ns) for path in [folder, *folder.rglob("*")])


@pytest.fixture
def root(tmp_path: Path) -> Path:
    return make_job(tmp_path / "job", SHEET, givens=GIVENS, anchorage=ANCHORAGE)


def run(capsys: pytest.CaptureFixture[str], *arguments: object) -> tuple[int, str, str]:
    """A command in this process: status, standard output, standard error."""
    status = cli.main([str(argument) for argument in arguments])
    told = capsys.readouterr()
    assert "Traceback" not in told.out + told.err
    return status, told.out, told.err


def test_the_version(capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^0$"):
        cli.main(["--version"])
    assert capsys.readouterr().out == f"calcpack {metadata.version('calcpack')}\n"


@pytest.mark.parametrize("arguments", [[], ["unknown"], ["check", "--xml"], ["trace"], ["check", "a", "b"]])
def test_a_command_that_does_not_exist_is_bad_input(arguments: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^2$"):
        cli.main(arguments)
    assert capsys.readouterr().err.startswith("usage: calcpack")


@pytest.mark.parametrize("command", ["start", *COMMANDS, "validation"])
def test_every_command_explains_itself(command: str, capsys: pytest.CaptureFixture[str]) -> None:
    with pytest.raises(SystemExit, match=r"^0$"):
        cli.main([command, "--help"])
    assert f"usage: calcpack {command}" in capsys.readouterr().out


# check


def test_check_prints_a_line_a_member_and_check(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = run(capsys, "check", root)
    assert (status, err) == (0, "")
    rows = out.split("\n")
    assert rows[0] == "26-044  Cold store at Marl Hythe  (ACI 318-19)"
    assert re.match(r"T1  straight tension  0\.\d{3}  OK  l_d = [\d.]+ in  \[.*25\.4\.2", rows[2])
    assert "open: 1\n  assumed: allowable soil bearing pressure" in out


def test_check_json_is_one_object_and_nothing_else(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = run(capsys, "check", root, "--json")
    assert (status, err) == (0, "")
    data = json.loads(out)
    assert [item["mark"] for item in data["results"]] == ["T1", "T2"]
    assert [item["kind"] for item in data["open"]] == ["assumed"]
    assert data["signoffs"] == []


@pytest.mark.parametrize("json_too", [[], ["--json"]])
def test_a_ratio_over_one_is_status_1(root: Path, json_too: list[str], capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "anchorage.csv").write_text(ANCHORAGE.replace("5.125,72", "5.125,12"), "utf-8")
    status, out, _ = run(capsys, "check", root, *json_too)
    assert status == 1
    assert "NG" in out


def test_check_writes_nothing(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    before = stamps(root)
    run(capsys, "check", root)
    assert stamps(root) == before


def test_the_job_is_the_folder_you_stand_in(
    root: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.chdir(root)
    assert run(capsys, "check")[0] == 0


def test_texts_of_any_kind_are_printed_as_they_are(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    title = 'Store \\"A\\" <script> # $x$ 🧪'
    (root / "job.toml").write_text(JOB.replace("Cold store at Marl Hythe", title), "utf-8")
    assert 'Store "A" <script> # $x$ 🧪' in run(capsys, "check", root)[1]


# Wrong input


def refused(
    capsys: pytest.CaptureFixture[str], root: Path, *messages: str, commands: tuple[str, ...] = COMMANDS
) -> None:
    """Every command gives status 2, the reason on standard error alone, and changes nothing."""
    for command in commands:
        before = stamps(root) if root.exists() else []
        status, out, err = run(capsys, command, root, *(["a"] if command == "trace" else []))
        assert (status, out) == (2, ""), command
        for message in messages:
            assert re.search(message, err), (command, message, err)
        assert (stamps(root) if root.exists() else []) == before, command


def test_a_folder_that_is_no_job(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    refused(capsys, tmp_path, r"^TableError: no job folder\n.*is not a job folder.*calcpack start")
    refused(capsys, tmp_path / "missing", r"is not a job folder")
    (tmp_path / "file").write_text("x", "utf-8")
    refused(capsys, tmp_path / "file", r"is not a job folder")


def test_an_unknown_code_edition(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "job.toml").write_text(JOB.replace("ACI 318-19", "ACI 318-77"), "utf-8")
    refused(capsys, root, r"concrete = 'ACI 318-77' +'ACI 318-14' or 'ACI 318-19'.*\[codes\]")


def test_toml_that_cannot_be_read(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "job.toml").write_text("[job\n", "utf-8")
    refused(capsys, root, r"job\.toml.*line 1")


@pytest.mark.parametrize(
    ("old", "new", "message"),
    [
        ("f_c [psi]", "f_c [in]", r"f_c \[in\]"),
        ("f_c [psi]", "f_c", r"f_c"),
        ("f_c [psi]", "f_q [psi]", r"f_q"),
        ("#7", "#2", r"row 2.*bar|bar.*row 2"),
        ("72", "long", r"'?long'?"),
        ("#7,4000", "#7,", r"row 2"),
        ("straight tension,#8", "bent,#8", r"bent"),
    ],
)
def test_tables_that_are_wrong_stop_every_command_that_reads_them(
    root: Path, capsys: pytest.CaptureFixture[str], old: str, new: str, message: str
) -> None:
    assert old in ANCHORAGE
    (root / "inputs" / "anchorage.csv").write_text(ANCHORAGE.replace(old, new, 1), "utf-8")
    refused(capsys, root, "anchorage.csv", message, commands=("check", "draft", "issue"))


def test_a_given_without_a_source_in_the_list(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "inputs" / "givens.toml").write_text(re.sub(r'source = "[^"]*"\n', "", GIVENS, count=1), "utf-8")
    refused(
        capsys, root, r"givens\.toml, \[\[given\]\] 1 source", "source is missing", commands=("check", "draft", "issue")
    )


def test_a_job_without_a_notebook(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "sheets" / "1.ipynb").unlink()
    refused(capsys, root, "no notebook in sheets/", commands=("draft", "issue"))


def test_a_job_without_a_revision_cannot_be_issued(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (root / "job.toml").write_text(JOB[: JOB.index("[[revision]]")], "utf-8")
    refused(capsys, root, r"RefusedError: job\.toml has no \[\[revision\]\]", commands=("issue",))


@pytest.mark.slow
@pytest.mark.parametrize(
    ("cells", "message"),
    [
        ([opening("X-1"), "1 / 0"], r"1\.ipynb, cell \[2\]: 1 / 0\s+ZeroDivisionError: division by zero"),
        ([opening("X-1"), "sheet.given('f_c', '4 ksi')"], r"f_c without a source"),
        ([opening("X-1"), given("a", "1 in"), "sheet.carry('X-1', 'a')"], r"LedgerError: circular reference"),
        ([opening("X-1"), "import os\nos._exit(1)"], r"the kernel died"),
        (["x = 1"], r"no sheet"),
    ],
    ids=["raises", "no source", "circular", "dies", "no sheet"],
)
def test_notebooks_that_are_wrong(tmp_path: Path, cells: list[str], message: str) -> None:
    root = make_job(tmp_path / "job", {"1.ipynb": cells})
    done = calcpack("draft", root)
    assert (done.returncode, done.stdout) == (2, "")
    assert re.search(message, done.stderr), done.stderr
    assert re.match(r"(SheetError|LedgerError): ", done.stderr)
    assert "Traceback" not in done.stderr
    assert "\x1b" not in done.stderr
    assert not (root / "draft").exists()


# Something in the way of the machine


@pytest.mark.parametrize("code", [errno.ENOSPC, errno.EACCES])
def test_a_disk_that_refuses(
    root: Path, code: int, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def refuse(*_: object) -> None:
        raise OSError(code, os.strerror(code), str(root / "draft"))

    monkeypatch.setattr(build, "build", refuse)
    status, out, err = run(capsys, "draft", root)
    assert (status, out) == (2, "")
    assert err == f"cannot read or write {root / 'draft'}: {os.strerror(code)}\n"


def test_an_error_of_the_machine_without_a_name(
    root: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def refuse(*_: object) -> None:
        raise OSError("the network is down")

    monkeypatch.setattr(build, "build", refuse)
    assert run(capsys, "draft", root) == (2, "", "cannot read or write a file: the network is down\n")


def test_a_run_that_is_interrupted(
    root: Path, monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    def interrupt(*_: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(build, "build", interrupt)
    assert run(capsys, "draft", root) == (2, "", "stopped; nothing was written\n")


def test_a_reader_that_leaves_early(root: Path) -> None:
    reading, writing = os.pipe()
    os.close(reading)
    command = [sys.executable, "-m", "calcpack.cli", "check", str(root)]
    done = subprocess.run(command, stdout=writing, stderr=subprocess.PIPE, timeout=60, check=False)
    os.close(writing)
    assert done.stderr == b""
    assert done.returncode == 1


@pytest.mark.parametrize("coding", ["ascii", "latin-1"])
def test_a_terminal_that_cannot_show_every_sign(root: Path, coding: str) -> None:
    done = calcpack("check", root, PYTHONIOENCODING=coding, LC_ALL="C")
    assert done.returncode == 0
    assert "allowable soil bearing pressure" in done.stdout


# start


def test_start_says_what_it_made(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = run(capsys, "start", tmp_path / "new")
    assert (status, err) == (0, "")
    assert "  job.toml\n" in out
    assert out.endswith(f"next: fill in job.toml, then: calcpack draft {tmp_path / 'new'}\n")


def test_start_refuses_a_folder_that_is_not_empty(root: Path, capsys: pytest.CaptureFixture[str]) -> None:
    refused(capsys, root, r"RefusedError: .*job is not empty", commands=("start",))


@pytest.mark.slow
def test_a_started_job_issues_at_once(tmp_path: Path) -> None:
    assert calcpack("start", "new", cwd=tmp_path).returncode == 0
    root = tmp_path / "new"
    assert calcpack("check", cwd=root).returncode == 0
    done = calcpack("issue", cwd=root)
    assert (done.returncode, done.stderr) == (0, "")  # quiet in a pipe
    assert sorted(path.name for path in (root / "record" / "issued" / "A").iterdir()) == [
        "ledger.json", "manifest.json", "package.html", "package.pdf",
    ]  # fmt: skip
    assert done.stdout.startswith(f"revision A issued: {root / 'record' / 'issued' / 'A'}\n")
    before = stamps(root / "record")
    again = calcpack("issue", cwd=root)
    assert (again.returncode, again.stderr) == (0, "")
    assert again.stdout.startswith("revision A is issued already, unchanged: ")
    assert "1 sheets, 0 run" in again.stdout
    assert stamps(root / "record") == before
    traced = calcpack("trace", "l_d", cwd=root)
    assert traced.returncode == 0
    assert "given: S-301, section 1, rev 0" in traced.stdout
    unknown = calcpack("trace", "no_such_value", cwd=root)
    assert (unknown.returncode, unknown.stdout) == (2, "")
    assert "no value called 'no_such_value' in this job" in unknown.stderr
    # A change of a given is refused with what differs, and nothing of the issue moves.
    givens = root / "inputs" / "givens.toml"
    givens.write_text(givens.read_text("utf-8").replace("15 in", "11 in"), "utf-8")
    changed = calcpack("issue", cwd=root)
    assert (changed.returncode, changed.stdout) == (2, "")
    assert "revision A is issued already, and the job differs from it" in changed.stderr
    assert re.search(r"/h_below: 15 in issued, 11 in now", changed.stderr)
    assert stamps(root / "record") == before


@pytest.mark.slow
def test_nothing_is_written_outside_the_job(tmp_path: Path) -> None:
    """The whole way to a package leaves the user's folders and the temporary ones as they were."""
    import tempfile

    root = make_job(tmp_path / "job", SHEET, anchorage=ANCHORAGE)
    with tempfile.TemporaryDirectory() as elsewhere:  # short, as sockets need it
        home, scratch = Path(elsewhere) / "h", Path(elsewhere) / "t"
        home.mkdir()
        scratch.mkdir()
        environment = {"PATH": os.environ["PATH"], "HOME": str(home), "TMPDIR": str(scratch)}
        command = [sys.executable, "-m", "calcpack.cli", "issue", str(root)]
        done = subprocess.run(command, env=environment, cwd=home, capture_output=True, timeout=120, check=False)
        assert (done.returncode, done.stderr) == (0, b"")
        assert list(Path(elsewhere).rglob("*")) in ([home, scratch], [scratch, home])
    assert sorted(path.name for path in root.iterdir()) == [".calcpack", "inputs", "job.toml", "record", "sheets"]


@pytest.mark.slow
def test_progress_is_shown_to_a_person_and_not_in_a_pipe(tmp_path: Path) -> None:
    root = make_job(tmp_path / "job", SHEET)
    leader, follower = pty.openpty()
    command = [sys.executable, "-m", "calcpack.cli", "draft", str(root)]
    done = subprocess.run(command, stdout=subprocess.PIPE, stderr=follower, timeout=120, check=False)
    os.close(follower)
    told = b""
    while True:
        try:
            part = os.read(leader, 4096)
        except OSError:
            break
        told += part
        if not part:
            break
    os.close(leader)
    assert done.returncode == 0
    lines = told.decode().replace("\r", "").splitlines()
    assert lines[0] == "  running 1.ipynb: first run"
    assert "  done    1.ipynb" in lines
    assert any("PDF" in line for line in lines)
    assert done.stdout.decode().startswith("draft written: ")
    assert calcpack("draft", root).stderr == ""


@pytest.mark.slow
def test_a_final_issue_is_refused_while_something_is_open(tmp_path: Path) -> None:
    """B5: open items stop a final issue; a preliminary one goes out, marked, with status 0."""
    cells = [opening("X-1"), "sheet.given('q_allow')"]
    root = make_job(
        tmp_path / "job", {"1.ipynb": cells}, toml=JOB.replace("Plan review", "Construction"), givens=GIVENS
    )
    done = calcpack("issue", root)
    assert (done.returncode, done.stdout) == (2, "")
    assert "revision A is for 'Construction'" in done.stderr
    assert "assumed: allowable soil bearing pressure" in done.stderr
    assert not (root / "record").exists()
    draft = calcpack("draft", root)
    assert draft.returncode == 1
    assert "open: 1\n" in draft.stdout
    (root / "job.toml").write_text(JOB, "utf-8")
    assert calcpack("issue", root).returncode == 0


@pytest.mark.slow
def test_a_sheet_whose_ratio_is_over_one_issues_with_status_1(tmp_path: Path) -> None:
    """A15: a ratio over 1.0 is seen in the package and in the status."""
    cells = [opening("X-1"), given("a", "2 in"), given("b", "1 in"), "sheet.verify('fits', demand=a, capacity=b)"]
    root = make_job(tmp_path / "job", {"1.ipynb": cells})
    done = calcpack("draft", root)
    assert done.returncode == 1
    assert "ratio: fits: ratio 2.00 NG  [sheet X-1]" in done.stdout
    assert "NG" in (root / "draft" / "package.html").read_text("utf-8")


# validation


def test_validation_prints_the_published_cases(capsys: pytest.CaptureFixture[str]) -> None:
    status, out, err = run(capsys, "validation")
    assert (status, err) == (0, "")
    assert len(out.splitlines()) > 5


def test_a_case_that_does_not_hold_is_status_1(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    from types import SimpleNamespace

    from calcpack import validation

    case: Any = SimpleNamespace(holds=False)
    monkeypatch.setattr(validation, "run", lambda: [case])
    monkeypatch.setattr(validation, "table", lambda: "one case")
    assert run(capsys, "validation") == (1, "one case\n", "")


# trace, on the demo


@pytest.mark.slow
def test_a_development_length_is_traced_to_the_drawing_and_the_geotechnical_report(
    tmp_path_factory: pytest.TempPathFactory,
) -> None:
    """B4, G5: every value under l_d of the footing ends at a document with its revision."""
    done = calcpack("trace", issued_demo(tmp_path_factory), "F-01/l_d")
    assert (done.returncode, done.stderr) == (0, "")
    assert done.stdout.startswith("F-01/l_d = ")
    sources = re.findall(r"given: (.*)", done.stdout)
    assert any(source.startswith("S-301, detail 2, rev 2") for source in sources)
    assert any("GR-041 rev 1" in source for source in sources)
    assert "goes into:\n  F-01/verdict" in done.stdout
