# One obvious command each. PYTHON is the interpreter of the environment the project is installed in.
PYTHON ?= python3

.PHONY: check test lint demo notebooks

check: lint test

lint:
	$(PYTHON) -m ruff check .
	$(PYTHON) -m ruff format --check .
	$(PYTHON) -m mypy

test:
	$(PYTHON) -m pytest
	$(PYTHON) -m pytest --nbval demo_project/sheets -p no:cacheprovider

demo:
	$(PYTHON) -m calcpack.cli issue demo_project

# Runs the demo's notebooks and stores their outputs in them, as a visitor on a code host sees them.
notebooks:
	$(PYTHON) tests/store_outputs.py demo_project
