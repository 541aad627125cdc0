#!/usr/bin/env bash
# Extents at five forming thresholds, and how often the field-theory rule breaks on relabelings of these data.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh && made_up_study
permute test --study ../demo/study/study.tsv --forming-p 0.05 0.02 0.01 0.005 0.001 --relabelings 2000 --out run
