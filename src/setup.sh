#!/bin/sh
# setup.sh [build|check|lint] - installs the packages that a build (or the tests, or the lint) needs and that are
# missing; does nothing, and asks nothing, when all are there.
set -u
want=${1:-build} missing=
need() { # need PACKAGE command-that-shows-it-is-there...
    package=$1
    shift
    "$@" >/dev/null 2>&1 || missing="$missing $package"
}
library() { need "$1" sh -c "command -v pkg-config && pkg-config --exists $2"; }

need gcc sh -c "command -v ${CC:-cc}"
need libc6-dev test -e /usr/include/stdio.h
need pkg-config command -v pkg-config
library libgsl-dev gsl
library libyaml-dev yaml-0.1
library libjson-c-dev json-c
library libncurses-dev ncursesw
library libcairo2-dev cairo
library libpango1.0-dev pangocairo
need fonts-dejavu-core sh -c 'ls /usr/share/fonts/truetype/dejavu/DejaVuSans.ttf || fc-list | grep DejaVuSans.ttf'
case $want in
check | lint)
    library check check
    library libvterm-dev vterm
    ;;
esac
if [ "$want" = lint ]; then
    for tool in clang clang-format clang-tidy cppcheck valgrind gcovr mandoc units zsh fish; do need $tool command -v $tool; done
    need libxml2-utils command -v xmllint
    need poppler-utils command -v pdffonts
    need libclang-rt-14-dev sh -c 'ls /usr/lib/llvm-*/lib/clang/*/lib/linux/libclang_rt.fuzzer-*.a'
    need python3-numpy sh -c '/usr/bin/python3 -c "import numpy"'
fi
[ -n "$missing" ] || exit 0

echo "beamhours: missing packages:$missing" >&2
as_root=
if [ "$(id -u)" -ne 0 ]; then
    as_root="sudo -n"
    if ! command -v sudo >/dev/null || ! sudo -n true 2>/dev/null; then as_root=none; fi
fi
if ! command -v apt-get >/dev/null || [ "$as_root" = none ]; then
    echo "beamhours: install them (names as in Debian), then run make again" >&2
    exit 69
fi
apt() { $as_root env DEBIAN_FRONTEND=noninteractive apt-get -q -o DPkg::Lock::Timeout=300 "$@" </dev/null >&2; }
# shellcheck disable=SC2086 # one word a package
apt install -y --no-install-recommends $missing ||
    { apt update && apt install -y --no-install-recommends $missing; } ||
    { echo "beamhours: could not install:$missing" >&2 && exit 69; }
