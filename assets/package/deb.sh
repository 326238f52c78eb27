#!/usr/bin/env bash
# Makes a Debian package of a built program: `bash assets/package/deb.sh PROGRAM FOLDER` writes
# FOLDER/crestline_VERSION_ARCHITECTURE.deb and prints its name. It needs dpkg-deb, objdump, strip and gzip, and cargo for
# the manual page and the shell completions. The same program gives the same bytes.
set -eu -o pipefail
here=$(cd "$(dirname "$0")" && pwd)
top=$(cd "$here/../.." && pwd)
program=$(realpath "$1")
folder=$2

version=$("$program" --version | cut -d' ' -f2)
architecture=$(dpkg --print-architecture)
# The day of the newest change, so that the package does not depend on the clock.
export SOURCE_DATE_EPOCH=${SOURCE_DATE_EPOCH:-$(git -C "$top" log -1 --format=%ct 2>/dev/null || stat -c %Y "$top/Cargo.toml")}

root=$(mktemp -d)
trap 'rm -rf "$root"' EXIT
chmod 755 "$root"

put() { install -D -m "$1" "$2" "$root/$3"; }

put 755 "$program" usr/bin/crestline
strip --strip-unneeded --remove-section=.comment "$root/usr/bin/crestline"
put 644 "$here/crestline.desktop" usr/share/applications/crestline.desktop
put 644 "$here/crestline.metainfo.xml" usr/share/metainfo/crestline.metainfo.xml
put 644 "$here/crestline.xml" usr/share/mime/packages/crestline.xml
put 644 "$here/crestline.svg" usr/share/icons/hicolor/scalable/apps/crestline.svg
for plan in "$top"/assets/examples/*.json; do
  put 644 "$plan" "usr/share/doc/crestline/examples/$(basename "$plan" .json).crestline.json"
done

made=$(mktemp -d -p "$root")
cargo run --quiet --locked --manifest-path "$top/Cargo.toml" -p crestline-cli --example shell_files -- "$made" >/dev/null
for page in "$made"/*.1; do
  gzip -9n "$page"
  put 644 "$page.gz" "usr/share/man/man1/$(basename "$page").gz"
done
put 644 "$made/crestline.bash" usr/share/bash-completion/completions/crestline
put 644 "$made/_crestline" usr/share/zsh/vendor-completions/_crestline
put 644 "$made/crestline.fish" usr/share/fish/vendor_completions.d/crestline.fish
rm -rf "$made"

copyright() {
  cat "$top/LICENSE"
  printf '\nThe program holds the font DejaVu Sans, whose authors say:\n\n'
  cat "$top/assets/fonts/LICENSE-DejaVu.txt"
}
copyright > "$root/copyright"
put 644 "$root/copyright" usr/share/doc/crestline/copyright
rm "$root/copyright"

{
  echo "crestline ($version) unstable; urgency=medium"
  echo
  echo "  * Crestline $version."
  echo
  echo " -- The Crestline developers <crestline@crestline.invalid>  $(date -R -u -d "@$SOURCE_DATE_EPOCH")"
} | gzip -9n > "$root/changelog.gz"
put 644 "$root/changelog.gz" usr/share/doc/crestline/changelog.gz
rm "$root/changelog.gz"

# What the files take on a disk of 1 kB blocks, and 1 kB for a folder: `du` would answer for the disk at hand.
installed_size=$(find "$root/usr" -type f -printf '%s\n' -o -printf '1\n' | awk '{ kb += int(($1 + 1023) / 1024) } END { print kb }')

# The newest C library that the program asks for.
glibc=$(objdump -T "$root/usr/bin/crestline" | grep -o 'GLIBC_[0-9.]*' | sort -uV | tail -1 | cut -d_ -f2)
mkdir "$root/DEBIAN"
cat > "$root/DEBIAN/control" <<CONTROL
Package: crestline
Version: $version
Architecture: $architecture
Maintainer: The Crestline developers <crestline@crestline.invalid>
Installed-Size: $installed_size
Depends: libc6 (>= $glibc), libgcc-s1
Recommends: libgl1, libegl1, libx11-6, libxcursor1, libxi6, libxkbcommon0, libxkbcommon-x11-0
Suggests: xdg-desktop-portal, zenity
Section: science
Priority: optional
Description: planner for compensated saddles of fretted string instruments
 Crestline works out where each string's saddle crest must stand so that
 fretted notes are in tune, from the neck, the strings, the action and the way
 a finger presses. It shows what every fretted note will be off by, writes a
 dimensioned drawing at 1:1 and a schedule for the jig, and finds from tuner
 readings what is wrong with an instrument.
CONTROL
(cd "$root" && find usr -type f -print0 | sort -z | xargs -0 md5sum > DEBIAN/md5sums)
# dpkg-deb only turns back the times of files that are newer than the day of the package.
find "$root" -exec touch --no-dereference --date "@$SOURCE_DATE_EPOCH" {} +
mkdir -p "$folder"
package=$folder/crestline_${version}_$architecture.deb
dpkg-deb --root-owner-group -z"${COMPRESSION:-6}" --build "$root" "$package" >/dev/null
echo "$package"
