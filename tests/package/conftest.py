from __future__ import annotations

from pathlib import Path
from typing import Any

import pytest
from package_samples import bars_sheet, columns_sheet, job_folder


def pytest_itemcollected(item: pytest.Item) -> None:
    # handcalcs calls names of pyparsing that are due to go.
    item.add_marker(pytest.mark.filterwarnings("ignore::DeprecationWarning:handcalcs"))


@pytest.fixture(scope="session")
def sheets(tmp_path_factory: pytest.TempPathFactory) -> list[Any]:
    """C-01 and A-03, the second over several pages."""
    root = job_folder(tmp_path_factory.mktemp("job") / "job")
    with pytest.MonkeyPatch.context() as patch:
        return [columns_sheet(root, patch), bars_sheet(root, patch, rows=90)]


@pytest.fixture
def job(tmp_path: Path) -> Path:
    return job_folder(tmp_path / "job")
