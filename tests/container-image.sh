#!/bin/sh
# Makes the container image in which the store tests find PostgreSQL 15 when no image can be pulled: Debian from
# debootstrap, PostgreSQL from Debian, imported under the name below. Needs root on Debian; run again, it does nothing.
#
#   tests/container-image.sh            makes responseledger-postgres:15
#   IMAGE=... SUITE=... MIRROR=...      other names, another Debian, another mirror
set -eu

IMAGE=${IMAGE:-responseledger-postgres:15}
SUITE=${SUITE:-bookworm}
MAJOR=15
# The daemon of Debian's docker.io speaks an older protocol than a newer client that may stand before it in PATH.
export DOCKER_API_VERSION="${DOCKER_API_VERSION:-1.41}"

say() { echo "container-image: $*" >&2; }
engine() { docker version --format '{{.Server.Version}}' >/dev/null 2>&1; }

if engine && docker image inspect "$IMAGE" >/dev/null 2>&1; then
  say "$IMAGE is there already"
  exit 0
fi
if [ "$(id -u)" != 0 ]; then
  say "run this as root: it installs docker.io and debootstrap, starts dockerd and builds a file system"
  exit 1
fi

missing=
command -v dockerd >/dev/null || missing="$missing docker.io"
command -v iptables >/dev/null || missing="$missing iptables"
command -v debootstrap >/dev/null || missing="$missing debootstrap"
if [ -n "$missing" ]; then
  say "installing$missing"
  apt-get update -qq
  # shellcheck disable=SC2086 # a list of packages
  DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends $missing >/dev/null
fi

if ! engine; then
  say "starting dockerd, which logs to /var/log/dockerd-responseledger.log"
  nohup dockerd >/var/log/dockerd-responseledger.log 2>&1 &
  tries=0
  until engine; do
    tries=$((tries + 1))
    if [ "$tries" -gt 60 ]; then
      say "dockerd did not answer within 60 s:"
      tail -n 20 /var/log/dockerd-responseledger.log >&2
      exit 1
    fi
    sleep 1
  done
fi
if docker image inspect "$IMAGE" >/dev/null 2>&1; then
  say "$IMAGE is there already"
  exit 0
fi

if [ -z "${MIRROR:-}" ]; then
  # The mirror that this machine uses is the one that it can reach.
  MIRROR=$(apt-get indextargets --format '$(SITE)' 'Created-By: Packages' 2>/dev/null | grep -m1 '/debian/\{0,1\}$' || true)
  MIRROR=${MIRROR:-http://deb.debian.org/debian}
fi
root=$(mktemp -d)
trap 'rm -rf --one-file-system "$root"' EXIT
say "building $SUITE from $MIRROR"
debootstrap --variant=minbase "$SUITE" "$root" "$MIRROR" >/dev/null
# The host's proxy, certificates and names, so that apt works inside as it does here.
cp /etc/resolv.conf "$root/etc/resolv.conf" 2>/dev/null || true
# A server of its own would start with the package; the tests make theirs.
mkdir -p "$root/etc/postgresql-common"
echo 'create_main_cluster = false' >"$root/etc/postgresql-common/createcluster.conf"
printf '#!/bin/sh\nexit 101\n' >"$root/usr/sbin/policy-rc.d"
chmod 755 "$root/usr/sbin/policy-rc.d"
DEBIAN_FRONTEND=noninteractive chroot "$root" apt-get install -y -qq --no-install-recommends \
  -o Dpkg::Options::=--force-confold "postgresql-$MAJOR" >/dev/null
rm -rf "$root"/var/lib/apt/lists/* "$root"/var/cache/apt/archives/*.deb "$root/etc/resolv.conf"
tar -C "$root" -c . | docker import - "$IMAGE" >/dev/null
say "made $IMAGE"
