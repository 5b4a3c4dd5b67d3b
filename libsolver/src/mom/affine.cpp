// Symbols: k wavenumber, u = (k / k_max)^2, s = jck; P, A scalar and vector potential matrices, D divergence,
// W = D^T P D - k^2 A, E_q and O_q even and odd parts of W at the nodes u_q.
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/mom/affine.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <optional>
#include <utility>

#include "mom/elements.hpp"
#include "mom/pair_fill.hpp"
#include "mom/phase_interpolant.hpp"

namespace annulet {

using Complex = std::complex<double>;
using Eigen::Index;
using Eigen::MatrixXcd;
using Eigen::MatrixXd;
using Eigen::VectorXcd;
using Eigen::VectorXd;

namespace {

constexpr int fewest_fills = 4;
constexpr double node_tolerance = 1e-11;

Complex wavenumber(Complex s) {
    return s / Complex(0, constants::c0_m_per_s);
}

Eigen::Matrix3Xd centres(const std::vector<Element>& elements) {
    Eigen::Matrix3Xd centre = Eigen::Matrix3Xd::Zero(3, static_cast<Index>(elements.size()));
    for (Index e = 0; e < centre.cols(); ++e) {
        const Element& element = elements[static_cast<std::size_t>(e)];
        for (int i = 0; i < element.corners(); ++i)
            centre.col(e) += element.corner[static_cast<std::size_t>(i)] / element.corners();
    }
    return centre;
}

/// Mean of the centres of the elements that a function touches.
Eigen::Matrix3Xd function_centres(const Basis& basis, const std::vector<Element>& elements,
                                  const Eigen::Matrix3Xd& element_centre) {
    Eigen::Matrix3Xd centre = Eigen::Matrix3Xd::Zero(3, basis.unknowns);
    VectorXd count = VectorXd::Zero(basis.unknowns);
    for (std::size_t e = 0; e < elements.size(); ++e)
        for (int slot = 0; slot < elements[e].slots(); ++slot)
            for (Basis::Matrix::InnerIterator i(basis.slots, basis.first_slot[e] + slot); i; ++i) {
                centre.col(i.col()) += element_centre.col(static_cast<Index>(e));
                count[i.col()] += 1;
            }
    return centre * count.cwiseMax(1).cwiseInverse().asDiagonal();
}

/// The longest distance of two corners, images included; from the centres and the largest element.
double largest_distance_m(const std::vector<Element>& elements, const Eigen::Matrix3Xd& centre,
                          std::optional<double> ground_plane_m) {
    double largest = 0, radius = 0;
    for (Index e = 0; e < centre.cols(); ++e) {
        const Element& element = elements[static_cast<std::size_t>(e)];
        for (int i = 0; i < element.corners(); ++i)
            radius = std::max(radius, (element.corner[static_cast<std::size_t>(i)] - centre.col(e)).norm());
        for (Index other = 0; other <= e; ++other) {
            Vec3 apart = centre.col(e) - centre.col(other);
            if (ground_plane_m)
                apart.z() =
                    std::max(std::abs(apart.z()), std::abs(centre(2, e) + centre(2, other) - 2 * *ground_plane_m));
            largest = std::max(largest, apart.norm());
        }
    }
    return largest + 2 * radius;
}

/// Nodes in k^2 with which exp(-jx), 0 <= x <= `reach`, is known to `node_tolerance`: the Chebyshev coefficients are
/// Bessel functions, 2 J_2n(reach) <= 2 (reach/2)^2n / (2n)! [Olver2010, 10.14.4].
int nodes_for(double reach) {
    int n = 3;
    const auto bound = [&] {
        return std::log(2.0) + 2 * n * std::log(std::max(reach, 1e-6) / 2) - std::lgamma(2 * n + 1);
    };
    while (2 * n < reach || bound() > std::log(node_tolerance)) ++n;
    return n;
}

/// Packed lower triangle of D^T P D + a A, P and A packed.
VectorXcd combine(const Eigen::SparseMatrix<double>& d, const VectorXcd& p, Complex a, const VectorXcd& vector) {
    using Column = Eigen::SparseMatrix<double>::InnerIterator;
    const Index n = d.cols(), cells = d.rows();
    VectorXcd packed(packed_size(n));
#pragma omp parallel for schedule(dynamic, 16)
    for (Index c = 0; c < n; ++c) {
        VectorXcd potential = VectorXcd::Zero(cells);  // of the charges of function c
        for (Column q(d, c); q; ++q)
            for (Index row = 0; row < cells; ++row) potential[row] += q.value() * p[packed_index(cells, row, q.row())];
        for (Index r = c; r < n; ++r) {
            const Index at = packed_column(n, c) + r - c;
            Complex sum = a * vector[at];
            for (Column q(d, r); q; ++q) sum += q.value() * potential[q.row()];
            packed[at] = sum;
        }
    }
    return packed;
}

template <typename Vector>
auto unpack(Index n, const Vector& packed) {
    using Scalar = typename Vector::Scalar;
    Eigen::Matrix<Scalar, Eigen::Dynamic, Eigen::Dynamic> full(n, n);
    for (Index c = 0; c < n; ++c) full.col(c).tail(n - c) = packed.segment(packed_column(n, c), n - c);
    constexpr Index tile = 32;  // columns and rows of one tile share the cache
    for (Index column = 0; column < n; column += tile)
        for (Index row = column; row < n; row += tile)
            for (Index c = column; c < std::min(column + tile, n); ++c)
                for (Index r = std::max(row, c + 1); r < std::min(row + tile, n); ++r) full(c, r) = full(r, c);
    return full;
}

}  // namespace

AffineMemory affine_memory(int unknowns, int cells, int fills, int nodes, int factors, AffineStorage storage) {
    const double n = unknowns, c = cells, a2 = n * (n + 1) / 2, p2 = c * (c + 1) / 2;
    constexpr double real = sizeof(double), complex = sizeof(Complex);
    AffineMemory memory;
    memory.kept_interpolants_bytes = fills * complex * (a2 + p2);
    memory.kept_terms_bytes = 2 * (nodes + 1) * real * a2;
    const bool terms = storage == AffineStorage::terms;
    const double filling = memory.kept_interpolants_bytes + complex * (2 * n * n + c * c);
    const double building =
        memory.kept_interpolants_bytes + (terms ? memory.kept_terms_bytes : 0) + complex * (2 * a2 + 2 * p2);
    const double sweeping =
        (terms ? memory.kept_terms_bytes : memory.kept_interpolants_bytes) + (factors + 2) * complex * n * n;
    memory.peak_bytes = std::max({filling, building, sweeping});
    return memory;
}

Complex factor_derivative(const ExactTerm& term, Complex s) {
    const double h = 1e-3 * std::abs(s);
    const auto difference = [&](double step) { return (term.factor(s + step) - term.factor(s - step)) / (2 * step); };
    return (4.0 * difference(h / 2) - difference(h)) / 3.0;
}

AffineOperator::AffineOperator(const Operator& op, double top_hz, const AffineOptions& options, Progress* progress)
    : op_(&op), top_hz_(top_hz), exact_(op.exact_terms()) {
    fill(options, progress);
    const int cells = static_cast<int>(op.basis().divergence.rows());
    const AffineMemory memory = affine_memory(op.unknowns(), cells, fills_, nodes(), 0);
    storage_ = options.storage;
    if (storage_ == AffineStorage::automatic)
        storage_ = memory.kept_terms_bytes + memory.kept_interpolants_bytes <= options.memory_limit_bytes
                       ? AffineStorage::terms
                       : AffineStorage::interpolants;
    if (storage_ == AffineStorage::interpolants) return;
    MatrixXd columns(packed_size(op.unknowns()), terms());
    make_terms([&](int q, const VectorXd& packed) { columns.col(q) = packed; });
    terms_ = std::move(columns);
    scalar_.reset();
    vector_.reset();
}

AffineOperator::~AffineOperator() = default;
AffineOperator::AffineOperator(AffineOperator&&) noexcept = default;
AffineOperator& AffineOperator::operator=(AffineOperator&&) noexcept = default;

void AffineOperator::fill(const AffineOptions& options, Progress* progress) {
    const double k_max = 2 * constants::pi * top_hz_ / constants::c0_m_per_s;
    const auto elements = make_elements(op_->mesh());
    const Eigen::Matrix3Xd centre = centres(elements);
    scalar_ = std::make_unique<PhaseInterpolant>(centre.leftCols(op_->basis().divergence.rows()));
    vector_ = std::make_unique<PhaseInterpolant>(function_centres(op_->basis(), elements, centre));
    choose_nodes(k_max * largest_distance_m(elements, centre, op_->mesh().ground_plane_m));
    for (const double x : leja_points(options.most_fills)) {
        checkpoint(progress, "fill", static_cast<std::size_t>(fills_), 0);
        const double k = x * k_max;
        const Potentials exact = fill_potentials(op_->pair_tables(), op_->basis(), k, true);
        const bool enough = fills_ >= fewest_fills;
        if (enough)
            interpolation_error_ =
                std::max(scalar_->relative_difference(k, exact.scalar), vector_->relative_difference(k, exact.vector));
        scalar_->add(k, exact.scalar);
        vector_->add(k, exact.vector);
        ++fills_;
        if (enough && interpolation_error_ <= options.fill_tolerance) return;
    }
    throw NumericalError(fmt::format("{} fills up to {:.6g} MHz leave an interpolation error of {:.2g}, above {:.2g}",
                                     fills_, top_hz_ / 1e6, interpolation_error_, options.fill_tolerance));
}

void AffineOperator::choose_nodes(double reach) {
    const int n = nodes_for(reach);
    node_ = VectorXd::Zero(n + 1);
    for (int q = 1; q <= n; ++q) node_[q] = 0.5 - 0.5 * std::cos(constants::pi * (q - 0.5) / n);
}

std::size_t AffineOperator::bytes() const {
    if (storage_ == AffineStorage::interpolants) return scalar_->bytes() + vector_->bytes();
    return static_cast<std::size_t>(terms_.size()) * sizeof(double);
}

VectorXcd AffineOperator::packed_field(Complex k) const {
    return combine(op_->basis().divergence, scalar_->value(k), -k * k, vector_->value(k));
}

VectorXcd AffineOperator::packed_field_derivative(Complex k) const {
    return combine(op_->basis().divergence, scalar_->derivative(k), -k * k, vector_->derivative(k)) -
           2.0 * k * vector_->value(k);
}

void AffineOperator::make_terms(const std::function<void(int, const VectorXd&)>& use) const {
    const double k_max = 2 * constants::pi * top_hz_ / constants::c0_m_per_s;
    const int n = nodes();
    const Eigen::SparseMatrix<double> d = op_->basis().divergence;
    const VectorXcd at_zero = lagrange(node_.tail(n), 0.0);
    VectorXcd charge = VectorXcd::Zero(packed_size(d.rows()));  // Im P / k at k = 0
    for (int q = 1; q <= n; ++q) {
        const double k = k_max * std::sqrt(node_[q]);
        const VectorXcd p = scalar_->value(k);
        charge += (at_zero[q - 1].real() / k) * p.imag();
        const VectorXcd w = combine(d, p, -k * k, vector_->value(k));
        use(q, w.real());
        use(n + 1 + q, w.imag() / k);
    }
    const VectorXcd none = VectorXcd::Zero(packed_size(d.cols()));
    use(0, combine(d, scalar_->value(0), 0, none).real());
    use(n + 1, combine(d, charge, 0, none).real());
}

VectorXcd AffineOperator::coefficients(Complex s) const {
    const double w_max = 2 * constants::pi * top_hz_;
    const VectorXcd e = lagrange(node_, -(s / w_max) * (s / w_max));
    VectorXcd all(terms());
    all << e / (s * constants::eps0_f_per_m), e * constants::eta0_ohm;
    return all;
}

VectorXcd AffineOperator::coefficient_derivatives(Complex s) const {
    const double w_max = 2 * constants::pi * top_hz_;
    const Complex u = -(s / w_max) * (s / w_max);
    const VectorXcd e = lagrange(node_, u), slope = lagrange_derivative(node_, u) * (2.0 * u / s);
    VectorXcd all(terms());
    all << (slope - e / s) / (s * constants::eps0_f_per_m), slope * constants::eta0_ohm;
    return all;
}

// On the imaginary axis factors are real or imaginary, so each term enters one of both parts only.
VectorXcd AffineOperator::sum_terms(const VectorXcd& factor) const {
    VectorXcd packed(terms_.rows());
    const VectorXd real = factor.real(), imaginary = factor.imag();
    constexpr Index block = 512;  // rows that stay in the cache over all terms
    const Index half = factor.size() / 2;
#pragma omp parallel for schedule(static)
    for (Index first = 0; first < packed.size(); first += block) {
        const Index rows = std::min(block, packed.size() - first);
        const auto part = [&](const VectorXd& weight) {
            VectorXd sum = VectorXd::Zero(rows);
            for (Index from : {Index{0}, half})
                if (!weight.segment(from, half).isZero(0))
                    sum += terms_.block(first, from, rows, half) * weight.segment(from, half);
            return sum;
        };
        packed.segment(first, rows).real() = part(real);
        packed.segment(first, rows).imag() = part(imaginary);
    }
    return packed;
}

MatrixXcd AffineOperator::assemble(const VectorXcd& packed) const {
    return unpack(op_->unknowns(), packed);
}

MatrixXcd AffineOperator::impedance_matrix(Complex s) const {
    MatrixXcd z = assemble(terms_.size() > 0 ? sum_terms(coefficients(s))
                                             : (packed_field(wavenumber(s)) / (s * constants::eps0_f_per_m)).eval());
    for (const ExactTerm& term : exact_) z += term.factor(s) * term.matrix.cast<Complex>();
    return z;
}

MatrixXcd AffineOperator::derivative(Complex s) const {
    MatrixXcd z;
    if (terms_.size() > 0) {
        z = assemble(sum_terms(coefficient_derivatives(s)));
    } else {
        const Complex k = wavenumber(s);
        const VectorXcd slope = packed_field_derivative(k) / Complex(0, constants::c0_m_per_s) - packed_field(k) / s;
        z = assemble(slope / (s * constants::eps0_f_per_m));
    }
    for (const ExactTerm& term : exact_) z += factor_derivative(term, s) * term.matrix.cast<Complex>();
    return z;
}

MatrixXcd AffineOperator::apply(Complex s, const MatrixXcd& x) const {
    return impedance_matrix(s) * x;
}

void AffineOperator::for_each_term(const std::function<void(int, const MatrixXd&)>& use) const {
    const Index n = op_->unknowns();
    if (terms_.size() == 0) {
        make_terms([&](int q, const VectorXd& packed) { use(q, unpack(n, packed)); });
        return;
    }
    for (int q = 0; q < terms(); ++q) use(q, unpack(n, terms_.col(q)));
}

}  // namespace annulet
