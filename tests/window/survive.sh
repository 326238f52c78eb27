#!/usr/bin/env bash
# Kills the real window at random moments while it is worked in. Whatever the moment, the plan's file is the old
# plan or the new one, and what was not saved is offered once when the window opens again.
# Usage: survive.sh PROGRAM [FOLDER]
# CRESTLINE_SEED repeats a run, CRESTLINE_KILLS sets how many there are.
# Needs xvfb, xdotool, imagemagick and python3.
set -euo pipefail
. "$(dirname "$0")/display.bash"

program=$1
folder=$(realpath -m "${2:-$(mktemp -d)}")
mkdir -p "$folder"
work=$(mktemp -d)
plan=$work/plan.json
RANDOM=${CRESTLINE_SEED:-$(( $(date +%N | sed 's/^0*//') % 32768 ))}
seed=${CRESTLINE_SEED:-$RANDOM}
RANDOM=$seed
kills=${CRESTLINE_KILLS:-6}
"$program" example steel_six -o "$plan"
start_display
export CRESTLINE_THEME=light

fail() {
    echo "survive.sh: $1 (CRESTLINE_SEED=$seed)" >&2
    import -window root "$folder/survive-failed.png" || true
    exit 1
}
key() { xdotool key --window "$window" --clearmodifiers "$@"; }
write() { xdotool type --window "$window" --delay 15 "$1"; }
scale_of() { python3 -c 'import json, sys; print(json.load(open(sys.argv[1]))["instrument"]["scale_mm"])' "$1"; }
# The scale in the recovery file, wherever the plan has one; nothing where it has none.
copies() { find "$work" -name '.plan.json.crestline-*.recovery'; }
kept() { python3 -c 'import json, sys; print(json.load(open(sys.argv[1]))["plan"]["instrument"]["scale_mm"])' "$1"; }
# Clicks into the field of the scale and types another one.
edit() {
    xdotool mousemove --window "$window" 215 144 click 1
    sleep 0.1
    key ctrl+a
    write "$1"
}
kill_now() { { kill -9 "$process" && wait "$process"; } 2>/dev/null || true; process=; }
focus() { xdotool windowfocus --sync "$window" 2>/dev/null || true; }

# A kill while it types, saves, or rests.
for (( turn = 1; turn <= kills; turn++ )); do
    start_window "$program" "$plan"
    focus
    # What an earlier turn has left is put off: the focus stands on taking it up.
    [ -z "$(copies)" ] || { come_to_rest; key Escape; }
    (
        sleep "0.$(( RANDOM % 9 ))"
        for scale in 641 642.5 643; do
            edit "$scale"
            key Tab ctrl+s
        done
    ) >/dev/null 2>&1 &
    hand=$!
    sleep "$(( RANDOM % 2 )).$(( RANDOM % 10 ))"
    kill_now
    kill "$hand" 2>/dev/null || true
    wait "$hand" 2>/dev/null || true
    "$program" check "$plan" || fail "kill $turn left a plan file that is none"
    for copy in $(copies); do
        kept "$copy" >/dev/null || fail "kill $turn left a recovery file that cannot be read"
    done
done
rm -f $(copies)

# Work that is not saved comes back.
before=$(scale_of "$plan")
start_window "$program" "$plan"
focus
come_to_rest
edit 655.5
key Tab
has_copy() { local copy; copy=$(copies | head -1); [ -n "$copy" ] && [ "$(kept "$copy")" = 655.5 ]; }
eventually has_copy || fail "no copy of the unsaved scale was kept"

# A second window on the same plan leaves the first one's copy alone.
first=$process first_window=$window
CRESTLINE_THEME=dark start_window "$program" "$plan"
focus
come_to_rest
edit 660
key Tab
two() { [ "$(copies | wc -l)" = 2 ]; }
eventually two || fail "two windows on one plan do not have a copy each"
key ctrl+q
come_to_rest
# The focus stands on Save; the next button gives the changes up.
key Tab Return
ended() { ! kill -0 "$process" 2>/dev/null; }
eventually ended || fail "the second window did not close"
has_copy || fail "the second window took the copy of the first"
process=$first window=$first_window
kill_now
[ "$(scale_of "$plan")" = "$before" ] || fail "the file was changed without being saved"

start_window "$program" "$plan"
focus
come_to_rest
import -window "$window" "$folder/recovery.png"
key Return
come_to_rest
key ctrl+s
saved() { [ "$(scale_of "$plan")" = 655.5 ]; }
eventually saved || fail "the work did not come back"
gone() { [ -z "$(copies)" ]; }
eventually gone || fail "the copy is still there after saving"

# Another program changes the file: the window asks when the user comes back, and keeps what it has.
sed -i 's/655.5/633/' "$plan"
xdotool windowfocus --sync "$window" || true
come_to_rest
edit 656
key Tab ctrl+s
come_to_rest
import -window "$window" "$folder/file-changed.png"
[ "$(scale_of "$plan")" = 633 ] || fail "the window saved over the other program's work without asking"
stop_window

# The window opens as it was left, and the plan is among the recent ones.
start_window "$program" "$plan"
focus
come_to_rest
[ -n "$(copies)" ] && { key Escape; come_to_rest; }
key ctrl+i
come_to_rest
key ctrl+q
eventually ended || fail "the window did not close"
grep -q '"inputs": false' "$CRESTLINE_STATE/layout.json" || fail "the arrangement was not remembered"
grep -q "$plan" "$CRESTLINE_STATE/recent.json" || fail "the plan is not among the recent ones"
rm -r "$work"
echo "survive.sh: done, pictures in $folder"
