#!/usr/bin/env bash
# Made-up ratings of ten teas: three columns tested at once, all 2^10 sign flips, with step-down p.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh
permute test --study ratings.tsv --variables aroma body finish --out run
