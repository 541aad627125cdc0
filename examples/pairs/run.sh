#!/usr/bin/env bash
# The fourteen images taken as two images of seven made-up tasters: labels change places only inside a taster, 2^7 = 128 flips of the differences.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
ls ../demo/study/taster-*.nii.gz |
  awk 'BEGIN { print "image\ttaster\tcup" } { print $1 "\tt" int((NR + 1) / 2) "\t" (NR % 2 ? "first" : "second") }' > study.tsv
permute test --study study.tsv --effect cup --levels second,first --exchange-inside taster --record height extent mass --out run
