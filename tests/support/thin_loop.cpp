// Symbols of [King1969]: x = kb, N_n kernel coefficients, a_n = coefficients of the integral equation; s_n = gap
// factor.
#include "support/thin_loop.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>
#include <annulet/numerics/roots.hpp>

#include <boost/math/constants/constants.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <cmath>
#include <vector>

namespace annulet::test {

using Complex = std::complex<double>;
using constants::pi;

namespace {

constexpr Complex j{0, 1};
constexpr double euler = boost::math::constants::euler<double>();

// (e^{-ju} - 1) / u, entire.
Complex wave_part(Complex u) {
    if (std::abs(u) > 0.1) return (std::exp(-j * u) - 1.0) / u;
    Complex sum = 0;
    Complex term = -j;
    for (int m = 1; m < 14; ++m) {
        sum += term;
        term *= -j * u / (m + 1.0);
    }
    return sum;
}

// Static coefficients, n = 0 ... count - 1 ([Wu1962]): ln(8b/a)/pi and [K_0 I_0(na/b) + C_n]/pi,
// C_n = gamma + ln 4n - 2 sum_{m<n} 1/(2m+1).
Eigen::VectorXd static_part(double b_over_a, int count) {
    Eigen::VectorXd result(count);
    result(0) = std::log(8 * b_over_a) / pi;
    double odd_sum = 0;
    for (int n = 1; n < count; ++n) {
        odd_sum += 1.0 / (2 * n - 1);
        const double y = n / b_over_a;
        // K_0 I_0 falls as 1/2y (1 + 1/8y^2); the factors overflow beyond.
        const double product = y < 300 ? boost::math::cyl_bessel_k(0, y) * boost::math::cyl_bessel_i(0, y)
                                       : (1 + 1 / (8 * y * y)) / (2 * y);
        result(n) = (product + euler + std::log(4.0 * n) - 2 * odd_sum) / pi;
    }
    return result;
}

// (1/pi) int_0^pi x w(2x sin t) cos 2nt dt, w the wave part: Gauss-Legendre, the integrand is entire.
Complex wave_by_quadrature(Complex x, int n) {
    const LineRule rule = gauss_legendre(static_cast<int>(2 * std::abs(x)) + 2 * n + 30, 0, pi / 2);
    Complex sum = 0;
    for (Eigen::Index i = 0; i < rule.nodes.size(); ++i)
        sum += rule.weights(i) * wave_part(2.0 * x * std::sin(rule.nodes(i))) * std::cos(2 * n * rule.nodes(i));
    return sum * 2.0 * x / pi;
}

// The same for n beyond `first` from the power series of the exponential, whose integrals
// int_0^pi sin^m t cos 2nt dt follow from Wallis' by the factor (n - m/2) / (n + 1 + m/2) and vanish for even m < 2n.
void add_wave_by_series(Complex x, int first, Eigen::VectorXcd& result) {
    Complex factor = -j * x / pi;  // (-j)^{m+1} (2x)^{m+1} / (2 pi (m+1)!)
    for (int m = 0; m < 2 * first; ++m) {
        if (m % 2 == 1) {
            double integral = std::sqrt(pi) * std::tgamma((m + 1) / 2.0) / std::tgamma(m / 2.0 + 1);
            for (int n = 0; n < result.size(); ++n) {
                if (n >= first) result(n) += factor * integral;
                integral *= (n - m / 2.0) / (n + 1 + m / 2.0);
            }
        }
        factor *= -j * 2.0 * x / (m + 2.0);
    }
}

Eigen::VectorXcd kernel_coefficients(Complex x, double b_over_a, int count) {
    Eigen::VectorXcd result = static_part(b_over_a, count).cast<Complex>();
    const int first = std::min(count, static_cast<int>(2 * std::abs(x)) + 30);
    for (int n = 0; n < first; ++n) result(n) += wave_by_quadrature(x, n);
    if (first < count) add_wave_by_series(x, first, result);
    return result;
}

double gap_factor(const ThinLoop& loop, int n) {
    const double half_angle = n * loop.gap_m / (2 * loop.radius_m);
    return half_angle == 0 ? 1.0 : std::sin(half_angle) / half_angle;
}

int terms_for(const ThinLoop& loop) {
    return 200 + static_cast<int>(1500 * std::sqrt(loop.radius_m * loop.wire_radius_m) / loop.gap_m);
}

// Beyond n >> b/a, b/g the terms of the admittance are 8j a b kb / (eta g^2 n^3) in the mean over an oscillation.
Complex admittance_beyond(const ThinLoop& loop, double frequency_hz, double terms) {
    return 4.0 * j * loop.wire_radius_m * loop.radius_m * loop.kb(frequency_hz) /
           (constants::eta0_ohm * loop.gap_m * loop.gap_m * terms * terms);
}

Complex single_coefficient(Complex x, double b_over_a, int n) {
    return loop_coefficients(x, b_over_a, n + 1)(n);
}

}  // namespace

double ThinLoop::kb(double frequency_hz) const {
    return 2 * pi * frequency_hz / constants::c0_m_per_s * radius_m;
}

double ThinLoop::frequency_hz(double kb) const {
    return kb * constants::c0_m_per_s / (2 * pi * radius_m);
}

Eigen::VectorXcd loop_coefficients(Complex kb, double b_over_a, int count) {
    const Eigen::VectorXcd kernel = kernel_coefficients(kb, b_over_a, count + 1);
    Eigen::VectorXcd a(count);
    for (int n = 0; n < count; ++n) {
        const Complex below = kernel(n == 0 ? 1 : n - 1);
        a(n) = kb / 2.0 * (kernel(n + 1) + below) - static_cast<double>(n) * n / kb * kernel(n);
    }
    return a;
}

Complex loop_kernel_by_quadrature(Complex kb, double b_over_a, int n) {
    // phi = 2 alpha sinh(u), alpha the wire's angular size at psi, makes the near singularity smooth; psi = t^3 pi for
    // the logarithm left at psi = 0.
    const LineRule around = gauss_legendre(40, 0, 1);
    Complex sum = 0;
    for (Eigen::Index p = 0; p < around.nodes.size(); ++p) {
        const double t = around.nodes(p);
        const double alpha = std::sin(pi * t * t * t / 2) / b_over_a;
        const LineRule along = gauss_legendre(160 + 8 * n, 0, std::asinh(pi / (2 * alpha)));
        Complex inner = 0;
        for (Eigen::Index q = 0; q < along.nodes.size(); ++q) {
            const double phi = 2 * alpha * std::sinh(along.nodes(q));
            const double r = 2 * std::hypot(std::sin(phi / 2), alpha);
            inner += along.weights(q) * 2 * alpha * std::cosh(along.nodes(q)) * std::exp(-j * kb * r) / r *
                     std::cos(n * phi);
        }
        sum += around.weights(p) * 3 * t * t * inner;
    }
    return sum / pi;
}

Eigen::VectorXcd loop_current(const ThinLoop& loop, double frequency_hz, int count) {
    if (count == 0) count = terms_for(loop);
    const Eigen::VectorXcd a = loop_coefficients(loop.kb(frequency_hz), loop.radius_m / loop.wire_radius_m, count);
    Eigen::VectorXcd current(count);
    for (int n = 0; n < count; ++n)
        current(n) = (n == 0 ? 1.0 : 2.0) * gap_factor(loop, n) / (j * constants::eta0_ohm * pi * a(n));
    return current;
}

Complex loop_impedance(const ThinLoop& loop, double frequency_hz) {
    const Eigen::VectorXcd current = loop_current(loop, frequency_hz);
    Complex mean = admittance_beyond(loop, frequency_hz, static_cast<double>(current.size()));
    for (int n = 0; n < current.size(); ++n) mean += gap_factor(loop, n) * current(n);
    return 1.0 / mean;
}

// Only cos(phi) radiates along the axis: field j omega mu0 b pi I_1 / 4 pi r.
double loop_axis_directivity(const ThinLoop& loop, double frequency_hz) {
    const double x = loop.kb(frequency_hz);
    const double intensity =
        constants::eta0_ohm * x * x * std::norm(loop_current(loop, frequency_hz, 2)(1)) / 32;  // W/sr
    return 4 * pi * intensity / (0.5 * (1.0 / loop_impedance(loop, frequency_hz)).real());
}

double loop_resonance_hz(const ThinLoop& loop, double lower_kb, double upper_kb) {
    const auto reactance = [&loop](double kb) { return loop_impedance(loop, loop.frequency_hz(kb)).imag(); };
    return loop.frequency_hz(bracketed_root(reactance, lower_kb, upper_kb, 1e-12));
}

double ring_resonance_kb(double b_over_a, int n) {
    const auto real_part = [=](double kb) { return single_coefficient(kb, b_over_a, n).real(); };
    return bracketed_root(real_part, n * 0.8, n + 0.35, 1e-13);
}

Complex ring_natural_kb(double b_over_a, int n) {
    const double start = ring_resonance_kb(b_over_a, n);
    const auto f = [=](Complex kb) { return single_coefficient(kb, b_over_a, n); };
    return muller_root(f, start, start * Complex(1, 0.05), start * Complex(0.99, 0.02));
}

}  // namespace annulet::test
