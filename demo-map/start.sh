#!/bin/sh
# Installs what the build needs (Debian packages, only those that are missing), builds the program and runs the
# whole job on the invented area in this folder. The results appear in demo-map/out/.
set -eu
cd "$(dirname "$0")/.."
# shellcheck disable=SC2046
sh .ci/packages $(cat .ci/build-packages)
cargo build --release
./target/release/homocline run demo-map/area.toml "$@"
