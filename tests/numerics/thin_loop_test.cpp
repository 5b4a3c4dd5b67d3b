#include "support/thin_loop.hpp"

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/numerics/contour.hpp>
#include <annulet/numerics/quadrature.hpp>

#include <cmath>
#include <vector>

#include "support/reference_values.hpp"

namespace annulet::test {
namespace {

using Complex = std::complex<double>;
using constants::pi;

ThinLoop loop_of(double b_over_a, double gap_over_a) {
    return {1, 1 / b_over_a, gap_over_a / b_over_a};
}

// Closed-form coefficients against direct quadrature of the tube kernel: the closed form neglects (a/b)^2 ln(b/a).
TEST(ThinLoop, KernelCoefficientsAgreeWithQuadrature) {
    for (const double b_over_a : {24.0, 120.0})
        for (const Complex kb : {Complex(0.1), Complex(1.1), Complex(3.3), Complex(1.0, 0.15)}) {
            const Eigen::VectorXcd a = loop_coefficients(kb, b_over_a, 8);
            const double bound = 3 * std::log(8 * b_over_a) / (b_over_a * b_over_a);
            std::vector<Complex> kernel;
            for (int n = 0; n <= 8; ++n) kernel.push_back(loop_kernel_by_quadrature(kb, b_over_a, n));
            for (std::size_t n = 1; n < 8; ++n) {
                const auto order = static_cast<double>(n);
                const Complex exact = kb / 2.0 * (kernel[n + 1] + kernel[n - 1]) - order * order / kb * kernel[n];
                EXPECT_LT(std::abs(a(static_cast<Eigen::Index>(n)) - exact),
                          bound * (std::abs(kb) + order * order / std::abs(kb)))
                    << kb << ", " << n;
            }
        }
}

// Order 32 comes from the power series just below kb = 1.5 and from quadrature just above.
TEST(ThinLoop, SeriesContinuesQuadrature) {
    const Eigen::VectorXcd series = loop_coefficients(1.5 - 1e-14, 50, 40);
    const Eigen::VectorXcd quadrature = loop_coefficients(1.5 + 1e-14, 50, 40);
    for (int n = 28; n < 40; ++n) EXPECT_LT(std::abs(series(n) - quadrature(n)), 1e-10) << n;
}

// Radiation resistance of uniform current, Foster, Proc. IRE 32, 1944.
TEST(ThinLoop, UniformCurrentRadiatesAsFosterFound) {
    for (const auto& entry : reference_values("loop_uniform")) {
        const Complex a0 = loop_coefficients(entry.geometry("kb"), 1000, 1)(0);
        const double resistance = (Complex(0, constants::eta0_ohm * pi) * a0).real();
        EXPECT_NEAR(resistance, entry.real("R_exact"), 1e-6 * resistance) << entry.id();
    }
}

// Twenty times the terms change nothing.
TEST(ThinLoop, SeriesHasConverged) {
    for (const double kb : {0.5, 1.1, 2.5}) {
        const ThinLoop loop = loop_of(288, 2);
        const double f = loop.frequency_hz(kb);
        const Eigen::VectorXcd current = loop_current(loop, f, 250000);
        Complex mean = 0;
        for (int n = 0; n < current.size(); ++n) {
            const double half_angle = n * loop.gap_m / 2;
            mean += (n == 0 ? 1.0 : std::sin(half_angle) / half_angle) * current(n);
        }
        EXPECT_LT(std::abs(loop_impedance(loop, f) * mean - 1.0), 1e-6) << kb;
    }
}

// The table's own series stops short of its limit by up to 6e-5 next to antiresonance (12,000 instead of all terms
// for the shortest gap of the thinnest wire), elsewhere by less than 1e-5.
TEST(ThinLoop, ImpedanceTable) {
    for (const auto& entry : reference_values("loop_impedance")) {
        for (const auto& [key, gap_over_a] : {std::pair{"Z_gap1a", 1.0}, {"Z_gap2a", 2.0}, {"Z_gap8a", 8.0}}) {
            const ThinLoop loop = loop_of(entry.geometry("b_over_a"), gap_over_a);
            const Complex z = loop_impedance(loop, loop.frequency_hz(entry.geometry("kb")));
            const Complex exact = entry.complex(key);
            EXPECT_LT(std::abs(z - exact), 7e-5 * std::abs(exact)) << entry.id() << " " << key << z << exact;
        }
    }
}

TEST(ThinLoop, ResonanceTable) {
    for (const auto& entry : reference_values("loop_resonance")) {
        const ThinLoop loop = loop_of(entry.geometry("b_over_a"), 2);
        const double f = loop_resonance_hz(loop);
        EXPECT_NEAR(loop.kb(f), entry.real("kb"), 1e-5) << entry.id();
        EXPECT_NEAR(loop_impedance(loop, f).real(), entry.real("R"), 1e-3) << entry.id();
        EXPECT_NEAR(loop_axis_directivity(loop, f), entry.real("D_axis"), 1e-5) << entry.id();
    }
}

// The natural mode of the closed ring by Muller's method and by a contour integral that knows nothing of it.
TEST(ThinLoop, NaturalModeIsTheOnlyOneNearby) {
    for (const int n : {1, 2}) {
        const Complex kb = ring_natural_kb(50, n);
        const auto t = [n](Complex x) -> Eigen::MatrixXcd {
            return Eigen::MatrixXcd::Constant(1, 1, loop_coefficients(x, 50, n + 1)(n));
        };
        const auto found = contour_eigenvalues(t, 1, {Complex(n, 0.15), 0.3, 0.3}, {.nodes = 60, .most_moments = 3});
        ASSERT_EQ(found.size(), 1u);
        EXPECT_LT(std::abs(found[0].value - kb), 1e-9);
        EXPECT_GT(kb.imag(), 0);
    }
}

// Q = |omega| / 2 |sigma| of the mode against (omega/2R) dX/domega of its own impedance (Yaghjian & Best, IEEE Trans.
// Antennas Propag. 53, 2005); they differ in the order 1/Q^2.
TEST(ThinLoop, ModeDecaysAsItsBandwidthSays) {
    for (const double b_over_a : {1e3, 1e5}) {
        const Complex kb = ring_natural_kb(b_over_a, 1);
        const double resonance = ring_resonance_kb(b_over_a, 1);
        const double h = 1e-5;
        const auto impedance = [&](double x) { return Complex(0, 1) * loop_coefficients(x, b_over_a, 2)(1); };
        const double slope = (impedance(resonance + h).imag() - impedance(resonance - h).imag()) / (2 * h);
        const double bandwidth_q = resonance * slope / (2 * impedance(resonance).real());
        const double mode_q = std::abs(kb) / (2 * kb.imag());
        EXPECT_NEAR(bandwidth_q / mode_q, 1, 2 / (mode_q * mode_q)) << mode_q;
    }
}

}  // namespace
}  // namespace annulet::test
