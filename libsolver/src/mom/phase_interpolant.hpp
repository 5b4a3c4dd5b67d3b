// A symmetric matrix of retarded interactions between wavenumbers where it is known.
#pragma once

#include <Eigen/Core>

#include <complex>
#include <vector>

namespace annulet {

/// Index of the packed lower triangle, column by column: where column j of an n x n matrix begins (its diagonal).
inline Eigen::Index packed_column(Eigen::Index n, Eigen::Index j) {
    return j * n - j * (j - 1) / 2;
}
inline Eigen::Index packed_size(Eigen::Index n) {
    return n * (n + 1) / 2;
}
/// Of element (i, j) on either side of the diagonal.
inline Eigen::Index packed_index(Eigen::Index n, Eigen::Index i, Eigen::Index j) {
    return i >= j ? packed_column(n, j) + i - j : packed_column(n, i) + j - i;
}

/// Element (m, n) is exp(-jkR_mn) times a polynomial in k through its values at the nodes, R_mn the distance of the
/// centres: what is left to the polynomial varies over the size of the elements only.
class PhaseInterpolant {
public:
    /// `centre`: 3 x n, m.
    explicit PhaseInterpolant(Eigen::Matrix3Xd centre) : centre_(std::move(centre)) {}

    /// The matrix (n x n, complex symmetric) at another real wavenumber, 1/m.
    void add(double k_per_m, const Eigen::MatrixXcd& matrix);
    const std::vector<double>& nodes() const { return node_; }

    /// Frobenius norm of the interpolated matrix minus `matrix`, over that of `matrix`.
    double relative_difference(double k_per_m, const Eigen::MatrixXcd& matrix) const;

    /// Packed lower triangle at any complex wavenumber, or its derivative in k.
    Eigen::VectorXcd value(std::complex<double> k_per_m) const;
    Eigen::VectorXcd derivative(std::complex<double> k_per_m) const;

    std::size_t bytes() const;

private:
    Eigen::VectorXcd sum(std::complex<double> k, const Eigen::VectorXcd& factor, const Eigen::VectorXcd* slope) const;

    Eigen::Matrix3Xd centre_;
    std::vector<double> node_;
    std::vector<Eigen::VectorXcd> value_;  ///< packed, times exp(+jkR)
};

/// Lagrange polynomials of the nodes at z, and their derivatives.
Eigen::VectorXcd lagrange(const Eigen::VectorXd& node, std::complex<double> z);
Eigen::VectorXcd lagrange_derivative(const Eigen::VectorXd& node, std::complex<double> z);

/// The first `count` points of a Leja sequence on [0, 1] that begins 1, 0: nested nodes for interpolation
/// [Reichel1990].
std::vector<double> leja_points(int count);

}  // namespace annulet
