#!/usr/bin/env bash
# Where no window can be opened, the program says so in plain words and points at the command line.
# Usage: no_display.sh PROGRAM
set -euo pipefail
program=$1
unset WAYLAND_DISPLAY WAYLAND_SOCKET

refused() {
    local words=$1 said status=0
    shift
    said=$("$@" 2>&1) || status=$?
    [ "$status" = 1 ] || { echo "no_display.sh: status $status: $said" >&2; exit 1; }
    case $said in
    *panicked* | *"/src/"*) echo "no_display.sh: the words are not plain: $said" >&2 && exit 1 ;;
    *"$words"*"crestline --help"*) ;;
    *) echo "no_display.sh: unexpected words: $said" >&2 && exit 1 ;;
    esac
}

refused "there is no display" env -u DISPLAY "$program"
refused "does not answer" env DISPLAY=:4094 timeout 60 "$program"
echo "no_display.sh: done"
