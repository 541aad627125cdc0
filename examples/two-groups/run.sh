#!/usr/bin/env bash
# Two made-up tea houses, seven tasters each: all C(14,7) = 3,432 label swaps.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
ls ../demo/study/taster-*.nii.gz | awk 'BEGIN { print "image\thouse" } { print $1 "\t" (NR % 2 ? "valley" : "hill") }' > study.tsv
permute test --study study.tsv --effect house --levels valley,hill --out run
