#include <gtest/gtest.h>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/roots.hpp>

#include <cmath>
#include <limits>
#include <numbers>

namespace annulet {
namespace {

using Complex = std::complex<double>;

TEST(BracketedRoot, ZerosOfKnownFunctions) {
    EXPECT_NEAR(bracketed_root([](double x) { return std::cos(x); }, 0, 3), std::numbers::pi / 2, 1e-15);
    // x tan x = 1: Abramowitz & Stegun 1964, table 4.20, first root 0.86033.
    EXPECT_NEAR(bracketed_root([](double x) { return x * std::tan(x) - 1; }, 0.1, 1.5), 0.86033, 5e-6);
    EXPECT_EQ(bracketed_root([](double x) { return x; }, 0, 1), 0);
}

TEST(BracketedRoot, FaultsCarryValues) {
    EXPECT_THROW(bracketed_root([](double x) { return x * x + 1; }, -1, 1), NumericalError);
    const auto hole = [](double x) {
        return std::abs(x - 0.3) < 0.29 ? std::numeric_limits<double>::quiet_NaN() : x - 0.3;
    };
    EXPECT_THROW(bracketed_root(hole, 0, 1), NumericalError);
}

TEST(Minimum, OfAParabolaAndAmongMany) {
    const Minimum parabola = local_minimum([](double x) { return (x - 2) * (x - 2) + 3; }, 0, 5);
    EXPECT_NEAR(parabola.x, 2, 1e-7);
    EXPECT_NEAR(parabola.value, 3, 1e-13);
    const Minimum lowest = sampled_minimum([](double x) { return std::cos(x) + 0.01 * x; }, 0, 20, 40);
    EXPECT_NEAR(lowest.x, std::numbers::pi - std::asin(-0.01) - 0.02, 1e-6);  // sin x = 0.01 near pi
    const Minimum edge = sampled_minimum([](double x) { return x; }, 1, 2, 10);
    EXPECT_NEAR(edge.x, 1, 1e-7);
}

TEST(ComplexRoot, NewtonAndMullerAgreeOnAPolynomial) {
    const auto f = [](Complex z) { return z * z * z - 1.0; };
    const auto slope = [](Complex z) { return 3.0 * z * z; };
    const Complex exact = std::polar(1.0, 2 * std::numbers::pi / 3);
    EXPECT_LT(std::abs(newton_root(f, slope, {-0.4, 1}) - exact), 1e-15);
    EXPECT_LT(std::abs(muller_root(f, {-0.4, 1}, {-0.5, 1}, {-0.45, 0.8}) - exact), 1e-14);
}

// Muller's parabola has complex zeros, so real starting values reach z^2 = -1.
TEST(ComplexRoot, MullerLeavesTheRealAxis) {
    const Complex z = muller_root([](Complex x) { return x * x + 1.0; }, 0.5, 1, 2);
    EXPECT_LT(std::abs(z * z + 1.0), 1e-14);
}

TEST(ComplexRoot, NoConvergenceThrows) {
    const auto f = [](Complex z) { return std::exp(z); };
    EXPECT_THROW(newton_root(f, f, 0.0), NumericalError);
    EXPECT_THROW(muller_root([](Complex) { return Complex(1); }, 0, 1, 2), NumericalError);
}

}  // namespace
}  // namespace annulet
