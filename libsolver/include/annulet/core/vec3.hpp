// Points and vectors of space and of the board plane.
#pragma once

#include <Eigen/Core>
#include <Eigen/Geometry>

namespace annulet {

using Vec3 = Eigen::Vector3d;
using Vec2 = Eigen::Vector2d;

/// A plane point lifted to height `z_m`.
inline Vec3 lift(const Vec2& p, double z_m) {
    return {p.x(), p.y(), z_m};
}

}  // namespace annulet
