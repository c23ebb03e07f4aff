#!/bin/sh
# Makes sure the system libraries of the PDF engine can be loaded: installs them where
# that is possible without asking, else says in one line what to install. Never fails:
# without them the HTML sheets are still issued.
set -u

have() {
    .venv/bin/python - <<'PY' 2>/dev/null
import ctypes.util
import sys

names = ("pango-1.0", "pangoft2-1.0", "harfbuzz-subset")
sys.exit(not all(ctypes.util.find_library(name) for name in names))
PY
}
say() { printf '%s\n' "$*" >&2; }

have && exit 0

packages="libpango-1.0-0 libpangoft2-1.0-0 libharfbuzz-subset0"
if [ "$(id -u)" = 0 ] && command -v apt-get >/dev/null 2>&1; then
    say "Installing the PDF engine's system libraries: $packages ..."
    if DEBIAN_FRONTEND=noninteractive apt-get install -y -qq $packages >/dev/null 2>&1 ||
        { apt-get update -qq >/dev/null 2>&1 &&
            DEBIAN_FRONTEND=noninteractive apt-get install -y -qq $packages >/dev/null; }; then
        have && exit 0
    fi
fi

case "$(uname -s)" in
    Darwin) say "No PDF sheets until this is run: brew install pango" ;;
    Linux) say "No PDF sheets until this is run (Debian, Ubuntu): sudo apt-get install $packages" ;;
    *) say "No PDF sheets until Pango is installed (MSYS2: pacman -S mingw-w64-ucrt-x86_64-pango, then set WEASYPRINT_DLL_DIRECTORIES)" ;;
esac
exit 0
