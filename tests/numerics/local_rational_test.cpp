#include <annulet/numerics/local_rational.hpp>

#include <gtest/gtest.h>

#include <cmath>

namespace annulet {
namespace {

using Complex = std::complex<double>;

LocalRational sampled(int points, double from, double to, Complex (*curve)(double)) {
    std::vector<double> x;
    std::vector<Complex> y;
    for (int i = 0; i < points; ++i) {
        x.push_back(from + (to - from) * i / (points - 1));
        y.push_back(curve(x.back()));
    }
    return {x, y};
}

Complex resonator(double x) {
    return 1.0 / (Complex(0, 1) * (x - 1 / x) * 30.0 + 1.0);
}
Complex resonator_slope(double x) {
    const Complex value = resonator(x);
    return -value * value * Complex(0, 30) * (1 + 1 / (x * x));
}
Complex smooth(double x) {
    return std::exp(Complex(0, 3 * x));
}

// A rational curve of type (1, 2) lies in the space of the interpolant: the identity needs no source.
TEST(LocalRational, IsExactForOneResonatorHoweverCoarseTheGrid) {
    const auto curve = sampled(9, 0.6, 1.4, resonator);
    for (double x = 0.6; x <= 1.4; x += 0.0137) {
        EXPECT_LT(std::abs(curve.value(x) - resonator(x)), 1e-10) << x;
        EXPECT_LT(std::abs(curve.derivative(x) - resonator_slope(x)), 1e-7) << x;
    }
}

TEST(LocalRational, KeepsValuesAndDerivativesAtTheGridPoints) {
    const auto curve = sampled(9, 0.6, 1.4, resonator);
    for (std::size_t i = 0; i < curve.x().size(); ++i) {
        EXPECT_EQ(curve.value(curve.x()[i]), curve.y()[i]);
        EXPECT_LT(std::abs(curve.derivative(curve.x()[i]) - resonator_slope(curve.x()[i])), 1e-7);
    }
}

TEST(LocalRational, ErrorOfASmoothCurveFallsAtOrderSevenOrMore) {
    const auto error = [](int points) {
        const auto curve = sampled(points, 0, 4, smooth);
        double worst = 0;
        for (double x = 1; x < 3; x += 0.01) worst = std::max(worst, std::abs(curve.value(x) - smooth(x)));
        return worst;
    };
    const double coarse = error(17), fine = error(33);
    EXPECT_LT(coarse, 1e-3);
    EXPECT_GT(std::log2(coarse / fine), 6.5);
}

TEST(LocalRational, FewPointsStillInterpolate) {
    EXPECT_EQ(LocalRational({1.0}, {Complex(2, 3)}).value(7), Complex(2, 3));
    const LocalRational line({1.0, 3.0}, {Complex(1, 0), Complex(3, 2)});
    EXPECT_LT(std::abs(line.value(2) - Complex(2, 1)), 1e-14);
    const LocalRational three({1.0, 2.0, 3.0}, {Complex(1), Complex(4), Complex(9)});
    EXPECT_LT(std::abs(three.value(2) - 4.0), 1e-14);
}

TEST(LocalRational, ConstantAndStraightDataStaySo) {
    const auto constant = sampled(20, 1, 2, [](double) { return Complex(0.3, -0.2); });
    const auto straight = sampled(20, 1, 2, [](double x) { return Complex(x, 2 * x); });
    for (double x = 1; x < 2; x += 0.013) {
        EXPECT_LT(std::abs(constant.value(x) - Complex(0.3, -0.2)), 1e-13);
        EXPECT_LT(std::abs(straight.value(x) - Complex(x, 2 * x)), 1e-12);
    }
}

}  // namespace
}  // namespace annulet
