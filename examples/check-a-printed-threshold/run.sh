#!/usr/bin/env bash
# Field theory and Bonferroni from figures alone: resel counts, voxels and degrees of freedom as a paper might give them.
set -euo pipefail
cd "$(dirname "$0")" && source ../common.sh
permute theory --resels 1,30,300,1000 --voxels 20000 --df 20 --direction greater --forming-p 0.001
