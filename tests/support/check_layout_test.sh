#!/usr/bin/env bash
# SPDX-License-Identifier: Apache-2.0
# Plants one breach at a time in a copy of the tree and asks whether tools/check-layout names it.
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/../.."

tree=$(mktemp -d)
trap 'rm -rf "$tree"' EXIT
head_lines='// SPDX-License-Identifier: Apache-2.0
// A planted file.'

fresh() { # a small tree that obeys every rule
  find "$tree" -mindepth 1 -delete
  mkdir -p "$tree"/{src/{math,field,trace,plate,specimen,app},shaders_cpu/tone,tests/field,tools,scenes,cmake}
  cp DEVELOPERS.md CMakeLists.txt README.md LICENSE CMakePresets.json .gitignore "$tree"
  printf '%s\n#include "math/vec.h"\n' "$head_lines" >"$tree/src/field/length.h"
  printf '%s\n#include "field/length.h"\n#include <cmath>\n' "$head_lines" >"$tree/src/field/length.cpp"
  printf '%s\n#include <embree3/rtcore.h>\n' "$head_lines" >"$tree/src/trace/embree_scene.cpp"
}

faults=0
expect() { # WORDS: the check fails and its message holds the words
  local said
  if said=$(tools/check-layout "$tree" 2>&1); then
    echo "not noticed: $1" >&2
    faults=$((faults + 1))
  elif ! grep -qF -- "$1" <<<"$said"; then
    printf 'noticed, but without the words "%s":\n%s\n' "$1" "$said" >&2
    faults=$((faults + 1))
  fi
}

fresh
tools/check-layout "$tree" || faults=$((faults + 1))

fresh
printf '%s\n#include "plate/image_file.h"\n' "$head_lines" >"$tree/src/field/length.h"
expect "src/field/length.h:3: field may not include plate/image_file.h"

fresh
printf '%s\n#include "../plate/image_file.h"\n' "$head_lines" >"$tree/src/field/length.h"
expect "src/field/length.h:3: include ../plate/image_file.h from src/, not by a relative path"

fresh
printf '%s\n#include <embree4/rtcore.h>\n' "$head_lines" >"$tree/src/trace/march.cpp"
expect "src/trace/march.cpp:3: embree4/rtcore.h comes in only by src/trace/embree_*"

fresh
printf '%s\n#include <toml++/toml.h>\n' "$head_lines" >"$tree/src/app/run.cpp"
expect "src/app/run.cpp:3: toml++/toml.h comes in only by src/specimen/*"

fresh
printf '%s\n#include <zlib.h>\n' "$head_lines" >"$tree/src/plate/pack.cpp"
expect "src/plate/pack.cpp:3: zlib.h is neither the standard library nor in the table of third parties"

fresh
printf '%s\n#include "field/length.h"\n' "$head_lines" >"$tree/shaders_cpu/tone/curve.h"
expect "shaders_cpu/tone/curve.h:3: shaders_cpu may not include field/length.h"

fresh
printf '// A planted file.\nint x;\n' >"$tree/src/field/length.cpp"
expect "src/field/length.cpp:1: the licence line is missing"

fresh
printf '// SPDX-License-Identifier: Apache-2.0\nint x;\n' >"$tree/src/field/length.cpp"
expect "src/field/length.cpp:2: the line that says what the file is for is missing"

fresh
{ echo "$head_lines" && seq -f '// line %g' 399; } >"$tree/src/field/length.cpp"
expect "src/field/length.cpp: 401 lines, 400 are allowed"

fresh
mkdir "$tree/src/utils"
printf '%s\n' "$head_lines" >"$tree/src/utils/string.h"
expect "src/utils: no such stage in the table of DEVELOPERS.md"

fresh
mkdir "$tree/notes"
expect "notes: not among the entries that the top level may have"

fresh
printf '%s\n' "${head_lines//\/\//#}" >"$tree/cmake/more.cmake"
sed -i '1d' "$tree/cmake/more.cmake"
expect "cmake/more.cmake:1: the licence line is missing"

[ "$faults" -eq 0 ]
