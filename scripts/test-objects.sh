#!/usr/bin/env bash
# Real MR objects for the tests: the test files that two of Debian's packages carry, unpacked to build/objects and not installed.
set -euo pipefail
cd "$(dirname "$0")/.."
target=build/objects
[ -e "$target/complete" ] && exit 0
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
(cd "$work" && apt-get download -o APT::Sandbox::User=root python3-pydicom python3-nibabel)
mkdir -p "$target"
for package in "$work"/*.deb; do dpkg-deb -x "$package" "$work/unpacked"; done
cp -r "$work/unpacked/usr/lib/python3/dist-packages/pydicom/data/test_files" "$target/pydicom"
cp -r "$work/unpacked/usr/lib/python3/dist-packages/nibabel/nicom/tests/data" "$target/nibabel"
find "$target" -name '*.dcm.gz' -exec gunzip -kf {} +
touch "$target/complete"
