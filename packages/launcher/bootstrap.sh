#!/bin/sh
# Brings a machine with nothing but the checkout as far as Node can take over:
#   sh packages/launcher/bootstrap.sh start|test [arguments]
# Plain POSIX shell, since nothing is installed yet.
set -eu

cd "$(dirname "$0")/../.."
task=${1:-}
case $task in
  start | test) shift ;;
  *) echo 'usage: bootstrap.sh start|test [arguments]' >&2; exit 2 ;;
esac

complain() {
  echo "Fieldfare: $*" >&2
  exit 1
}

command -v node >/dev/null 2>&1 || complain 'Node 20 is not installed.'
case $(node --version) in
  v20.*) ;;
  *) complain "Node 20 is needed; this is $(node --version)." ;;
esac

has() {
  command -v "$1" >/dev/null 2>&1
}

has_postgres() {
  for program in /usr/lib/postgresql/*/bin/postgres; do
    [ -x "$program" ] && return 0
  done
  return 1
}

needed=
has_postgres || needed="$needed postgresql"
has redis-server || needed="$needed redis-server"
has ffmpeg || needed="$needed ffmpeg"
if [ "$task" = test ]; then
  has chromium || needed="$needed chromium"
  has pdftotext || needed="$needed poppler-utils"
fi
# Speaks over the demo's music; the demo does without where it is missing.
wished=
has espeak-ng || wished=' espeak-ng'

install() {
  # shellcheck disable=SC2086 -- the list is meant to be split into words
  DEBIAN_FRONTEND=noninteractive apt-get -o DPkg::Lock::Timeout=300 -qq -y --no-install-recommends install $1 \
    </dev/null
}

if [ -n "$needed$wished" ] && [ "$(id -u)" -eq 0 ] && has apt-get; then
  echo "Installing the Debian packages$needed$wished"
  log=$(mktemp)
  if ! install "$needed$wished" >"$log" 2>&1; then
    # The usual reason is a package list that is missing or old.
    apt-get -o DPkg::Lock::Timeout=300 -qq update </dev/null >>"$log" 2>&1 || true
    if ! install "$needed$wished" >>"$log" 2>&1 && { [ -z "$needed" ] || ! install "$needed" >>"$log" 2>&1; }; then
      tail -n 5 "$log" >&2
      rm -f "$log"
      [ -z "$needed" ] || complain "these Debian packages could not be installed:$needed"
    fi
  fi
  rm -f "$log"
elif [ -n "$needed" ]; then
  complain "these Debian packages are missing:$needed (as root: apt-get install$needed)"
elif [ -n "$wished" ]; then
  echo "The Debian package$wished is missing; the demo goes without speech."
fi

if ! node packages/launcher/packages-installed.js; then
  echo 'Installing the npm packages'
  npm ci --include=dev --no-audit --no-fund --loglevel=error </dev/null ||
    complain 'npm ci failed; its message is above.'
fi

# exec, so that a signal to this process is a signal to Fieldfare.
exec node --import tsx "packages/launcher/src/$task.ts" "$@"
