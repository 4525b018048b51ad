# shellcheck shell=bash
# Finds Java and sizes its memory. Read by the scripts beside this folder, which define say, stop and home.

# Sets java, java_home and java_major, or ends with code 2.
find_java() {
    if [ -n "${JAVA_HOME:-}" ]; then
        java=$JAVA_HOME/bin/java
        [ -x "$java" ] || stop 2 "JAVA_HOME is $JAVA_HOME, which has no bin/java; Turnstone needs Java 17 or later"
    else
        java=$(command -v java) || stop 2 "no java found; Turnstone needs Java 17 or later: install a JDK or set JAVA_HOME"
    fi
    local version='' real
    real=$(readlink -f "$java" 2>/dev/null) || real=$java
    java_home=$(dirname "$(dirname "$real")")
    # The release file of the installation saves starting a JVM only to ask it.
    if [ -r "$java_home/release" ] && [ "$(basename "$(dirname "$real")")" = bin ]; then
        version=$(sed -n 's/^JAVA_VERSION="\(.*\)"$/\1/p' "$java_home/release")
    fi
    [ -n "$version" ] || version=$("$java" -version 2>&1 | sed -n 's/^[a-zA-Z]* version "\([^"]*\)".*/\1/p' | head -n 1)
    java_major=${version#1.}
    java_major=${java_major%%[!0-9]*}
    [ -n "$java_major" ] || stop 2 "$java does not say its version; Turnstone needs Java 17 or later"
    [ "$java_major" -ge 17 ] || stop 2 "$java is Java $version; Turnstone needs Java 17 or later: set JAVA_HOME"
}

# Half of this machine's (or container's) memory, at most 4 GiB.
default_heap() {
    local kib='' limit=''
    if [ -r /proc/meminfo ]; then
        kib=$(awk '/^MemTotal:/ {print $2}' /proc/meminfo)
        [ ! -r /sys/fs/cgroup/memory.max ] || limit=$(cat /sys/fs/cgroup/memory.max)
        [[ ! $limit =~ ^[0-9]+$ ]] || [ $((limit / 1024)) -ge "$kib" ] || kib=$((limit / 1024))
    elif command -v sysctl >/dev/null; then
        kib=$(($(sysctl -n hw.memsize 2>/dev/null || echo 0) / 1024))
    fi
    local mib=$((${kib:-0} / 2048))
    [ "$mib" -gt 0 ] || mib=2048
    [ "$mib" -le 4096 ] || mib=4096
    printf '%dm' "$mib"
}

# keep_newest_logs FOLDER COUNT: takes older logs of this program away.
keep_newest_logs() {
    local files=() file
    for file in "$1"/turnstone-[0-9]*-[0-9]*-[0-9]*.log; do [ ! -f "$file" ] || files+=("$file"); done
    # Names begin with the time, so the order of names is the order of age.
    local surplus=$((${#files[@]} - $2)) index
    for ((index = 0; index < surplus; index++)); do rm -f "${files[$index]}"; done
}
