#!/usr/bin/env bash
# Photographs every page of the real window on a display of its own.
# Usage: photograph.sh PROGRAM [FOLDER [PLAN]]
# CRESTLINE_PAGES, CRESTLINE_SIZES and CRESTLINE_THEMES narrow it down.
# Needs xvfb, xdotool and imagemagick; draws with software OpenGL.
set -euo pipefail
. "$(dirname "$0")/display.bash"

program=$1
folder=${2:-$(mktemp -d)}
plan=${3:-}
mkdir -p "$folder"
start_display

# The page of readings wants a plan that has some.
read_plan=$(mktemp -d)/read.json
"$program" example steel_six_sharp -o "$read_plan"

photograph() {
    local page=$1 theme=$2 size=$3 plan=$plan
    [ "$page" = diagnosis ] && plan=${plan:-$read_plan}
    CRESTLINE_PAGE=$page CRESTLINE_THEME=$theme CRESTLINE_SIZE=$size start_window "$program" ${plan:+"$plan"}
    come_to_rest
    local picture=$folder/$page-$theme-$size.png
    import -window "$window" "$picture"
    # A blank or half-drawn window has few colours.
    [ "$(identify -format %k "$picture")" -gt 100 ] || { echo "photograph.sh: $picture is blank" >&2; exit 1; }
    stop_window
}

for page in ${CRESTLINE_PAGES:-saddle fretted-notes compare how-sure sheets diagnosis help}; do
    for size in ${CRESTLINE_SIZES:-1280x800 1920x1080}; do
        for theme in ${CRESTLINE_THEMES:-light dark}; do
            photograph "$page" "$theme" "$size"
        done
    done
done
echo "photograph.sh: done, pictures in $folder"
