#include "support/convergence.hpp"

#include <gtest/gtest.h>
#include <annulet/core/diagnostics.hpp>

#include <cmath>

namespace annulet::test {
namespace {

TEST(Convergence, OrderAndLimitOfAPowerLaw) {
    for (const double order : {0.5, 1.0, 2.0, 3.7}) {
        const auto f = [order](double h) { return 5 - 0.3 * std::pow(h, order); };
        const auto [p, limit] = extrapolate({0.1, 0.17, 0.4}, {f(0.1), f(0.17), f(0.4)});
        EXPECT_NEAR(p, order, 1e-9);
        EXPECT_NEAR(limit, 5, 1e-10);
    }
}

// The trapezoidal rule on a smooth function has order 2 (Euler-Maclaurin).
TEST(Convergence, TrapezoidalRuleHasOrderTwo) {
    const auto trapezoid = [](int n) {
        double sum = (1 + std::exp(1.0)) / 2;
        for (int i = 1; i < n; ++i) sum += std::exp(double(i) / n);
        return sum / n;
    };
    const auto [p, limit] = extrapolate({1.0 / 64, 1.0 / 32, 1.0 / 16}, {trapezoid(64), trapezoid(32), trapezoid(16)});
    EXPECT_NEAR(p, 2, 1e-3);
    EXPECT_NEAR(limit, std::exp(1.0) - 1, 1e-8);
}

TEST(Convergence, DivergingValuesThrow) {
    EXPECT_THROW(extrapolate({1, 2, 4}, {1.0, 3.0, 2.0}), NumericalError);
}

}  // namespace
}  // namespace annulet::test
