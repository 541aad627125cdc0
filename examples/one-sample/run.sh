#!/usr/bin/env bash
# The first eight tasters only: 2^8 = 256 sign flips. preview says beforehand what so few can reach.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
permute preview --images ../demo/study/taster-0[1-8]_*.nii.gz
permute test --images ../demo/study/taster-0[1-8]_*.nii.gz --out run
