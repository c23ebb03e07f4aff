#!/bin/sh
# Makes sure that what the checks of the issued pages need is there: Chromium, Java, Node packages.
# Installs them where that is possible without asking, else says which checks are left out.
# Never fails: the checks themselves fail where none may be left out (CI=true).
# Usage: .make/test-tools.sh   (from the top of the checkout; `make` calls it)
# Everything it says goes to standard error.
set -u

packages=.make/node
say() { printf '%s\n' "$*" >&2; }
have() { command -v "$1" >/dev/null 2>&1; }
browser() { have chromium || have chromium-browser || have google-chrome; }
# A command alone is not enough: some systems have a `java` that only says where to get one.
java_runs() { have java && java -version >/dev/null 2>&1; }

wanted=
browser || wanted="$wanted chromium"
java_runs || wanted="$wanted default-jre-headless"
have npm || wanted="$wanted nodejs npm"

if [ -n "$wanted" ] && [ "$(id -u)" = 0 ] && have apt-get; then
    say "Installing for the checks of the pages:$wanted ..."
    # shellcheck disable=SC2086 # several names
    DEBIAN_FRONTEND=noninteractive apt-get install -y -qq $wanted >/dev/null 2>&1 ||
        { apt-get update -qq >/dev/null 2>&1 &&
            DEBIAN_FRONTEND=noninteractive apt-get install -y -qq $wanted >/dev/null; } ||
        say "apt-get could not install all of them."
fi

# npm keeps a list of what it installed; where that follows the lock, nothing is to be done.
if have npm; then
    if [ ! -f "$packages/node_modules/.package-lock.json" ] ||
        [ "$packages/package-lock.json" -nt "$packages/node_modules/.package-lock.json" ]; then
        say "Installing from $packages/package-lock.json ..."
        npm ci --prefix "$packages" --ignore-scripts --no-audit --no-fund --loglevel=error >&2 &&
            touch "$packages/node_modules/.package-lock.json"
    fi
fi

browser || say "Left out: every check in a browser (sort, filter, compare, accessibility). It needs Chromium."
[ -f "$packages/node_modules/axe-core/axe.min.js" ] ||
    say "Left out: the accessibility rules of axe. They need Node.js with npm."
java_runs && [ -f "$packages/node_modules/vnu-jar/build/dist/vnu.jar" ] ||
    say "Left out: the Nu checker of HTML. It needs Java, and Node.js with npm."
exit 0
