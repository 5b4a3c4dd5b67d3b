#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <omp.h>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/blas_threads.hpp>
#include <annulet/numerics/symmetric_solver.hpp>

#include <Eigen/LU>
#include <complex>
#include <limits>
#include <random>
#include <vector>

namespace annulet {
namespace {

using Eigen::MatrixXcd;
using Complex = std::complex<double>;
constexpr unsigned seed = 20240611;
constexpr double epsilon = std::numeric_limits<double>::epsilon();

MatrixXcd random_matrix(int rows, int columns, unsigned offset = 0) {
    std::mt19937 engine(seed + offset);
    std::normal_distribution<double> normal;
    MatrixXcd a(rows, columns);
    for (Eigen::Index j = 0; j < columns; ++j)
        for (Eigen::Index i = 0; i < rows; ++i) a(i, j) = Complex(normal(engine), normal(engine));
    return a;
}

MatrixXcd random_symmetric(int n) {
    const MatrixXcd a = random_matrix(n, n);
    return a + a.transpose();
}

class BothBackends : public testing::TestWithParam<FactorBackend> {
protected:
    SymmetricSolver factor(const MatrixXcd& a, int steps = 1) const { return SymmetricSolver(a, {GetParam(), steps}); }
};

INSTANTIATE_TEST_SUITE_P(Backends, BothBackends, testing::Values(FactorBackend::lapack, FactorBackend::eigen),
                         [](const auto& test) { return test.param == FactorBackend::lapack ? "lapack" : "eigen"; });

TEST_P(BothBackends, BackwardErrorIsRounding) {
    for (const int n : {1, 2, 7, 64, 65, 200}) {
        const MatrixXcd a = random_symmetric(n);
        const MatrixXcd b = random_matrix(n, 3, 1);
        const SymmetricSolver solver = factor(a);
        ASSERT_TRUE(solver.ok()) << solver.status().message;
        const MatrixXcd x = solver.solve(b);
        EXPECT_LT((a * x - b).norm(), 10 * epsilon * n * (a.norm() * x.norm() + b.norm())) << "n = " << n;
        EXPECT_LT(solver.relative_residual(x, b), 2 * epsilon) << "n = " << n;
    }
}

TEST_P(BothBackends, ProductIsThatOfTheOriginalMatrix) {
    const MatrixXcd a = random_symmetric(60);
    const MatrixXcd x = random_matrix(60, 4, 2);
    EXPECT_LT((factor(a).multiply(x) - a * x).norm(), 100 * epsilon * a.norm() * x.norm());
}

// A zero diagonal needs the 2 x 2 pivots of Bunch and Kaufman.
TEST_P(BothBackends, ZeroDiagonal) {
    MatrixXcd a = random_symmetric(50);
    a.diagonal().setZero();
    const MatrixXcd exact = random_matrix(50, 2, 3);
    const SymmetricSolver solver = factor(a);
    EXPECT_LT((solver.solve(a * exact) - exact).norm() / exact.norm(), 1e3 * epsilon / solver.reciprocal_condition());
    EXPECT_LT((solver.solve(a * exact) - exact).norm() / exact.norm(), 1e-11);
}

TEST_P(BothBackends, ConditionEstimateWithinThreeOfTheTruth) {
    const MatrixXcd a = random_symmetric(80);
    const auto norm_one = [](const MatrixXcd& m) { return m.cwiseAbs().colwise().sum().maxCoeff(); };
    const double exact = 1 / (norm_one(a) * norm_one(a.inverse()));
    const double estimate = factor(a).reciprocal_condition();
    EXPECT_GE(estimate, exact * (1 - 1e-9));  // the estimate of |A^-1| is a lower bound
    EXPECT_LE(estimate, 3 * exact);           // [Higham1988]: almost always within a factor of three
}

TEST_P(BothBackends, SingularMatrixIsReported) {
    MatrixXcd a = MatrixXcd::Zero(6, 6);
    a.diagonal() << 1, 2, 0, 4, 5, 6;
    const SymmetricSolver solver = factor(a);
    EXPECT_FALSE(solver.ok());
    EXPECT_THAT(solver.status().message, testing::HasSubstr("singular"));
    EXPECT_EQ(solver.reciprocal_condition(), 0);
    EXPECT_THROW(solver.solve(MatrixXcd::Ones(6, 1)), NumericalError);
}

TEST_P(BothBackends, ValueThatIsNotFiniteIsReportedWithItsPlace) {
    MatrixXcd a = random_symmetric(9);
    a(4, 7) = a(7, 4) = Complex(0, std::numeric_limits<double>::quiet_NaN());
    const SymmetricSolver solver = factor(a);
    EXPECT_FALSE(solver.ok());
    EXPECT_THAT(solver.status().message, testing::HasSubstr("row 7, column 4"));
}

TEST_P(BothBackends, AsymmetryIsReported) {
    MatrixXcd a = random_symmetric(9);
    a(1, 2) += 1e-3;
    EXPECT_THAT(factor(a).status().message, testing::HasSubstr("not symmetric"));
}

TEST_P(BothBackends, SameAnswerInsideAParallelRegion) {
    const MatrixXcd a = random_symmetric(150);
    const MatrixXcd b = random_matrix(150, 1, 5);
    MatrixXcd alone;
    {
        const BlasThreads single(1);
        alone = factor(a).solve(b);
    }
    std::vector<double> difference(4, 1.0);
#pragma omp parallel for num_threads(2)
    for (int i = 0; i < 4; ++i) difference[static_cast<std::size_t>(i)] = (factor(a).solve(b) - alone).norm();
    for (const double d : difference) EXPECT_EQ(d, 0);
}

TEST(SymmetricSolver, BackendsAgree) {
    const MatrixXcd a = random_symmetric(120);
    const MatrixXcd b = random_matrix(120, 5, 6);
    const SymmetricSolver lapack(a, {FactorBackend::lapack, 1});
    const SymmetricSolver eigen(a, {FactorBackend::eigen, 1});
    const MatrixXcd x = eigen.solve(b);
    EXPECT_LT((lapack.solve(b) - x).norm() / x.norm(), 1e-12);
    EXPECT_NEAR(lapack.reciprocal_condition() / eigen.reciprocal_condition(), 1, 0.5);
}

TEST(SymmetricSolver, EmptyMatrixIsSolved) {
    const SymmetricSolver solver{MatrixXcd(0, 0)};
    EXPECT_TRUE(solver.ok());
    EXPECT_EQ(solver.solve(MatrixXcd(0, 1)).rows(), 0);
}

TEST(BlasThreads, ScopeEndsWithThePreviousNumber) {
    const int before = BlasThreads::current();
    {
        const BlasThreads scope(1);
        EXPECT_EQ(BlasThreads::current(), 1);
    }
    EXPECT_EQ(BlasThreads::current(), before);
}

}  // namespace
}  // namespace annulet
