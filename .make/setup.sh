#!/bin/sh
# Makes .venv from the lock and sees to the system libraries of the PDF engine.
# Usage: .make/setup.sh   (from the top of the checkout; `make` calls it)
# Everything it says goes to standard error.
set -eu

venv=.venv
python=${PYTHON:-python3}
say() { printf '%s\n' "$*" >&2; }

"$python" -c 'import sys; sys.exit(sys.version_info < (3, 11))' || {
    say "lampassay needs Python 3.11 or newer; '$python' is $("$python" --version 2>&1)."
    say "Name another one with: make PYTHON=python3.12 sheets"
    exit 1
}

if [ ! -x "$venv/bin/python" ]; then
    say "Making $venv ..."
    # Debian splits venv off; virtualenv from the package index does the same work.
    "$python" -m venv "$venv" 2>/dev/null || {
        rm -rf "$venv"
        scratch=$(mktemp -d)
        "$python" -m pip install --quiet --target "$scratch" virtualenv
        PYTHONPATH=$scratch "$python" -m virtualenv --quiet "$venv"
        rm -rf "$scratch"
    }
fi

say "Installing from .make/lock.txt ..."
"$venv/bin/python" -m pip install --quiet --disable-pip-version-check --require-hashes -r .make/lock.txt
"$venv/bin/python" -m pip install --quiet --disable-pip-version-check --no-deps --no-build-isolation --editable .

.make/pdf-libraries.sh
