#!/usr/bin/env bash
# Spoils plans and tables of readings for a number of minutes: bash tests/fuzz.sh MINUTES [SEED].
# What breaks the program is kept in target/fuzz-findings; the exit status is 1 where something did.
set -eu -o pipefail
cd "$(dirname "$0")/.."
[ $# -ge 1 ] || { echo "usage: bash tests/fuzz.sh MINUTES [SEED]" >&2; exit 2; }
target=${CARGO_TARGET_DIR:-$PWD/target}
cargo build -q --locked -p crestline-tests --example fuzz
exec nice -n 19 "$target/debug/examples/fuzz" "$1" "${2:-1}" "$target/fuzz-findings"
