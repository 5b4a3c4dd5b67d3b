// The current of a solution as point moments: what far and near fields are summed from.
#pragma once

#include <annulet/mom/operator.hpp>

#include <Eigen/Core>

namespace annulet {

/// Quadrature points of the current on all cells.
struct CurrentSamples {
    Eigen::Matrix3Xd position_m;      ///< 3 x points
    Eigen::Matrix3Xcd moment_a_m;     ///< 3 x points: weight times current density, ampere metre
    Eigen::VectorXcd charge_c_per_s;  ///< points: weight times div J, ampere (charge = -1/(jw) of it)
    Eigen::VectorXd radius_m;         ///< points: of the wire whose axis the point lies on, 0 on surfaces
    std::vector<int> element;         ///< of each point: mesh cells first, then panels and layers of the sheets
};

/// From coefficients of the unknowns (A). With a ground plane, `with_images` adds the image currents.
CurrentSamples sample_currents(const Operator& op, const Eigen::VectorXcd& coefficients, bool with_images = true);

}  // namespace annulet
