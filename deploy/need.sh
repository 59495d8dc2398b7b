# Sourced by start.sh and tests/run.sh: finds what the machine lacks and installs it where it can.
# Debian and its relatives are served by apt (as root, or by sudo); elsewhere the message says what to install.

say() { printf '%s\n' "$*"; }

apt_updated=0
apt_install() {
  local as=()
  if [ "$(id -u)" -ne 0 ]; then
    command -v sudo >/dev/null 2>&1 || return 1
    as=(sudo)
  fi
  command -v apt-get >/dev/null 2>&1 || return 1
  if [ "$apt_updated" -eq 0 ]; then
    say "Refreshing the list of packages."
    "${as[@]}" apt-get -q=2 update </dev/null || return 1
    apt_updated=1
  fi
  say "Installing $*."
  "${as[@]}" env DEBIAN_FRONTEND=noninteractive apt-get -q=2 install -y --no-install-recommends "$@" </dev/null >/dev/null
}

need_dotnet() {
  if command -v dotnet >/dev/null 2>&1 && dotnet --list-sdks 2>/dev/null | grep -q '^10\.'; then
    return 0
  fi
  apt_install dotnet-sdk-10.0 || true
  if ! command -v dotnet >/dev/null 2>&1 || ! dotnet --list-sdks 2>/dev/null | grep -q '^10\.'; then
    say "The .NET 10 SDK is missing, and this machine's packages do not have it. Install it from the .NET download page, put 'dotnet' on the PATH, and run this again." >&2
    return 1
  fi
}

postgres_bin() {
  local candidate
  if [ -n "${RESPONSELEDGER_POSTGRES_BIN:-}" ] && [ -x "$RESPONSELEDGER_POSTGRES_BIN/initdb" ] && [ -x "$RESPONSELEDGER_POSTGRES_BIN/postgres" ]; then
    printf '%s\n' "$RESPONSELEDGER_POSTGRES_BIN"
    return 0
  fi
  for candidate in $(ls -d /usr/lib/postgresql/*/bin 2>/dev/null | sort -t/ -k5,5nr); do
    if [ -x "$candidate/initdb" ] && [ -x "$candidate/postgres" ]; then
      printf '%s\n' "$candidate"
      return 0
    fi
  done
  candidate=$(command -v postgres 2>/dev/null) || candidate=""
  if [ -n "$candidate" ] && [ -x "$(dirname "$candidate")/initdb" ]; then
    dirname "$candidate"
    return 0
  fi
  return 1
}

need_postgres() {
  postgres_bin >/dev/null && return 0
  apt_install postgresql || true
  if ! postgres_bin >/dev/null; then
    say "PostgreSQL 15 or newer (its server programs, not only psql) is missing. Install it, for example 'apt-get install postgresql', or set ConnectionStrings__Ledger to a PostgreSQL of your own." >&2
    return 1
  fi
}

# For the checks of the pages alone; the server needs no Node.js.
need_node() {
  local major
  major=$(node --version 2>/dev/null | sed 's/^v\([0-9]*\).*/\1/')
  if [ "${major:-0}" -ge 18 ] && command -v npm >/dev/null 2>&1; then
    return 0
  fi
  apt_install nodejs npm || true
  major=$(node --version 2>/dev/null | sed 's/^v\([0-9]*\).*/\1/')
  if [ "${major:-0}" -lt 18 ] || ! command -v npm >/dev/null 2>&1; then
    say "Node.js 18 or newer with npm is missing: the checks of the pages need it. Install it, for example 'apt-get install nodejs npm'." >&2
    return 1
  fi
}
