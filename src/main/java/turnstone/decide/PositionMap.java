package turnstone.decide;

import java.util.Arrays;
import java.util.List;

/**
 * Where the materials lie on axis 1 and axis 2, drawn in characters: a letter for each, one scale for both axes.
 *
 * <p>A character is about twice as high as it is wide, so a row spans twice the distance of a column. Letters that fall on one another are
 * written side by side where there is room.
 */
final class PositionMap {
    private static final int COLUMNS = 69;
    private static final int ROWS = 19;
    private static final double HIGH_TO_WIDE = 2;

    private PositionMap() {}

    /** The letter of a material by its index: a, b, … z, A, … Z, then a star. */
    static char letter(int index) {
        if (index < 26) {
            return (char) ('a' + index);
        }
        return index < 52 ? (char) ('A' + index - 26) : '*';
    }

    /** Lines of the map; position[1] is taken as 0 where there is one axis only. */
    static List<String> draw(double[][] positions) {
        double[] x = coordinate(positions, 0);
        double[] y = coordinate(positions, 1);
        double lowX = low(x);
        double lowY = low(y);
        double perColumn = Math.max((high(x) - lowX) / (COLUMNS - 1), (high(y) - lowY) / (HIGH_TO_WIDE * (ROWS - 1)));
        double column = perColumn > 0 ? perColumn : 1;
        int height = (int) Math.rint((high(y) - lowY) / (column * HIGH_TO_WIDE)) + 1;
        int indent = (int) Math.floor((COLUMNS - (high(x) - lowX) / column) / 2);
        char[][] cells = new char[height][COLUMNS + 1];
        for (char[] row : cells) {
            Arrays.fill(row, ' ');
        }
        cross(cells, indent + at(0, lowX, column), height - 1 - at(0, lowY, column * HIGH_TO_WIDE));
        for (int k = 0; k < positions.length; k++) {
            int row = height - 1 - at(y[k], lowY, column * HIGH_TO_WIDE);
            place(cells[row], Math.min(COLUMNS - 1, indent + at(x[k], lowX, column)), letter(k));
        }
        return Arrays.stream(cells).map(row -> new String(row).stripTrailing()).toList();
    }

    private static void cross(char[][] cells, int column, int row) {
        if (row >= 0 && row < cells.length && column >= 0 && column < COLUMNS) {
            cells[row][column] = '+';
        }
    }

    private static void place(char[] row, int column, char letter) {
        int at = column;
        while (at < row.length - 1 && row[at] != ' ' && row[at] != '+') {
            at++;
        }
        row[at] = letter;
    }

    private static int at(double value, double low, double perCell) {
        return (int) Math.rint((value - low) / perCell);
    }

    private static double[] coordinate(double[][] positions, int axis) {
        return Arrays.stream(positions)
                .mapToDouble(position -> axis < position.length ? position[axis] : 0)
                .toArray();
    }

    private static double low(double[] values) {
        return Arrays.stream(values).min().orElseThrow();
    }

    private static double high(double[] values) {
        return Arrays.stream(values).max().orElseThrow();
    }
}
