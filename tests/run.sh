#!/bin/sh
# Installs what the tests need (Debian packages, only those that are missing) and runs them all.
set -eu
cd "$(dirname "$0")/.."
# shellcheck disable=SC2046
sh .ci/packages $(cat .ci/build-packages .ci/test-packages)
cargo test "$@"
