#!/bin/sh
# Installs what is missing, builds, and runs the whole job on both samples. Ends with the paths of
# the drawings.
set -eu
here=$(CDPATH='' cd -- "$(dirname -- "$0")" && pwd)
top=$(dirname -- "$here")
build=${BRINK_BUILD:-"$top/build"}
BRINK_BUILD="$build" sh "$top/.ci/build"
out="$build/sample-reports"
for site in quarry road-cut; do
  "$build/bin/brink" report "$here/$site/site.toml" -o "$out/$site"
  echo
done
echo "Drawings:"
for site in quarry road-cut; do
  for drawing in "$out/$site"/*.svg "$out/$site"/*.pdf; do
    [ ! -f "$drawing" ] || echo "$drawing"
  done
done
