#!/usr/bin/env bash
# An hour's worth of edits in a few minutes: the real window keeps its memory.
# Usage: memory.sh PROGRAM [FOLDER]
# CRESTLINE_STEPS sets how many steps are made; with CRESTLINE_TELL set it says after each round how things stand.
# Needs xvfb, xdotool and imagemagick.
set -euo pipefail
. "$(dirname "$0")/display.bash"

program=$1
folder=$(realpath -m "${2:-$(mktemp -d)}")
mkdir -p "$folder"
work=$(mktemp -d)
plan=$work/plan.json
"$program" example steel_six -o "$plan"
start_display
export CRESTLINE_THEME=light CRESTLINE_SIZE=1280x800 CRESTLINE_TIMING=1

# A step every two seconds for an hour, each with the frames of its keys.
steps_wanted=${CRESTLINE_STEPS:-1800}
frames_wanted=$(( 2 * steps_wanted ))
# What the window may take: 150 MB, in the kernel's kB of 1024 bytes. The code of an optimised program takes 15 MB of
# it; that of one that is not optimised is three times as large, which says nothing of the window, so that an
# allowance stands for either.
limit_kb=146484
code_kb=16000
# What its data may grow by once every page has been shown and every kind of work done: 200 steps are kept of some
# kilobytes each, and what the allocator has in hand differs by some megabytes from one moment to the next.
growth_kb=8000
# On a busy machine, and with a program that is not optimised, the script ends after so many seconds with what has
# been done by then, which must be a twelfth: five minutes of work, in which every page comes up and every kind of step is made.
most_seconds=${CRESTLINE_MOST_SECONDS:-150}
fewest_steps=$(( steps_wanted / 12 ))

