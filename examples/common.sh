# Sourced by every example: the command, and the demo's made-up study.
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
permute() { dotnet "$here/../src/Permute.Cli/bin/Release/net10.0/permute-cli.dll" "$@"; }
made_up_study() { [ -f "$here/demo/study/study.tsv" ] || permute demo --out "$here/demo" > /dev/null; }
