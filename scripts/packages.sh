# Sourced by the other scripts: what annulet needs of Debian 12, and how it is installed where missing.

packages=(
    g++ cmake ninja-build pkg-config python3
    libeigen3-dev libboost-dev libopenblas-openmp-dev liblapacke-dev libpolyclipping-dev libcgal-dev
    libtomlplusplus-dev libcli11-dev libfmt-dev nlohmann-json3-dev libssl-dev
    libgtest-dev libgmock-dev libbenchmark-dev
)

install_missing_packages() {
    command -v dpkg-query >/dev/null || { echo "No Debian system: install what scripts/packages.sh lists yourself."; return; }
    local missing=() package
    for package in "${packages[@]}"; do
        [[ "$(dpkg-query -W -f='${db:Status-Status}' "$package" 2>/dev/null)" == installed ]] || missing+=("$package")
    done
    [[ ${#missing[@]} -gt 0 ]] || return 0
    local as_root=()
    if [[ $EUID -ne 0 ]]; then
        command -v sudo >/dev/null || { echo "As root, run: apt-get install ${missing[*]}" >&2; return 1; }
        as_root=(sudo)
    fi
    echo "Installing ${missing[*]}"
    "${as_root[@]}" apt-get update -qq
    "${as_root[@]}" env DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends "${missing[@]}" >/dev/null
}

# Configures and builds the Release preset with all processors.
build() {
    cmake --preset release
    cmake --build --preset release "$@"
}
