# shellcheck shell=bash disable=SC2015
# Shared means of the scripts in this folder, to be sourced: saying things, timed steps, and installing what is missing
# on Debian and Ubuntu. Installing asks for sudo where the person is not root, and says what it is about to do.

root=$(cd "$(dirname "${BASH_SOURCE[0]}")/../.." && pwd)
cd "$root" || exit 1

skipped=()

say() { printf '%s\n' "$*"; }

# Ends the script with a plain sentence.
stop() { printf '\n%s\n' "$*" >&2; exit 1; }

# A check that cannot be made here. It is said at once and again at the end, so that nobody takes it for made.
skip() {
  skipped+=("$*")
  say "SKIPPED: $*"
}

# step NAME COMMAND…: runs it, prints how long it took, and ends the script where it fails.
step() {
  local name=$1 began=$SECONDS
  shift
  say ""
  say "== $name"
  "$@" || stop "$name: failed after $((SECONDS - began)) s."
  say "== $name: $((SECONDS - began)) s"
}

# The oldest Rust that builds this, as Cargo.toml states it.
need_rust() {
  local wanted found
  wanted=$(sed -n 's/^rust-version = "\(.*\)"$/\1/p' Cargo.toml)
  [ -d "$HOME/.cargo/bin" ] && PATH=$PATH:$HOME/.cargo/bin
  command -v cargo > /dev/null && command -v rustc > /dev/null ||
    stop "Rust is missing. Install it from rustup.rs, $wanted or newer, then run this again."
  found=$(rustc --version | cut -d' ' -f2)
  [ "$(printf '%s\n%s\n' "$wanted" "$found" | sort -V | head -n 1)" = "$wanted" ] ||
    stop "Rust $found is too old; $wanted or newer is needed. With rustup: rustup update stable"
}

as_root() {
  if [ "$(id -u)" = 0 ]; then
    "$@"
  elif command -v sudo > /dev/null; then
    sudo "$@"
  else
    stop "Packages are missing, and there is no sudo to install them with: run as root: $*"
  fi
}

installed() { [ "$(dpkg-query --show --showformat='${db:Status-Status}' "$1" 2> /dev/null)" = installed ]; }

# need_packages NAME…: installs those of them that are not there. Elsewhere than on Debian and Ubuntu it only names them.
need_packages() {
  local missing=() name
  if ! command -v dpkg-query > /dev/null || ! command -v apt-get > /dev/null; then
    say "Not Debian or Ubuntu: what these packages hold must be there already: $*"
    return
  fi
  for name in "$@"; do
    installed "$name" || missing+=("$name")
  done
  [ ${#missing[@]} -gt 0 ] || return 0
  say "Installing Debian packages: ${missing[*]}"
  if [ -z "${lists_are_fresh:-}" ]; then
    as_root apt-get update -qq || say "The package lists could not be renewed; trying with the old ones."
    lists_are_fresh=yes
  fi
  as_root env DEBIAN_FRONTEND=noninteractive apt-get install -qq -y --no-install-recommends "${missing[@]}" \
    > /dev/null ||
    stop "These packages could not be installed: ${missing[*]}"
}

# SQLite is compiled from source with the app.
need_compiler() {
  command -v cc > /dev/null || need_packages gcc libc6-dev
}

# What the window is built against.
need_window() {
  need_compiler
  pkg-config --exists webkit2gtk-4.1 2> /dev/null || need_packages pkg-config libwebkit2gtk-4.1-dev
}

# A rustup component or target that may be missing. Fails where it cannot be had.
need_rustup() {
  local kind=$1 name=$2
  command -v rustup > /dev/null || return 1
  rustup "$kind" list | grep -q "^$name.*(installed)" || timeout 300 rustup "$kind" add "$name"
}
