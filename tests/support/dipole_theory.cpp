#include "support/dipole_theory.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>
#include <annulet/numerics/special.hpp>

#include <cmath>

namespace annulet::test {

using Complex = std::complex<double>;
using constants::eta0_ohm;
using constants::pi;

namespace {

constexpr double wavenumber = 2 * pi;  // lengths in wavelengths

Complex spherical_wave(double r) {
    return std::exp(Complex(0, -wavenumber * r)) / r;
}

// Integral over [a, b] with panels that shrink toward both ends, where 1/R of a thin wire peaks.
template <typename F>
Complex graded_integral(F f, double a, double b) {
    const LineRule rule = gauss_legendre(24, 0, 1);
    constexpr int halvings = 30;
    Complex sum = 0;
    for (const double end : {a, b}) {
        const double full = (a + b) / 2 - end;
        for (int i = 0; i <= halvings; ++i) {
            const double outer = full * std::ldexp(1.0, -i);
            const double inner = i == halvings ? 0 : outer / 2;
            for (Eigen::Index q = 0; q < rule.nodes.size(); ++q)
                sum += std::abs(outer - inner) * rule.weights(q) * f(end + inner + (outer - inner) * rule.nodes(q));
        }
    }
    return sum;
}

}  // namespace

Complex mutual_dipole_impedance(double length_1, double length_2, double spacing, double stagger) {
    const double h1 = length_1 / 2;
    const double h2 = length_2 / 2;
    const auto integrand = [=](double z) {  // z from the centre of the second dipole
        const double axial = z + stagger;
        const Complex field = spherical_wave(std::hypot(spacing, axial - h1)) +
                              spherical_wave(std::hypot(spacing, axial + h1)) -
                              2 * std::cos(wavenumber * h1) * spherical_wave(std::hypot(spacing, axial));
        return field * std::sin(wavenumber * (h2 - std::abs(z)));
    };
    return Complex(0, eta0_ohm / (4 * pi)) * (graded_integral(integrand, -h2, 0) + graded_integral(integrand, 0, h2));
}

Complex mutual_half_wave_side_by_side(double spacing) {
    constexpr double length = 0.5;
    const double diagonal = std::hypot(spacing, length);
    const double u0 = wavenumber * spacing;
    const double u1 = wavenumber * (diagonal + length);
    const double u2 = wavenumber * spacing * spacing / (diagonal + length);  // diagonal - length without cancellation
    const double r = 2 * cosine_integral(u0) - cosine_integral(u1) - cosine_integral(u2);
    const double x = -(2 * sine_integral(u0) - sine_integral(u1) - sine_integral(u2));
    return eta0_ohm / (4 * pi) * Complex(r, x);
}

double two_wire_impedance(double a1, double a2, double spacing) {
    return eta0_ohm / (2 * pi) * std::acosh((spacing * spacing - a1 * a1 - a2 * a2) / (2 * a1 * a2));
}

double step_up_ratio(double driven_radius, double other_radius, double spacing) {
    const double mu = other_radius / driven_radius;
    const double nu = spacing / driven_radius;
    const double share =
        std::acosh((nu * nu - mu * mu + 1) / (2 * nu)) / std::acosh((nu * nu + mu * mu - 1) / (2 * nu * mu));
    return (1 + share) * (1 + share);
}

double ring_inductance_over_mu0(double b, double a) {
    return b * (std::log(8 * b / a) - 2);
}

double rectangle_inductance_over_mu0(double x, double y, double a) {
    return (x * std::log(2 * x / a) + y * std::log(2 * y / a) + 2 * std::hypot(x, y) - x * std::asinh(x / y) -
            y * std::asinh(y / x) - 2 * (x + y)) /
           pi;
}

double strip_inductance_over_mu0(double length, double width) {
    return length / (2 * pi) * (std::log(2 * length / width) + 0.5 + width / (3 * length));
}

}  // namespace annulet::test
