// The Galerkin matrix of the mixed-potential integral equation: all that does not depend on frequency
// is computed in the constructor, once per geometry.
#pragma once

#include <annulet/mesh/mesh.hpp>
#include <annulet/mom/basis.hpp>
#include <annulet/mom/permittivity.hpp>

#include <Eigen/Core>
#include <Eigen/SparseCore>

#include <complex>
#include <functional>
#include <memory>
#include <vector>

namespace annulet {

struct PairTables;  // quadrature tables and near-field statics (src/mom)

/// A part of the matrix whose dependence on s = sigma + jw is known exactly: `factor`(s) times `matrix`, unknowns x
/// unknowns, symmetric. `factor` is analytic near the imaginary axis, with factor(conj s) = conj factor(s), ohm.
struct ExactTerm {
    Eigen::SparseMatrix<double> matrix;
    std::function<std::complex<double>(std::complex<double> s)> factor;
};

/// Z_mn = jw mu0 <f_m, G f_n> + (1/jw eps0) <div f_m, G div f_n> + surface impedance + lumped parts, with
/// G = exp(-jkR)/(4 pi R) [Harrington1968]; with a ground plane G acts on the images too.
class Operator {
public:
    /// `parts` in the order of Mesh::lumped. Computes the static moments of near pairs and all tables. A conductor
    /// is either foil or wire of one radius: throws std::invalid_argument where cells of both kinds share one.
    explicit Operator(Mesh mesh, std::vector<Lumped> parts = {});
    ~Operator();
    Operator(Operator&&) noexcept;
    Operator& operator=(Operator&&) noexcept;

    const Mesh& mesh() const { return mesh_; }
    const Basis& basis() const { return basis_; }
    int unknowns() const { return basis_.unknowns; }
    int ports() const { return static_cast<int>(port_vectors_.cols()); }

    /// Voltage vectors of unit port voltage: unknowns x ports, V_m = <f_m, V/g> over the gap (dimensionless).
    const Eigen::MatrixXd& port_vectors() const { return port_vectors_; }
    /// The same for the lumped parts: unknowns x parts.
    const Eigen::MatrixXd& lumped_vectors() const { return lumped_vectors_; }
    const std::vector<Lumped>& parts() const { return parts_; }

    /// Z in ohm, unknowns x unknowns, at `frequency_hz` > 0. Complex symmetric if `symmetrise`, else as the
    /// quadrature leaves it (a test of the quadrature).
    Eigen::MatrixXcd impedance_matrix(double frequency_hz, bool symmetrise = true) const;

    /// Static matrices (k = 0): <f_m, G f_n> (m), unknowns x unknowns, and potential coefficients times eps0 of
    /// unit charges (1/m) on the elements that carry charge.
    Eigen::MatrixXd static_vector_potential() const;
    Eigen::MatrixXd static_scalar_potential() const;

    /// Sum over conductors of the impedance of the sheet (ohm) or of the round wire (ohm/m) times <f_m, f_n>: ohm,
    /// unknowns x unknowns.
    Eigen::SparseMatrix<std::complex<double>> surface_impedance_matrix(double frequency_hz) const;

    /// All that Z holds beside the two potentials: surface impedances, masses of the sheets, lumped parts. Independent
    /// of this object.
    std::vector<ExactTerm> exact_terms() const;

    const PairTables& pair_tables() const { return *tables_; }

private:
    Mesh mesh_;
    Basis basis_;
    std::vector<Lumped> parts_;
    Eigen::MatrixXd port_vectors_, lumped_vectors_;
    std::vector<Eigen::SparseMatrix<double>> gram_;  ///< per conductor: <f_m, f_n> on its cells
    std::vector<Permittivity> permittivities_;       ///< per sheet
    std::vector<double> wire_radius_m_;              ///< per conductor: of the round wire; 0: foil
    std::unique_ptr<PairTables> tables_;
};

}  // namespace annulet
