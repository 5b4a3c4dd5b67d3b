// Triangles of graded size in a region whose outline must not be divided any further.
#pragma once

#include <annulet/geometry/boolean.hpp>

#include <array>
#include <functional>
#include <span>
#include <vector>

namespace annulet {

struct Triangulation {
    std::vector<Vec2> points;                   ///< those of the loops in their order, then the inner ones
    std::vector<std::array<int, 3>> triangles;  ///< counter-clockwise
};

/// Constrained Delaunay triangulation of the region between an outer loop and its holes, refined by circumcentres
/// [Ruppert1995], without points on the outline, then smoothed. `size_m`: wanted edge length at a point.
/// Throws NumericalError if the outline crosses itself.
Triangulation triangulate(std::span<const Loop> loops, const std::function<double(const Vec2&)>& size_m);

}  // namespace annulet
