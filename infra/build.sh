#!/usr/bin/env bash
# Builds the Lambda functions into archives that are the same, byte for byte, wherever and whenever they are built with the Go
# version of go.mod: no paths, no build identifiers, no times.
#
#   infra/build.sh [FOLDER]             the archives of all functions for arm64, into FOLDER (without it dist)
#   infra/build.sh --program FUNCTION OUT   one program for this machine, with the same flags, for the emulator
set -euo pipefail
cd "$(dirname "$0")/.."
functions=(check)
export CGO_ENABLED=0 GOFLAGS= GOTOOLCHAIN=local GOAMD64=v1 GOARM64=v8.0 GOEXPERIMENT=
compile() { go build -mod=readonly -tags lambda.norpc -trimpath -buildvcs=false -ldflags '-s -w -buildid=' -o "$2" "$1"; }

if [ "${1:-}" = --program ]; then
  compile "$2" "$3"
  exit
fi

out=${1:-dist}
mkdir -p "$out"
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
for f in "${functions[@]}"; do
  GOOS=linux GOARCH=arm64 compile "./functions/$f" "$work/$f"
  go run ./infra/zip "$out/$f.zip" "$work/$f"
done
(cd "$out" && sha256sum "${functions[@]/%/.zip}")
