#!/usr/bin/env bash
# System packages and node_modules, only where something is missing. Arguments: postgresql chromium gdal-bin
set -euo pipefail
cd "$(dirname "$0")/.."

missing=()
for package in "$@"; do
  case "$package" in
    postgresql)
      if [ -z "${POSTGRES_BIN:-}" ] && ! compgen -G "/usr/lib/postgresql/*/bin/initdb" >/dev/null && ! command -v initdb >/dev/null; then
        missing+=(postgresql)
      fi
      ;;
    chromium)
      if [ -z "${CHROMIUM_PATH:-}" ] && ! command -v chromium >/dev/null; then missing+=(chromium); fi
      ;;
    gdal-bin)
      if ! command -v ogrinfo >/dev/null; then missing+=(gdal-bin); fi
      ;;
  esac
done

if [ "${#missing[@]}" -gt 0 ]; then
  if [ "$(id -u)" = 0 ] && command -v apt-get >/dev/null; then
    echo "Installing system packages: ${missing[*]}"
    export DEBIAN_FRONTEND=noninteractive
    apt-get update -q </dev/null
    apt-get install -y -q --no-install-recommends "${missing[@]}" </dev/null
  else
    echo "This machine lacks: ${missing[*]}" >&2
    echo "Ask its administrator to run:" >&2
    echo "    apt-get update && apt-get install -y --no-install-recommends ${missing[*]}" >&2
    exit 1
  fi
fi

if ! node scripts/check-dependencies.mjs; then
  echo "Installing the packages of package-lock.json"
  npm ci --no-fund --no-audit </dev/null
fi
mkdir -p .data build
