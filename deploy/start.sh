#!/usr/bin/env bash
# Starts ResponseLedger: installs what is missing where it can, builds when sources are newer than the last build,
# and runs the server in the foreground as this very process. Stop it with Ctrl+C.
#
#   deploy/start.sh            with the invented demo lab
#   deploy/start.sh --empty    on the real, empty store
#
# Further arguments go to the server, such as --urls http://127.0.0.1:8080
set -euo pipefail
root=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
cd "$root"
. deploy/need.sh

arguments=()
for argument in "$@"; do
  case "$argument" in
    --empty) export RESPONSELEDGER_DEMO=0 ;;
    --help | -h) sed -n '2,8s/^# \{0,1\}//p' "$0"; exit 0 ;;
    *) arguments+=("$argument") ;;
  esac
done

need_dotnet
[ -n "${ConnectionStrings__Ledger:-}" ] || need_postgres

built=artifacts/server
stamp=$built/.built
sources=(src migrations web Directory.Build.props Directory.Packages.props global.json)
if [ ! -f "$stamp" ] || [ -n "$(find "${sources[@]}" \( -name bin -o -name obj -o -name node_modules \) -prune -o -type f -newer "$stamp" -print -quit)" ]; then
  say "Building. The first time takes a minute or two."
  started=$(mktemp)
  export DOTNET_CLI_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1
  dotnet publish src/ResponseLedger.Server -c Release -o "$built" -v quiet
  # The stamp carries the time before the build, so that what was edited meanwhile is built next time.
  touch -r "$started" "$stamp"
  rm -f "$started"
fi

exec dotnet "$built/ResponseLedger.Server.dll" "${arguments[@]}"
