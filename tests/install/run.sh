#!/bin/sh
# Installs the build given as $1 into a temporary folder, checks that every public header and the
# program arrived and nothing else did, and builds and runs a project that finds the package.
set -eu
build=$1
here=$(CDPATH='' cd -- "$(dirname -- "$0")" && pwd)
top=$(dirname -- "$(dirname -- "$here")")
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT INT TERM

cmake --install "$build" --prefix "$work/prefix" >"$work/log" || { cat "$work/log"; exit 1; }

headers() { (cd "$1" && find . -name '*.hpp' | sort); }
{ headers "$top/lib/include"; headers "$top/plot/include"; } | sort >"$work/expected"
headers "$work/prefix/include" >"$work/installed"
diff -u "$work/expected" "$work/installed" || { echo "installed headers differ from the source"; exit 1; }
"$work/prefix/bin/brink" --version
others=$(cd "$work/prefix" && find . -type f ! -name '*.hpp' ! -path './lib/*/cmake/brink/*' ! -path './lib/cmake/brink/*' |
  sed 's|/lib/[^/]*-linux-[^/]*/|/lib/|' | sort | tr '\n' ' ')
expected="./bin/brink ./lib/libbrink.a ./lib/libbrink_plot.a "
[ "$others" = "$expected" ] || { echo "installed files: $others"; echo "expected: $expected"; exit 1; }

cmake -S "$here/consumer" -B "$work/consumer" -DCMAKE_PREFIX_PATH="$work/prefix" >"$work/log" 2>&1 &&
  cmake --build "$work/consumer" >>"$work/log" 2>&1 || { cat "$work/log"; exit 1; }
"$work/consumer/consumer"
