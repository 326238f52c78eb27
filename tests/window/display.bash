# Functions for scripts that drive the real window: a display of its own, one window, and no dialog service.
# Sourced, not run.

server=
process=
window=

# Starts a display that nothing else uses, with a state folder of its own, and cleans up when the script ends.
start_display() {
    local pipe
    pipe=$(mktemp -u)
    mkfifo "$pipe"
    Xvfb -displayfd 7 -screen 0 1920x1080x24 -nolisten tcp 7>"$pipe" >/dev/null 2>&1 &
    server=$!
    trap 'stop_window; kill "$server" 2>/dev/null || true; rm -rf "$CRESTLINE_STATE"' EXIT
    export DISPLAY=":$(timeout 20 head -1 "$pipe")" LIBGL_ALWAYS_SOFTWARE=1
    rm -f "$pipe"
    export CRESTLINE_STATE=$(mktemp -d)
    unset WAYLAND_DISPLAY DBUS_SESSION_BUS_ADDRESS XDG_RUNTIME_DIR
}

# Starts the program and waits for its window, which goes to the upper left corner.
start_window() {
    "$@" &
    process=$!
    window=$(timeout 60 xdotool search --sync --onlyvisible --pid "$process" | head -1)
    xdotool windowmove "$window" 0 0
    # Away from everything that reacts to the pointer.
    xdotool mousemove --window "$window" 800 1
    xdotool windowfocus "$window" 2>/dev/null || true
}

# Ends the program if it still runs.
stop_window() {
    [ -n "$process" ] || return 0
    kill "$process" 2>/dev/null || true
    wait "$process" 2>/dev/null || true
    process=
}

# Sets `used` to the processor time that the program has used, in hundredths of a second, and `runs` to
# whether one of its threads runs or waits for a processor.
look() {
    local fields task
    used=0 runs=no
    { read -r -a fields <"/proc/$process/stat"; } 2>/dev/null || return 0
    used=$(( fields[13] + fields[14] ))
    for task in /proc/"$process"/task/*/stat; do
        { read -r -a fields <"$task"; } 2>/dev/null || continue
        [ "${fields[2]}" = R ] && runs=yes
    done
    return 0
}

# Waits until the program has done what it was asked, so that a slow machine only makes a script slower:
# three tenths of a second without any work, or twenty seconds at most.
come_to_rest() {
    local before=-1 quiet=0 turn
    for (( turn = 0; turn < 200; turn++ )); do
        sleep 0.1
        look
        if [ "$used" = "$before" ] && [ "$runs" = no ]; then quiet=$(( quiet + 1 )); else quiet=0; fi
        before=$used
        [ "$quiet" -ge 3 ] && return 0
    done
    return 0
}

# Waits until a command succeeds; fails where it does not within ten seconds.
eventually() {
    local turn
    for (( turn = 0; turn < 50; turn++ )); do
        "$@" && return 0
        sleep 0.2
    done
    return 1
}
