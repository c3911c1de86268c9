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
# One line a finding: its identifier, and where the standard library's is cured the version of Go.
awk '/^Vulnerability/ {id = $3} /Fixed in:/ {sub(/.*@/, ""); print id, /^go/ ? $0 : "-"; id = ""} /^Your code/ && id {print id, "-"}' "$work/found" >"$work/called"
if [ "$status" -eq 3 ] && [ ! -s "$work/called" ]; then echo 'the findings cannot be read'; exit 1; fi
accepted=$(sed 's/ *#.*//; /^$/d' infra/vulnerabilities.txt)
waived=$(grep '^go1' <<<"$accepted" || true)
new=
while read -r id cured; do
  grep -qx "$id" <<<"$accepted" && continue
  [ "$cured" != - ] && [ -n "$waived" ] && [ "$(printf '%s\n' "$cured" "$waived" | sort -V | tail -n 1)" = "$waived" ] && continue
  new+=" $id"
done <"$work/called"
[ -z "$new" ] || { echo "neither cured nor let pass by infra/vulnerabilities.txt:$new"; exit 1; }
