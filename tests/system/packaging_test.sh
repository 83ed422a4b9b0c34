#!/usr/bin/env bash
# Installs a finished build under a scratch prefix, then builds and runs a project that knows gaskettle by its installed
# package alone. Usage: packaging_test.sh CMAKE BUILD-FOLDER CONSUMER-FOLDER SCRATCH-FOLDER VERSION MODEL
set -euo pipefail
cmake=$1 build=$2 consumer=$3 scratch=$4 version=$5 model=$6

fail() {
  echo "packaging: $*" >&2
  exit 1
}

rm -rf "$scratch"
prefix=$scratch/prefix
"$cmake" --install "$build" --prefix "$prefix" > /dev/null

# An installed header may include no header of ours that stayed behind.
headers=$prefix/include/gaskettle
[[ -f $headers/base/units.h ]] || fail "no headers under $headers"
while IFS=: read -r file line; do
  included=${line#*\"}
  included=${included%%\"*}
  [[ -f $headers/$included ]] || fail "${file#"$headers/"} includes \"$included\", which is not installed"
done < <(grep -rE '^ *#include "' "$headers")

# The package may name no path of the build or the sources: it would break when they are gone.
package=$(dirname "$(find "$prefix" -name gaskettle-config.cmake)")
source=$(sed -n 's/^CMAKE_HOME_DIRECTORY:INTERNAL=//p' "$build/CMakeCache.txt")
for path in "$build" "$source"; do
  if grep -rnF -- "$path/" "$package" >&2; then fail "the package names $path"; fi
done

# attempt WHAT COMMAND...: shows what the command said only if it failed.
attempt() {
  "${@:2}" > "$scratch/log" 2>&1 || { cat "$scratch/log" >&2; fail "the user's project was not $1"; }
}
attempt configured "$cmake" -S "$consumer" -B "$scratch/build" -G Ninja -DCMAKE_BUILD_TYPE=Release \
  -DCMAKE_PREFIX_PATH="$prefix" -DWANTED_VERSION="$version"
attempt built "$cmake" --build "$scratch/build"
answer=$("$scratch/build/consumer" "$model") || fail "the user's program gave status $?, having said: $answer"
[[ $answer == "gaskettle $version" ]] || fail "the user's program said: $answer"

"$prefix/bin/gaskettle" --help > "$scratch/log" 2>&1 || { cat "$scratch/log" >&2; fail "the installed program fails"; }
rm -rf "$scratch"
