#!/usr/bin/env bash
# From a fresh clone to the first result: installs the packages, builds, sweeps the shipped river-gauge loop.
set -euo pipefail
cd "$(dirname "$0")/.."
source scripts/packages.sh

install_missing_packages
build --target annulet
echo
build/release/annulet sweep models/river-gauge-868.toml --out out "$@"
echo
echo "The files are in $PWD/out. The program is $PWD/build/release/annulet; try it with --help."
