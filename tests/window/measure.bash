#!/usr/bin/env bash
# Measures the window: time to its first frame, processor time at rest, and memory. Use a release build.
# Usage: bash measure.bash PROGRAM [PLAN]
set -euo pipefail
. "$(dirname "$0")/display.bash"

program=$1
plan=${2:-}
start_display
told=$(mktemp)
for run in 1 2 3 4 5; do
    CRESTLINE_TIMING=1 "$program" ${plan:+"$plan"} 2>"$told" &
    process=$!
    eventually grep "first frame" "$told" || echo "no frame in ten seconds" >&2
    stop_window
done
rm "$told"
start_window "$program" ${plan:+"$plan"}
come_to_rest
look
began=$used
sleep 10
look
echo "at rest: $(( used - began )) hundredths of a second of processor time in 10 s"
awk '/VmRSS/ { print "resident: " $2 / 1000 " MB" }' "/proc/$process/status"
