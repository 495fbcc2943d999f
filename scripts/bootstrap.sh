#!/bin/sh
# Set-up before `npm start` and `npm test`: needs only sh and node. Says what it does, skips what is done,
# may be repeated and interrupted at any point.
#   sh scripts/bootstrap.sh start|test
set -eu
purpose=${1:-start}
cd "$(dirname "$0")/.."

say() { printf 'set-up: %s\n' "$*"; }
stop() { printf 'set-up stopped: %s\n' "$*" >&2; exit 1; }

node_major=$(node -p 'process.versions.node.split(".")[0]' 2>/dev/null) || stop "Node.js is missing. Install Node 20 and try again."
[ "$node_major" = 20 ] || stop "this is Node $node_major; Halfline needs Node 20."

free_kib=$(df -Pk . | awk 'NR==2 {print $4}')
[ "$free_kib" -ge 1500000 ] || [ -d node_modules ] || stop "only $((free_kib / 1024)) MiB are free here; the set-up needs about 1500 MiB. Free some and try again."

# 1. Debian packages. TeX makes the PDF, bubblewrap confines it; the browser is for the tests alone.
packages="postgresql texlive-latex-base texlive-latex-recommended texlive-latex-extra texlive-pictures texlive-science texlive-fonts-recommended lmodern latexmk poppler-utils bubblewrap"
[ "$purpose" = test ] && packages="$packages chromium"
# Asked once for all: packages it never heard of are left out of the answer.
installed=" $(dpkg-query -W -f '${db:Status-Status} ${Package}\n' $packages 2>/dev/null | sed -n 's/^installed //p' | tr '\n' ' ') "
missing=
for package in $packages; do
  case $installed in *" $package "*) ;; *) missing="$missing $package" ;; esac
done
if [ -n "$missing" ]; then
  as_root=
  if [ "$(id -u)" != 0 ]; then
    command -v sudo >/dev/null 2>&1 || stop "these Debian packages are missing and there is no sudo here:$missing
Ask someone who administers this machine for:  apt-get install --no-install-recommends$missing"
    as_root=sudo
  fi
  say "installing Debian packages:$missing"
  log=$(mktemp)
  if ! { $as_root env DEBIAN_FRONTEND=noninteractive apt-get update && $as_root env DEBIAN_FRONTEND=noninteractive apt-get install -y --no-install-recommends $missing; } >"$log" 2>&1; then
    tail -n 15 "$log" >&2
    stop "apt-get could not install:$missing. Its last lines are above; is the network reachable, and is there room on the disk?"
  fi
  rm -f "$log"
fi

# 2. The npm packages of the lock file. The stamp is written last, so that a broken install is done again.
lock=$(sha256sum package-lock.json | cut -d ' ' -f 1)
if [ "$(cat node_modules/.halfline-lock 2>/dev/null || true)" != "$lock" ]; then
  say "installing npm packages (npm ci)"
  npm ci --no-fund --no-audit --loglevel=error || stop "npm ci failed; its words are above. Is the npm registry reachable?"
  printf '%s' "$lock" >node_modules/.halfline-lock
fi

# 3. The private database and the build.
exec node scripts/prepare.mjs
