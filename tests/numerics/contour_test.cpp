#include <gtest/gtest.h>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/contour.hpp>
#include <annulet/numerics/roots.hpp>

#include <Eigen/Eigenvalues>
#include <cmath>
#include <numbers>
#include <random>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Eigen::MatrixXcd;
using Eigen::MatrixXd;

MatrixXcd random_matrix(int n, unsigned seed) {
    std::mt19937 engine(seed);
    std::normal_distribution<double> normal;
    MatrixXcd a(n, n);
    for (Eigen::Index c = 0; c < n; ++c)
        for (Eigen::Index r = 0; r < n; ++r) a(r, c) = Complex(normal(engine), normal(engine));
    return a;
}

// (s^2 I + s C + K) by its companion matrix, an independent linear eigenvalue problem.
TEST(Contour, QuadraticPolynomialAgainstCompanionMatrix) {
    const int n = 12;
    const MatrixXcd c = random_matrix(n, 11);
    const MatrixXcd k = random_matrix(n, 12);
    const auto t = [&](Complex s) -> MatrixXcd { return s * s * MatrixXcd::Identity(n, n) + s * c + k; };
    MatrixXcd companion = MatrixXcd::Zero(2 * n, 2 * n);
    companion.topRightCorner(n, n).setIdentity();
    companion.bottomLeftCorner(n, n) = -k;
    companion.bottomRightCorner(n, n) = -c;
    const Eigen::VectorXcd all = companion.eigenvalues();
    const EllipseContour contour{{0.2, 0.1}, 2.0, 1.2};
    const auto found = contour_eigenvalues(t, n, contour);
    std::size_t inside = 0;
    for (Eigen::Index i = 0; i < all.size(); ++i) {
        if (!contour.contains(all(i))) continue;
        ++inside;
        double nearest = 1;
        for (const Eigenpair& pair : found) nearest = std::min(nearest, std::abs(pair.value - all(i)));
        EXPECT_LT(nearest, 1e-11) << all(i);
    }
    EXPECT_GT(inside, 3u);
    EXPECT_EQ(found.size(), inside);
    for (const Eigenpair& pair : found) EXPECT_LT((t(pair.value) * pair.vector).norm(), 1e-11);
}

// Delay equation x'(t) = -a x(t - 1): s + a e^-s = 0, so s = W_k(-a), the branches of Lambert's function (Corless,
// Gonnet, Hare, Jeffrey, Knuth, Adv. Comput. Math. 5, 1996). A 1 x 1 problem with many eigenvalues needs more moments.
TEST(Contour, ScalarDelayEquationNeedsHigherMoments) {
    const double a = 2;
    const auto t = [a](Complex s) -> MatrixXcd { return MatrixXcd::Constant(1, 1, s + a * std::exp(-s)); };
    const EllipseContour contour{{-1, 0}, 3.0, 16.0};
    const auto found = contour_eigenvalues(t, 1, contour, {.nodes = 200});
    ASSERT_EQ(found.size(), 6u);
    for (std::size_t i = 0; i < 6; ++i) {
        const Complex s = found[i].value;
        EXPECT_LT(std::abs(s * std::exp(s) + a), 1e-11 * std::abs(std::exp(s)) * 20);
        EXPECT_LT(std::abs(s - std::conj(found[5 - i].value)), 1e-11);
    }
    const Complex first = newton_root([a](Complex s) { return s + a * std::exp(-s); },
                                      [a](Complex s) { return 1.0 - a * std::exp(-s); }, {0.2, 1.7});
    EXPECT_LT(std::abs(found[3].value - first), 1e-12);
}

// Delay system with matrices that commute: the eigenvalues are those of scalar equations s + b_i + c_i e^-s.
TEST(Contour, MatrixDelaySystem) {
    const int n = 5;
    const MatrixXcd basis = random_matrix(n, 21);
    Eigen::VectorXcd b(n), c(n);
    for (int i = 0; i < n; ++i) b(i) = 0.3 * i, c(i) = 1.0 + 0.5 * i;
    const MatrixXcd inverse = basis.inverse();
    const MatrixXcd matrix_b = basis * b.asDiagonal() * inverse;
    const MatrixXcd matrix_c = basis * c.asDiagonal() * inverse;
    const auto t = [&](Complex s) -> MatrixXcd {
        return s * MatrixXcd::Identity(n, n) + matrix_b + std::exp(-s) * matrix_c;
    };
    const auto found = contour_eigenvalues(t, n, {{-0.5, 2}, 1.5, 1.8});
    ASSERT_GE(found.size(), 4u);
    for (const Eigenpair& pair : found) {
        double smallest = 1;
        for (int i = 0; i < n; ++i)
            smallest = std::min(smallest, std::abs(pair.value + b(i) + c(i) * std::exp(-pair.value)));
        EXPECT_LT(smallest, 1e-11);
    }
}

