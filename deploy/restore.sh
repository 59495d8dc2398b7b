#!/usr/bin/env bash
# Restores a backup into an empty database, and nowhere else.
#
#   deploy/restore.sh FILE "CONNECTION"       CONNECTION of the owner, to a database without tables
#
# The server's role is granted its rights again when the server starts with the owner's connection string beside its own.
set -euo pipefail
[ $# -eq 2 ] || { sed -n '2,6s/^# \{0,1\}//p' "$0"; exit 2; }
file=$1 connection=$2
tables=$(psql -AXqt -d "$connection" -c "select count(*) from pg_tables where schemaname = 'public'")
[ "$tables" -eq 0 ] || { echo "The database already has $tables tables. Restore into an empty one, so that nothing is mixed." >&2; exit 1; }
pg_restore --exit-on-error --no-owner --no-privileges --single-transaction --dbname="$connection" "$file"
psql -AXqt -d "$connection" -c "select 'runs ' || count(*) from run union all select 'ledger entries ' || count(*) from ledger_entry"
