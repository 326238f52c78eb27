#!/usr/bin/env bash
# Photographs every page of the real window on a display of its own.
# Usage: photograph.sh PROGRAM FOLDER [PLAN]
# Needs xvfb, xdotool and imagemagick; draws with software OpenGL.
set -euo pipefail

program=$1
folder=$2
plan=${3:-}
mkdir -p "$folder"

display=$(( 90 + RANDOM % 400 ))
Xvfb ":$display" -screen 0 1920x1080x24 -nolisten tcp >/dev/null 2>&1 &
server=$!
trap 'kill "$server" 2>/dev/null || true' EXIT
export DISPLAY=":$display" LIBGL_ALWAYS_SOFTWARE=1
unset WAYLAND_DISPLAY DBUS_SESSION_BUS_ADDRESS
for _ in $(seq 50); do xdotool getdisplaygeometry >/dev/null 2>&1 && break; sleep 0.1; done

photograph() {
    local page=$1 theme=$2 size=$3
    CRESTLINE_PAGE=$page CRESTLINE_THEME=$theme CRESTLINE_SIZE=$size "$program" ${plan:+"$plan"} &
    local window=$! id
    id=$(timeout 30 xdotool search --sync --onlyvisible --pid "$window" | head -1)
    xdotool windowmove "$id" 0 0
    sleep "${CRESTLINE_SETTLE:-1.5}"
    import -window "$id" "$folder/$page-$theme-$size.png"
    kill "$window"
    wait "$window" 2>/dev/null || true
}

for page in ${CRESTLINE_PAGES:-saddle fretted-notes}; do
    for size in ${CRESTLINE_SIZES:-1280x800 1920x1080}; do
        for theme in ${CRESTLINE_THEMES:-light dark}; do
            photograph "$page" "$theme" "$size"
        done
    done
done
ls "$folder"
