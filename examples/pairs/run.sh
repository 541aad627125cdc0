#!/usr/bin/env bash
# The fourteen images taken as two images of seven made-up tasters: labels change places only inside a taster, 2^7 = 128 flips of the differences.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
{ printf 'image\ttaster\tcup\n'; i=0; for f in ../demo/study/taster-*.nii.gz; do printf '%s\tt%d\t%s\n' "$f" $((i / 2)) "$([ $((i++ % 2)) = 0 ] && echo first || echo second)"; done; } > study.tsv
permute test --study study.tsv --effect cup --levels second,first --exchange-inside taster --record height extent mass --out run
