// Symbols: A the matrix, X the unknowns, B the right-hand sides, R = B - A X.
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/symmetric_solver.hpp>

#include <fmt/format.h>

#include <Eigen/LU>

#include <algorithm>
#include <cassert>
#include <cmath>
#include <complex>
#include <utility>
#include <vector>

#include "numerics/lapack.hpp"

namespace annulet {

using Eigen::MatrixXcd;

namespace {

constexpr double largest_asymmetry = 1e-9;

double norm_one(const MatrixXcd& a) {
    return a.size() == 0 ? 0.0 : a.cwiseAbs().colwise().sum().maxCoeff();
}

double largest_difference_of_transpose(const MatrixXcd& a) {
    double largest = 0;
    for (Eigen::Index j = 0; j < a.cols(); ++j)
        for (Eigen::Index i = j + 1; i < a.rows(); ++i) largest = std::max(largest, std::norm(a(i, j) - a(j, i)));
    return std::sqrt(largest);
}

std::string fault_of(const MatrixXcd& a) {
    if (a.rows() != a.cols()) return fmt::format("the matrix is not square: {} x {}", a.rows(), a.cols());
    for (Eigen::Index j = 0; j < a.cols(); ++j)
        for (Eigen::Index i = 0; i < a.rows(); ++i)
            if (!std::isfinite(a(i, j).real()) || !std::isfinite(a(i, j).imag()))
                return fmt::format("the matrix has a value that is not finite in row {}, column {}", i, j);
    const double scale = a.size() == 0 ? 0.0 : a.cwiseAbs().maxCoeff();
    const double asymmetry = largest_difference_of_transpose(a);
    if (asymmetry > largest_asymmetry * scale)
        return fmt::format("the matrix is not symmetric: entries differ from the transpose by up to {:.3g} of {:.3g}",
                           asymmetry, scale);
    return {};
}

}  // namespace

struct SymmetricSolver::Factors {
    virtual ~Factors() = default;
    virtual void solve_in_place(const MatrixXcd& stored, MatrixXcd& x) const = 0;
    virtual double reciprocal_condition(const MatrixXcd& stored, double norm_one) const = 0;
    virtual std::string name() const = 0;
};

#ifdef ANNULET_HAS_OPENBLAS

// The factors overwrite the lower triangle and the diagonal; the strict upper triangle keeps A.
struct SymmetricSolver::LapackFactors final : Factors {
    std::vector<int> pivots;

    LapackFactors(MatrixXcd& a, FactorStatus& status) : pivots(static_cast<std::size_t>(a.rows())) {
        const int n = static_cast<int>(a.rows());
        int info = 0;
        int length = -1;
        std::complex<double> best_length;
        zsytrf_("L", &n, a.data(), &n, pivots.data(), &best_length, &length, &info, 1);
        length = std::max(1, static_cast<int>(best_length.real()));
        std::vector<std::complex<double>> work(static_cast<std::size_t>(length));
        zsytrf_("L", &n, a.data(), &n, pivots.data(), work.data(), &length, &info, 1);
        assert(info >= 0);
        status.ok = info == 0;
        if (info > 0) status.message = fmt::format("the matrix is singular: pivot {} of {} is zero", info - 1, n);
    }

    void solve_in_place(const MatrixXcd& stored, MatrixXcd& x) const override {
        const int n = static_cast<int>(x.rows());
        const int columns = static_cast<int>(x.cols());
        int info = 0;
        zsytrs_("L", &n, &columns, stored.data(), &n, pivots.data(), x.data(), &n, &info, 1);
        assert(info == 0);
    }

    double reciprocal_condition(const MatrixXcd& stored, double norm_one) const override {
        const int n = static_cast<int>(stored.rows());
        std::vector<std::complex<double>> work(2 * static_cast<std::size_t>(n));
        double reciprocal = 0;
        int info = 0;
        zsycon_("L", &n, stored.data(), &n, pivots.data(), &norm_one, &reciprocal, work.data(), &info, 1);
        assert(info == 0);
        return reciprocal;
    }

    std::string name() const override { return "lapack zsytrf"; }
};

#endif

struct SymmetricSolver::EigenFactors final : Factors {
    Eigen::PartialPivLU<MatrixXcd> lu;

    EigenFactors(const MatrixXcd& a, FactorStatus& status) : lu(a) {
        status.ok = true;
        for (Eigen::Index i = 0; i < a.rows(); ++i)
            if (lu.matrixLU()(i, i) == std::complex<double>(0)) {
                status = {false, fmt::format("the matrix is singular: pivot {} of {} is zero", i, a.rows())};
                return;
            }
    }

    void solve_in_place(const MatrixXcd&, MatrixXcd& x) const override { x = lu.solve(x); }
    double reciprocal_condition(const MatrixXcd&, double) const override { return lu.rcond(); }
    std::string name() const override { return "eigen lu"; }
};

std::unique_ptr<SymmetricSolver::Factors> SymmetricSolver::make_factors(FactorBackend backend) {
#ifdef ANNULET_HAS_OPENBLAS
    if (backend != FactorBackend::eigen) return std::make_unique<LapackFactors>(matrix_, status_);
#endif
    (void)backend;
    return std::make_unique<EigenFactors>(matrix_, status_);
}

SymmetricSolver::SymmetricSolver(MatrixXcd matrix, SolverOptions options)
    : size_(static_cast<int>(matrix.rows())), refinement_steps_(options.refinement_steps), matrix_(std::move(matrix)) {
    status_.message = fault_of(matrix_);
    if (!status_.message.empty()) return;
    norm_one_ = norm_one(matrix_);
    norm_frobenius_ = matrix_.norm();
    diagonal_ = matrix_.diagonal();
    if (size_ == 0) {
        status_.ok = true;
        return;
    }
    factors_ = make_factors(options.backend);
}

SymmetricSolver::~SymmetricSolver() = default;
SymmetricSolver::SymmetricSolver(SymmetricSolver&&) noexcept = default;
SymmetricSolver& SymmetricSolver::operator=(SymmetricSolver&&) noexcept = default;

MatrixXcd SymmetricSolver::solve(const MatrixXcd& b) const {
    if (!status_.ok) throw NumericalError(status_.message);
    assert(b.rows() == size_);
    MatrixXcd x = b;
    if (b.size() == 0) return x;
    factors_->solve_in_place(matrix_, x);
    for (int step = 0; step < refinement_steps_; ++step) {
        MatrixXcd correction = b - multiply(x);
        factors_->solve_in_place(matrix_, correction);
        x += correction;
    }
    return x;
}

MatrixXcd SymmetricSolver::multiply(const MatrixXcd& x) const {
    const auto upper = matrix_.triangularView<Eigen::StrictlyUpper>();
    MatrixXcd product = diagonal_.asDiagonal() * x;
    product += upper * x;
    product += upper.transpose() * x;
    return product;
}

double SymmetricSolver::relative_residual(const MatrixXcd& x, const MatrixXcd& b) const {
    const MatrixXcd r = b - multiply(x);
    double largest = 0;
    for (Eigen::Index j = 0; j < b.cols(); ++j) {
        const double scale = norm_frobenius_ * x.col(j).norm() + b.col(j).norm();
        if (scale > 0) largest = std::max(largest, r.col(j).norm() / scale);
    }
    return largest;
}

double SymmetricSolver::reciprocal_condition() const {
    if (!status_.ok) return 0;
    return factors_ ? factors_->reciprocal_condition(matrix_, norm_one_) : 1;
}

std::string SymmetricSolver::backend_name() const {
    return factors_ ? factors_->name() : "none";
}

}  // namespace annulet
