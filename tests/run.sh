#!/bin/sh
# Installs what is missing, builds, checks the format and runs every test. Arguments go to ctest.
set -eu
here=$(CDPATH='' cd -- "$(dirname -- "$0")" && pwd)
top=$(dirname -- "$here")
build=${BRINK_BUILD:-"$top/build"}
BRINK_BUILD="$build" sh "$top/.ci/build" -DBRINK_TESTS=ON
cd "$build"
exec ctest --output-on-failure --no-tests=error -j "$(nproc)" "$@"
