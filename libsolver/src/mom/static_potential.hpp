// Closed-form static potentials of a planar cell [Wilton1984], [Graglia1993].
#pragma once

#include "mom/element.hpp"

#include <array>

namespace annulet {

struct CellPotential {
    std::array<double, 4> scalar{};  ///< integral of 1/R over each triangle of the fan, m
    Vec3 vector{0, 0, 0};            ///< integral of r'/R over the whole cell, m^2
};

/// At the point r, anywhere in space.
CellPotential static_potential(const PlanarElement& source, const Vec3& r);

/// Integral of 1/R over the whole cell alone, m: at half the cost.
double static_charge_potential(const PlanarElement& source, const Vec3& r);

}  // namespace annulet
