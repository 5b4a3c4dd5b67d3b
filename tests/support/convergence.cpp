#include "support/convergence.hpp"

#include <annulet/numerics/roots.hpp>

#include <cmath>

namespace annulet::test {

double richardson(double fine_size, double coarse_size, double fine, double coarse, double order) {
    return fine + (fine - coarse) / (std::pow(coarse_size / fine_size, order) - 1);
}

Extrapolation extrapolate(const std::array<double, 3>& sizes, const std::array<double, 3>& values) {
    const double ratio = (values[2] - values[1]) / (values[1] - values[0]);
    const double medium = sizes[1] / sizes[0];
    const double coarse = sizes[2] / sizes[0];
    const auto excess = [=](double p) {
        return (std::pow(coarse, p) - std::pow(medium, p)) / (std::pow(medium, p) - 1) - ratio;
    };
    const double order = bracketed_root(excess, 0.05, 20, 1e-12);
    return {order, richardson(sizes[0], sizes[1], values[0], values[1], order)};
}

}  // namespace annulet::test
