#!/usr/bin/env bash
# Where there is no OpenGL, the program paints by the processor, says so once, looks the same and does the same.
# Usage: no_opengl.sh PROGRAM [FOLDER]
# Needs xvfb, xdotool, imagemagick and python3.
set -euo pipefail
. "$(dirname "$0")/display.bash"

program=$1
folder=$(realpath -m "${2:-$(mktemp -d)}")
mkdir -p "$folder"
work=$(mktemp -d)
plan=$work/plan.json
"$program" example steel_six -o "$plan"
start_display
export CRESTLINE_THEME=light
# Of 1,024,000 pixels, as many may be another colour by more than a fiftieth: OpenGL and the processor round
# the soft edges of letters and lines each in their own way.
most_different=500

fail() {
    echo "no_opengl.sh: $1" >&2
    import -window root "$folder/failed.png" || true
    exit 1
}
key() { xdotool key --window "$window" --clearmodifiers "$@"; come_to_rest; }
painter() { tr '\0' '\n' <"/proc/$process/environ" | sed -n 's/^CRESTLINE_PAINTER=//p'; }

# The same picture both ways.
for way in opengl processor; do
    CRESTLINE_PAINTER=$way start_window "$program" "$plan"
    come_to_rest
    import -window "$window" "$folder/painted-by-$way.png"
    stop_window
done
different=$(compare -metric AE -fuzz 2% "$folder"/painted-by-{opengl,processor}.png null: 2>&1) || true
different=${different%% *}
[ "${different%.*}" -le "$most_different" ] || fail "$different pixels differ between OpenGL and the processor"

# Files that are no libraries stand before the real ones, as on a system without them.
mkdir "$work/none"
touch "$work"/none/{libGL,libEGL}.so{,.1}
export LD_LIBRARY_PATH=$work/none
start_window "$program" "$plan"
come_to_rest
[ "$(painter)" = processor-instead ] || fail "the program did not start itself again"
import -window "$window" "$folder/no-opengl.png"

look
began=$used
sleep 2
look
[ "$(( used - began ))" -le 1 ] || fail "the window used $(( used - began )) hundredths of a second in two at rest"

xdotool mousemove --window "$window" 215 144
come_to_rest
xdotool click 1
come_to_rest
key ctrl+a
xdotool type --window "$window" --delay 40 640.5
key Tab
key ctrl+s
saved() { python3 -c 'import json, sys; sys.exit(json.load(open(sys.argv[1]))["instrument"]["scale_mm"] != 640.5)' "$plan"; }
eventually saved || fail "the scale was not saved"
key ctrl+q
ended() { ! kill -0 "$process" 2>/dev/null; }
eventually ended || fail "the window did not close"
rm -r "$work"
echo "no_opengl.sh: done, $different pixels differ from OpenGL, pictures in $folder"
