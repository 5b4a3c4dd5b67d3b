// Far field of sampled currents.
#pragma once

#include <annulet/mom/current_samples.hpp>

#include <Eigen/Core>

namespace annulet {

/// Radiation vector transverse to each direction (A m): N_t = (1 - rr) sum_p moment_p exp(jk r . r_p), so that
/// E = -jk eta0 exp(-jkr)/(4 pi r) N_t  [Balanis2005] (3-58). The current of a wire flows on its tube: its moments
/// carry the factor J0(k a sin theta), theta from the axis, to the order (ka)^4. `directions`: n x 3 unit vectors;
/// result 3 x n.
Eigen::Matrix3Xcd radiation_vectors(const CurrentSamples& currents, double k_per_m, const Eigen::MatrixX3d& directions);

/// Power through the sphere (upper half with a ground plane), W: (eta0 k^2 / 32 pi^2) times the integral of |N_t|^2,
/// by a product rule fine enough for the size of the antenna.
double radiated_power_w(const Operator& op, const Eigen::VectorXcd& coefficients, double frequency_hz);

}  // namespace annulet
