# shellcheck shell=bash disable=SC2154,SC2034
# Keeps what the JVM makes of the engine's classes from one start to the next (a class-data archive): reading and checking some fifteen
# thousand classes is most of a start. Nothing depends on it: where an archive is missing, damaged or of other jars, Java reads the jars.
# Read by the launcher, which defines say, stop, home, java and java_major.

# archive_options CLASS_PATH: sets share to the options that use the archive, or make one as this run ends where there is none.
archive_options() {
    local folder=$home/target/archive jar=$home/target/turnstone.jar
    local file=$folder/spark-$java_major.jsa aside maker making=no
    # What Java says about archives belongs into the log, whether this run has one or not.
    share=(-Xlog:disable -Xlog:all=warning:stderr)
    for aside in "$folder/spark-$java_major".*.jsa; do
        [ -f "$aside" ] || continue
        maker=${aside%.jsa}
        maker=${maker##*.}
        if kill -0 "$maker" 2>/dev/null; then
            making=yes
        elif [ "$aside" -nt "$jar" ] && "$java" "@$home/target/engine/jvm.options" -Xshare:on "-XX:SharedArchiveFile=$aside" -cp "$1" -version >/dev/null 2>&1; then
            mv -f "$aside" "$file" 2>/dev/null
        else
            # Of an older build, or cut off in the middle.
            rm -f "$aside"
        fi
    done
    if [ -f "$file" ] && [ "$file" -nt "$jar" ]; then
        share+=("-XX:SharedArchiveFile=$file")
    elif [ "$making" = no ] && [ "${TURNSTONE_BUILD:-}" != never ] && [ -d "$home/src/main" ] && mkdir -p "$folder" 2>/dev/null; then
        # The process keeps its number through exec, so the next start sees whether this one still writes.
        share+=("-XX:ArchiveClassesAtExit=$folder/spark-$java_major.$$.jsa")
    fi
}
