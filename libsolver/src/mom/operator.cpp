#include <annulet/core/constants.hpp>
#include <annulet/mom/operator.hpp>

#include <stdexcept>
#include <utility>

#include "mom/element.hpp"
#include "mom/gram.hpp"
#include "mom/pair_fill.hpp"
#include "mom/surface_impedance.hpp"

namespace annulet {

using Complex = std::complex<double>;

namespace {

std::vector<double> wire_radii(const Mesh& mesh) {
    std::vector<double> radii(mesh.conductors.size(), -1);
    for (const Cell& cell : mesh.cells) {
        if (cell.conductor < 0) continue;
        double& known = radii[static_cast<std::size_t>(cell.conductor)];
        const double radius = cell.kind == CellKind::segment ? cell.radius_m : 0;
        if (known >= 0 && known != radius)
            throw std::invalid_argument("foil and wire, or wires of different radii, share a conductor of the mesh");
        known = radius;
    }
    return radii;
}

/// Of foil in ohm, of a round wire in ohm/m.
Complex conductor_impedance(const Conductor& conductor, double wire_radius_m, Complex s) {
    return wire_radius_m > 0 ? wire_impedance_per_m(conductor, wire_radius_m, s) : sheet_impedance(conductor, s);
}

}  // namespace

Operator::Operator(Mesh mesh, std::vector<Lumped> parts)
    : mesh_(std::move(mesh)), basis_(make_basis(mesh_)), parts_(std::move(parts)) {
    port_vectors_ = gap_vectors(mesh_, basis_, mesh_.ports);
    lumped_vectors_ = gap_vectors(mesh_, basis_, mesh_.lumped);
    gram_ = gram_matrices(mesh_, basis_);
    for (const SheetMesh& sheet : mesh_.sheets)
        permittivities_.emplace_back(mesh_.laminates[static_cast<std::size_t>(sheet.laminate)]);
    wire_radius_m_ = wire_radii(mesh_);
    tables_ = std::make_unique<PairTables>(make_pair_tables(mesh_, basis_));
}

Operator::~Operator() = default;
Operator::Operator(Operator&&) noexcept = default;
Operator& Operator::operator=(Operator&&) noexcept = default;

Eigen::MatrixXcd Operator::impedance_matrix(double frequency_hz, bool symmetrise) const {
    const double w = 2 * constants::pi * frequency_hz, k = w / constants::c0_m_per_s;
    Potentials g = fill_potentials(*tables_, basis_, k, symmetrise);
    const Eigen::SparseMatrix<double> d = basis_.divergence;
    Eigen::MatrixXcd z = d.transpose() * (g.scalar * d).eval();
    z *= 1.0 / Complex(0, w * constants::eps0_f_per_m);
    z += Complex(0, w * constants::mu0_h_per_m) * g.vector;
    z += surface_impedance_matrix(frequency_hz);
    for (std::size_t i = 0; i < mesh_.sheets.size(); ++i)
        z += polarisation_factor(permittivities_[i], Complex(0, w)) * basis_.polarisation_mass[i].cast<Complex>();
    for (std::size_t i = 0; i < parts_.size(); ++i) {
        const Eigen::VectorXd v = lumped_vectors_.col(static_cast<int>(i));
        z += part_impedance(parts_[i], frequency_hz) * (v * v.transpose()).cast<Complex>();
    }
    if (symmetrise) z = (0.5 * (z + z.transpose())).eval();  // the products above round differently either way
    return z;
}

Eigen::MatrixXd Operator::static_vector_potential() const {
    return fill_potentials(*tables_, basis_, 0, true).vector.real();
}

Eigen::MatrixXd Operator::static_scalar_potential() const {
    return fill_potentials(*tables_, basis_, 0, true).scalar.real();
}

Eigen::SparseMatrix<Complex> Operator::surface_impedance_matrix(double frequency_hz) const {
    Eigen::SparseMatrix<Complex> sum(unknowns(), unknowns());
    const Complex s(0, 2 * constants::pi * frequency_hz);
    for (std::size_t i = 0; i < gram_.size(); ++i)
        if (!mesh_.conductors[i].perfect())
            sum += conductor_impedance(mesh_.conductors[i], wire_radius_m_[i], s) * gram_[i].cast<Complex>();
    return sum;
}

std::vector<ExactTerm> Operator::exact_terms() const {
    std::vector<ExactTerm> terms;
    for (std::size_t i = 0; i < gram_.size(); ++i)
        if (!mesh_.conductors[i].perfect())
            terms.push_back({gram_[i], [conductor = mesh_.conductors[i], radius_m = wire_radius_m_[i]](Complex s) {
                                 return conductor_impedance(conductor, radius_m, s);
                             }});
    for (std::size_t i = 0; i < permittivities_.size(); ++i)
        terms.push_back({basis_.polarisation_mass[i], [permittivity = permittivities_[i]](Complex s) {
                             return polarisation_factor(permittivity, s);
                         }});
    for (std::size_t i = 0; i < parts_.size(); ++i) {
        const Eigen::SparseMatrix<double> v = Eigen::MatrixXd(lumped_vectors_.col(static_cast<int>(i))).sparseView();
        terms.push_back({v * v.transpose(), [part = parts_[i]](Complex s) { return part_impedance(part, s); }});
    }
    return terms;
}

}  // namespace annulet
