#!/bin/sh
# Sets up and opens Hilltop on the demo plan, or on the plan given. Without a
# display it prints the verdict instead. A second run changes nothing.
#
#   sh cmd/start.sh [PLAN.json]
set -eu
plan=""
case ${1:-} in
-*)
	echo "usage: sh cmd/start.sh [PLAN.json]" >&2
	exit 2
	;;
esac
if [ -n "${1:-}" ]; then # a relative path counts from where the user stands
	case $1 in
	/*) plan=$1 ;;
	*) plan=$PWD/$1 ;;
	esac
fi
cd "$(dirname "$0")/.."
. cmd/setup.sh

if [ -z "${DISPLAY:-}${WAYLAND_DISPLAY:-}" ] && [ "$(uname -s)" = Linux ]; then
	need_go
	say "no display (neither DISPLAY nor WAYLAND_DISPLAY is set): printing the verdict instead of opening the window" >&2
	CGO_ENABLED=0 go build -trimpath -o bin/hilltop-batch ./cmd/hilltop-batch
	exec bin/hilltop-batch judge "${plan:-assets/plans/skerry-demo.json}"
fi

need_go
need_headers
[ -x bin/hilltop ] || say "building the window; the first build takes some minutes"
CGO_ENABLED=1 go build -trimpath -o bin/hilltop ./cmd/hilltop
exec bin/hilltop ${plan:+"$plan"}
