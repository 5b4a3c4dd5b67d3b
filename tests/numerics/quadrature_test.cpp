#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>

#include <cmath>
#include <stdexcept>

namespace annulet {
namespace {

using constants::pi;

double power_integral(int p, double a, double b) {
    return (std::pow(b, p + 1) - std::pow(a, p + 1)) / (p + 1);
}

// Abramowitz & Stegun, Handbook of Mathematical Functions, 1964, table 25.4: n = 2, 3, 5.
TEST(GaussLegendre, PrintedNodes) {
    EXPECT_NEAR(gauss_legendre(2).nodes(1), 0.577350269189626, 1e-15);
    EXPECT_NEAR(gauss_legendre(3).nodes(2), 0.774596669241483, 1e-15);
    EXPECT_NEAR(gauss_legendre(3).weights(1), 0.888888888888889, 1e-15);
    EXPECT_NEAR(gauss_legendre(5).nodes(4), 0.906179845938664, 1e-15);
    EXPECT_NEAR(gauss_legendre(5).weights(4), 0.236926885056189, 1e-15);
}

TEST(GaussLegendre, ExactToDegreeTwiceNLessOneAndNoFurther) {
    for (int n = 1; n <= 12; ++n) {
        const LineRule rule = gauss_legendre(n, -0.5, 1.5);
        for (int p = 0; p <= 2 * n; ++p) {
            const double error = rule.weights.dot(rule.nodes.array().pow(p).matrix()) - power_integral(p, -0.5, 1.5);
            if (p < 2 * n)
                EXPECT_NEAR(error, 0, 1e-14 * std::pow(1.5, p)) << "n = " << n << ", degree " << p;
            else
                EXPECT_GT(std::abs(error), 1e-10) << "n = " << n;
        }
    }
}

TEST(GaussLegendre, ManyPoints) {
    for (const int n : {64, 201, 1000}) {
        const LineRule rule = gauss_legendre(n, 0, 1);
        EXPECT_NEAR(rule.weights.sum(), 1, 1e-13);
        for (int i = 1; i < n; ++i) ASSERT_LT(rule.nodes(i - 1), rule.nodes(i));
        const double integral = rule.weights.dot((50 * rule.nodes).array().cos().matrix());
        EXPECT_NEAR(integral, std::sin(50.0) / 50, 1e-13);
    }
}

TEST(GaussSquare, ProductsOfPowers) {
    const SquareRule rule = gauss_square(3, 2);
    for (int p = 0; p <= 5; ++p)
        for (int q = 0; q <= 3; ++q) {
            const auto values = rule.points.col(0).array().pow(p) * rule.points.col(1).array().pow(q);
            EXPECT_NEAR(rule.weights.dot(values.matrix()), 1.0 / ((p + 1) * (q + 1)), 1e-15);
        }
}

double factorial(int n) {
    return std::tgamma(n + 1.0);
}

double triangle_error(const TriangleRule& rule, int p, int q) {
    const auto values = rule.points.col(0).array().pow(p) * rule.points.col(1).array().pow(q);
    return rule.weights.dot(values.matrix()) - 2 * factorial(p) * factorial(q) / factorial(p + q + 2);
}

// Mean of L1^p L2^q over a triangle: 2 p! q! / (p + q + 2)! (Strang & Fix 1973).
TEST(TriangleRule, ExactToTheDegreeAndNoFurther) {
    for (const auto& [degree, points] : {std::pair{1, 1}, {2, 3}, {4, 6}, {5, 7}, {8, 16}}) {
        const TriangleRule rule = triangle_rule(degree);
        EXPECT_EQ(rule.weights.size(), points);
        EXPECT_GT(rule.weights.minCoeff(), 0);
        double beyond = 0;
        for (int p = 0; p <= degree; ++p)
            for (int q = 0; p + q <= degree; ++q)
                EXPECT_NEAR(triangle_error(rule, p, q), 0, 2e-15) << degree << ": " << p << ", " << q;
        for (int p = 0; p <= degree + 1; ++p)
            beyond = std::max(beyond, std::abs(triangle_error(rule, p, degree + 1 - p)));
        EXPECT_GT(beyond, 1e-7) << degree;
    }
}

TEST(TriangleRule, OtherDegreesAreRefused) {
    EXPECT_THROW(triangle_rule(9), std::invalid_argument);
    EXPECT_THROW(triangle_rule(-1), std::invalid_argument);
    EXPECT_EQ(triangle_rule(3).weights.size(), 6);
}

// Mean of x^2i y^2j z^2k over the sphere: (2i-1)!! (2j-1)!! (2k-1)!! / (2(i+j+k)+1)!!.
TEST(SphereRule, EvenPowers) {
    const SphereRule rule = sphere_rule(6);
    const auto odd_product = [](int m) {
        double product = 1;
        for (int i = m; i > 1; i -= 2) product *= i;
        return product;
    };
    EXPECT_NEAR(rule.weights.sum(), 4 * pi, 1e-13);
    for (int i = 0; i <= 5; ++i)
        for (int j = 0; i + j <= 5; ++j) {
            const int k = 5 - i - j;
            const auto values = rule.directions.col(0).array().pow(2 * i) * rule.directions.col(1).array().pow(2 * j) *
                                rule.directions.col(2).array().pow(2 * k);
            const double exact =
                odd_product(2 * i - 1) * odd_product(2 * j - 1) * odd_product(2 * k - 1) / odd_product(11);
            EXPECT_NEAR(rule.weights.dot(values.matrix()) / (4 * pi), exact, 1e-15);
        }
}

TEST(Interpolation, ReproducesPolynomialsAndNodes) {
    const Interpolation interpolation(chebyshev_nodes(7, 2e9, 5e9));
    const auto f = [](double x) { return std::pow(x / 1e9 - 3, 6) - 2 * x / 1e9; };
    const Eigen::VectorXd values = interpolation.nodes().unaryExpr(f);
    for (const double x : {2e9, 2.345e9, 3.5e9, 4.999e9}) EXPECT_NEAR(interpolation.basis(x).dot(values), f(x), 1e-12);
    EXPECT_EQ(interpolation.basis(interpolation.nodes()(3)), Eigen::VectorXd::Unit(7, 3));
}

// The error of Chebyshev interpolation of 1/(1 + 25 x^2) falls as rho^-n, rho = (1 + sqrt 26)/5 (Trefethen,
// Approximation Theory and Approximation Practice, 2013, theorem 8.2).
TEST(Interpolation, ConvergesGeometricallyAsTheoryPredicts) {
    const auto f = [](double x) { return 1 / (1 + 25 * x * x); };
    const auto worst = [&](int n) {
        const Interpolation interpolation(chebyshev_nodes(n));
        const Eigen::VectorXd values = interpolation.nodes().unaryExpr(f);
        double largest = 0;
        for (int i = 0; i <= 2000; ++i)
            largest = std::max(largest, std::abs(interpolation.basis(-1 + i * 1e-3).dot(values) - f(-1 + i * 1e-3)));
        return largest;
    };
    const double rate = std::pow(worst(60) / worst(100), 1.0 / 40);
    EXPECT_NEAR(rate, (1 + std::sqrt(26.0)) / 5, 0.005);
}

TEST(Interpolation, ManyNodesNeitherOverflowNorCancel) {
    const Interpolation interpolation(chebyshev_nodes(400, 0, 1e10));
    EXPECT_NEAR(interpolation.basis(3.21e9).sum(), 1, 1e-13);
    EXPECT_LT(interpolation.basis(3.21e9).cwiseAbs().sum(), 6);
}

}  // namespace
}  // namespace annulet
