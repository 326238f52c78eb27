#!/usr/bin/env bash
# The Debian package: made from the built program, looked at by Debian's own checkers, installed, used and removed.
# `bash tests/package.sh PROGRAM FOLDER`. Installing wants root; without it the package's files are unpacked instead.
set -eu -o pipefail
top=$(cd "$(dirname "$0")/.." && pwd)
program=$1
folder=$2
assets=$top/assets/package

fail() { echo "package: $*" >&2; exit 1; }

# Packed in a hurry: the test is not of the packing.
export COMPRESSION=1
package=$(bash "$assets/deb.sh" "$program" "$folder" | tail -1)
again=$(bash "$assets/deb.sh" "$program" "$folder/again" | tail -1)
if ! cmp "$package" "$again"; then
  for asked in control md5sums; do
    diff <(dpkg-deb --info "$package" "$asked") <(dpkg-deb --info "$again" "$asked") || true
  done
  diff <(dpkg-deb --contents "$package") <(dpkg-deb --contents "$again") || true
  fail "the same program gave two different packages"
fi

desktop-file-validate "$assets/crestline.desktop"
# A name by a registered domain is asked for, and the project has none.
appstreamcli validate --no-net --override=cid-desktopapp-is-not-rdns=info "$assets/crestline.metainfo.xml"
lintian --fail-on error,warning --tag-display-limit 0 "$package"

root=$(mktemp -d)
trap 'rm -rf "$root"' EXIT
dpkg-deb --extract "$package" "$root"
update-mime-database "$root/usr/share/mime" 2>/dev/null
grep -q '^application/vnd.crestline-plan+json:\*.crestline.json$' "$root/usr/share/mime/globs" \
  || fail "the kind of a plan file is not known"
for page in "$root"/usr/share/man/man1/*.gz; do
  said=$(MANWIDTH=80 man --warnings -l "$page" 2>&1 >/dev/null) || fail "$page: man cannot show it"
  [ -z "$said" ] || fail "$page: $said"
done
bash -n "$root/usr/share/bash-completion/completions/crestline"

if [ "$(id -u)" = 0 ]; then
  dpkg --install "$package" >/dev/null
  installed=/usr/bin/crestline
else
  installed=$root/usr/bin/crestline
fi
wanted=$("$program" --version)
[ "$("$installed" --version)" = "$wanted" ] || fail "the installed program is another one"
for plan in "$root"/usr/share/doc/crestline/examples/*.json; do
  "$installed" solve "$plan" | grep -q 'Total pull' || fail "the installed program does not solve $plan"
done
if [ "$(id -u)" = 0 ]; then
  dpkg --remove crestline >/dev/null
  [ ! -e /usr/bin/crestline ] || fail "the program stayed behind"
fi
echo "package $(basename "$package"): made twice alike, checked, installed, used and removed"
