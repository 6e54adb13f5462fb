"""What several tests need: one profile for hypothesis, so that every run tries the same cases."""

from __future__ import annotations

from hypothesis import settings

settings.register_profile("repeatable", derandomize=True, deadline=None, max_examples=100)
settings.load_profile("repeatable")
