# Shared by app/start and tests/all: makes .venv from a lock file, and again when the lock file has changed.
environment() {
    lock=$1
    if ! command -v python3 >/dev/null 2>&1; then
        echo "Python 3.11 or newer is needed. On Debian or Ubuntu: apt-get install python3 python3-venv" >&2
        exit 1
    fi
    if ! python3 -c 'import sys; sys.exit(sys.version_info < (3, 11))'; then
        echo "Python 3.11 or newer is needed; this is $(python3 --version)." >&2
        exit 1
    fi
    if [ ! -x .venv/bin/python ] || ! .venv/bin/python -c 'import pip' >/dev/null 2>&1; then
        rm -rf .venv
        if ! python3 -m venv .venv; then
            echo "The environment could not be made. On Debian or Ubuntu: apt-get install python3-venv" >&2
            rm -rf .venv
            exit 1
        fi
    fi
    stamp=.venv/installed-$(basename "$lock")
    if ! cmp -s "$lock" "$stamp"; then
        echo "Installing what $lock lists (once) ..."
        .venv/bin/python -m pip install --quiet --disable-pip-version-check --require-hashes -r "$lock"
        cp "$lock" "$stamp"
    fi
}
