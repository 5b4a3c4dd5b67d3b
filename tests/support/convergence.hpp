// Observed order of convergence and extrapolation from solutions on three meshes.
#pragma once

#include <array>

namespace annulet::test {

struct Extrapolation {
    double order;  ///< p of f(h) = f(0) + C h^p
    double limit;  ///< f(0) [Richardson1911]
};

/// From `values` at the mesh sizes `sizes`, finest first (any ratios). Throws `NumericalError` if the values do not
/// fall toward a limit with an order in [0.05, 20].
Extrapolation extrapolate(const std::array<double, 3>& sizes, const std::array<double, 3>& values);

/// f(0) from two values when the order is known.
double richardson(double fine_size, double coarse_size, double fine, double coarse, double order);

}  // namespace annulet::test
