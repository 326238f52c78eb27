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
