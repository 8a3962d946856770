#!/usr/bin/env bash
# Prepares this machine, then runs one of scripts/*.mts. The last step replaces this shell, so signals reach it.
set -euo pipefail
cd "$(dirname "$0")/.."
script=$1
shift
case "$script" in
  test) bash scripts/prepare.sh postgresql chromium gdal-bin ;;
  *) bash scripts/prepare.sh postgresql ;;
esac
exec node --import tsx "scripts/$script.mts" "$@"
