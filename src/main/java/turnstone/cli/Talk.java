package turnstone.cli;

import java.io.PrintStream;
import java.util.Locale;
import turnstone.night.Progress;
import turnstone.night.Words;

/**
 * Progress on standard error: one line that changes in place on a terminal, one plain line per phase otherwise.
 *
 * <p>Results never go through here: they belong to standard output.
 */
final class Talk implements Progress {
    /** Whether standard error is a terminal. */
    enum Screen {
        TERMINAL,
        PLAIN
    }

    private static final long REDRAW_MS = 200;

    private final PrintStream err;
    private final Screen screen;
    private String phase = "";
    private long expected;
    private long phaseStarted_ms;
    private long drawn_ms;
    private int drawnWidth;

    Talk(PrintStream err, Screen screen) {
        this.err = err;
        this.screen = screen;
    }

    @Override
    public synchronized void phase(String name, long records) {
        wipe();
        phase = name;
        expected = records;
        phaseStarted_ms = System.currentTimeMillis();
        drawn_ms = 0;
        draw(name + " …");
    }

    @Override
    public synchronized void records(long done) {
        long now = System.currentTimeMillis();
        if (screen == Screen.PLAIN || phase.isEmpty() || now - drawn_ms < REDRAW_MS) {
            return;
        }
        drawn_ms = now;
        double seconds = Math.max(1, now - phaseStarted_ms) / 1000.0;
        double rate = done / seconds;
        StringBuilder line = new StringBuilder(phase).append("  ").append(grouped(done));
        if (expected > 0) {
            line.append(" of ").append(grouped(expected));
        }
        line.append(" records, ").append(grouped(Math.round(rate))).append(" a second");
        if (expected > done && rate > 0) {
            line.append(", about ").append(seconds((expected - done) / rate)).append(" left");
        }
        draw(line.toString());
    }

    @Override
    public synchronized void done(String summary) {
        wipe();
        double elapsed_s = (System.currentTimeMillis() - phaseStarted_ms) / 1000.0;
        err.println(summary + "  (" + seconds(elapsed_s) + ")");
        phase = "";
    }

    @Override
    public synchronized void remark(String line) {
        wipe();
        err.println(line);
        if (!phase.isEmpty()) {
            draw(phase + " …");
        }
    }

    /** Clears the changing line before something else is printed. */
    synchronized void wipe() {
        if (screen == Screen.TERMINAL && drawnWidth > 0) {
            err.print("\r" + " ".repeat(drawnWidth) + "\r");
            err.flush();
        }
        drawnWidth = 0;
    }

    private void draw(String line) {
        if (screen == Screen.PLAIN) {
            return;
        }
        String shown = line.length() > 110 ? line.substring(0, 110) : line;
        err.print("\r" + shown + " ".repeat(Math.max(0, drawnWidth - shown.length())));
        err.flush();
        drawnWidth = Math.max(shown.length(), 0);
    }

    private static String grouped(long value) {
        return Words.number(value);
    }

    private static String seconds(double value) {
        if (value < 99.95) {
            return String.format(Locale.ROOT, "%.1f s", value);
        }
        long whole = Math.round(value);
        return whole / 60 + " min " + whole % 60 + " s";
    }
}
