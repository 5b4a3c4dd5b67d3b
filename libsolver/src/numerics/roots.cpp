#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/roots.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <boost/math/tools/minima.hpp>
#include <boost/math/tools/toms748_solve.hpp>
#include <cassert>
#include <cmath>
#include <cstdint>
#include <limits>

namespace annulet {

using Complex = std::complex<double>;

namespace {

[[noreturn]] void not_converged(const char* method, Complex z, Complex value) {
    throw NumericalError(fmt::format("{} did not converge: f({:.6g}{:+.6g}j) = {:.3g}{:+.3g}j", method, z.real(),
                                     z.imag(), value.real(), value.imag()));
}

bool small_step(Complex step, Complex z, const ComplexRootOptions& options) {
    return std::abs(step) <= options.relative_tolerance * (std::abs(z) + options.scale);
}

bool finite(Complex z) {
    return std::isfinite(z.real()) && std::isfinite(z.imag());
}

}  // namespace

double bracketed_root(const RealFunction& f, double lower, double upper, double relative_tolerance) {
    const double at_lower = f(lower);
    const double at_upper = f(upper);
    if (at_lower == 0) return lower;
    if (at_upper == 0) return upper;
    if (!(at_lower * at_upper < 0) && !(std::signbit(at_lower) != std::signbit(at_upper)))
        throw NumericalError(fmt::format("no change of sign between f({:.6g}) = {:.3g} and f({:.6g}) = {:.3g}", lower,
                                         at_lower, upper, at_upper));
    const auto close = [relative_tolerance](double a, double b) {
        return std::abs(a - b) <= relative_tolerance * std::max(std::abs(a), std::abs(b));
    };
    std::uintmax_t steps = 200;
    const auto checked = [&f](double x) {
        const double value = f(x);
        if (std::isnan(value)) throw NumericalError(fmt::format("f({:.6g}) is not a number", x));
        return value;
    };
    const auto [a, b] = boost::math::tools::toms748_solve(checked, lower, upper, at_lower, at_upper, close, steps);
    return (a + b) / 2;
}

Minimum local_minimum(const RealFunction& f, double lower, double upper) {
    const int bits = std::numeric_limits<double>::digits / 2;
    const auto [x, value] = boost::math::tools::brent_find_minima(f, lower, upper, bits);
    return {x, value};
}

Minimum sampled_minimum(const RealFunction& f, double lower, double upper, int samples) {
    assert(samples >= 2);
    const double step = (upper - lower) / samples;
    Minimum best{lower, std::numeric_limits<double>::infinity()};
    double previous = std::numeric_limits<double>::infinity();
    double current = f(lower);
    for (int i = 0; i <= samples; ++i) {
        const double next = i == samples ? std::numeric_limits<double>::infinity() : f(lower + (i + 1) * step);
        if (current <= previous && current <= next) {
            const double x = lower + i * step;
            const Minimum found = local_minimum(f, std::max(lower, x - step), std::min(upper, x + step));
            if (found.value < best.value) best = found;
            if (current < best.value) best = {x, current};
        }
        previous = current;
        current = next;
    }
    return best;
}

Complex newton_root(const ComplexFunction& f, const ComplexFunction& derivative, Complex start,
                    const ComplexRootOptions& options) {
    Complex z = start;
    for (int step = 0; step < options.most_steps; ++step) {
        const Complex value = f(z);
        if (value == 0.0) return z;
        const Complex dz = -value / derivative(z);
        if (!finite(dz)) break;
        z += dz;
        if (small_step(dz, z, options)) return z;
    }
    not_converged("Newton's method", z, f(z));
}

Complex muller_root(const ComplexFunction& f, Complex z0, Complex z1, Complex z2, const ComplexRootOptions& options) {
    Complex f0 = f(z0);
    Complex f1 = f(z1);
    Complex f2 = f(z2);
    for (int step = 0; step < options.most_steps; ++step) {
        if (f2 == 0.0) return z2;
        const Complex slope01 = (f1 - f0) / (z1 - z0);
        const Complex slope12 = (f2 - f1) / (z2 - z1);
        const Complex curvature = (slope12 - slope01) / (z2 - z0);
        const Complex slope = slope12 + curvature * (z2 - z1);
        const Complex root = std::sqrt(slope * slope - 4.0 * f2 * curvature);
        // The larger denominator is the nearer zero of the parabola.
        const Complex denominator = std::abs(slope + root) > std::abs(slope - root) ? slope + root : slope - root;
        const Complex dz = -2.0 * f2 / denominator;
        if (!finite(dz)) break;
        z0 = z1, z1 = z2, z2 += dz;
        if (small_step(dz, z2, options)) return z2;
        f0 = f1, f1 = f2, f2 = f(z2);
    }
    not_converged("Muller's method", z2, f2);
}

}  // namespace annulet
