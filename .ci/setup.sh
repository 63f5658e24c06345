# Set-up shared by notebooks/start.sh and tests/run.sh; POSIX sh, sourced from the project's root.
#
#   prepare EXTRA [SYSTEM_PACKAGE...]
#
# makes .venv, adds the Debian packages that are missing where it may, and installs polywalk (editable) with the
# extra. A stamp in .venv makes the next call fast. What cannot be installed is said in plain words.

venv=.venv
python=$venv/bin/python

say() { printf '%s\n' "polywalk: $*"; }

prepare() {
    extra=$1
    shift
    stamp=$venv/.polywalk-$extra
    if [ -x "$python" ] && [ -f "$stamp" ] && [ "$(cat "$stamp")" = "$(fingerprint "$extra")" ]; then
        return 0
    fi
    find_python
    add_packages $(wanted_packages) "$@"
    [ -n "$base" ] || find_python
    if [ -z "$base" ]; then
        say "Python 3.11 or newer is missing. Debian 12, Ubuntu 24.04: sudo apt-get install python3 python3-venv python3-dev"
        return 1
    fi
    make_venv && install_package "$extra" && fingerprint "$extra" >"$stamp"
}

# What the installation depends on: the place, the Python, the extra, and what pyproject.toml asks for.
fingerprint() {
    printf '%s | %s | %s | %s\n' "$PWD" "$("$python" --version 2>&1)" "$1" "$(cksum <pyproject.toml)"
}

# Sets $base to a Python >= 3.11, one that can build an environment and C code if there is one, else any.
find_python() {
    base=
    for test in 'import ensurepip, os, sysconfig as s; ok = os.path.exists(s.get_path("include") + "/Python.h")' 'ok = True'; do
        for name in python3 python3.14 python3.13 python3.12 python3.11; do
            if "$name" -c "$test; import sys; sys.exit(sys.version_info < (3, 11) or not ok)" >/dev/null 2>&1; then
                base=$name
                return 0
            fi
        done
    done
}

# The Debian packages that pycddlib's compilation and the environment need, beside those the caller names.
wanted_packages() {
    echo gcc libcdd-dev libgmp-dev
    if [ -z "$base" ]; then
        echo python3 python3-venv python3-dev
    elif ! "$base" -c 'import ensurepip' 2>/dev/null; then
        echo "$(python_name)-venv"
    fi
    if [ -n "$base" ] && [ ! -f "$("$base" -c 'import sysconfig; print(sysconfig.get_path("include"))')/Python.h" ]; then
        echo "$(python_name)-dev"
    fi
}

python_name() { "$base" -c 'import sys; print("python%d.%d" % sys.version_info[:2])'; }

# Installs the named Debian packages that are absent; says which ones, and the command, where it may not.
add_packages() {
    command -v dpkg-query >/dev/null 2>&1 || return 0
    absent=
    for name in "$@"; do
        dpkg-query -W -f '${Status}' "$name" 2>/dev/null | grep -q 'ok installed' || absent="$absent $name"
    done
    [ -n "$absent" ] || return 0
    if [ "$(id -u)" = 0 ]; then
        as_root=
    elif sudo -n true 2>/dev/null; then
        as_root="sudo -n"
    else
        say "missing system packages; install them with: sudo apt-get install$absent"
        return 0
    fi
    say "installing$absent"
    $as_root apt-get -q update || say "apt-get update failed; going on with the package lists as they are"
    for name in $absent; do
        $as_root env DEBIAN_FRONTEND=noninteractive apt-get -q -y install --no-install-recommends "$name" ||
            say "could not install the system package $name"
    done
}

make_venv() {
    [ -x "$python" ] && "$python" -m pip --version >/dev/null 2>&1 && return 0
    "$base" -m venv --clear "$venv" && return 0
    say "could not make $venv with $base; on Debian and Ubuntu: sudo apt-get install $(python_name)-venv"
    return 1
}

install_package() {
    say "installing the package and what it needs into $venv (some minutes the first time)"
    "$python" -m pip install --disable-pip-version-check -q -e ".[$1]" && return 0
    say "the installation failed; pip's message is above. If it speaks of cdd.h or gmp.h, pycddlib found no headers:"
    say "  Debian, Ubuntu: sudo apt-get install gcc libcdd-dev libgmp-dev      macOS: brew install cddlib gmp"
    say "  anywhere with conda: conda install -c conda-forge pycddlib"
    return 1
}
