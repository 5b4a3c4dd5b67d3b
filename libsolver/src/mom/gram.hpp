// Overlap integrals of the basis functions with each other and with the impressed field of the gaps.
#pragma once

#include <annulet/mom/basis.hpp>

#include <vector>

#include "mom/element.hpp"

namespace annulet {

/// <f_a, f_b> of the local functions over one planar element, dimensionless.
Eigen::Matrix4d planar_gram(const PlanarElement& element);

/// <f_m, f_n> over the cells of each conductor (dimensionless; wires per metre of circumference are handled by
/// the impedance per length, so there it is in metres): one unknowns x unknowns matrix per Mesh::conductors entry.
std::vector<Eigen::SparseMatrix<double>> gram_matrices(const Mesh& mesh, const Basis& basis);

/// V_m = <f_m, field_per_m> over the cells of each gap: unknowns x gaps, dimensionless.
Eigen::MatrixXd gap_vectors(const Mesh& mesh, const Basis& basis, const std::vector<Gap>& gaps);

}  // namespace annulet
