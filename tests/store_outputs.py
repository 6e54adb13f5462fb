"""Run a job's notebooks from clean state and store their outputs in them: what a visitor sees before running anything.

usage: python tests/store_outputs.py JOB
"""

from __future__ import annotations

import sys
from pathlib import Path

import nbformat

from calcpack.job import load
from calcpack.package.run import run_sheets


def main() -> None:
    """Store the outputs of every notebook of the job named on the command line."""
    job = load(Path(sys.argv[1]))
    for executed in run_sheets(job, print):
        path = job.root / executed.path
        notebook = nbformat.read(path, as_version=4)
        for cell, run in zip(notebook.cells, executed.notebook.cells, strict=True):
            if cell.cell_type == "code":
                cell.outputs, cell.execution_count = run.outputs, run.execution_count
        nbformat.write(notebook, path)


if __name__ == "__main__":
    main()
