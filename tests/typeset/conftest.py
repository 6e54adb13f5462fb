"""One store of layouts for the tests of typesetting."""

from __future__ import annotations

import pytest

from calcpack.typeset.store import LayoutStore


@pytest.fixture(scope="session")
def store() -> LayoutStore:
    return LayoutStore()
