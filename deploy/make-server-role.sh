#!/bin/bash
# Runs once, when the container's store is first made: the role that the server signs in with, which owns nothing.
set -euo pipefail
psql -v ON_ERROR_STOP=1 --username "$POSTGRES_USER" --dbname "$POSTGRES_DB" -v password="$SERVER_PASSWORD" <<'SQL'
create role responseledger_server login password :'password';
SQL
