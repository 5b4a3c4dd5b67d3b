// The Galerkin matrix of the mixed-potential integral equation: all that does not depend on frequency
// is computed in the constructor, once per geometry.
#pragma once

#include <annulet/mesh/mesh.hpp>
#include <annulet/mom/basis.hpp>

#include <Eigen/Core>

#include <complex>
#include <memory>
#include <vector>

namespace annulet {

struct FieldTables;   // quadrature tables of the elements (src/mom)
struct StaticMoments; // closed-form near-field statics (src/mom)

class Operator {
public:
    /// Computes the static moments of near pairs and the quadrature tables.
    explicit Operator(Mesh mesh);
    ~Operator();
    Operator(Operator&&) noexcept;
    Operator& operator=(Operator&&) noexcept;

    const Mesh& mesh() const { return mesh_; }
    const Basis& basis() const { return basis_; }
    int unknowns() const { return basis_.unknowns; }

    /// Voltage vectors of unit port voltage: unknowns x ports, V_m = <f_m, V/g> over the gap.
    const Eigen::MatrixXd& port_vectors() const { return port_vectors_; }
    /// The same for the lumped parts, unknowns x parts.
    const Eigen::MatrixXd& lumped_vectors() const { return lumped_vectors_; }

    /// Z (ohm, unknowns x unknowns, complex symmetric) at `frequency_hz`: fields, surface impedance and parts.
    Eigen::MatrixXcd impedance_matrix(double frequency_hz) const;
    /// The same before symmetrising, for tests of the quadrature.
    Eigen::MatrixXcd impedance_matrix_unsymmetrised(double frequency_hz) const;

    /// Impedance of the lumped parts at the frequency, by the order of `Mesh::lumped`; set from the model.
    using PartImpedance = std::vector<std::complex<double>> (*)(double);
    void set_lumped(std::vector<Lumped> parts) { parts_ = std::move(parts); }

    /// Vector potential matrix <f_m, G f_n> (m) and panel potential matrix (1/m) at wavenumber k (1/m);
    /// `symmetrise` averages the two testing orders of near pairs.
    Eigen::MatrixXcd vector_potential(double k_per_m, bool symmetrise = true) const;
    Eigen::MatrixXcd scalar_potential(double k_per_m, bool symmetrise = true) const;

private:
    Mesh mesh_;
    Basis basis_;
    Eigen::MatrixXd port_vectors_, lumped_vectors_;
    std::vector<Lumped> parts_;
    std::unique_ptr<FieldTables> tables_;
    std::unique_ptr<StaticMoments> statics_;
};

}  // namespace annulet
