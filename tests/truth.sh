#!/usr/bin/env bash
# The long simulations: field theory against an independent table in every setting, on all processors. Some minutes.
set -euo pipefail
cd "$(dirname "$0")/.."
PERMUTE_TRUTH=all dotnet test -c Release tests/Permute.Tests --filter "FullyQualifiedName~SimulationTests" --logger "console;verbosity=detailed"
