#!/usr/bin/env bash
# Load on `desk serve` on this machine, by loopback only: what it answers at 1, 8 and 64 connections, what it does with more than it
# takes, and whether its memory stays as it is. One client address may have 16 requests under way, so more connections come from more
# loopback addresses. The load generator shares the machine with the server.
#
#   infra/load.sh [SECONDS A RUN [SECONDS OF THE MEMORY RUN]]      (without them 15 and 600; 0 leaves that run out)
set -euo pipefail
cd "$(dirname "$0")/.."
each=${1:-15} long=${2:-600}
work=$(mktemp -d)
server=
trap '[ -z "$server" ] || kill "$server" 2>/dev/null || true; rm -rf "$work"' EXIT

go build -o "$work/desk" ./functions/desk
go build -modfile=infra/tools.mod -o "$work/vegeta" github.com/tsenart/vegeta/v12
"$work/desk" serve -listen 127.0.0.1:0 -log json 2>"$work/log" >/dev/null &
server=$!
url=
for _ in $(seq 200); do
  url=$(sed -n 's/.*"url":"\([^"]*\)".*/\1/p' "$work/log" | head -n 1)
  [ -z "$url" ] || break
  sleep 0.05
done
[ -n "$url" ] || { cat "$work/log"; echo 'the server does not start'; exit 1; }
resident() { awk '/^VmRSS/ {print $2}' "/proc/$server/status"; }

printf '%s processors, %s\n' "$(nproc)" "$(sed -n 's/^model name.*: //p' /proc/cpuinfo | head -n 1)"
printf 'load before: %s\n' "$(cut -d' ' -f1-3 /proc/loadavg)"
printf 'one recipe: testdata/recipes/oat-biscuit.json in every market of the set, %s bytes\n' "$(wc -c <testdata/recipes/oat-biscuit.json)"

# attack CLIENTS CONNECTIONS SECONDS NAME: every client from an address of its own, each with its share of the connections.
attack() {
  local clients=$1 share=$(($2 / $1)) pids=() i
  printf 'POST %s/v1/check\nContent-Type: application/json\n@testdata/recipes/oat-biscuit.json\n' "$url" >"$work/target"
  for i in $(seq "$clients"); do
    "$work/vegeta" attack -targets "$work/target" -rate 0 -max-workers "$share" -workers "$share" -connections "$share" -max-body 0 \
      -laddr "127.0.0.$((i + 1))" -duration "${3}s" -timeout 30s -output "$work/$4.$i" &
    pids+=($!)
  done
  for i in "${pids[@]}"; do wait "$i"; done
}
report() {
  printf '\n== %s\n' "$2"
  "$work/vegeta" report "$work/$1".* | grep -E '^(Requests|Latencies|Success|Status)'
  printf 'Resident      %s KiB\n' "$(resident)"
}

attack 1 1 3 warm
for c in 1 8 64; do
  attack $(((c + 15) / 16)) "$c" "$each" "c$c"
  report "c$c" "$c connections"
done
attack 16 256 "$each" many
report many '256 connections of 16 clients: more than 64 requests under way are turned away with 503'
attack 1 64 "$each" greedy
report greedy '64 connections of one client: more than 16 requests under way are turned away with 429'

if [ "$long" -gt 0 ]; then
  printf '\n== memory over %s s with 8 connections, every 30 s\n' "$long"
  attack 1 8 "$long" memory &
  attacking=$!
  for _ in $(seq $((long / 30))); do
    sleep 30
    printf '%s ' "$(resident)"
  done
  echo KiB
  wait "$attacking"
  report memory "$long s"
fi
printf 'load after: %s\n' "$(cut -d' ' -f1-3 /proc/loadavg)"
