#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <fmt/format.h>

#include <Eigen/LU>
#include <Eigen/SVD>

#include <cmath>

namespace annulet {

using Complex = std::complex<double>;
using Eigen::Index;
using Eigen::MatrixXcd;
using Eigen::MatrixXd;
using Eigen::VectorXcd;

namespace {

constexpr double dependent = 1e-11;  ///< a current with less than this outside the basis adds nothing but rounding

void append(MatrixXd& matrix, const MatrixXd& columns) {
    const Index before = matrix.cols();
    matrix.conservativeResize(columns.rows(), before + columns.cols());
    matrix.rightCols(columns.cols()) = columns;
}

/// Factors of all terms at s, affine ones first.
VectorXcd factors_at(const AffineOperator& affine, Complex s) {
    const VectorXcd affine_part = affine.coefficients(s);
    VectorXcd all(affine_part.size() + static_cast<Index>(affine.exact_terms().size()));
    all.head(affine_part.size()) = affine_part;
    for (Index i = affine_part.size(); i < all.size(); ++i)
        all[i] = affine.exact_terms()[static_cast<std::size_t>(i - affine_part.size())].factor(s);
    return all;
}

VectorXcd factor_derivatives_at(const AffineOperator& affine, Complex s) {
    const VectorXcd affine_part = affine.coefficient_derivatives(s);
    VectorXcd all(affine_part.size() + static_cast<Index>(affine.exact_terms().size()));
    all.head(affine_part.size()) = affine_part;
    for (Index i = affine_part.size(); i < all.size(); ++i)
        all[i] = factor_derivative(affine.exact_terms()[static_cast<std::size_t>(i - affine_part.size())], s);
    return all;
}

/// Symmetric n x n from its lower triangle, packed column by column.
MatrixXcd symmetric_from(const Eigen::VectorXd& real, const Eigen::VectorXd& imaginary, Index n) {
    MatrixXcd full(n, n);
    Index at = 0;
    for (Index c = 0; c < n; ++c)
        for (Index r = c; r < n; ++r, ++at) full(c, r) = full(r, c) = Complex(real[at], imaginary[at]);
    return full;
}

/// LDL^T without pivots of a small complex symmetric matrix, real and imaginary parts apart so that the loops
/// vectorise.
class SmallFactors {
public:
    explicit SmallFactors(const MatrixXcd& a) : re_(a.real()), im_(a.imag()), inverse_(a.rows()) {
        const Index n = a.rows();
        for (Index k = 0; k < n; ++k) {
            const Complex inverse = inverse_[k] = 1.0 / Complex(re_(k, k), im_(k, k));
            for (Index c = k + 1; c < n; ++c) subtract(k, c, Complex(re_(c, k), im_(c, k)) * inverse);
            for (Index r = k + 1; r < n; ++r) {
                const Complex scaled = Complex(re_(r, k), im_(r, k)) * inverse;
                re_(r, k) = scaled.real();
                im_(r, k) = scaled.imag();
            }
        }
    }

    MatrixXcd solve(MatrixXcd x) const {
        const Index n = re_.rows();
        for (Index column = 0; column < x.cols(); ++column) {
            auto v = x.col(column);
            for (Index k = 0; k < n; ++k)
                for (Index r = k + 1; r < n; ++r) v[r] -= multiply(re_(r, k), im_(r, k), v[k]);
            for (Index k = 0; k < n; ++k) v[k] = multiply(inverse_[k].real(), inverse_[k].imag(), v[k]);
            for (Index k = n - 1; k >= 0; --k)
                for (Index r = k + 1; r < n; ++r) v[k] -= multiply(re_(r, k), im_(r, k), v[r]);
        }
        return x;
    }

private:
    /// Without the tests for infinities of the operator.
    static Complex multiply(double re, double im, Complex z) {
        return {re * z.real() - im * z.imag(), re * z.imag() + im * z.real()};
    }

    /// Column c minus factor times column k, from the diagonal down.
    void subtract(Index k, Index c, Complex factor) {
        const double f = factor.real(), g = factor.imag();
        const double *from_re = re_.col(k).data(), *from_im = im_.col(k).data();
        double *to_re = re_.col(c).data(), *to_im = im_.col(c).data();
        for (Index r = c; r < re_.rows(); ++r) {
            to_re[r] -= f * from_re[r] - g * from_im[r];
            to_im[r] -= f * from_im[r] + g * from_re[r];
        }
    }

