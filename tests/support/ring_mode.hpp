// The first azimuthal mode of a closed strip ring, from the matrix of its operator.
#pragma once

#include <annulet/mom/operator.hpp>

namespace annulet::test {

/// Coefficients of the current cos(phi), total 1 A, on a closed annulus of test_meshes: the share of each row of
/// cells is that of the static edge profile 1/sqrt(1 - (2t/w)^2); `across` are its nodes on [0, 1].
Eigen::VectorXd cosine_current(const Mesh& mesh, const Basis& basis, const std::vector<double>& across);

/// Zero of Im(c^T Z c), Hz, between the two frequencies.
double mode_frequency_hz(const Operator& op, const Eigen::VectorXd& current, double from_hz, double to_hz);

/// Static inductance (H) of the perfectly conducting annulus: rows of cells carry uniform currents that share one
/// flux, L = 1 / (1^T L_ij^-1 1).
double ring_inductance_h(const Operator& op, int rows);

/// Capacitance (F) of the conductor made of all cells: C = 1^T P^-1 1 eps0.
double capacitance_f(const Operator& op);

}  // namespace annulet::test