fail() {
    echo "memory.sh: $1" >&2
    import -window root "$folder/memory-failed.png" || true
    exit 1
}
mkfifo "$work/nap"
exec 8<>"$work/nap"
# Some hundredths of a second without a process of their own.
nap() { read -r -t 0.012 -u 8 || true; }
# Finds the threads that paint where OpenGL is done in software.
find_painters() {
    local task name
    painters=()
    for task in /proc/"$process"/task/*; do
        read -r name <"$task/comm"
        case $name in llvmpipe*) painters+=("$task/stat") ;; esac
    done
}
# Sets `sleeps` to how often the window's own thread has gone to sleep, and `busy` to whether it or a painter runs.
look_closely() {
    local name value rest painter fields
    sleeps='' busy=yes
    while read -r name value rest; do
        case $name in
            State:) [ "$value" != S ] || busy=no ;;
            voluntary_ctxt_switches:) sleeps=$value ;;
        esac
    done <"/proc/$process/status"
    for painter in "${painters[@]}"; do
        read -r -a fields <"$painter"
        [ "${fields[2]}" != R ] || busy=yes
    done
}
# Waits until the window has woken up since it had slept `before` times, and sleeps again, whatever is worked out
# beside it.
settle() {
    local before=$1 last='' turn
    for (( turn = 0; turn < 300; turn++ )); do
        nap
        look_closely
        [ "$busy" = no ] && [ "$sleeps" != "$before" ] && [ "$sleeps" = "$last" ] && return 0
        last=$sleeps
    done
}
# Keys one after the other, each when the one before has been taken in.
keys() {
    local key
    for key in "$@"; do
        look_closely
        local woken=$sleeps
        xdotool key --window "$window" --clearmodifiers "$key"
        settle "$woken"
    done
}
write() {
    look_closely
    local woken=$sleeps
    xdotool type --window "$window" --delay 40 "$1"
    settle "$woken"
}
click() {
    look_closely
    local woken=$sleeps
    xdotool mousemove --window "$window" "$1" "$2" click 1
    settle "$woken"
}
# The words so many times.
times() { local what; for (( what = 0; what < $1; what++ )); do printf '%s ' "${@:2}"; done; }

# Steps in the first two fields, of which the scale is the first; the last four are taken back and done again three
# times over. `there` and `back` are arrow keys, so that what one page changes another one changes back.
stepping() {
    local there=$2 back=$3
    keys "$1"
    click 215 144
    keys $(times 4 "$there" Tab "$back" shift+Tab)
    keys $(times 3 $(times 4 ctrl+z) $(times 4 ctrl+shift+z))
}
# Two steps on a page that works them out beside the window, which takes long in a program that is not optimised.
working() {
    keys "$1"
    click 215 144
    keys Up ctrl+z
}
typing() {
    click 215 144
    keys ctrl+a
    write "$(( 640 + $1 % 9 )).5"
    keys Tab
}
looking() {
    keys ctrl+m ctrl+m ctrl+i ctrl+i ctrl+plus ctrl+0
    xdotool mousemove --window "$window" 600 300 click 4 click 4 click 5 click 5 mousemove --window "$window" 1050 250
    keys ctrl+r
}
# A sample is begun, and another plan's in the midst of it.
how_sure() {
    keys ctrl+4
    sleep 0.5
    keys ctrl+z ctrl+shift+z
    sleep 0.5
    keys ctrl+1
}
writing() {
    keys ctrl+e ctrl+a
    write "$work/out-$1.$2"
    keys Return
}
another() {
    keys ctrl+k
    write "$1"
    # In the question about the changes the focus stands on Save; the next button gives them up.
    keys Return Tab Return
}
round() {
    # Out of whatever a key that came at the wrong moment has opened.
    keys Escape Escape
    local turn=$1 page endings=(pdf svg dxf csv)
    local others=("plan: bass" "example: mandolin" "example: steel" "plan: tenor" "example: fanned" "plan: classical")
    typing "$turn"
    for page in ctrl+1 F1; do stepping "$page" Up Down; done
    for page in ctrl+2 ctrl+5; do stepping "$page" Down Up; done
    for page in ctrl+3 ctrl+6; do working "$page"; done
    keys ctrl+1
    looking
    how_sure
    writing "$turn" "${endings[turn % 4]}"
    # A plan keeps its steps until there are as many as are ever kept.
    [ $(( turn % 8 )) -lt 7 ] || another "${others[turn / 8 % ${#others[@]}]}"
}
# Sets `steps` and `frames` to what the program has told last.
counted() {
    local told
    told=$(sed -n 's/^\([0-9]*\) steps in \([0-9]*\) frames$/\1 \2/p' "$work/told" | tail -1)
    read -r steps frames <<<"${told:-0 0}"
}
# Sets what the process has in memory, kB: all of it, its own data, and the pages of the program's file.
measure() {
    all=$(awk '$1 == "Rss:" { print $2 }' "/proc/$process/smaps_rollup")
    data=$(awk '$1 == "Anonymous:" { print $2 }' "/proc/$process/smaps_rollup")
    code=$(awk -v file="$(readlink -f "$program")" \
        '/^[0-9a-f]+-[0-9a-f]+ / { ours = ($6 == file) } ours && $1 == "Rss:" { sum += $2 } END { print sum + 0 }' \
        "/proc/$process/smaps")
    without_code=$(( all - code ))
}

cd "$work"
start_window "$program" "$plan" 2>"$work/told"
come_to_rest
find_painters
measure
echo "at first: resident $all kB, of which the program's file $code and data $data"
steps=0 frames=0 settled= began=$SECONDS
for (( turn = 0; (steps < steps_wanted || frames < frames_wanted) && SECONDS - began < most_seconds; turn++ )); do
    round "$turn"
    kill -0 "$process" 2>/dev/null || fail "the window has gone in round $turn"
    counted
    measure
    [ -n "$settled" ] || [ "$steps" -lt $(( fewest_steps / 3 )) ] || settled=$data
    [ -z "${CRESTLINE_TELL:-}" ] || echo "$(( SECONDS - began )) s, $steps steps, $frames frames: resident $all kB, file $code, data $data"
done
come_to_rest
measure
import -window "$window" "$folder/memory.png"
[ "$steps" -ge "$fewest_steps" ] || fail "only $steps steps in $frames frames came about"
[ "$(ls "$work" | grep -c '^out-')" -ge 2 ] || fail "the drawings were not written"
echo "after $steps steps in $frames frames: resident $all kB, of which the program's file $code and data $data (after the first $(( fewest_steps / 3 )) steps $settled)"
[ $(( without_code + code_kb )) -lt "$limit_kb" ] || fail "the window takes $(( without_code + code_kb )) kB"
[ $(( data - settled )) -lt "$growth_kb" ] || fail "its data grew by $(( data - settled )) kB since then"
rm -r "$work"
echo "memory.sh: done, picture in $folder"
