#!/usr/bin/env bash
# Works in the real window as a user would: types a wrong number and a right one, undoes, saves, writes a
# drawing, closes with changes. Fails where a file does not hold what it should or the window does not end.
# Usage: drive.sh PROGRAM [FOLDER]
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
export CRESTLINE_THEME=${CRESTLINE_THEME:-light}

fail() {
    echo "drive.sh: $1" >&2
    import -window root "$folder/failed.png" || true
    exit 1
}
picture() { import -window "$window" "$folder/$1.png"; }
key() { xdotool key --window "$window" --clearmodifiers "$@"; come_to_rest; }
write() { xdotool type --window "$window" --delay 40 "$1"; come_to_rest; }
click() { xdotool mousemove --window "$window" "$1" "$2"; come_to_rest; xdotool click 1; come_to_rest; }
# Whether the saved plan has this scale.
has_scale() { python3 -c 'import json, sys; sys.exit(json.load(open(sys.argv[1]))["instrument"]["scale_mm"] != float(sys.argv[2]))' "$plan" "$1"; }

cd "$work"
start_window "$program" "$plan"

# At rest the window uses no processor time: less than a hundredth of a second in two.
come_to_rest
look
began=$used
sleep 2
look
spent=$(( used - began ))
[ "$spent" -le 1 ] || fail "the window used $spent hundredths of a second in two seconds at rest"

# The scale is the field behind its label in the group that opens first.
click 215 144
key ctrl+a
write 64x
picture wrong-number
key ctrl+a
write 64
picture out-of-range
key ctrl+a
write 640,5
key Tab
key ctrl+s
eventually has_scale 640.5 || fail "the scale was not saved"
picture saved

# One gesture is one step.
key ctrl+z
key ctrl+s
eventually has_scale 647.7 || fail "undo did not bring the scale back"
key ctrl+shift+z
key ctrl+s
eventually has_scale 640.5 || fail "redo did not bring the scale again"

# The drawing goes to the path that the window proposes.
key ctrl+e
picture path-field
key Return
eventually test -s "$work/plan.pdf" || fail "no drawing was written"
picture written
key ctrl+e
key Return
picture file-exists
key Escape

# Menus.
click 101 16
picture file-menu
key Escape

# Closing with changes asks first.
click 215 144
key ctrl+a
write 650
key Tab
key ctrl+q
picture unsaved
kill -0 "$process" 2>/dev/null || fail "the window closed with changes and did not ask"
# The focus stands on Save.
key Return
ended() { ! kill -0 "$process" 2>/dev/null; }
eventually ended || fail "the window did not close after saving"
eventually has_scale 650 || fail "the changes were not saved before closing: $(grep -m1 scale_mm "$plan")"
rm -r "$work"
echo "drive.sh: done, pictures in $folder"
