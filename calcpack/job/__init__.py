"""A job folder, read: job.toml, the schedules and tables of inputs/, and fingerprints of what was read."""

from calcpack.job.bars import BAR_SIZES, BarLayout, Transverse
from calcpack.job.digest import row_digest
from calcpack.job.folder import Codes, Deferred, Job, Limit, Person, Revision, find, load
from calcpack.job.givens import GivenValue, read_givens
from calcpack.job.schedules import (
    ColumnRow,
    ForceRow,
    StoryRow,
    Termination,
    match,
    match_stories,
    read_columns,
    read_forces,
    read_stories,
    read_terminations,
)
from calcpack.job.tables import Column, Row, Table, read_table

__all__ = [
    "BAR_SIZES",
    "BarLayout",
    "Codes",
    "Column",
    "ColumnRow",
    "Deferred",
    "ForceRow",
    "GivenValue",
    "Job",
    "Limit",
    "Person",
    "Revision",
    "Row",
    "StoryRow",
    "Table",
    "Termination",
    "Transverse",
    "find",
    "load",
    "match",
    "match_stories",
    "read_columns",
    "read_forces",
    "read_givens",
    "read_stories",
    "read_table",
    "read_terminations",
    "row_digest",
]
