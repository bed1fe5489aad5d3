#!/bin/sh
# Sets up and runs every check. Ends with a line of counts.
#
#   sh cmd/verify.sh [--long]
#
# --long adds fuzzing, soak and size runs.
set -eu
cd "$(dirname "$0")/.."
. cmd/setup.sh

LONG=""
[ "${1:-}" = --long ] && LONG=1
[ -z "${1:-}" ] || [ "$1" = --long ] || stop "unknown option $1; the only one is --long"

STATICCHECK=honnef.co/go/tools/cmd/staticcheck@v0.8.2
GOVULNCHECK=golang.org/x/vuln/cmd/govulncheck@v1.9.0
PACKAGES="./... ./testdata"
GOROUTINES="./gui/session ./bosehubbard/figure ./bosehubbard/passage ./bosehubbard/gutzwiller ./bosehubbard/exact ./bosehubbard/thermo ./bosehubbard/fock ./bosehubbard/num/... ./cmd/hilltop-batch"

logs=$(mktemp -d)
trap 'rm -rf "$logs"' EXIT
began=$(date +%s)
step() { say "[$(($(date +%s) - began)) s] $*"; }

step "setting up"
need_go
need_headers
# shellcheck disable=SC2086
if is_debian; then install $WINDOW_TOOLS; fi

step "gofmt"
unformatted=$(gofmt -l assets bosehubbard cmd gui testdata)
[ -z "$unformatted" ] || stop "not formatted: $unformatted"

step "go mod tidy"
go mod tidy -diff

step "go vet"
# shellcheck disable=SC2086
go vet $PACKAGES

step "staticcheck"
# shellcheck disable=SC2086
go run "$STATICCHECK" $PACKAGES

step "govulncheck"
code=0
go run "$GOVULNCHECK" ./... >"$logs/vuln" 2>&1 || code=$?
if [ "$code" -eq 3 ]; then
	cat "$logs/vuln"
	stop "known vulnerabilities are reached"
elif grep -q 'fetching vulnerabilities' "$logs/vuln"; then
	say "govulncheck is left out: its database does not answer from here"
elif [ "$code" -ne 0 ]; then
	cat "$logs/vuln"
	stop "govulncheck failed"
fi
rm "$logs/vuln"

run() {
	name=$1
	shift
	step "$name"
	if ! "$@" -v >"$logs/$name" 2>&1; then
		grep -E -A 30 '^\s*--- FAIL|^panic|^FAIL|^#|WARNING: DATA RACE' "$logs/$name" | head -n 200
		failed=1
	fi
}

failed=""
# The pages need no C and no display; only the program does.
# shellcheck disable=SC2086
run tests env CGO_ENABLED=0 go test $(go list $PACKAGES | grep -v '/cmd/hilltop$')
# shellcheck disable=SC2086
run race env CGO_ENABLED=1 go test -race -short $GOROUTINES

step "cross-builds of the batch program"
for target in linux/amd64 linux/arm64 windows/amd64 windows/arm64 darwin/amd64 darwin/arm64; do
	CGO_ENABLED=0 GOOS=${target%/*} GOARCH=${target#*/} go build -trimpath -o "$logs/batch" ./cmd/hilltop-batch ||
		stop "cross-build for $target failed"
done

if command -v xvfb-run >/dev/null 2>&1; then
	# The display keeps its pixels in a file, from which the tests read when one changes.
	mkdir "$logs/display"
	run window env HILLTOP_WINDOW=1 HILLTOP_FRAMEBUFFER="$logs/display/Xvfb_screen0" LANG=C.UTF-8 \
		xvfb-run -a -s "-screen 0 1440x900x24 -fbdir $logs/display" go test -count=1 -timeout 20m ./cmd/hilltop
else
	say "no xvfb-run on this system: the real-window test is left out"
fi

if [ -n "$LONG" ]; then
	step "fuzzing, one minute a target"
	for package in $(go list $PACKAGES); do
		for target in $(go test -list '^Fuzz' "$package" | grep '^Fuzz' || true); do
			run "fuzz-$target" go test -run '^$' -fuzz "^$target\$" -fuzztime 60s "$package"
		done
	done
	run long env HILLTOP_LONG=1 CGO_ENABLED=0 go test -timeout 60m $(go list $PACKAGES | grep -v '/cmd/hilltop$')
fi

count() { cat "$logs"/* 2>/dev/null | grep -a -c "^ *--- $1" || true; }
step "done"
printf '%s passed, %s failed, %s skipped\n' "$(count PASS)" "$(count FAIL)" "$(count SKIP)"
[ -z "$failed" ] && [ "$(count FAIL)" -eq 0 ]