    MatrixXd re_, im_;
    VectorXcd inverse_;
};

/// X of A X = B for a small complex symmetric A, with one step of refinement; by LU where the residual shows that
/// pivots were needed.
MatrixXcd solve_small(const MatrixXcd& a, const MatrixXcd& b) {
    constexpr double least_accuracy = 1e-13;
    const SmallFactors factors(a);
    MatrixXcd x = factors.solve(b);
    x += factors.solve(b - a * x);
    if ((a * x - b).norm() <= least_accuracy * (a.norm() * x.norm() + b.norm())) return x;
    return a.partialPivLu().solve(b);
}

}  // namespace

double ReducedPole::frequency_hz() const {
    return s.imag() / (2 * constants::pi);
}

double ReducedPole::q() const {
    return std::abs(s.imag()) / (2 * std::abs(s.real()));
}

ReducedModel::ReducedModel(const AffineOperator& affine)
    : basis_(affine.op().unknowns(), 0),
      ports_(0, affine.op().ports()),
      images_(static_cast<std::size_t>(affine.terms()) + affine.exact_terms().size(), basis_),
      projected_(images_.size()),
      port_vectors_(affine.op().port_vectors()) {}

MatrixXd ReducedModel::new_columns(const MatrixXcd& currents) const {
    MatrixXd columns(currents.rows(), 0);
    const auto add_part = [&](Eigen::VectorXd part, double scale) {
        for (int pass = 0; pass < 2; ++pass) {  // the second removes what rounding left of the first [Giraud2005]
            part -= basis_ * (basis_.transpose() * part);
            part -= columns * (columns.transpose() * part);
        }
        if (part.norm() > dependent * scale) append(columns, part.normalized());
    };
    for (Index c = 0; c < currents.cols(); ++c) {
        add_part(currents.col(c).imag(), currents.col(c).norm());
        add_part(currents.col(c).real(), currents.col(c).norm());
    }
    return columns;
}

void ReducedModel::add(const AffineOperator& affine, const MatrixXcd& currents) {
    const MatrixXd columns = new_columns(currents);
    if (columns.cols() > 0) project(affine, columns);
}

MatrixXd ReducedModel::principal_directions(const MatrixXcd& currents, double least_part) const {
    MatrixXd parts(currents.rows(), 2 * currents.cols());
    parts << currents.real(), currents.imag();
    for (int pass = 0; pass < 2; ++pass) parts -= basis_ * (basis_.transpose() * parts);
    const Eigen::BDCSVD<MatrixXd> svd(parts, Eigen::ComputeThinU);
    const auto& sigma = svd.singularValues();
    Index rank = 0;
    while (rank < sigma.size() && sigma[rank] > least_part * sigma[0] && sigma[rank] > dependent * currents.norm())
        ++rank;
    return svd.matrixU().leftCols(rank);
}

void ReducedModel::project(const AffineOperator& affine, const MatrixXd& columns) {
    const Index before = basis_.cols(), after = before + columns.cols();
    append(basis_, columns);
    ports_ = basis_.transpose() * port_vectors_;
    const auto extend = [&](std::size_t q, const MatrixXd& image) {
        append(images_[q], image);
        MatrixXd& projected = projected_[q];
        projected.conservativeResize(after, after);
        const MatrixXd right = basis_.transpose() * image;
        projected.rightCols(columns.cols()) = right;
        projected.bottomLeftCorner(columns.cols(), before) = right.topRows(before).transpose();
        auto corner = projected.bottomRightCorner(columns.cols(), columns.cols());
        corner = (0.5 * (corner + corner.transpose())).eval();
    };
    affine.for_each_term([&](int q, const MatrixXd& term) { extend(static_cast<std::size_t>(q), term * columns); });
    for (std::size_t i = 0; i < affine.exact_terms().size(); ++i)
        extend(static_cast<std::size_t>(affine.terms()) + i, affine.exact_terms()[i].matrix * columns);
    packed_.resize(after * (after + 1) / 2, static_cast<Index>(projected_.size()));
    for (std::size_t q = 0; q < projected_.size(); ++q) {
        auto column = packed_.col(static_cast<Index>(q));
        Index at = 0;
        for (Index c = 0; c < after; at += after - c, ++c)
            column.segment(at, after - c) = projected_[q].col(c).tail(after - c);
    }
}

MatrixXcd ReducedModel::weighted_sum(const VectorXcd& factor) const {
    return symmetric_from(packed_ * factor.real(), packed_ * factor.imag(), size());
}

MatrixXcd ReducedModel::matrix(const AffineOperator& affine, Complex s) const {
    return weighted_sum(factors_at(affine, s));
}

MatrixXcd ReducedModel::derivative(const AffineOperator& affine, Complex s) const {
    return weighted_sum(factor_derivatives_at(affine, s));
}

MatrixXcd ReducedModel::solve(const AffineOperator& affine, Complex s) const {
    const MatrixXcd y = solve_small(matrix(affine, s), ports_.cast<Complex>());
    if (!y.allFinite())
        throw NumericalError(
            fmt::format("the reduced matrix is singular at {:.9g} Hz", s.imag() / (2 * constants::pi)));
    return y;
}

MatrixXcd ReducedModel::residuals(const AffineOperator& affine, std::span<const Complex> s,
                                  std::span<const MatrixXcd> y) const {
    const Index p = port_vectors_.cols();
    MatrixXcd r = port_vectors_.cast<Complex>().replicate(1, static_cast<Index>(s.size()));
    MatrixXcd weight(static_cast<Index>(images_.size()), static_cast<Index>(s.size()));
    for (std::size_t i = 0; i < s.size(); ++i) weight.col(static_cast<Index>(i)) = factors_at(affine, s[i]);
    MatrixXcd all(size(), r.cols());
    for (std::size_t q = 0; q < images_.size(); ++q) {
        for (std::size_t i = 0; i < s.size(); ++i)
            all.middleCols(static_cast<Index>(i) * p, p) = weight(static_cast<Index>(q), static_cast<Index>(i)) * y[i];
        r.real() -= images_[q] * all.real();
        r.imag() -= images_[q] * all.imag();
    }
    return r;
}

}  // namespace annulet
