#!/usr/bin/env bash
# Renders every example's drawing and report with headless Chromium, to be looked at: DIR/NAME.png, DIR/NAME-report.png and
# DIR/NAME-phone.png. Fails where the browser reports an error on the page.
#
#     tests/outside/look.sh DIR
set -euo pipefail
directory=$(realpath -m "${1:?usage: look.sh DIR}")
cd "$(dirname "$0")/../.."
mkdir -p "$directory"
profile=$(mktemp -d)
trap 'rm -rf "$profile"' EXIT

shot() { # FILE OUT WIDTH HEIGHT
    chromium --headless --no-sandbox --disable-gpu --no-first-run --user-data-dir="$profile" --hide-scrollbars \
        --enable-logging=stderr --screenshot="$2" --window-size="$3,$4" "file://$1" 2>"$profile/log" >/dev/null
    if grep -E 'CONSOLE|Refused to' "$profile/log"; then
        echo "$1: the browser complains" >&2
        exit 1
    fi
}

for spec in examples/*.toml; do
    name=$(basename "$spec" .toml)
    cargo run --quiet --release -- loft "$spec" -o "$directory" --only drawing,report --quiet
    shot "$directory/$name.svg" "$directory/$name.png" 1600 1130
    shot "$directory/$name.html" "$directory/$name-report.png" 1200 3600
    shot "$directory/$name.html" "$directory/$name-phone.png" 400 4600
done
