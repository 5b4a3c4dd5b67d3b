// The matrix of the operator as a short sum of real matrices times scalar functions of s = sigma + jw: what reduced
// models and natural modes need, since it can be evaluated, with its derivative, at any complex frequency.
#pragma once

#include <annulet/core/progress.hpp>
#include <annulet/mom/operator.hpp>

#include <Eigen/Core>

#include <complex>
#include <cstddef>
#include <functional>
#include <memory>
#include <vector>

namespace annulet {

class PhaseInterpolant;  // src/mom

/// What is kept between evaluations.
enum class AffineStorage {
    automatic,     ///< terms, unless they exceed `AffineOptions::memory_limit_bytes`
    terms,         ///< the real matrices themselves
    interpolants,  ///< only the exact fills; terms are made anew when asked for
};

struct AffineOptions {
    AffineStorage storage = AffineStorage::automatic;
    double fill_tolerance = 1e-9;       ///< of an interpolated fill against an exact one, Frobenius norm
    int most_fills = 40;                ///< NumericalError where these do not suffice
    double memory_limit_bytes = 1.0e9;  ///< of what is kept
};

/// Bytes that a mesh of `unknowns` and `cells` (elements that carry charge) takes with `fills` exact fills and `nodes`
/// affine nodes.
struct AffineMemory {
    double kept_terms_bytes = 0;         ///< 2 (nodes + 1) packed real matrices of the unknowns
    double kept_interpolants_bytes = 0;  ///< packed complex matrices of unknowns and of cells for each fill
    double peak_bytes = 0;               ///< the larger of building (fills and terms at once) and sweeping
};
/// `factors`: factorisations kept by a sweep at a time.
AffineMemory affine_memory(int unknowns, int cells, int fills, int nodes, int factors,
                           AffineStorage storage = AffineStorage::terms);

/// Z(s) = W(k)/(s eps0) + exact terms, k = s/(jc), W = D^T P(k) D - k^2 A(k). For real k the real part of W is even in
/// k and the imaginary part odd, so W = sum_q e_q(k^2) E_q + jk sum_q e_q(k^2) O_q with real matrices and Lagrange
/// polynomials e_q: conj Z(s) = Z(conj s) holds by itself. P and A are filled exactly at few wavenumbers (a Leja
/// sequence on [0, k_max], nested, so that every further fill first tests those before it) and each element is
/// interpolated with exp(-jkR), R the distance of its centres, factored out; n Chebyshev nodes in k^2 of that
/// interpolant make the even and odd parts. With the node k = 0 added the charge part of closed currents stays zero.
class AffineOperator {
public:
    /// For frequencies up to `top_hz` (any lower one is inside). `op` must outlive this. Throws NumericalError,
    /// Cancelled.
    AffineOperator(const Operator& op, double top_hz, const AffineOptions& options = {}, Progress* progress = nullptr);
    ~AffineOperator();
    AffineOperator(AffineOperator&&) noexcept;
    AffineOperator& operator=(AffineOperator&&) noexcept;

    const Operator& op() const { return *op_; }
    double top_hz() const { return top_hz_; }
    int fills() const { return fills_; }
    int nodes() const { return static_cast<int>(node_.size()) - 1; }  ///< without k = 0
    AffineStorage storage() const { return storage_; }
    std::size_t bytes() const;
    /// Relative difference of the last fill from what those before it gave: larger than the error left.
    double interpolation_error() const { return interpolation_error_; }

    /// Z(s) and dZ/ds, unknowns x unknowns, complex symmetric.
    Eigen::MatrixXcd impedance_matrix(std::complex<double> s) const;
    Eigen::MatrixXcd derivative(std::complex<double> s) const;
    /// Z(s) X.
    Eigen::MatrixXcd apply(std::complex<double> s, const Eigen::MatrixXcd& x) const;

    /// Z(s) = sum_q coefficients(s)[q] T_q + sum_i exact_terms[i].factor(s) exact_terms[i].matrix.
    int terms() const { return 2 * static_cast<int>(node_.size()); }
    Eigen::VectorXcd coefficients(std::complex<double> s) const;
    Eigen::VectorXcd coefficient_derivatives(std::complex<double> s) const;
    /// Calls `use(q, T_q)` for every term, in any order, T_q real symmetric and dense.
    void for_each_term(const std::function<void(int, const Eigen::MatrixXd&)>& use) const;
    const std::vector<ExactTerm>& exact_terms() const { return exact_; }

private:
    void fill(const AffineOptions& options, Progress* progress);
    void choose_nodes(double reach);
    Eigen::VectorXcd packed_field(std::complex<double> k) const;
    Eigen::VectorXcd packed_field_derivative(std::complex<double> k) const;
    Eigen::MatrixXcd assemble(const Eigen::VectorXcd& packed) const;
    void make_terms(const std::function<void(int, const Eigen::VectorXd&)>& use) const;
    Eigen::VectorXcd sum_terms(const Eigen::VectorXcd& factor) const;

    const Operator* op_;
    double top_hz_;
    AffineStorage storage_ = AffineStorage::terms;
    std::vector<ExactTerm> exact_;
    std::unique_ptr<PhaseInterpolant> scalar_, vector_;
    Eigen::VectorXd node_;   ///< of (k/k_max)^2, the first 0
    Eigen::MatrixXd terms_;  ///< packed lower triangles, one column per term; empty when interpolants are kept
    int fills_ = 0;
    double interpolation_error_ = 0;
};

/// d/ds of a scalar factor, by central differences of fourth order.
std::complex<double> factor_derivative(const ExactTerm& term, std::complex<double> s);

}  // namespace annulet
