# SPDX-License-Identifier: Apache-2.0
# Shell functions that the scripts share: packages, number of jobs, configuring a build folder.
# Source it with $top set to the checkout.

# install_packages GROUP...: installs what is missing of the groups of .setup/packages, through apt as root or sudo,
# and says so; does nothing when all is there.
install_packages() {
  local wanted=() missing=() group name as=()
  while read -r group name _; do
    case " $* " in *" $group "*) wanted+=("$name") ;; esac
  done < <(grep -v '^#' "$top/.setup/packages")
  if ! command -v dpkg-query >/dev/null || ! command -v apt-get >/dev/null; then
    echo "This is no Debian system, so nothing is installed. These are needed: ${wanted[*]}"
    return 0
  fi
  for name in "${wanted[@]}"; do
    [ "$(dpkg-query -W -f='${db:Status-Status}' "$name" 2>/dev/null)" = installed ] || missing+=("$name")
  done
  [ ${#missing[@]} -eq 0 ] && return 0
  if [ "$(id -u)" -ne 0 ]; then
    if ! command -v sudo >/dev/null; then
      echo "These packages are missing: ${missing[*]}"
      echo "Installing them needs root and there is no sudo. As root: apt-get install ${missing[*]}"
      return 1
    fi
    as=(sudo)
  fi
  echo "Installing with apt${as[0]:+ through sudo}: ${missing[*]}"
  local apt=("${as[@]}" env DEBIAN_FRONTEND=noninteractive apt-get -qq -o Dpkg::Use-Pty=0)
  # The package lists are fetched only where apt does not know a package yet or its file has moved on.
  if ! apt-get -qq --simulate --no-install-recommends install "${missing[@]}" >/dev/null 2>&1 ||
     ! "${apt[@]}" --no-install-recommends -y install "${missing[@]}" >/dev/null; then
    echo "Fetching apt's package lists first"
    "${apt[@]}" update || return 1
    "${apt[@]}" --no-install-recommends -y install "${missing[@]}" >/dev/null || return 1
  fi
}

# Compile jobs: one a processor, fewer where memory is short (a job takes up to 1.5 GB).
job_count() {
  local cores memory
  cores=$(nproc)
  memory=$(awk '/^MemAvailable/ {print int($2 / 1572864)}' /proc/meminfo)
  [ "$memory" -lt 1 ] && memory=1
  [ "$cores" -lt "$memory" ] && echo "$cores" || echo "$memory"
}

# configure FOLDER OPTIONS...: prepares a build folder inside the checkout with Ninja; quiet unless it fails.
configure() {
  local folder="$top/$1" log
  shift
  log=$(cmake -S "$top" -B "$folder" -G Ninja "$@" 2>&1) || { echo "$log"; return 1; }
}
