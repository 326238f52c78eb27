# Functions for scripts that drive the real window: a display of its own, one window, and no dialog service.
# Sourced, not run.

server=
process=
window=

# Starts a display that nothing else uses and cleans up when the script ends.
start_display() {
    local pipe
    pipe=$(mktemp -u)
    mkfifo "$pipe"
    Xvfb -displayfd 7 -screen 0 1920x1080x24 -nolisten tcp 7>"$pipe" >/dev/null 2>&1 &
    server=$!
    trap 'stop_window; kill "$server" 2>/dev/null || true' EXIT
    export DISPLAY=":$(timeout 20 head -1 "$pipe")" LIBGL_ALWAYS_SOFTWARE=1
    rm -f "$pipe"
    unset WAYLAND_DISPLAY DBUS_SESSION_BUS_ADDRESS XDG_RUNTIME_DIR
}

# Starts the program and waits for its window, which goes to the upper left corner.
start_window() {
    "$@" &
    process=$!
    window=$(timeout 60 xdotool search --sync --onlyvisible --pid "$process" | head -1)
    xdotool windowmove "$window" 0 0
    # Away from everything that reacts to the pointer.
    xdotool mousemove --window "$window" 700 8
    xdotool windowfocus "$window" 2>/dev/null || true
}

# Ends the program if it still runs.
stop_window() {
    [ -n "$process" ] || return 0
    kill "$process" 2>/dev/null || true
    wait "$process" 2>/dev/null || true
    process=
}

# Processor time that the program has used, in hundredths of a second.
ticks() { awk '{ print $14 + $15 }' "/proc/$process/stat" 2>/dev/null || echo 0; }

# Waits until the program has done what it was asked, so that a slow machine only makes a script slower:
# three tenths of a second without any work, or ten seconds at most.
come_to_rest() {
    local before now=-1 quiet=0
    for _ in $(seq 100); do
        before=$now
        sleep 0.1
        now=$(ticks)
        if [ "$now" = "$before" ]; then quiet=$(( quiet + 1 )); else quiet=0; fi
        [ "$quiet" -ge 3 ] && return 0
    done
    return 0
}
