#!/bin/sh
# Every C++ source is formatted by the .clang-format at the top.
set -eu
cd "$(dirname -- "$0")/.."
if ! command -v clang-format >/dev/null 2>&1; then
  echo "clang-format is not installed; see .ci/packages"
  exit 1
fi
find lib plot cli tests \( -name '*.hpp' -o -name '*.cpp' \) -print0 | xargs -0 clang-format --dry-run -Werror
