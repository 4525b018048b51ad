package turnstone.shelf;

import java.nio.charset.StandardCharsets;
import java.util.Base64;

/** The textual form of keys, RFC 7468: a line that begins, Base64 in lines of 64, a line that ends. */
final class Pem {
    private static final int LINE = 64;

    private Pem() {}

    static String of(String label, byte[] content) {
        String body = Base64.getMimeEncoder(LINE, new byte[] {'\n'}).encodeToString(content);
        return "-----BEGIN " + label + "-----\n" + body + "\n-----END " + label + "-----\n";
    }

    /** The Base64 between the two lines, without line ends. */
    static String body(String text, String label) {
        String begin = "-----BEGIN " + label + "-----";
        int from = text.indexOf(begin);
        int to = text.indexOf("-----END " + label + "-----");
        if (from < 0 || to < from + begin.length()) {
            throw new IllegalArgumentException("no " + label + " in it");
        }
        String body = text.substring(from + begin.length(), to).replaceAll("\\s", "");
        return new String(body.getBytes(StandardCharsets.US_ASCII), StandardCharsets.US_ASCII);
    }
}
