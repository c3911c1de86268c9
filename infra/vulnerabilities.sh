#!/usr/bin/env bash
# Looks for known vulnerabilities in what the programs and tests call. The database is built from the reports that the module
# golang.org/x/vulndb carries, in the version pinned in infra/vulndb.mod; the public database need not be reached.
set -euo pipefail
cd "$(dirname "$0")/.."
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
module=golang.org/x/vulndb
go mod download -modfile=infra/vulndb.mod "$module"
go list -modfile=infra/vulndb.mod -m -f 'reports: {{.Path}} {{.Version}}' "$module"
reports=$(go list -modfile=infra/vulndb.mod -m -f '{{.Dir}}' "$module")/data/osv
go tool -modfile=infra/vulndb.mod indexdb -vulns "$reports" -out "$work/db"
[ "$(ls "$work/db/ID" | wc -l)" -gt 4000 ] || { echo 'the database is not whole'; exit 1; }
status=0
go tool -modfile=infra/tools.mod govulncheck -db "file://$work/db" -test ./... >"$work/found" || status=$?
case $status in
0 | 3) grep -E '^Vulnerability|Found in|Fixed in|^No vuln|^Your code|^This scan|^vulnerabilities' "$work/found" ;; # 3: there are findings
*) cat "$work/found"; exit "$status" ;;
esac
sed -n 's/^Vulnerability #[0-9]*: //p' "$work/found" | sort >"$work/called"
sed 's/ *#.*//; /^$/d' infra/vulnerabilities.txt | sort >"$work/accepted"
if [ "$status" -eq 3 ] && [ ! -s "$work/called" ]; then echo 'the findings cannot be read'; exit 1; fi
new=$(comm -23 "$work/called" "$work/accepted")
[ -z "$new" ] || { printf 'not in infra/vulnerabilities.txt:\n%s\n' "$new"; exit 1; }
gone=$(comm -13 "$work/called" "$work/accepted" | tr '\n' ' ')
[ -z "$gone" ] || echo "no longer found with this Go: $gone"
