package turnstone.measure;

import java.math.BigInteger;

/** An exact fraction in lowest terms, denominator above 0. */
record Fraction(BigInteger numerator, BigInteger denominator) {
    static final Fraction ZERO = of(0);
    static final Fraction ONE = of(1);

    Fraction {
        if (denominator.signum() == 0) {
            throw new IllegalArgumentException("denominator 0");
        }
        BigInteger shared = numerator.gcd(denominator);
        if (denominator.signum() < 0) {
            shared = shared.negate();
        }
        numerator = numerator.divide(shared);
        denominator = denominator.divide(shared);
    }

    static Fraction of(long whole) {
        return new Fraction(BigInteger.valueOf(whole), BigInteger.ONE);
    }

    static Fraction of(long numerator, long denominator) {
        return new Fraction(BigInteger.valueOf(numerator), BigInteger.valueOf(denominator));
    }

    Fraction plus(Fraction other) {
        return new Fraction(
                numerator.multiply(other.denominator).add(other.numerator.multiply(denominator)),
                denominator.multiply(other.denominator));
    }

    Fraction minus(Fraction other) {
        return plus(new Fraction(other.numerator.negate(), other.denominator));
    }

    Fraction times(Fraction other) {
        return new Fraction(numerator.multiply(other.numerator), denominator.multiply(other.denominator));
    }

    Fraction over(Fraction other) {
        return new Fraction(numerator.multiply(other.denominator), denominator.multiply(other.numerator));
    }

    boolean isZero() {
        return numerator.signum() == 0;
    }
}
