# shellcheck shell=sh
# Shared by samples/first-run.sh and tests/run.sh, which read it with `.` from the top folder: what
# has to be there before farrier can be built, and the build itself.

# need PACKAGE...: installs those of the named Debian packages that are missing. Silent where none
# is; where it may not install, it says what is missing and leaves the verdict to the build.
need() {
  missing=
  for package; do
    status=$(dpkg-query -W -f '${Status}' "$package" 2>/dev/null || :)
    case $status in
      *' ok installed') ;;
      *) missing="$missing $package" ;;
    esac
  done
  [ -n "$missing" ] || return 0

  as_root=
  if [ "$(id -u)" -ne 0 ]; then
    as_root=sudo
  fi
  if ! command -v apt-get >/dev/null || { [ -n "$as_root" ] && ! command -v sudo >/dev/null; }; then
    echo "missing, and not to be installed from here:$missing" >&2
    return 0
  fi
  echo "installing Debian packages:$missing" >&2
  # The package index may never have been fetched, or be too old to name what the mirror has.
  $as_root apt-get update -qq || echo "the package index could not be renewed" >&2
  # shellcheck disable=SC2086  # the list is split into packages on purpose
  $as_root env DEBIAN_FRONTEND=noninteractive \
    apt-get install -y -qq --no-install-recommends $missing >/dev/null
}

# build_tree FOLDER [CMAKE-ARGUMENT...]: configures and builds a Release tree. Shows one line of
# progress on a terminal, the end of the log where something fails, and nothing else.
build_tree() {
  tree=$1
  shift
  mkdir -p "$tree"
  echo "building in $tree" >&2
  if ! cmake -S . -B "$tree" -DCMAKE_BUILD_TYPE=Release "$@" >"$tree/configure.log" 2>&1; then
    cat "$tree/configure.log" >&2
    return 1
  fi
  { cmake --build "$tree" -j "$(nproc)" 2>&1 && echo built; } |
    awk -v log_file="$tree/build.log" -v terminal="$([ -t 2 ] && echo yes || echo no)" '
      { print >log_file; last = $0 }
      /^\[/ && terminal == "yes" { printf "\r\033[K%s", substr($0, 1, 78) >"/dev/stderr" }
      END {
        if (terminal == "yes") printf "\r\033[K" >"/dev/stderr"
        exit last == "built" ? 0 : 1
      }' || {
    echo "the build failed; the end of $tree/build.log:" >&2
    grep -n -A 6 -E 'error|undefined reference|Error [0-9]' "$tree/build.log" | tail -n 60 >&2
    return 1
  }
}
