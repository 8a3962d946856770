#!/usr/bin/env bash
# Format, lint, types and unit tests: what to run before every commit.
set -euo pipefail
cd "$(dirname "$0")/.."
npx prettier --check .
npx eslint .
npx next typegen >/dev/null
npx tsc --noEmit
npx vitest run --project unit --project components
