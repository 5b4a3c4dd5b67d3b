// Overlap integrals of the basis functions with each other and with the impressed field of the gaps.
#pragma once

#include <annulet/mom/basis.hpp>

#include <vector>

#include "mom/element.hpp"

namespace annulet {

/// <f_a, f_b> of the local functions over one planar element, dimensionless.
Eigen::Matrix4d planar_gram(const PlanarElement& element);

/// The same for the rooftop functions f = u r_u / J of the bilinear map (triangles: as above). Polarisation flux is
/// held by its energy, and on a cell of aspect ratio b/a the fields built from triangles carry b/4a times the flux
/// sideways, which costs nothing in the vector potential but (b/4a)^2 in the energy.
Eigen::Matrix4d rooftop_gram(const PlanarElement& element);

/// <f_m, f_n> over the cells of each conductor (dimensionless; wires per metre of circumference are handled by
/// the impedance per length, so there it is in metres): one unknowns x unknowns matrix per Mesh::conductors entry.
std::vector<Eigen::SparseMatrix<double>> gram_matrices(const Mesh& mesh, const Basis& basis);

/// V_m = <f_m, field_per_m> over the cells of each gap: unknowns x gaps, dimensionless.
Eigen::MatrixXd gap_vectors(const Mesh& mesh, const Basis& basis, const std::vector<Gap>& gaps);

}  // namespace annulet