TEST(Contour, ClosePairIsResolved) {
    for (const double distance : {1e-2, 1e-4, 1e-6}) {
        Eigen::VectorXcd diagonal(4);
        diagonal << Complex(0.3, 0.2), Complex(0.3 + distance, 0.2), Complex(-0.4, 0.1), Complex(3, 0);
        const MatrixXcd basis = random_matrix(4, 31);
        const MatrixXcd a = basis * diagonal.asDiagonal() * basis.inverse();
        const auto t = [&](Complex s) -> MatrixXcd { return (s * MatrixXcd::Identity(4, 4) - a) * std::exp(s); };
        const auto found = contour_eigenvalues(t, 4, {0, 1, 1});
        ASSERT_EQ(found.size(), 3u) << distance;
        double spread = 0;
        for (const Eigenpair& pair : found) {
            const double nearest = (diagonal.array() - pair.value).abs().minCoeff();
            EXPECT_LT(nearest, 1e-12) << distance;
            spread =
                std::max(spread, std::abs(pair.value - diagonal(0)) < 0.1 ? std::abs(pair.value - diagonal(0)) : 0);
        }
        EXPECT_NEAR(spread, distance, 1e-11);
    }
}

TEST(Contour, DoubleEigenvalueComesWithTwoVectors) {
    Eigen::VectorXcd diagonal(3);
    diagonal << 0.5, 0.5, -0.5;
    const MatrixXcd basis = random_matrix(3, 41);
    const MatrixXcd a = basis * diagonal.asDiagonal() * basis.inverse();
    const auto t = [&](Complex s) -> MatrixXcd { return s * MatrixXcd::Identity(3, 3) - a; };
    const auto found = contour_eigenvalues(t, 3, {0, 1, 1}, {.newton_steps = 0});
    ASSERT_EQ(found.size(), 3u);
    for (const Eigenpair& pair : found) EXPECT_LT((diagonal.array() - pair.value).abs().minCoeff(), 1e-12);
}

// At +s0 and -s0 the residues cancel and the vectors coincide: the lowest moment vanishes.
TEST(Contour, PairThatSharesAVectorIsFound) {
    const MatrixXcd basis = random_matrix(6, 51);
    Eigen::VectorXcd squares = Eigen::VectorXcd::Constant(6, 9.0);
    squares(2) = Complex(0.2, 0.3);
    const MatrixXcd a = basis * squares.asDiagonal() * basis.inverse();
    const auto t = [&](Complex s) -> MatrixXcd { return s * s * MatrixXcd::Identity(6, 6) - a; };
    const auto found = contour_eigenvalues(t, 6, {0, 1, 1});
    ASSERT_EQ(found.size(), 2u);
    EXPECT_LT(std::abs(found[0].value + found[1].value), 1e-13);
    EXPECT_LT(std::abs(found[1].value - std::sqrt(squares(2))), 1e-13);
}

TEST(Contour, NothingInside) {
    const auto t = [](Complex s) -> MatrixXcd { return (s - 5.0) * MatrixXcd::Identity(3, 3); };
    EXPECT_TRUE(contour_eigenvalues(t, 3, {0, 1, 1}).empty());
}

TEST(Contour, MoreThanTheMomentsResolveThrows) {
    const auto t = [](Complex s) -> MatrixXcd { return MatrixXcd::Constant(1, 1, std::sin(20.0 * s)); };
    EXPECT_THROW(contour_eigenvalues(t, 1, {0, 1, 1}, {.most_moments = 4}), NumericalError);
}

// The trapezoidal rule converges geometrically, here as (radius / |s|)^nodes of the nearest eigenvalue outside a circle
// ([Beyn2012], theorem 4.7).
TEST(Contour, ErrorFallsGeometricallyWithNodes) {
    const auto t = [](Complex s) -> MatrixXcd {
        MatrixXcd m = MatrixXcd::Zero(2, 2);
        m(0, 0) = (s - 0.5) * (s - 1.5);
        m(1, 1) = 4.0 - s;
        return m;
    };
    const auto error = [&](int nodes) {
        const auto found = contour_eigenvalues(
            t, 2, {0, 1, 1}, {.nodes = nodes, .rank_tolerance = 0.05, .residual_tolerance = 1, .newton_steps = 0});
        return found.empty() ? 1.0 : std::abs(found.front().value - 0.5);
    };
    EXPECT_NEAR(std::log(error(20) / error(60)) / 40, std::log(1.5), 0.01);
}

}  // namespace
}  // namespace annulet
