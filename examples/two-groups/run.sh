#!/usr/bin/env bash
# Two made-up tea houses, seven tasters each: all C(14,7) = 3,432 label swaps.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
{ printf 'image\thouse\n'; i=0; for f in ../demo/study/taster-*.nii.gz; do printf '%s\t%s\n' "$f" "$([ $((i++ % 2)) = 0 ] && echo valley || echo hill)"; done; } > study.tsv
permute test --study study.tsv --effect house --levels valley,hill --out run
