// The dense factorisation of complex symmetric (not Hermitian) matrices behind one face.
#pragma once

#include <Eigen/Core>

#include <memory>
#include <string>

namespace annulet {

enum class FactorBackend {
    automatic,  ///< LAPACK where the build has it, else Eigen
    lapack,     ///< Bunch-Kaufman LDL^T of zsytrf [Bunch1977]; falls back to Eigen where the build has no LAPACK
    eigen       ///< LU with partial pivoting: portable, about twice the work
};

/// What the factorisation came to; `message` is empty when `ok`.
struct FactorStatus {
    bool ok = false;
    std::string message;
};

struct SolverOptions {
    FactorBackend backend = FactorBackend::automatic;
    int refinement_steps = 1;  ///< steps of iterative refinement in `solve`, in double precision
};

/// A = A^T factored once for many right-hand sides. `solve` may be called from several threads at a time, and
/// construction inside an OpenMP parallel region runs on the calling thread alone.
class SymmetricSolver {
public:
    /// Factors `matrix` (n x n, relative asymmetry below 1e-9; finite). Does not throw on a bad matrix: see `status`.
    explicit SymmetricSolver(Eigen::MatrixXcd matrix, SolverOptions options = {});
    ~SymmetricSolver();
    SymmetricSolver(SymmetricSolver&&) noexcept;
    SymmetricSolver& operator=(SymmetricSolver&&) noexcept;

    const FactorStatus& status() const { return status_; }
    bool ok() const { return status_.ok; }
    int size() const { return size_; }

    /// X (n x m) of A X = `b` (n x m). Throws `NumericalError` with the status message if the factorisation failed.
    Eigen::MatrixXcd solve(const Eigen::MatrixXcd& b) const;

    /// A X for X (n x m), from the matrix as it was before factoring.
    Eigen::MatrixXcd multiply(const Eigen::MatrixXcd& x) const;

    /// Largest over the columns of |b - A x| / (|A|_F |x| + |b|), 2-norms: the backward error of a solution.
    double relative_residual(const Eigen::MatrixXcd& x, const Eigen::MatrixXcd& b) const;

    /// Estimate of 1 / (|A|_1 |A^-1|_1) [Higham1988]; 0 if the factorisation failed.
    double reciprocal_condition() const;

    /// "lapack zsytrf" or "eigen lu".
    std::string backend_name() const;

private:
    struct Factors;
    struct LapackFactors;
    struct EigenFactors;
    std::unique_ptr<Factors> make_factors(FactorBackend backend);

    int size_ = 0;
    int refinement_steps_ = 1;
    FactorStatus status_;
    double norm_one_ = 0;
    double norm_frobenius_ = 0;
    Eigen::VectorXcd diagonal_;  // of A
    Eigen::MatrixXcd matrix_;    // A, or with the LAPACK factors in its lower triangle
    std::unique_ptr<Factors> factors_;
};

}  // namespace annulet
