// Symbols of [Beyn2012]: A_p moments, V probing vectors, B_0 and B_1 block Hankel matrices. The variable of the moments
// is z = (s - center) / larger semi-axis, so that powers stay of order one.
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/contour.hpp>

#include <fmt/format.h>

#include <Eigen/Eigenvalues>
#include <Eigen/LU>
#include <Eigen/SVD>

#include <algorithm>
#include <cmath>
#include <random>
#include <utility>

namespace annulet {

using Eigen::MatrixXcd;
using Eigen::VectorXcd;
using Complex = std::complex<double>;

namespace {

constexpr Complex j{0, 1};

MatrixXcd probing_vectors(int rows, int columns, unsigned seed) {
    std::mt19937 engine(seed);
    std::normal_distribution<double> normal;
    MatrixXcd v(rows, columns);
    for (Eigen::Index c = 0; c < columns; ++c)
        for (Eigen::Index r = 0; r < rows; ++r) v(r, c) = Complex(normal(engine), normal(engine));
    return v;
}

double scale_of(const EllipseContour& contour) {
    return std::max(contour.semi_real, contour.semi_imag);
}

struct Moments {
    std::vector<MatrixXcd> a;
    double size;  // mean of |dz/dt T(s)^-1 V| around the contour: what A_0 would be without cancellation
};

// A_p = 1/(2 pi j) times the integral of z^p T(s)^-1 V dz, p = 0 ... count - 1 ([Beyn2012] eqs. 3.8 and 5.1).
Moments moments(const InverseFunction& inverse, const MatrixXcd& v, const EllipseContour& contour, int count,
                int nodes) {
    const double scale = scale_of(contour);
    Moments result{{static_cast<std::size_t>(count), MatrixXcd::Zero(v.rows(), v.cols())}, 0};
    for (int i = 0; i < nodes; ++i) {
        const double angle = 2 * constants::pi * (i + 0.5) / nodes;
        const Complex z{contour.semi_real / scale * std::cos(angle), contour.semi_imag / scale * std::sin(angle)};
        const Complex dz{-contour.semi_real / scale * std::sin(angle), contour.semi_imag / scale * std::cos(angle)};
        const MatrixXcd x = inverse(contour.center + scale * z, v);
        Complex weight = dz / (j * static_cast<double>(nodes));
        result.size += std::abs(weight) * x.norm();
        for (MatrixXcd& moment : result.a) {
            moment += weight * x;
            weight *= z;
        }
    }
    return result;
}

// Block (r, c) of the Hankel matrix is A_{r+c+shift}.
MatrixXcd hankel(const std::vector<MatrixXcd>& a, int pairs, int shift) {
    const Eigen::Index rows = a.front().rows();
    const Eigen::Index columns = a.front().cols();
    MatrixXcd b(rows * pairs, columns * pairs);
    for (int r = 0; r < pairs; ++r)
        for (int c = 0; c < pairs; ++c)
            b.block(r * rows, c * columns, rows, columns) = a[static_cast<std::size_t>(r + c + shift)];
    return b;
}

struct Decomposition {
    MatrixXcd u;  // left singular vectors of B_0 above the noise
    MatrixXcd w;  // right ones, over their singular values
    Eigen::Index rank;
    bool full;  // no singular value is noise: there may be more eigenvalues
};

Decomposition decompose(const Moments& moments, int pairs, double tolerance) {
    constexpr double rounding = 1e-13;
    const Eigen::JacobiSVD<MatrixXcd> svd(hankel(moments.a, pairs, 0), Eigen::ComputeThinU | Eigen::ComputeThinV);
    const Eigen::VectorXd& sigma = svd.singularValues();
    const double noise = std::max(tolerance * sigma(0), rounding * moments.size);
    Eigen::Index rank = 0;
    while (rank < sigma.size() && sigma(rank) > noise) ++rank;
    const Eigen::VectorXcd inverse = sigma.head(rank).cwiseInverse().cast<Complex>();
    return {svd.matrixU().leftCols(rank), svd.matrixV().leftCols(rank) * inverse.asDiagonal(), rank,
            rank == sigma.size()};
}

// Linear eigenvalue problem of the moments ([Beyn2012], integral algorithms 1 and 2); residuals are not yet known.
std::vector<Eigenpair> linearised(const Moments& moments, int pairs, const Decomposition& b0,
                                  const EllipseContour& contour) {
    std::vector<Eigenpair> result;
    if (b0.rank == 0) return result;
    const MatrixXcd linear = b0.u.adjoint() * hankel(moments.a, pairs, 1) * b0.w;
    const Eigen::ComplexEigenSolver<MatrixXcd> solver(linear);
    const MatrixXcd vectors = b0.u.topRows(moments.a.front().rows()) * solver.eigenvectors();
    for (Eigen::Index i = 0; i < b0.rank; ++i)
        result.push_back(
            {contour.center + scale_of(contour) * solver.eigenvalues()(i), vectors.col(i).normalized(), 0});
    return result;
}

// The number of pairs of moments from which the rank is not full and no longer grows, or 0. One pair alone misses
// eigenvalues that share a vector.
int settled_pairs(const Moments& moments, int most_pairs, double tolerance) {
    Eigen::Index previous = -1;
    for (int pairs = 1; pairs <= most_pairs; ++pairs) {
        const Decomposition b0 = decompose(moments, pairs, tolerance);
        if (b0.rank == previous && !b0.full) return pairs;
        previous = b0.rank;
    }
    return 0;
}

// Mean Frobenius norm at the ends of the axes. The norm at an eigenvalue will not do: it may vanish there.
double norm_around(const MatrixFunction& matrix, const EllipseContour& contour) {
    const Complex real = contour.semi_real;
    const Complex imag = j * contour.semi_imag;
    double sum = 0;
    for (const Complex step : {real, -real, imag, -imag}) sum += matrix(contour.center + step).norm();
    return sum / 4;
}

// One step of Newton's method on T(s) v = 0, c^H v = 1; returns the change of s.
Complex newton_step(const MatrixFunction& matrix, Complex& s, VectorXcd& v, double h) {
    const Eigen::Index n = v.size();
    MatrixXcd bordered = MatrixXcd::Zero(n + 1, n + 1);
    bordered.topLeftCorner(n, n) = matrix(s);
    bordered.topRightCorner(n, 1) = (matrix(s + h) * v - matrix(s - h) * v) / (2 * h);
    bordered.bottomLeftCorner(1, n) = v.adjoint();
    VectorXcd right = VectorXcd::Zero(n + 1);
    right.head(n) = -bordered.topLeftCorner(n, n) * v;
    const VectorXcd change = bordered.partialPivLu().solve(right);
    s += change(n);
    v = (v + change.head(n)).normalized();
    return change(n);
}

Eigenpair polished(const MatrixFunction& matrix, Eigenpair start, double scale, double norm, int most_steps) {
    Eigenpair current = start;
    Eigenpair best = std::move(start);
    best.residual = (matrix(best.value) * best.vector).norm() / norm;
    for (int step = 0; step < most_steps; ++step) {
        const Complex change = newton_step(matrix, current.value, current.vector, 1e-5 * scale);
        if (!current.vector.allFinite() || !std::isfinite(std::abs(current.value))) break;
        current.residual = (matrix(current.value) * current.vector).norm() / norm;
        const bool better = current.residual < best.residual;
        if (better) best = current;
        if (!better || std::abs(change) < 1e-14 * (std::abs(current.value) + scale)) break;
    }
    return best;
}

// Two pairs are one when value and direction agree.
bool same(const Eigenpair& a, const Eigenpair& b, double scale) {
    return std::abs(a.value - b.value) < 1e-8 * scale && std::abs(a.vector.dot(b.vector)) > 1 - 1e-6;
}

std::vector<Eigenpair> accepted(const MatrixFunction& matrix, std::vector<Eigenpair> raw, const EllipseContour& contour,
                                const ContourOptions& options) {
    constexpr double margin = 1.05;  // polishing may pull a pair inside
    const double scale = scale_of(contour);
    const double norm = raw.empty() ? 1 : norm_around(matrix, contour);
    std::vector<Eigenpair> kept;
    for (Eigenpair& pair : raw) {
        if (!contour.contains(pair.value, margin)) continue;
        pair = polished(matrix, std::move(pair), scale, norm, options.newton_steps);
        if (!contour.contains(pair.value) || !(pair.residual <= options.residual_tolerance)) continue;
        const auto is_same = [&](const Eigenpair& other) { return same(pair, other, scale); };
        if (std::none_of(kept.begin(), kept.end(), is_same)) kept.push_back(std::move(pair));
    }
    std::sort(kept.begin(), kept.end(), [](const Eigenpair& a, const Eigenpair& b) {
        return std::pair(a.value.imag(), a.value.real()) < std::pair(b.value.imag(), b.value.real());
    });
    return kept;
}

}  // namespace

bool EllipseContour::contains(Complex s, double factor) const {
    const double x = (s.real() - center.real()) / (factor * semi_real);
    const double y = (s.imag() - center.imag()) / (factor * semi_imag);
    return x * x + y * y <= 1;
}

Eigenpair polish_eigenpair(const MatrixFunction& matrix, Eigenpair start, double scale, int most_steps) {
    const double norm = norm_around(matrix, {start.value, scale, scale});
    return polished(matrix, std::move(start), scale, norm, most_steps);
}

std::vector<Eigenpair> contour_eigenvalues(const MatrixFunction& matrix, const InverseFunction& inverse, int size,
                                           const EllipseContour& contour, const ContourOptions& options) {
    constexpr int few_pairs = 4;  // more columns are better conditioned than more moments
    for (int columns = std::min(options.columns, size);; columns = std::min(2 * columns, size)) {
        const MatrixXcd v = probing_vectors(size, columns, options.seed);
        const int most_pairs = columns < size ? std::min(few_pairs, options.most_moments) : options.most_moments;
        const Moments a = moments(inverse, v, contour, 2 * most_pairs, options.nodes);
        const int pairs = settled_pairs(a, most_pairs, options.rank_tolerance);
        if (pairs > 0) {
            const Decomposition b0 = decompose(a, pairs, options.rank_tolerance);
            return accepted(matrix, linearised(a, pairs, b0, contour), contour, options);
        }
        if (columns == size) break;
    }
    throw NumericalError(fmt::format("the contour holds more eigenvalues than {} moments of a {} x {} matrix resolve",
                                     options.most_moments, size, size));
}

std::vector<Eigenpair> contour_eigenvalues(const MatrixFunction& matrix, int size, const EllipseContour& contour,
                                           const ContourOptions& options) {
    const auto inverse = [&matrix](Complex s, const MatrixXcd& b) -> MatrixXcd {
        return matrix(s).partialPivLu().solve(b);
    };
    return contour_eigenvalues(matrix, inverse, size, contour, options);
}

}  // namespace annulet
