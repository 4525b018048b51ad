# shellcheck shell=bash disable=SC2154
# Builds the jar when it is missing or older than its sources. Read by the scripts beside this folder, which define say, stop, home and java_home.

# True when nothing under the sources is newer than the last good build.
up_to_date() {
    local stamp=$home/target/turnstone.stamp
    [ -f "$stamp" ] && [ -f "$home/target/turnstone.jar" ] && [ -f "$home/target/engine/jvm.options" ] || return 1
    [ -z "$(find "$home/pom.xml" "$home/.mvn" "$home/src/main" -newer "$stamp" -print -quit)" ]
}

# A release without sources has nothing to build; TURNSTONE_BUILD=never takes what is there.
build_if_needed() {
    case ${TURNSTONE_BUILD:-} in
        '') ;;
        never) return 0 ;;
        *) stop 2 "TURNSTONE_BUILD is \"$TURNSTONE_BUILD\"; expected never, or nothing" ;;
    esac
    [ -d "$home/src/main" ] || return 0
    ! up_to_date || return 0
    mkdir -p "$home/target" 2>/dev/null || stop 4 "$home/target can't be written: the first use of a checkout builds there"
    lock_build
    # Another start may have built while this one waited.
    up_to_date || build
    unlock_build
}

# The lock is held by an open descriptor, so it ends with its holder, however that ends.
lock_build() {
    command -v flock >/dev/null || return 0
    exec 9>"$home/target/turnstone.lock"
    if ! flock -n 9; then
        say "another start is building; waiting…"
        flock 9 || stop 5 "the build's lock can't be had: $home/target/turnstone.lock"
    fi
}

unlock_build() { exec 9>&-; }

build() {
    local target=$home/target log=$home/target/build.log code maven
    maven=$(command -v mvn) || stop 2 "Maven is needed to build (mvn is not on PATH); install Maven 3.8 or later"
    [ -x "$java_home/bin/javac" ] || stop 2 "$java_home has no javac: building needs a JDK, not only a Java runtime"
    if [ -f "$target/turnstone.jar" ]; then
        say "sources changed, building…"
    else
        say "building (first use, takes a minute)…"
    fi
    # Anything that changes from here on is newer than this build.
    : >"$target/turnstone.stamp.next"
    # Jars of another choice of dependencies must not stay on the class path.
    if [ ! -f "$target/turnstone.stamp" ] || [ "$home/pom.xml" -nt "$target/turnstone.stamp" ]; then rm -rf "$target/engine"; fi
    # Nor may classes: the compiler looks at what is newer only, and a class whose neighbour changed is not.
    rm -rf "$target/launcher/classes" "$target/launcher/maven-status"
    rm -f "$target/turnstone.stamp"
    (cd "$home" && JAVA_HOME=$java_home exec "$maven" -q -B -ntp -Dstyle.color=never -Dlauncher package) >"$log" 2>&1 </dev/null &
    local maven_pid=$!
    # A background job of a script ignores Ctrl-C: it is passed on.
    trap 'kill -TERM '"$maven_pid"' 2>/dev/null; wait; say "interrupted while building; the next start builds again"; exit 130' INT
    trap 'kill -TERM '"$maven_pid"' 2>/dev/null; wait; say "ended while building; the next start builds again"; exit 143' TERM
    wait "$maven_pid"
    code=$?
    trap - INT TERM
    if [ "$code" -ne 0 ]; then
        say "the build failed:"
        grep -E '^\[ERROR\]' "$log" | grep -vE '^\[ERROR\] *($|-> |To see the full|Re-run Maven|For more information|\[Help)' | awk '!seen[$0]++' | head -n 20 >&2
        stop 70 "all of it is in $log"
    fi
    # A running start keeps the jar that it opened: the new one takes the name only.
    mv -f "$target/launcher/turnstone.jar" "$target/turnstone.jar" || exit 4
    mv -f "$target/turnstone.stamp.next" "$target/turnstone.stamp" || exit 4
}
