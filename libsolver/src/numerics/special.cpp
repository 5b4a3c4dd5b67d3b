#include <annulet/core/constants.hpp>
#include <annulet/numerics/special.hpp>

#include <boost/math/constants/constants.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <boost/math/special_functions/ellint_2.hpp>
#include <cassert>
#include <cmath>
#include <limits>

namespace annulet {

using Complex = std::complex<double>;
using constants::pi;

namespace {

constexpr double euler = boost::math::constants::euler<double>();
constexpr double epsilon = std::numeric_limits<double>::epsilon();
constexpr double largest_series_argument = 3;  // of Si and Cin: the largest term there is 1.5

double arithmetic_geometric_mean(double a, double b) {
    while (std::abs(a - b) > 4 * epsilon * a) {
        const double mean = (a + b) / 2;
        b = std::sqrt(a * b);
        a = mean;
    }
    return (a + b) / 2;
}

// Si, term by term x^(2n+1) / ((2n+1) (2n+1)!), and Cin, x^(2n) / (2n (2n)!): start with the power `first`.
double alternating_series(double x, int first) {
    double power = 1;
    for (int i = 1; i <= first; ++i) power *= x / i;
    double sum = 0;
    for (int n = first; std::abs(power) > epsilon * std::abs(sum) / 8; n += 2) {
        sum += power / n;
        power *= -x * x / ((n + 1.0) * (n + 2.0));
    }
    return sum;
}

// E_1(jx) by its even continued fraction [Abramowitz1964, 5.1.22, contracted], evaluated by Lentz's method.
Complex exponential_integral_imaginary(double x) {
    Complex b{1, x};
    Complex c = 1 / std::numeric_limits<double>::min();
    Complex d = 1.0 / b;
    Complex h = d;
    for (int i = 1; i < 1000; ++i) {
        const double a = -static_cast<double>(i) * i;
        b += 2.0;
        d = 1.0 / (a * d + b);
        c = b + a / c;
        const Complex change = c * d;
        h *= change;
        if (std::abs(change - 1.0) < epsilon) break;
    }
    return h * Complex(std::cos(x), -std::sin(x));
}

// sum (-1)^k a_k(nu) / z^k, the algebraic factor of I_nu(z) [Abramowitz1964, 9.7.1], mu = 4 nu^2.
Complex asymptotic_factor(double mu, Complex z) {
    Complex sum = 1;
    Complex term = 1;
    for (int k = 1; k < 40; ++k) {
        const double odd = 2 * k - 1;
        term *= -(mu - odd * odd) / (8.0 * k * z);
        sum += term;
        if (std::abs(term) < epsilon / 4) break;
    }
    return sum;
}

// I_0/I_1 = 2/z + 1/(4/z + 1/(6/z + ...)) by Lentz's method.
Complex ratio_by_fraction(Complex z) {
    Complex f = 2.0 / z;
    Complex c = f;
    Complex d = 0;
    const int most = 200 + static_cast<int>(8 * std::abs(z));
    for (int n = 2; n < most; ++n) {
        const Complex b = 2.0 * n / z;
        d = 1.0 / (b + d);
        c = b + 1.0 / c;
        const Complex change = c * d;
        f *= change;
        if (std::abs(change - 1.0) < epsilon) break;
    }
    return f;
}

}  // namespace

double elliptic_k_of_complement(double m1) {
    assert(m1 > 0 && m1 <= 1);
    return pi / (2 * arithmetic_geometric_mean(1, std::sqrt(m1)));
}

double elliptic_e_of_complement(double m1) {
    assert(m1 >= 0 && m1 <= 1);
    return boost::math::ellint_2(std::sqrt(1 - m1));
}

// K(m) = (1/pi) ln(16/m1) K(m1) - 2 sum_n c_n^2 s_n m1^n, c_n = (2n-1)!!/(2n)!!, s_n = sum_{i<=n} 1/((2i-1)2i).
LogSplit elliptic_k_split(double m1) {
    assert(m1 >= 0 && m1 <= 1);
    const double slope = m1 < 1 ? elliptic_k_of_complement(1 - m1) / pi : std::numeric_limits<double>::infinity();
    if (m1 > 0.5) return {elliptic_k_of_complement(m1) + slope * std::log(m1), slope};
    double sum = 0;
    double coefficient = 1;
    double harmonic = 0;
    double power = 1;
    for (int n = 1; power > epsilon / 64; ++n) {
        const double ratio = (2.0 * n - 1) / (2.0 * n);
        coefficient *= ratio * ratio;
        harmonic += 1 / ((2.0 * n - 1) * (2.0 * n));
        power *= m1;
        sum += coefficient * harmonic * power;
    }
    return {std::log(16.0) * slope - 2 * sum, slope};
}

double sine_integral(double x) {
    assert(x >= 0);
    if (x <= largest_series_argument) return alternating_series(x, 1);
    return pi / 2 + exponential_integral_imaginary(x).imag();
}

double cosine_integral(double x) {
    assert(x > 0);
    if (x <= largest_series_argument) return euler + std::log(x) - alternating_series(x, 2);
    return -exponential_integral_imaginary(x).real();
}

double entire_cosine_integral(double x) {
    assert(x >= 0);
    if (x <= largest_series_argument) return alternating_series(x, 2);
    return euler + std::log(x) + exponential_integral_imaginary(x).real();
}

double spherical_bessel_j(int n, double x) {
    return boost::math::sph_bessel(static_cast<unsigned>(n), x);
}

double spherical_bessel_y(int n, double x) {
    return boost::math::sph_neumann(static_cast<unsigned>(n), x);
}

Complex spherical_hankel_outgoing(int n, double x) {
    return {spherical_bessel_j(n, x), -spherical_bessel_y(n, x)};
}

Complex bessel_i0_over_i1(Complex z) {
    constexpr double large = 40;
    constexpr double negligible = 20;  // e^(-2 Re z) below rounding
    assert(z.real() >= 0 && std::abs(z) > 0);
    if (std::abs(z) > large && z.real() > negligible) return asymptotic_factor(0, z) / asymptotic_factor(4, z);
    return ratio_by_fraction(z);
}

}  // namespace annulet
