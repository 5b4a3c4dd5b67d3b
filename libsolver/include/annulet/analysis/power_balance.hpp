// Where the power into a port goes.
#pragma once

#include <annulet/mom/operator.hpp>

#include <Eigen/Core>

namespace annulet {

struct PowerBalance {
    double frequency_hz = 0;
    double input_w = 0;
    double radiated_w = 0;    ///< through the far sphere
    double dissipated_w = 0;  ///< in metal, sheets and lumped parts
    /// (radiated + dissipated) / input: 1 but for the quadrature.
    double ratio() const { return (radiated_w + dissipated_w) / input_w; }
};

/// Of the currents (unknowns, A) that a voltage of 1 V drives at a port of input admittance `admittance_s`.
PowerBalance power_balance(const Operator& op, const Eigen::VectorXcd& currents_a, std::complex<double> admittance_s,
                           double frequency_hz);

}  // namespace annulet
