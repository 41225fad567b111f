# shellcheck shell=bash
# What the scripts share: where things are, and doing a step only when its inputs have changed.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."
mkdir -p .cache

say() { printf '\033[1m· %s\033[0m\n' "$*" >&2; }
fail() { printf '%s\n' "$*" >&2; exit 1; }

# One hash over the names and contents of files and folders.
hash_of() {
    find "$@" -type f ! -name '*.pyc' ! -path '*/.*/*' ! -path '*/node_modules/*' \
        ! -path 'web/dist*' -print0 \
        | LC_ALL=C sort -z | xargs -0 sha256sum | sha256sum | cut -d' ' -f1
}

# once STAMP "INPUTS" COMMAND…: runs the command unless the stamp has the hash of these inputs. The
# stamp of an installed folder lies inside it and goes with it. The hash is taken before the
# command: an edit meanwhile counts for the next time.
once() {
    local stamp=$1 inputs=$2 hash
    shift 2
    # shellcheck disable=SC2086  # several inputs, split on purpose
    hash=$(hash_of $inputs)
    [[ -f $stamp && $(<"$stamp") == "$hash" ]] && return
    rm -f "$stamp"
    "$@"
    printf '%s' "$hash" >"$stamp"
}

# Only one of these scripts at a time installs or builds in this tree.
lock() {
    exec 9>.cache/lock
    flock -n 9 || { say "waiting for another build here to end"; flock 9; }
}

apt_install() {
    say "installing $* (apt-get)"
    command -v apt-get >/dev/null || fail "please install $*: this script knows only apt-get"
    export DEBIAN_FRONTEND=noninteractive
    apt-get update -qq
    apt-get install -y -qq --no-install-recommends "$@" >&2
}

make_venv() {
    say "making the Python environment .venv"
    rm -rf .venv
    python3 -m venv .venv >/dev/null 2>&1 || {
        rm -rf .venv
        apt_install python3-venv
        python3 -m venv .venv
    }
}

pip_install() {
    say "installing Python packages of $1"
    .venv/bin/python -m pip install --disable-pip-version-check --require-hashes -q -r "$1"
}

npm_install() {
    say "installing the page's libraries (npm)"
    (cd web && npm ci --ignore-scripts --no-audit --no-fund --loglevel=error) >&2
}

# Everything that turns the sources into web/dist.
build() {
    install_for_build
    [[ -e web/dist/index.html ]] || rm -f .cache/build.stamp
    once .cache/build.stamp \
        "web package-python .cache/trimmed scripts/build_site.mjs scripts/headers.json" \
        build_site
}

install_for_build() {
    command -v python3 >/dev/null || apt_install python3 python3-venv
    python3 -c 'import sys; sys.exit(sys.version_info < (3, 11))' \
        || fail "Python 3.11 or newer is needed; python3 here is $(python3 --version)"
    command -v npm >/dev/null || fail "please install Node.js 20 or newer with npm"
    node -e 'process.exit(parseInt(process.versions.node) < 20 ? 1 : 0)' \
        || fail "Node.js 20 or newer is needed; node here is $(node --version)"
    .venv/bin/python -m pip --version >/dev/null 2>&1 || make_venv
    once .venv/build.stamp scripts/requirements.txt pip_install scripts/requirements.txt
    once web/node_modules/.stamp "web/package.json web/package-lock.json" npm_install
    .venv/bin/python scripts/fetch_runtime.py
    once .cache/trimmed/.stamp "scripts/trim_runtime.py scripts/trim_runtime.mjs scripts/runtime.sha256" \
        trim_runtime
}

trim_runtime() {
    say "trimming and compiling the runtime"
    node scripts/trim_runtime.mjs
}

build_site() {
    say "building web/dist"
    # flit packs whatever lies in the package's folder: give it the sources alone.
    rm -rf .cache/wheel .cache/package
    mkdir -p .cache/package
    (cd package-python && find . \( -path '*/.*/*' -o -name '*.pyc' \) -prune -o -type f -print0 \
        | xargs -0 cp --parents -t ../.cache/package)
    # A fixed date makes the same sources give the same wheel, byte for byte.
    SOURCE_DATE_EPOCH=1700000000 .venv/bin/python -m pip wheel --disable-pip-version-check -q \
        --no-deps --no-build-isolation --wheel-dir .cache/wheel .cache/package
    node scripts/build_site.mjs
}
