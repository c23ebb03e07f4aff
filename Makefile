# `make sheets` sets up and issues the demo; `make test` sets up and runs every gate.
# The other targets are single gates, for work on the code.

PYTHON ?= python3
BIN := .venv/bin
READY := .venv/.ready
DEMO := content/$(notdir $(patsubst %/campaign.toml,%,$(wildcard content/*/campaign.toml)))

.PHONY: sheets test setup lint types imports tests benchmarks reference messages lock clean

sheets: $(READY)
	@$(BIN)/lampassay issue $(DEMO)
	@echo "Open output/$(notdir $(DEMO))/index.html in a browser: the comparison, with a link to every sheet."

test: lint types imports tests

setup: $(READY)

$(READY): .make/lock.txt .make/setup.sh .make/pdf-libraries.sh pyproject.toml
	@PYTHON="$(PYTHON)" .make/setup.sh
	@touch $@

lint: $(READY)
	$(BIN)/ruff format --check .
	$(BIN)/ruff check .

types: $(READY)
	$(BIN)/mypy

imports: $(READY)
	$(BIN)/lint-imports --no-cache

tests: $(READY)
	@.make/test-tools.sh
	$(BIN)/python -m pytest -n auto

benchmarks: $(READY)
	for file in tests/benchmarks/bench_*.py; do $(BIN)/python "$$file" || exit 1; done

# Writes the command reference of README.md anew from the help texts.
reference: $(READY)
	$(BIN)/python tests/cli/write_reference.py

# Brings the catalogues of generator/language/catalogues in line with the messages of the program.
messages: $(READY)
	$(BIN)/python -m tests.language.write_catalogues

# Writes .make/lock.txt anew from pyproject.toml; needs uv on the path.
lock:
	uv pip compile --universal --python-version 3.11 --generate-hashes --no-emit-index-url \
	    --no-header --group dev --extra sign pyproject.toml --upgrade --output-file .make/lock.txt

clean:
	rm -rf .venv output
