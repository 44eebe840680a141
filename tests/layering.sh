#!/bin/sh
# The order of the layers and of the library's stages, and who may include what.
set -eu
cd "$(dirname -- "$0")/.."
stages="base orientation readings sphere sets mechanics kinematics design risk record"
failed=0
complain() {
  echo "$1"
  failed=1
}
# refuse TEXT PATTERN FOLDER...: no source in the folders matches the pattern.
refuse() {
  text=$1
  pattern=$2
  shift 2
  found=$(grep -rnE --include='*.hpp' --include='*.cpp' -- "$pattern" "$@" 2>/dev/null || true)
  [ -z "$found" ] || complain "$text:
$found"
}

# A stage includes itself and earlier ones only.
later=""
for stage in $(echo "$stages" | tr ' ' '\n' | tac); do
  if [ -n "$later" ]; then
    for folder in "lib/include/brink/$stage" "lib/src/$stage"; do
      [ ! -d "$folder" ] || refuse "$stage includes a later stage" \
        "#include \"(brink/)?($later)/" "$folder"
    done
  fi
  later="${later:+$later|}$stage"
done
for folder in lib/include/brink/* lib/src/*/; do
  case " $stages " in
    *" $(basename "$folder") "*) ;;
    *) complain "$folder is not a stage of the library" ;;
  esac
done

refuse "the library draws nothing, prints nothing and reads no options" \
  '#include [<"](iostream|cairo|pango|CLI/|brink/plot|cstdio>)' lib
refuse "the drawings know nothing of the program" '#include [<"](iostream|CLI/|command)' plot
refuse "public headers show Eigen and the standard library only" \
  '#include [<"](fmt|nlohmann|toml|boost|nettle|cairo|pango)' lib/include plot/include
# Comparisons of directions are in these stages; elsewhere 1e-9 may be a criterion of convergence.
geometry=$(find lib/include/brink lib/src -name '*.?pp' ! -name ties.hpp |
  grep -E '/(orientation|mechanics|kinematics)/')
# shellcheck disable=SC2086 # the list is meant to split into words
refuse "the only tolerance for ties is in base/ties.hpp" '^([^/]|/[^/])*[^0-9.]1e-0?9[^0-9]' $geometry

# A library that compiles slowly is known to few files.
only() {
  found=$(grep -rlE --include='*.hpp' --include='*.cpp' "#include [<\"]$1" lib plot cli | sort | tr '\n' ' ')
  for file in $found; do
    case " $2 " in *" $file "*) ;; *) complain "$file includes $1; only $2 may" ;; esac
  done
}
only 'CLI/' 'cli/src/command_line.cpp'
only 'toml\+\+' 'lib/src/record/toml_tree.cpp'
only 'nlohmann/' 'lib/src/record/json.cpp lib/src/design/centreline.cpp' # JSON out; GeoJSON in
only '(cairo|pango)' 'plot/src/cairo_painter.cpp'

longest=$(find lib plot cli -name '*.?pp' -exec wc -l {} + | awk '$2 != "total" && $1 > 600 {print $2 " has " $1 " lines; the limit is 600"}')
[ -z "$longest" ] || complain "$longest"
exit $failed
