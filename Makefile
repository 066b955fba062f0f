# The two commands a newcomer needs: `make site` and `make test`. Both make their own .venv.
PYTHON ?= python3
VENV := .venv
BIN := $(VENV)/bin
export NO_MKDOCS_2_WARNING := 1

.PHONY: site preview check gate test bench clean

# The stamp is rebuilt when the dependencies change, so a stale environment is not trusted.
$(VENV)/.ready: pyproject.toml
	$(PYTHON) -m venv $(VENV)
	$(BIN)/python -m pip install --quiet --upgrade pip
	$(BIN)/python -m pip install --quiet --editable ".[test]"
	touch $@

site: $(VENV)/.ready
	$(BIN)/etchwright site

preview: $(VENV)/.ready
	$(BIN)/etchwright preview

check: $(VENV)/.ready
	$(BIN)/etchwright check

gate: $(VENV)/.ready
	$(BIN)/ruff check builder tests bench
	$(BIN)/mypy
	$(BIN)/lint-imports

test: check gate
	$(BIN)/python -m tests.chromium_ready
	$(BIN)/python -m pytest -n 2 --dist loadfile

bench: $(VENV)/.ready
	$(BIN)/python -m bench

clean:
	rm -rf $(VENV) site .pytest_cache .mypy_cache .ruff_cache .import_linter_cache
