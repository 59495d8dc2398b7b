#!/usr/bin/env bash
# Runs every check of the project and ends with one line: N passed, N failed, N skipped.
#
#   tests/run.sh                    everything; what needs a container engine is skipped where there is none
#   tests/run.sh --all              as CI runs it: what is missing is installed, and nothing may be skipped
#   tests/run.sh Engine.Tests ...   only these test projects; "web" is the pages
set -uo pipefail
root=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
cd "$root"
. deploy/need.sh

all=0
only=()
for argument in "$@"; do
  case "$argument" in
    --all) all=1 ;;
    --help | -h) sed -n '2,6s/^# \{0,1\}//p' "$0"; exit 0 ;;
    *) only+=("$argument") ;;
  esac
done

export DOTNET_CLI_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1
[ "$all" -eq 1 ] && export RESPONSELEDGER_TEST_REQUIRE=1
passed=0 failed=0 skipped=0
results=$root/TestResults
rm -rf "$results"
mkdir -p "$results"
began=$SECONDS

check() { # a check of the whole tree that either holds or does not
  local name=$1 log=$results/check-$((passed + failed)).log
  shift
  if "$@" >"$log" 2>&1; then
    passed=$((passed + 1))
    say "ok      $name"
  else
    failed=$((failed + 1))
    say "FAILED  $name"
    tail -n 60 "$log"
  fi
}

count() { # adds up the counters of one result file
  local file=$1 counters executed ok bad total
  counters=$(grep -o '<Counters [^>]*>' "$file" 2>/dev/null | head -n 1)
  if [ -z "$counters" ]; then
    failed=$((failed + 1))
    return
  fi
  total=$(sed 's/.* total="\([0-9]*\)".*/\1/' <<<"$counters")
  executed=$(sed 's/.* executed="\([0-9]*\)".*/\1/' <<<"$counters")
  ok=$(sed 's/.* passed="\([0-9]*\)".*/\1/' <<<"$counters")
  bad=$((executed - ok))
  passed=$((passed + ok))
  failed=$((failed + bad))
  skipped=$((skipped + total - executed))
  if [ "$total" -eq 0 ]; then
    failed=$((failed + 1))
  fi
}

run_tests() { # project, label, environment...
  local project=$1 label=$2 since=$SECONDS
  shift 2
  local name=${project}-${label}
  env "$@" dotnet test "tests/ResponseLedger.$project" -c Release --no-build --nologo \
    --logger "trx;LogFileName=$results/$name.trx" >"$results/$name.log" 2>&1
  local status=$?
  local before=$failed
  count "$results/$name.trx"
  if [ "$status" -ne 0 ] && [ "$failed" -eq "$before" ]; then
    failed=$((failed + 1))
  fi
  if [ "$failed" -gt "$before" ]; then
    say "FAILED  $project ($label)"
    grep -vE '^\s*$' "$results/$name.log" | tail -n 120
  else
    say "ok      $project ($label), $((SECONDS - since)) s"
  fi
}

wanted() { [ ${#only[@]} -eq 0 ] || [[ " ${only[*]} " == *" $1 "* ]]; }

finish() {
  say "Took $((SECONDS - began)) s."
  say "$passed passed, $failed failed, $skipped skipped"
  [ "$failed" -eq 0 ]
  exit
}

run_node_tests() { # counts every test of tests/web
  local log=$results/web.log before=$failed ok bad left
  # The files are named one by one: what Node.js makes of a folder differs between its versions.
  (cd tests/web && find . -name node_modules -prune -o -name '*.test.js' -print0 | sort -z | xargs -0 node --test --test-reporter=tap) >"$log" 2>&1
  ok=$(sed -n 's/^# pass \([0-9]*\)$/\1/p' "$log" | tail -n 1)
  bad=$(sed -n 's/^# fail \([0-9]*\)$/\1/p' "$log" | tail -n 1)
  left=$(sed -n -E 's/^# (skipped|todo|cancelled) ([0-9]*)$/\2/p' "$log" | paste -sd+ | sed 's/^$/0/')
  passed=$((passed + ${ok:-0}))
  failed=$((failed + ${bad:-0}))
  skipped=$((skipped + left))
  if [ "${ok:-0}" -eq 0 ] || [ -z "$bad" ]; then
    failed=$((failed + 1))
  fi
  if [ "$failed" -gt "$before" ]; then
    say "FAILED  web"
    grep -vE '^ +(---|\.\.\.|duration_ms|type:)' "$log" | tail -n 120
  else
    say "ok      web, ${ok} tests"
  fi
}

check_web() {
  check "packages of tests/web" npm --prefix tests/web ci --no-fund --no-audit
  run_node_tests
  check "types of the pages" npm --prefix tests/web run --silent types
  check "vendored copies are those of their packages" npm --prefix tests/web run --silent vendor:check
}

if [ ${#only[@]} -eq 0 ] || wanted web; then
  if need_node; then check_web; else failed=$((failed + 1)); fi
  [ "${only[*]}" = web ] && finish
fi

need_dotnet && need_postgres || { failed=1; finish; }

say "Restoring and building."
before_build=$failed
check "restore from the lock files" dotnet restore --locked-mode
check "build without a warning" dotnet build --no-restore -c Release -v quiet
[ "$failed" -eq "$before_build" ] || finish

if [ ${#only[@]} -eq 0 ]; then
  check "formatted as .editorconfig says" dotnet format --no-restore --verify-no-changes
  check "tools of the manifest" dotnet tool restore
  check "no pending change of the model" dotnet ef migrations has-pending-model-changes \
    --project migrations/ResponseLedger.Migrations --no-build --configuration Release
fi

for project in House.Tests Engine.Tests Formats.Tests Ledger.Tests Records.Tests; do
  wanted $project && run_tests $project local RESPONSELEDGER_TEST_DATABASE=local
done
for project in Store.Tests Server.Tests Bench.Tests; do
  wanted $project && run_tests $project local RESPONSELEDGER_TEST_DATABASE=local
done

if wanted Store.Tests; then
  if [ "$all" -eq 1 ]; then
    if bash tests/container-image.sh >"$results/container-image.log" 2>&1; then
      run_tests Store.Tests container RESPONSELEDGER_TEST_DATABASE=container \
        RESPONSELEDGER_TEST_IMAGE=responseledger-postgres:15 RESPONSELEDGER_TEST_IMAGE_LOCAL=1 \
        DOCKER_API_VERSION=1.41 TESTCONTAINERS_RYUK_DISABLED=true
    else
      failed=$((failed + 1))
      say "FAILED  container engine and image"
      tail -n 40 "$results/container-image.log"
    fi
  else
    run_tests Store.Tests container RESPONSELEDGER_TEST_DATABASE=container
  fi
fi

if [ ${#only[@]} -eq 0 ]; then
  check "benchmarks in their short form" dotnet run --project tests/ResponseLedger.Benchmarks -c Release --no-build -- --short
  grep -E '^\|' "$results"/check-*.log 2>/dev/null | sed 's/^[^|]*|/|/' || true
fi

finish
