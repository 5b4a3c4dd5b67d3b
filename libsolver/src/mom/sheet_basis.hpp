// Polarisation flux in the sheets: solenoidal in every brick or prism, so that bound charge sits on faces and walls
// only.
#pragma once

#include <annulet/mom/basis.hpp>

#include <vector>

namespace annulet {

struct BasisTriplets {
    std::vector<Eigen::Triplet<double>> slots, divergence;
};

/// Adds the unknowns of all sheets to `basis.unknowns`, their slots and first_slot entries behind the metal's `rows`
/// (which grows), their charges to the triplets. Returns the number of elements that carry charge.
int append_sheets(const Mesh& mesh, int& rows, Basis& basis, BasisTriplets& triplets);

/// See Basis::polarisation_mass; needs the finished `slots`.
std::vector<Eigen::SparseMatrix<double>> polarisation_mass(const Mesh& mesh, const Basis& basis);

}  // namespace annulet
