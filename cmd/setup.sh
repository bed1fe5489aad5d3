# Sourced by start.sh and verify.sh: finds or installs what a machine needs.
# Everything a script of this project needs beyond the base system stands here.

GO_LEAST=21 # Go 1.21 and newer fetch the toolchain that go.mod names by themselves
HEADERS="gcc libc6-dev libgl1-mesa-dev xorg-dev libxkbcommon-dev libwayland-dev"
WINDOW_TOOLS="xvfb xauth xdotool x11-utils imagemagick libgl1-mesa-dri"

say() { printf '%s\n' "hilltop: $*"; }

stop() {
	say "$*" >&2
	exit 1
}

as_root() {
	if [ "$(id -u)" -eq 0 ]; then
		"$@"
	elif command -v sudo >/dev/null 2>&1; then
		sudo "$@"
	else
		stop "need to install packages ($*) but this is not root and there is no sudo"
	fi
}

# missing PACKAGE...: prints those that dpkg does not have installed.
missing() {
	for package in "$@"; do
		state=$(dpkg-query -W -f '${db:Status-Status}' "$package" 2>/dev/null || true)
		[ "$state" = installed ] || printf '%s ' "$package"
	done
}

# install PACKAGE...: installs the missing ones; does nothing where none is.
install() {
	wanted=$(missing "$@")
	[ -n "$wanted" ] || return 0
	say "installing $wanted"
	as_root env DEBIAN_FRONTEND=noninteractive apt-get update -qq
	# shellcheck disable=SC2086
	as_root env DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends $wanted >/dev/null
}

is_debian() { [ "$(uname -s)" = Linux ] && command -v apt-get >/dev/null 2>&1 && command -v dpkg-query >/dev/null 2>&1; }

# go_new_enough: succeeds where go is there and not older than 1.$GO_LEAST.
go_new_enough() {
	command -v go >/dev/null 2>&1 || return 1
	minor=$(GOTOOLCHAIN=local go env GOVERSION | sed -n 's/^go1\.\([0-9]*\).*/\1/p')
	[ "${minor:-0}" -ge "$GO_LEAST" ]
}

need_go() {
	go_new_enough && return 0
	is_debian && install golang-go ca-certificates || true
	go_new_enough || stop "needs Go 1.$GO_LEAST or newer on the PATH (go.mod then fetches its own toolchain): https://go.dev/dl"
}

# need_headers: the C side of the window.
need_headers() {
	if is_debian; then
		# shellcheck disable=SC2086
		install $HEADERS
		return 0
	fi
	command -v cc >/dev/null 2>&1 || stop "needs a C compiler for the window; on macOS run xcode-select --install, on Windows install a MinGW-w64 gcc (README.md, section Windows and macOS)"
	[ "$(uname -s)" != Linux ] && return 0
	printf '#include <GL/gl.h>\n#include <X11/Xlib.h>\n#include <X11/extensions/Xrandr.h>\n' | cc -E - >/dev/null 2>&1 ||
		stop "needs the C headers of OpenGL and X11 (on Debian: $HEADERS); install your system's packages of them and run this again"
}
